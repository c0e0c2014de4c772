// Signs and waves of short period, cos(2π phase·r + const), in products with other functions.

import { Coefficient } from '../exact/coefficient.ts';
import { gcd, Rational } from '../exact/rational.ts';
import { taylorCoefficients } from '../limit/taylor.ts';
import type { ProfileFactor } from './profile.ts';

/** Where the wave is a function of the arguments of a free factor, the product is again a free function of them:
 *  (-1)^(x+y) f(x+y) = g(x+y). Any other wave is kept. */
export function absorbPhase(
  phase: readonly Rational[],
  factors: readonly ProfileFactor[],
): { phase: readonly Rational[]; factors: readonly ProfileFactor[] } {
  if (phase.every((p) => p.isZero)) return { phase, factors };
  const at = factors.findIndex((f) => f.kind === 'free' && isFunctionOf(phase, f.rows));
  const factor = factors[at];
  if (factor?.kind !== 'free') return { phase, factors };
  const renamed = { ...factor, name: `${factor.name}*(${phase.join()})` };
  return {
    phase: phase.map(() => Rational.zero),
    factors: factors.map((f, i) => (i === at ? renamed : f)),
  };
}

/** True when phase = Σ c_i row_i modulo integers for rational c_i with the denominator of the phase. */
function isFunctionOf(phase: readonly Rational[], rows: readonly (readonly number[])[]): boolean {
  const order = Number(phase.reduce((n, x) => (n / gcd(n, x.den)) * x.den, 1n));
  let sums = [phase];
  for (const row of rows)
    sums = sums.flatMap((rest) =>
      Array.from({ length: order }, (_, c) => rest.map((x, k) => x.sub(Rational.of(c * row[k]!, order)))),
    );
  return sums.some((rest) => rest.every((x) => x.isInteger));
}

/** cos(α + 2π turn) = cos(2π turn)·cos α − sin(2π turn)·sin α as weights of cos α and sin α. Exact for twelfths of a turn.
 *  Throws ExpansionPointError for other angles. */
export function waveWeights(turn: Rational): { cosine: Coefficient; sine: Coefficient } {
  const twice = turn.mul(Rational.of(2));
  if (twice.isInteger) {
    const sign = twice.num % 2n === 0n ? Rational.one : Rational.minusOne;
    return { cosine: Coefficient.rational(sign), sine: Coefficient.zero };
  }
  const angle = Coefficient.symbol('pi').scale(twice);
  return {
    cosine: taylorCoefficients('cos', angle, 0)[0]!,
    sine: taylorCoefficients('sin', angle, 0)[0]!.neg(),
  };
}
