// Normal form of a density modulo total derivatives. A monomial with n fields is a polynomial in momenta k_1..k_n; two
// densities are equivalent iff the polynomials agree after symmetrising over equal fields and setting Σ k = 0. Here the
// same quotient is worked out block by block (block.ts): the momenta never appear, and the cost does not grow with the
// size of a symmetrised polynomial.
//
// A derivative common to all factors of a block is taken out first. This is exact: in momenta it multiplies by
// Π_i k_i^γ, which for two or more fields is no zero divisor where Σ k = 0, and the order of the monomials in a block prefers large common
// derivatives, so that the representative does not depend on the division.

import type { Coefficient } from '../exact/coefficient.ts';
import { Rational } from '../exact/rational.ts';
import { Block } from './block.ts';
import { Density, type JetMonomial, type JetSpace, type JetVariable } from './jets.ts';

/** Blocks worked out so far, kept as long as the jet space they were met in. */
const blocksOf = new WeakMap<JetSpace, Map<string, Block>>();

function blockFor(space: JetSpace, counts: readonly number[], degree: readonly number[]): Block {
  const blocks = blocksOf.get(space) ?? new Map<string, Block>();
  blocksOf.set(space, blocks);
  const key = `${counts.join(',')}|${degree.join(',')}`;
  const block = blocks.get(key) ?? new Block(counts, degree);
  blocks.set(key, block);
  return block;
}

/** The representative of the density modulo total derivatives; zero iff the density is a total derivative. The
 *  field-independent constant is dropped. Linear. Throws LimitError for a block beyond the stated size. */
export function normalForm(density: Density): Density {
  const groups = new Map<string, { counts: number[]; degree: number[]; monomials: JetMonomial[] }>();
  const { space } = density;
  for (const m of density.terms.keys()) {
    if (m === '') continue;
    const counts = new Array<number>(space.fields.length).fill(0);
    for (const f of space.factors(m)) counts[f.field]!++;
    const degree = space.degree(m);
    const key = `${counts.join(',')}|${degree.join(',')}`;
    const group = groups.get(key);
    if (group) group.monomials.push(m);
    else groups.set(key, { counts, degree, monomials: [m] });
  }
  const out = new Map<JetMonomial, Coefficient>();
  for (const { counts, degree, monomials } of groups.values()) {
    const factorLists = monomials.map((m) => space.factors(m));
    const size = counts.reduce((x, y) => x + y, 0);
    // With a single field Σ k = 0 leaves no momentum: every derivative is a total derivative and nothing is divided out.
    const common = size === 1 ? degree.map(() => 0) : commonDerivative(factorLists);
    const block = blockFor(
      space,
      counts,
      degree.map((n, k) => n - size * common[k]!),
    );
    const sums = new Map<number, Coefficient>();
    for (const [i, factors] of factorLists.entries()) {
      const coefficient = density.get(monomials[i]!);
      const { numerators, denominator } = block.reduction(block.number(shifted(factors, common, -1)));
      for (const [standard, numerator] of numerators) {
        const term = coefficient.scale(Rational.of(numerator, denominator));
        const old = sums.get(standard);
        sums.set(standard, old ? old.add(term) : term);
      }
    }
    for (const [standard, sum] of sums)
      if (!sum.isZero) out.set(space.monomial(shifted(block.factorsOf(standard), common, 1)), sum);
  }
  return new Density(space, out);
}

/** True iff x − y is a total derivative. Throws LimitError for a block beyond the stated size. */
export function isEquivalent(x: Density, y: Density): boolean {
  return normalForm(x.sub(y)).isZero;
}

function commonDerivative(factorLists: readonly (readonly JetVariable[])[]): number[] {
  let common: number[] | undefined;
  for (const factors of factorLists)
    for (const { derivative } of factors)
      common = common ? common.map((n, k) => Math.min(n, derivative[k]!)) : [...derivative];
  return common ?? [];
}

function shifted(factors: readonly JetVariable[], by: readonly number[], sign: 1 | -1): JetVariable[] {
  return factors.map((f) => ({ field: f.field, derivative: f.derivative.map((n, k) => n + sign * by[k]!) }));
}
