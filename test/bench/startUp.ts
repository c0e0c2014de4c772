// Start-up of the built program against bare Node. Every round runs each command once, in turning order, so that noise
// from outside hits all of them; the ratio is the median of the ratios within the rounds.

import { spawnSync } from 'node:child_process';
import { median } from './timing.ts';

export interface StartUpRow {
  readonly command: string;
  /** Median seconds of the whole process. */
  readonly seconds: number;
  /** Median over the rounds of the time relative to `node -e 0` in the same round. */
  readonly ratio: number;
  /** Largest ratio that we want to see. */
  readonly target: number | null;
}

const commands: readonly {
  readonly name: string;
  readonly args: readonly string[];
  readonly target: number | null;
}[] = [
  { name: 'node -e 0', args: ['-e', '0'], target: null },
  { name: 'saltus --version', args: ['dist/saltus.js', '--version'], target: 1.6 },
  { name: 'saltus --help', args: ['dist/saltus.js', '--help'], target: null },
  {
    name: 'saltus check cases/ring-exchange-sheet.yaml',
    args: ['dist/saltus.js', 'check', 'cases/ring-exchange-sheet.yaml'],
    target: 6,
  },
];

/** Seconds of one process from start to end. Throws when it does not end with exit code 0. */
function secondsOf(args: readonly string[]): number {
  const start = performance.now();
  const run = spawnSync(process.execPath, args, { stdio: ['ignore', 'pipe', 'pipe'], timeout: 60_000 });
  const seconds = (performance.now() - start) / 1000;
  if (run.status !== 0) throw new Error(`node ${args.join(' ')} ended with ${run.status}: ${run.stderr}`);
  return seconds;
}

/** Measures every command, started from the top folder of the project, in as many rounds. One round before them is not
 *  counted: it fills the caches of the file system. */
export function measureStartUp(rounds: number): StartUpRow[] {
  const seconds = commands.map((): number[] => []);
  for (let round = -1; round < rounds; round++)
    for (let i = 0; i < commands.length; i++) {
      const turn = (i + round + 1) % commands.length;
      const measured = secondsOf(commands[turn]!.args);
      if (round >= 0) seconds[turn]!.push(measured);
    }
  return commands.map(({ name, target }, i) => ({
    command: name,
    seconds: median(seconds[i]!),
    ratio: median(seconds[i]!.map((s, round) => s / seconds[0]![round]!)),
    target,
  }));
}
