// The symmetrised momentum polynomial of a density at given momenta, exactly: an n-field monomial Π_i ∂^(α_i) φ becomes
// the mean over all assignments of momenta to factors of Π_i k_i^(α_i), with k_n = −(k_1 + … + k_(n−1)) and ∂ → k
// (no factor i). Densities that differ by a total derivative have the same polynomial, so that its values compare our
// expansion with any other program's, whatever its normal form.

import { Rational } from '../../src/exact/rational.ts';
import type { Density } from '../../src/limit/jets.ts';

/** Momentum of the i-th field, i = 1, 2, …, one entry per axis of the density. */
export type Momenta = (i: number) => readonly number[];

/** Σ over the monomials of their symmetrised momentum polynomials at the given momenta; of every coefficient only the
 *  rational factor counts, which sets all parameters and spacings to 1. One field. */
export function momentumValue(density: Density, momenta: Momenta): Rational {
  const { space } = density;
  let sum = Rational.zero;
  for (const [monomial, coefficient] of density.terms) {
    const factors = space.factors(monomial).map((f) => f.derivative);
    const value = symmetrised(factors, conservedMomenta(factors.length, space.axes.length, momenta));
    for (const { factor } of coefficient.terms) sum = sum.add(factor.mul(value));
  }
  return sum;
}

/** k_1 … k_n with k_n = −Σ of the others. */
function conservedMomenta(n: number, axes: number, momenta: Momenta): bigint[][] {
  const free = Array.from({ length: n - 1 }, (_, i) => momenta(i + 1).map(BigInt));
  const last = Array.from({ length: axes }, (_, k) => -free.reduce((s, p) => s + p[k]!, 0n));
  return [...free, last];
}

/** Mean over the assignments of n momenta to n factors: with m_t factors of type t it is Π m_t!/n! times the coefficient
 *  of Π x_t^(m_t) in Π_j Σ_t x_t k_j^(α_t), worked out momentum by momentum. */
function symmetrised(factors: readonly (readonly number[])[], momenta: readonly bigint[][]): Rational {
  const types = new Map<string, { alpha: readonly number[]; count: number }>();
  for (const alpha of factors) {
    const key = alpha.join(',');
    types.set(key, { alpha, count: (types.get(key)?.count ?? 0) + 1 });
  }
  const list = [...types.values()];
  // Used numbers of factors of each type → sum of the products so far.
  let states = new Map<string, bigint>([[list.map(() => 0).join(','), 1n]]);
  for (const k of momenta) {
    const values = list.map(({ alpha }) => alpha.reduce((p, n, axis) => p * k[axis]! ** BigInt(n), 1n));
    const next = new Map<string, bigint>();
    for (const [key, product] of states) {
      const used = key.split(',').map(Number);
      for (const [t, { count }] of list.entries()) {
        if (used[t] === count) continue;
        const nextKey = used.map((n, i) => (i === t ? n + 1 : n)).join(',');
        next.set(nextKey, (next.get(nextKey) ?? 0n) + product * values[t]!);
      }
    }
    states = next;
  }
  const [total = 0n] = states.values();
  const repeats = list.reduce((p, { count }) => p * factorial(count), 1n);
  return Rational.of(total * repeats, factorial(factors.length));
}

function factorial(n: number): bigint {
  let out = 1n;
  for (let i = 2n; i <= BigInt(n); i++) out *= i;
  return out;
}
