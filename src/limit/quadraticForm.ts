// Sign of the quadratic part of a density in momentum space: a monomial (∂^α φ)(∂^β φ) contributes
// i^{|α|−|β|} k^{α+β} (its real part). A Euclidean action must have a non-negative one.

import { Coefficient } from '../exact/coefficient.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { Density } from './jets.ts';

export type QuadraticSign = 'positive' | 'indefinite' | 'unknown';

/** Sign of a coefficient when the given generators are positive (`pi` and primes are): undefined when not evident. */
export function signOf(value: Coefficient, positive: ReadonlySet<string>): number | undefined {
  if (value.isZero) return 0;
  const isPositive = (g: string): boolean => g === 'pi' || g.startsWith('#') || positive.has(g);
  const signs = new Set<number>();
  for (const t of value.terms) {
    const isKnown = t.powers.every(([g, e]) => isPositive(g) || (e.isInteger && e.num % 2n === 0n));
    if (!isKnown) return undefined;
    signs.add(t.factor.sign);
  }
  return signs.size === 1 ? [...signs][0] : undefined;
}

/** Whether the quadratic part of one field's density is non-negative for all momenta. `positive` is proved (all even
 *  monomials with positive weights), `indefinite` comes with a momentum where it is negative, else `unknown`.
 *  Densities that couple different fields quadratically are `unknown`. */
export function quadraticSign(density: Density, positive: ReadonlySet<string>): QuadraticSign {
  const { space } = density;
  const polynomials = new Map<number, { exponents: number[]; weight: Coefficient }[]>();
  for (const [m, c] of density.terms) {
    if (m.length !== 2) continue;
    const [x, y] = space.factors(m) as [ReturnType<typeof space.variable>, ReturnType<typeof space.variable>];
    if (x.field !== y.field) return 'unknown';
    const orderOf = (d: readonly number[]): number => d.reduce((s, n) => s + n, 0);
    const half = (orderOf(x.derivative) - orderOf(y.derivative)) / 2;
    if (!Number.isInteger(half)) continue;
    const list = polynomials.get(x.field) ?? [];
    list.push({
      exponents: x.derivative.map((n, k) => n + y.derivative[k]!),
      weight: half % 2 === 0 ? c : c.neg(),
    });
    polynomials.set(x.field, list);
  }
  if (polynomials.size === 0) return 'unknown';
  const signs = [...polynomials.values()].map((p) => polynomialSign(p, space.axes.length, positive));
  if (signs.includes('indefinite')) return 'indefinite';
  return signs.every((s) => s === 'positive') ? 'positive' : 'unknown';
}

function polynomialSign(
  terms: readonly { exponents: readonly number[]; weight: Coefficient }[],
  dimension: number,
  positive: ReadonlySet<string>,
): QuadraticSign {
  const isEven = terms.every((t) => t.exponents.every((n) => n % 2 === 0));
  if (isEven && terms.every((t) => (signOf(t.weight, positive) ?? -1) >= 0)) return 'positive';
  for (const momentum of sampleMomenta(dimension)) {
    const value = terms.reduce((sum, { exponents, weight }) => {
      const power = exponents.reduce((p, n, k) => p.mul(momentum[k]!.pow(n)), Rational.one);
      return sum.add(weight.scale(power));
    }, Coefficient.zero);
    if (signOf(value, positive) === -1) return 'indefinite';
  }
  return 'unknown';
}

/** Momenta with components 0, ±1, 2: the axes, diagonals and a few directions between. */
function sampleMomenta(dimension: number): Rational[][] {
  let out: Rational[][] = [[]];
  for (let k = 0; k < dimension; k++) out = out.flatMap((v) => [0, 1, -1, 2].map((n) => [...v, rational(n)]));
  return out;
}
