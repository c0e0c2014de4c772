import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Quotient, rationalRatio } from '../../src/exact/quotient.ts';
import { Rational, rational } from '../../src/exact/rational.ts';

const exponents = fc
  .tuple(fc.integer({ min: -6, max: 6 }), fc.constantFrom(1, 2, 3))
  .map(([n, d]) => rational(n, d));
const monomials = fc
  .record({
    factor: fc.integer({ min: -9, max: 9 }).filter((n) => n !== 0),
    powers: fc.uniqueArray(fc.tuple(fc.constantFrom('a', 'b', 'beta', 'pi', '#2', '#3'), exponents), {
      maxLength: 4,
      selector: ([g]) => g,
    }),
  })
  .map(({ factor, powers }) => Coefficient.monomial(rational(factor), powers));
const coefficients = fc
  .array(monomials, { maxLength: 4 })
  .map((ms) => ms.reduce((x, y) => x.add(y), Coefficient.zero));

const values = new Map([
  ['a', 0.7],
  ['b', 1.3],
  ['beta', 2.1],
]);

describe('coefficients', () => {
  it('form a commutative ring with a unique representation', () => {
    fc.assert(
      fc.property(coefficients, coefficients, coefficients, (x, y, z) => {
        expect(x.add(y).equals(y.add(x))).toBe(true);
        expect(x.mul(y).equals(y.mul(x))).toBe(true);
        expect(
          x
            .mul(y)
            .mul(z)
            .equals(x.mul(y.mul(z))),
        ).toBe(true);
        expect(x.mul(y.add(z)).equals(x.mul(y).add(x.mul(z)))).toBe(true);
        expect(x.add(y).sub(y).equals(x)).toBe(true);
      }),
    );
  });

  it('agree with floating-point values (a witness on another route)', () => {
    fc.assert(
      fc.property(coefficients, coefficients, (x, y) => {
        const expected = x.toNumber(values) * y.toNumber(values);
        const scale = Math.max(
          1,
          ...x.mul(y).terms.map((t) => Math.abs(Coefficient.ofTerm(t).toNumber(values))),
        );
        expect(Math.abs(x.mul(y).toNumber(values) - expected)).toBeLessThan(1e-7 * scale);
      }),
    );
  });

  it('know that sqrt(3) squared is 3, sqrt(12) is 2 sqrt(3) and sqrt(1/2) is sqrt(2)/2', () => {
    const half = rational(1, 2);
    const root3 = Coefficient.root(rational(3), half);
    expect(root3.mul(root3).equals(Coefficient.integer(3))).toBe(true);
    expect(Coefficient.root(rational(12), half).equals(root3.scale(rational(2)))).toBe(true);
    expect(Coefficient.root(half, half).equals(Coefficient.root(rational(2), half).scale(half))).toBe(true);
    expect(() => Coefficient.root(rational(-2), half)).toThrow(RangeError);
  });

  it('divide by monomials and refuse sums', () => {
    fc.assert(
      fc.property(
        coefficients,
        monomials.filter((m) => m.asMonomial!.factor.sign > 0),
        (x, m) => {
          expect(x.mul(m).div(m).equals(x)).toBe(true);
        },
      ),
    );
    const sum = Coefficient.symbol('a').add(Coefficient.one);
    expect(() => Coefficient.one.div(sum)).toThrow(RangeError);
  });
});

describe('quotients of coefficients', () => {
  const sums = coefficients.filter((c) => !c.isZero);
  it('form a field with equality by cross-multiplication', () => {
    fc.assert(
      fc.property(sums, sums, sums, (x, y, z) => {
        const p = Quotient.of(x, y);
        const q = Quotient.of(z, x);
        expect(p.add(q).sub(q).equals(p)).toBe(true);
        expect(p.mul(q).div(q).equals(p)).toBe(true);
        expect(p.mul(q).equals(Quotient.of(z, y))).toBe(true);
      }),
      { numRuns: 50 },
    );
  });

  it('give the rational ratio where there is one', () => {
    const j = Coefficient.symbol('J1').add(Coefficient.symbol('J2'));
    expect(`${rationalRatio(Quotient.of(j.scale(rational(3))), Quotient.of(j.scale(rational(2))))}`).toBe(
      '3/2',
    );
    expect(rationalRatio(Quotient.of(j), Quotient.of(Coefficient.symbol('J1')))).toBeUndefined();
    expect(() => Quotient.of(j, Coefficient.zero)).toThrow(RangeError);
    expect(Quotient.of(Coefficient.one).pow(Rational.of(-2)).equals(Quotient.of(Coefficient.one))).toBe(true);
  });
});
