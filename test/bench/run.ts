// npm run bench [-- --quick] [--only start-up|t1|t2] [--peers FOLDER] [--json FILE]: start-up of the built program, then the hot paths beside
// general-purpose algebra systems where they are installed (FOLDER, or the variable SALTUS_PEERS, holds their scripts).
// Times are wall-clock; ratios are what to read. Ends with one JSON line (or FILE), and with exit code 1 when a result
// differs from another system's.

import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { isDeepStrictEqual, parseArgs } from 'node:util';
import {
  type Densities,
  equivalences,
  inventedDensities,
  type Method,
  type Mode,
} from './equivalenceTask.ts';
import { expansionCheck, ringExchangeExpansion } from './expansionTask.ts';
import { type PeerOutcome, Peers, type SystemName, systemNames } from './peers.ts';
import { measureStartUp, type StartUpRow } from './startUp.ts';
import { median, repeated, type Timed, timed } from './timing.ts';

const { values: options } = parseArgs({
  options: {
    quick: { type: 'boolean', default: false },
    peers: { type: 'string' },
    json: { type: 'string' },
    only: { type: 'string' },
    // Internal: one call in this fresh process, its seconds and result on standard output.
    once: { type: 'string', multiple: true },
  },
});
const { quick } = options;
const repeats = quick ? 3 : 9;
const leastSeconds = quick ? 0.1 : 0.5;

interface Row {
  readonly size: string;
  /** First call in a fresh process, median over a few processes. */
  readonly cold: number;
  /** Median of repeated calls in one process. */
  readonly warm: number;
  readonly result: unknown;
  readonly peers: readonly (PeerOutcome & { readonly agrees?: boolean })[];
}

const expansionCall = (order: number) => () => ringExchangeExpansion(order);

/** What `--once` runs: `t1 ORDER`, or `t2 FILE METHOD` with the densities in FILE. */
function once([task, argument, method]: readonly string[]): Timed<unknown> {
  if (task === 't1') {
    const { seconds, result } = timed(expansionCall(Number(argument)));
    return { seconds, result: expansionCheck(result) };
  }
  const densities: Densities = JSON.parse(readFileSync(argument!, 'utf8'));
  return timed(() => equivalences(densities, method as Method));
}

function coldSeconds(args: readonly string[]): number {
  const script = fileURLToPath(import.meta.url);
  const seconds = Array.from({ length: quick ? 1 : 5 }, () => {
    const run = spawnSync(
      process.execPath,
      ['--import', 'tsx', script, ...args.flatMap((argument) => ['--once', argument])],
      { encoding: 'utf8', timeout: 120_000 },
    );
    if (run.status !== 0) throw new Error(`a fresh process failed: ${run.stderr}`);
    return (JSON.parse(run.stdout) as Timed<unknown>).seconds;
  });
  return median(seconds);
}

/** Adds to what a peer found whether it is what we found. */
const compared = (outcome: PeerOutcome, agrees: (result: unknown) => boolean): Row['peers'][number] =>
  'skipped' in outcome ? outcome : { ...outcome, agrees: agrees(outcome.result) };

function expansionRow(order: number, peers: Peers | undefined): Row {
  const { seconds: warm, result } = repeated(expansionCall(order), repeats, leastSeconds);
  const check = expansionCheck(result);
  const isSlow = (name: SystemName): boolean => name === 'Maxima' && order > 12;
  const outcomes = peers
    ? systemNames.filter((name) => !isSlow(name)).map((name) => peers.run(name, 't1', [String(order)]))
    : [];
  return {
    size: `order ${order}`,
    cold: coldSeconds(['t1', String(order)]),
    warm,
    result: check,
    peers: outcomes.map((o) => compared(o, (r) => isDeepStrictEqual((r as { check: unknown }).check, check))),
  };
}

/** Arguments of each system's script beyond size and mode: the fastest of its methods. */
const equivalenceMethods: Partial<Record<SystemName, string>> = { SymPy: 'rings', PARI: 'euler' };

