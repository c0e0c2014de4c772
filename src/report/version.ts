// The version of this program. The bundle has it written in at build time, so that `--version` opens no file.

import { readFileSync } from 'node:fs';

/** Replaced by the build; absent when the sources run as they are. */
declare const SALTUS_VERSION: string | undefined;

function versionOfSources(): string {
  const description = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8'));
  return String(description.version);
}

/** Version as in package.json, e.g. `0.1.0`. */
export const version: string = typeof SALTUS_VERSION === 'string' ? SALTUS_VERSION : versionOfSources();
