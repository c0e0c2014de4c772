// Repeats and medians. Times are wall-clock seconds inside the process that does the work.

/** Seconds and result of one call. */
export interface Timed<T> {
  readonly seconds: number;
  readonly result: T;
}

export function timed<T>(work: () => T): Timed<T> {
  const start = performance.now();
  const result = work();
  return { seconds: (performance.now() - start) / 1000, result };
}

/** Throws RangeError for an empty list. */
export function median(values: readonly number[]): number {
  if (values.length === 0) throw new RangeError('no values');
  const sorted = [...values].sort((x, y) => x - y);
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}

/** Median seconds of repeated calls after `warmUp` untimed ones, and the last result. */
export function repeated<T>(work: () => T, warmUp: number, repeats: number): Timed<T> {
  for (let i = 0; i < warmUp; i++) work();
  const runs = Array.from({ length: repeats }, () => timed(work));
  return { seconds: median(runs.map((r) => r.seconds)), result: runs.at(-1)!.result };
}
