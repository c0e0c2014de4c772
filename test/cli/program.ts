// Runs the bundled program in child processes. The bundle is built once for the tests of this folder, inside
// node_modules, so that it finds the rules of the checkout and leaves dist/ alone.

import { type SpawnSyncReturns, spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

export const checkout = fileURLToPath(new URL('../../', import.meta.url));

/** A bundle that can be run and removed. */
export interface Program {
  readonly path: string;
  run(
    args: readonly string[],
    options?: { input?: string | Buffer; env?: Record<string, string>; cwd?: string },
  ): SpawnSyncReturns<string>;
  remove(): void;
}

/** Builds the program. Throws when the build fails. */
export function buildProgram(): Program {
  const folder = mkdtempSync(join(checkout, 'node_modules', '.saltus-'));
  const built = spawnSync(process.execPath, ['.build.mjs', '--no-types', '--outdir', folder], {
    cwd: checkout,
    encoding: 'utf8',
  });
  if (built.status !== 0) throw new Error(`the build failed:\n${built.stderr}`);
  const path = join(folder, 'saltus.js');
  return {
    path,
    run: (args, { input = '', env = {}, cwd = checkout } = {}) =>
      spawnSync(process.execPath, [path, ...args], {
        cwd,
        input,
        encoding: 'utf8',
        env: { PATH: process.env.PATH ?? '', ...env },
        timeout: 60_000,
      }),
    remove: () => rmSync(folder, { recursive: true, force: true }),
  };
}
