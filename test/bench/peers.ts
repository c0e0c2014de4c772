// General-purpose algebra systems, driven by scripts from outside the project that print one JSON line each:
// {task, system, size, seconds, result}, seconds inside the process. The folder of scripts is given by --peers or
// SALTUS_PEERS; a system that is not installed, fails or takes too long is left out with the reason.

import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';

export interface PeerResult {
  readonly system: string;
  readonly seconds: number;
  readonly result: unknown;
}

export type PeerOutcome = PeerResult | { readonly system: string; readonly skipped: string };

/** How the scripts of one system are started. Python must be the one that the system's packages are installed for. */
const systems = {
  SymPy: { program: '/usr/bin/python3', probe: ['-c', 'import sympy'], extension: 'py' },
  PARI: { program: 'gp', probe: ['--version'], extension: 'sh' },
  FORM: { program: 'form', probe: ['-v'], extension: 'sh' },
  Maxima: { program: 'maxima', probe: ['--version'], extension: 'sh' },
} as const;

export type SystemName = keyof typeof systems;
export const systemNames = Object.keys(systems) as SystemName[];

/** Exit code of timeout(1) when it had to end the program. */
const TIMED_OUT = 124;

/** A folder of scripts and a folder for what they write. */
export class Peers {
  private readonly installed = new Map<SystemName, boolean>();

  constructor(
    readonly folder: string,
    readonly scratch: string,
    readonly timeoutSeconds: number,
  ) {}

  private isInstalled(name: SystemName): boolean {
    let found = this.installed.get(name);
    if (found === undefined) {
      const { program, probe } = systems[name];
      found = spawnSync(program, probe, { stdio: 'ignore', timeout: 30_000 }).status === 0;
      this.installed.set(name, found);
    }
    return found;
  }

  /** Runs the script of a task, e.g. t1_pari.sh, in one system. */
  run(name: SystemName, task: 't1' | 't2', args: readonly string[]): PeerOutcome {
    const { extension } = systems[name];
    const script = path.join(this.folder, `${task}_${name.toLowerCase()}.${extension}`);
    if (!existsSync(script)) return { system: name, skipped: 'no script' };
    if (!this.isInstalled(name)) return { system: name, skipped: 'not installed' };
    const [program, all] = extension === 'py' ? [systems[name].program, [script, ...args]] : [script, args];
    const run = this.spawn(program, all);
    if (run.status === TIMED_OUT) return { system: name, skipped: `more than ${this.timeoutSeconds} s` };
    const line = run.stdout.split('\n').find((l) => l.startsWith('{'));
    if (line === undefined) return { system: name, skipped: `no result (exit code ${run.status})` };
    const { seconds, result } = JSON.parse(line) as PeerResult;
    return { system: name, seconds, result };
  }

  /** The input file of T2, written by the generator that belongs to the scripts; undefined when it did not run. */
  equivalenceInput(d: number, mode: string): unknown {
    const generator = path.join(this.folder, 't2_gen.py');
    if (!existsSync(generator) || this.spawn('/usr/bin/python3', [generator, String(d), mode]).status !== 0)
      return undefined;
    return JSON.parse(readFileSync(path.join(this.scratch, `t2_${d}_${mode}.json`), 'utf8'));
  }

  /** Through timeout(1), which ends the children of a script as well. */
  private spawn(program: string, args: readonly string[]) {
    return spawnSync('timeout', ['-k', '2', String(this.timeoutSeconds), program, ...args], {
      cwd: this.scratch,
      env: { ...process.env, PEER_DATA: this.scratch, PYTHONDONTWRITEBYTECODE: '1' },
      encoding: 'utf8',
      maxBuffer: 2 ** 28,
    });
  }
}
