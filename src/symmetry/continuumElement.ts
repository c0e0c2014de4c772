// Action of a point element on a continuum density: derivatives along permuted axes, a sign for every derivative along a
// reflected one, fields permuted with their signs.

import type { Coefficient } from '../exact/coefficient.ts';
import { addTerm, Density, type JetMonomial } from '../limit/jets.ts';
import type { PointElement } from './pointGroup.ts';

/** The density in the transformed fields φ'(r) = φ(M^{-1} r). The matrix is a signed permutation. */
export function transformDensity(density: Density, element: PointElement): Density {
  const { space } = density;
  const images = space.axes.map((_, axis) => {
    const row = element.matrix.findIndex((r) => r[axis] !== 0);
    return { axis: row, sign: element.matrix[row]![axis]! };
  });
  const out = new Map<JetMonomial, Coefficient>();
  for (const [m, c] of density.terms) {
    let sign = 1;
    const factors = space.factors(m).map(({ field, derivative }) => {
      const image = element.fields[field]!;
      sign *= image.sign;
      const moved = new Array<number>(derivative.length).fill(0);
      for (const [axis, n] of derivative.entries()) {
        const to = images[axis]!;
        moved[to.axis] = n;
        if (n % 2 === 1) sign *= to.sign;
      }
      return { field: image.field, derivative: moved };
    });
    addTerm(out, space.monomial(factors), sign === 1 ? c : c.neg());
  }
  return new Density(space, out);
}
