import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import { elementaryOperator, moment, supportCentre } from '../../src/model/stencil.ts';

const stencils = fc
  .array(
    fc.tuple(
      fc.integer({ min: -4, max: 4 }),
      fc.integer({ min: -4, max: 4 }),
      fc.integer({ min: -5, max: 5 }),
    ),
    {
      minLength: 1,
      maxLength: 6,
    },
  )
  .map((terms) =>
    LaurentPolynomial.of(
      2,
      terms.map(([x, y, w]) => ({ exponents: [x, y], weight: Coefficient.integer(w) })),
    ),
  )
  .filter((s) => !s.isZero);
const shift = (x: number, y: number): LaurentPolynomial =>
  LaurentPolynomial.of(2, [{ exponents: [x, y], weight: Coefficient.one }]);

describe('elementary operators', () => {
  const at = (name: 'T' | 'Delta' | 'Deltab' | 'Deltac'): LaurentPolynomial => elementaryOperator(name, 0, 2);
  it('satisfy Δ = T Δ⁻ and 2 Δᶜ = Δ + Δ⁻', () => {
    expect(at('Delta').equals(at('T').mul(at('Deltab')))).toBe(true);
    expect(
      at('Deltac')
        .scale(Coefficient.integer(2))
        .equals(at('Delta').add(at('Deltab'))),
    ).toBe(true);
  });
});

describe('moments', () => {
  const origin = [Rational.zero, Rational.zero];
  it('of a product of stencils are the convolution of the moments', () => {
    fc.assert(
      fc.property(stencils, stencils, fc.nat({ max: 3 }), fc.nat({ max: 3 }), (s, t, m, n) => {
        let sum = Coefficient.zero;
        for (let i = 0; i <= m; i++)
          for (let j = 0; j <= n; j++)
            sum = sum.add(moment(s, origin, [i, j]).mul(moment(t, origin, [m - i, n - j])));
        expect(moment(s.mul(t), origin, [m, n]).equals(sum)).toBe(true);
      }),
      { numRuns: 50 },
    );
  });
  it('do not change when stencil and centre move together', () => {
    fc.assert(
      fc.property(stencils, fc.integer({ min: -3, max: 3 }), fc.nat({ max: 4 }), (s, x, n) => {
        const centre = supportCentre(s);
        const moved = s.mul(shift(x, -x));
        expect(moment(moved, supportCentre(moved), [n, 1]).equals(moment(s, centre, [n, 1]))).toBe(true);
      }),
    );
  });
  it('of odd order vanish about the centre of Δ_x Δ_y, which is half a step along both axes', () => {
    const s = elementaryOperator('Delta', 0, 2).mul(elementaryOperator('Delta', 1, 2));
    const centre = supportCentre(s);
    expect(centre.map(String)).toEqual(['1/2', '1/2']);
    for (const alpha of [
      [1, 0],
      [2, 1],
      [1, 2],
      [3, 0],
    ])
      expect(moment(s, centre, alpha).isZero).toBe(true);
    // Δ = 2 sinh(∂/2) about its centre, so the coefficient of ∂_x³ ∂_y is 2·(1/2)³/3! = 1/24.
    expect(moment(s, centre, [3, 1]).asRational!.equals(rational(1, 24))).toBe(true);
  });
});

describe('the centre of a support', () => {
  it('is that of the box around all the stencils together', () => {
    expect(supportCentre(shift(0, 0), shift(3, -2)).map(String)).toEqual(['3/2', '-1']);
    expect(supportCentre(LaurentPolynomial.zero(2)).map(String)).toEqual(['0', '0']);
    expect(() => supportCentre()).toThrow(RangeError);
  });
});
