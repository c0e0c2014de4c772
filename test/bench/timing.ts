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

/** Median seconds of at least `repeats` calls and at least `leastSeconds` of them, after as long a warm-up that is not
 *  counted, and the last result. */
export function repeated<T>(work: () => T, repeats: number, leastSeconds: number): Timed<T> {
  for (let spent = 0; spent < leastSeconds; ) spent += timed(work).seconds;
  const runs: Timed<T>[] = [];
  for (let spent = 0; runs.length < repeats || spent < leastSeconds; ) {
    const run = timed(work);
    runs.push(run);
    spent += run.seconds;
  }
  return { seconds: median(runs.map((r) => r.seconds)), result: runs.at(-1)!.result };
}
