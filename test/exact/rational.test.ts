import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { gcd, Rational, rational } from '../../src/exact/rational.ts';

const rationals = fc
  .tuple(fc.bigInt({ min: -(10n ** 20n), max: 10n ** 20n }), fc.bigInt({ min: 1n, max: 10n ** 20n }))
  .map(([n, d]) => Rational.of(n, d));

describe('rational numbers', () => {
  it('form a field', () => {
    fc.assert(
      fc.property(rationals, rationals, rationals, (x, y, z) => {
        expect(x.add(y).equals(y.add(x))).toBe(true);
        expect(x.mul(y).equals(y.mul(x))).toBe(true);
        expect(
          x
            .add(y)
            .add(z)
            .equals(x.add(y.add(z))),
        ).toBe(true);
        expect(x.mul(y.add(z)).equals(x.mul(y).add(x.mul(z)))).toBe(true);
        expect(x.sub(x).isZero).toBe(true);
        if (!x.isZero) expect(x.mul(x.inv()).isOne).toBe(true);
      }),
    );
  });

  it('are in lowest terms with a positive denominator', () => {
    fc.assert(
      fc.property(rationals, rationals, (x, y) => {
        for (const r of [x.add(y), x.mul(y), x.sub(y), x.neg()]) {
          expect(r.den > 0n).toBe(true);
          expect(gcd(r.num, r.den)).toBe(1n);
        }
      }),
    );
  });

  it('read back from their text, and decimals are exact', () => {
    fc.assert(
      fc.property(rationals, (x) => {
        expect(Rational.parse(x.toString()).equals(x)).toBe(true);
      }),
    );
    expect(Rational.parse('0.1').equals(rational(1, 10))).toBe(true);
    expect(Rational.parse('-12.50').equals(rational(-25, 2))).toBe(true);
    expect(() => Rational.parse('1e3')).toThrow(SyntaxError);
    expect(() => Rational.parse('1/0')).toThrow(RangeError);
  });

  it('compare and floor as on the number line', () => {
    fc.assert(
      fc.property(rationals, rationals, (x, y) => {
        expect(Math.sign(x.compare(y))).toBe(x.sub(y).sign);
        const low = Rational.of(x.floor());
        expect(low.compare(x) <= 0 && x.compare(low.add(Rational.one)) < 0).toBe(true);
      }),
    );
  });

  it('approximate to floats even when both parts are beyond the range of floats', () => {
    const huge = 10n ** 400n;
    expect(Rational.of(huge * 3n, huge * 4n).toNumber()).toBeCloseTo(0.75, 14);
    expect(Rational.of(1n, 3n).toNumber()).toBeCloseTo(1 / 3, 15);
  });
});
