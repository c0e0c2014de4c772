import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitPower, judgeFit } from '../../src/witness/fit.ts';

const spacings = [1 / 8, 1 / 16, 1 / 32, 1 / 64];

describe('fitted exponents', () => {
  it('of a pure power are that power, without spread', () => {
    fc.assert(
      fc.property(fc.integer({ min: -6, max: 6 }), fc.double({ min: 0.1, max: 10, noNaN: true }), (p, c) => {
        const fit = fitPower(
          spacings,
          spacings.map((a) => -c * a ** p),
        );
        expect(fit.exponent).toBeCloseTo(p, 9);
        expect(fit.slope).toBeCloseTo(p, 9);
        expect(fit.spread).toBeLessThan(1e-9);
      }),
    );
  });
  it('follow the drift of a power with a correction', () => {
    const values = spacings.map((a) => a ** -2 * (1 + 3 * a));
    const fit = fitPower(spacings, values);
    expect(Math.abs(fit.exponent + 2)).toBeLessThan(Math.abs(fit.slope + 2));
    expect(judgeFit(fit, -2)).toBe('confirms');
    expect(judgeFit(fit, -1)).toBe('contradicts');
  });
  it('prove nothing while the local slopes still move', () => {
    const fit = fitPower(spacings, [1, 10, 1, 10]);
    expect(judgeFit(fit, 0)).toBe('inconclusive');
  });
});
