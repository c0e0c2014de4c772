// Elementary operators as Laurent polynomials, and exact moments of stencils.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { OperatorName } from '../notation/tree.ts';

/** T, Δ = T − 1, Δ⁻ = 1 − T⁻¹, Δᶜ = (T − T⁻¹)/2 along one axis as polynomials in the shift (lattice units, undivided);
 *  `d` as the variable of a differential operator. */
export function elementaryOperator(name: OperatorName, axis: number, dimension: number): LaurentPolynomial {
  const forward = LaurentPolynomial.variable(dimension, axis);
  const backward = LaurentPolynomial.variable(dimension, axis, -1);
  const identity = LaurentPolynomial.constant(dimension, Coefficient.one);
  switch (name) {
    case 'T':
    case 'd':
      return forward;
    case 'Delta':
      return forward.sub(identity);
    case 'Deltab':
      return identity.sub(backward);
    case 'Deltac':
      return forward.sub(backward).scale(Coefficient.rational(rational(1, 2)));
  }
}

/** Moment m_α = Σ_v c_v (v − centre)^α / α! of a stencil: the coefficient of a^{|α|} ∂^α in its Taylor expansion about the
 *  centre (lattice units). Exact. Cost: one pass over the weights. */
export function moment(
  stencil: LaurentPolynomial,
  centre: readonly Rational[],
  alpha: readonly number[],
): Coefficient {
  let factorials = Rational.one;
  for (const n of alpha) for (let k = 2; k <= n; k++) factorials = factorials.mul(rational(k));
  return stencil.terms
    .reduce((sum, { exponents, weight }) => {
      const power = alpha.reduce(
        (p, n, k) => p.mul(rational(exponents[k]!).sub(centre[k]!).pow(n)),
        Rational.one,
      );
      return sum.add(weight.scale(power));
    }, Coefficient.zero)
    .scale(factorials.inv());
}

/** Centre of the bounding box of the supports of some stencils, in lattice units: integers and half-integers. The origin
 *  when all of them are zero. Throws RangeError without a stencil. */
export function supportCentre(...stencils: readonly LaurentPolynomial[]): Rational[] {
  const [first] = stencils;
  if (!first) throw new RangeError('no stencil is given');
  const sites = stencils.flatMap((s) => s.terms.map((t) => t.exponents));
  return Array.from({ length: first.dimension }, (_, k) => {
    if (sites.length === 0) return Rational.zero;
    const along = sites.map((v) => v[k]!);
    const [low, high] = [Math.min(...along), Math.max(...along)];
    return rational(low + high, 2);
  });
}