function equivalenceRows(d: number, mode: Mode, scratch: string, peers: Peers | undefined): Row[] {
  const fromPeers = peers?.equivalenceInput(d, mode) as Densities | undefined;
  const densities = fromPeers ?? inventedDensities(d, mode);
  const file = path.join(scratch, `input-${d}-${mode}.json`);
  writeFileSync(file, JSON.stringify(densities));
  const isSlow = (name: SystemName): boolean => name === 'Maxima' && mode === 'dense';
  const outcomes =
    peers && fromPeers
      ? systemNames
          .filter((name) => !isSlow(name))
          .map((name) =>
            peers.run(name, 't2', [String(d), mode, equivalenceMethods[name] ?? ''].filter(Boolean)),
          )
      : [];
  return (['normal form', 'Euler operator'] as const).map((method): Row => {
    const { seconds: warm, result } = repeated(() => equivalences(densities, method), repeats, leastSeconds);
    return {
      size: `${d} ${mode}, ${method}`,
      cold: coldSeconds(['t2', file, method]),
      warm,
      result,
      peers:
        method === 'normal form' ? outcomes.map((o) => compared(o, (r) => isDeepStrictEqual(r, result))) : [],
    };
  });
}

const duration = (seconds: number): string =>
  seconds < 1 ? `${(seconds * 1000).toPrecision(3)} ms` : `${seconds.toFixed(2)} s`;
const ratioText = (ratio: number): string => `x ${ratio < 10 ? ratio.toPrecision(2) : ratio.toFixed(0)}`;

function printTable(title: string, head: readonly string[], rows: readonly (readonly string[])[]): void {
  const widths = head.map((h, k) => Math.max(h.length, ...rows.map((r) => r[k]!.length)));
  const line = (cells: readonly string[]): string =>
    cells.map((c, k) => (k === 0 ? c.padEnd(widths[k]!) : c.padStart(widths[k]!))).join('   ');
  console.log(`\n${title}\n\n${[line(head), ...rows.map(line)].join('\n')}`);
}

function printStartUp(rows: readonly StartUpRow[]): void {
  const judged = ({ ratio, target }: StartUpRow): string =>
    target === null ? '' : ratio <= target ? `<= ${target}` : `OVER ${target}`;
  printTable(
    'Start-up: whole process, interleaved runs',
    ['command', 'median', 'ratio to node', 'target'],
    rows.map((r) => [r.command, duration(r.seconds), r.ratio.toFixed(2), judged(r)]),
  );
}

/** One column per system: its time over our warm median, so that above 1 means slower than saltus. */
function printRows(title: string, rows: readonly Row[]): void {
  const cell = (row: Row, name: SystemName): string => {
    const outcome = row.peers.find((p) => p.system === name);
    if (!outcome) return '-';
    if ('skipped' in outcome) return outcome.skipped;
    const ratio = `${duration(outcome.seconds)} (${ratioText(outcome.seconds / row.warm)})`;
    return outcome.agrees ? ratio : `${ratio} DIFFERS`;
  };
  const columns = systemNames.filter((name) => rows.some((r) => r.peers.some((p) => p.system === name)));
  printTable(
    title,
    ['size', 'saltus, first call', 'saltus, median', ...columns],
    rows.map((r) => [r.size, duration(r.cold), duration(r.warm), ...columns.map((c) => cell(r, c))]),
  );
}

const isWanted = (section: string): boolean => options.only === undefined || options.only === section;

function bench(): void {
  const scratch = mkdtempSync(path.join(tmpdir(), 'saltus-bench-'));
  try {
    const folder = options.peers ?? process.env.SALTUS_PEERS;
    const peers = folder ? new Peers(path.resolve(folder), scratch, quick ? 20 : 120) : undefined;
    const startUp = isWanted('start-up') ? measureStartUp(quick ? 3 : 21) : [];
    if (startUp.length > 0) printStartUp(startUp);
    const orders = isWanted('t1') ? (quick ? [8] : [8, 12, 16]) : [];
    const expansion = orders.map((order) => expansionRow(order, peers));
    if (expansion.length > 0)
      printRows('T1: expansion of the ring-exchange action and its normal form', expansion);
    const inputs: readonly (readonly [number, Mode])[] = quick
      ? [[8, 'sparse']]
      : [
          [8, 'sparse'],
          [8, 'dense'],
          [12, 'dense'],
        ];
    const equivalence = isWanted('t2')
      ? inputs.flatMap(([d, mode]) => equivalenceRows(d, mode, scratch, peers))
      : [];
    if (equivalence.length > 0)
      printRows('T2: equivalence of four-field densities modulo total derivatives', equivalence);
    const record = JSON.stringify({ bench: { quick, startUp, expansion, equivalence } });
    if (options.json) writeFileSync(options.json, `${record}\n`);
    else console.log(`\n${record}`);
    if ([...expansion, ...equivalence].some((r) => r.peers.some((p) => p.agrees === false)))
      process.exitCode = 1;
  } finally {
    rmSync(scratch, { recursive: true, force: true });
  }
}

if (options.once) console.log(JSON.stringify(once(options.once)));
else bench();
