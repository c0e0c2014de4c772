// Exponents from numbers: least squares in log–log, with the drift of the local slopes as the uncertainty.

export interface PowerFit {
  /** p in |value| ∝ spacing^p, extrapolated along the drift of the local slopes. */
  readonly exponent: number;
  /** Slope of the least-squares line through all points. */
  readonly slope: number;
  /** Spread of the local slopes: how far the values are from a pure power. */
  readonly spread: number;
}

const mean = (values: readonly number[]): number => values.reduce((x, y) => x + y, 0) / values.length;

function standardDeviation(values: readonly number[]): number {
  if (values.length < 2) return 0;
  const centre = mean(values);
  return Math.sqrt(values.reduce((sum, v) => sum + (v - centre) ** 2, 0) / (values.length - 1));
}

/** Fits |values| at the given spacings, coarsest first; at least two points, none of them zero. */
export function fitPower(spacings: readonly number[], values: readonly number[]): PowerFit {
  const x = spacings.map((a) => Math.log(a));
  const y = values.map((v) => Math.log(Math.abs(v)));
  const local = x.slice(1).map((xi, i) => (y[i + 1]! - y[i]!) / (xi - x[i]!));
  const [mx, my] = [mean(x), mean(y)];
  const covariance = x.reduce((sum, xi, i) => sum + (xi - mx) * (y[i]! - my), 0);
  const slope = covariance / x.reduce((sum, xi) => sum + (xi - mx) ** 2, 0);
  const last = local.at(-1)!;
  const before = local.at(-2) ?? last;
  // deviations from the asymptotic slope halve when the size doubles, at the slowest
  return {
    exponent: 2 * last - before,
    slope,
    spread: standardDeviation(local),
  };
}

export type FitVerdict = 'confirms' | 'contradicts' | 'inconclusive';

/** Exponents of families differ by one at least, mostly; a quarter is a safe distance. */
const CONFIRMS = 0.25;
const CONTRADICTS = 0.6;
/** Local slopes that still differ by more than this prove nothing. */
const SETTLED = 0.25;

/** What a fitted exponent says about an exact one. */
export function judgeFit(fit: PowerFit, exact: number): FitVerdict {
  const distance = Math.abs(fit.exponent - exact);
  if (distance < CONFIRMS) return 'confirms';
  return distance > CONTRADICTS && fit.spread < SETTLED ? 'contradicts' : 'inconclusive';
}
