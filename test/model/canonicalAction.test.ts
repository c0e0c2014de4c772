import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { canonicalAction, isInvariant, isSameAction } from '../../src/model/canonicalAction.ts';
import { specialAngle } from '../../src/model/specialAngle.ts';
import { LimitError } from '../../src/notation/source.ts';
import { inlineCase } from '../inlineCase.ts';

describe('the canonical action', () => {
  const canonical = (term: string, values: 'angle' | 'real' = 'angle') =>
    canonicalAction(
      inlineCase({ time: false, values, parameters: ['J', 'g'], action: { term } }).parent.terms[0]!
        .expression,
    );
  const same = (x: string, y: string, values: 'angle' | 'real' = 'angle'): boolean =>
    isSameAction(canonical(x, values), canonical(y, values));

  it('knows trigonometric, exponential and polynomial identities and translations', () => {
    expect(
      same('J*cos(Delta_x phi)*cos(Delta_y phi)', 'J/2*cos((T_x + T_y - 2) phi) + J/2*cos((T_x - T_y) phi)'),
    ).toBe(true);
    expect(same('J*sin(Delta_x phi)^2', 'J/2 - J/2*cos(2 Delta_x phi)')).toBe(true);
    expect(same('J*cos(Delta_x phi)', 'J*cos(Deltab_x phi)')).toBe(true);
    expect(same('J*cos(Delta_x phi)', 'J*cos(-Delta_x T_y^3 phi)')).toBe(true);
    expect(same('(Delta_x phi)^2', '2 phi^2 - 2 phi (T_x phi)', 'real')).toBe(true);
    expect(same('exp(Delta_x phi)*exp(Delta_y phi)', 'exp((T_x + T_y - 2) phi)', 'real')).toBe(true);
    expect(same('cosh(phi)^2 - sinh(phi)^2 + g*phi', 'g*phi', 'real')).toBe(true);
    expect(same('(Delta_x phi)^2', '(Delta_y phi)^2', 'real')).toBe(false);
    expect(same('J*cos(Delta_x phi)', 'J*cos(Delta_x^2 phi)')).toBe(false);
    expect(same('log(1 + (Delta_x phi)^2)', 'log(1 + (Deltab_x phi)^2)', 'real')).toBe(true);
    expect(same('log(1 + (Delta_x phi)^2)', 'log(1 + (Delta_y phi)^2)', 'real')).toBe(false);
  });

  it('takes constant phases out by the addition theorems', () => {
    expect(same('cos(Delta_x phi + pi/2)', '-sin(Delta_x phi)')).toBe(true);
    expect(same('sin(Delta_x phi - pi/2)', '-cos(Delta_x phi)')).toBe(true);
    expect(same('cos(Delta_x phi + 5*pi)', '-cos(Delta_x phi)')).toBe(true);
    expect(same('2*cos(Delta_x phi + pi/3)', 'cos(Delta_x phi) - sqrt(3)*sin(Delta_x phi)')).toBe(true);
    expect(same('cos(Delta_x phi + pi/3)', 'cos(Delta_x phi - pi/3)')).toBe(false);
    expect(same('cos(phi^2 + pi)', '-cos(phi^2)', 'real')).toBe(true);
  });

  it('knows the parity of functions that it does not expand', () => {
    expect(same('phi tan(Delta_x phi)', '-phi tan(-Delta_x phi)', 'real')).toBe(true);
    expect(same('sin(phi^3)*phi', '-sin(-phi^3)*phi', 'real')).toBe(true);
    expect(same('cos(phi^3 - (T_x phi)^3)', 'cos((T_x phi)^3 - phi^3)', 'real')).toBe(true);
    expect(same('sin(phi^3)', 'sin(-phi^3)', 'real')).toBe(false);
    expect(same('exp(phi^3)', 'exp(-phi^3)', 'real')).toBe(false);
    expect(same('sqrt(1 + phi)', 'sqrt(1 - phi)', 'real')).toBe(false);
  });

  it('collects the arguments of such functions', () => {
    expect(same('log(1 + (Delta_x phi)^2)', 'log(1 + phi^2 - 2 phi (T_x phi) + (T_x phi)^2)', 'real')).toBe(
      true,
    );
    expect(same('exp(phi^2 + phi (T_x phi))', 'exp((T_x phi) phi + phi^2)', 'real')).toBe(true);
  });

  it('is refused where the expansion grows beyond the stated limit', () => {
    expect(() => canonical('(Delta_x^2 phi + Delta_y^2 phi)^24', 'real')).toThrow(LimitError);
  });

  it('is mapped by signed permutations and field signs', () => {
    const quarterTurn = [
      [0, -1],
      [1, 0],
    ];
    const map = (sign: 1 | -1) => ({
      matrix: quarterTurn,
      fields: new Map([['phi', { name: 'phi', sign }]]),
    });
    const mixed = canonical('J*sin(Delta_x phi)*sin(Delta_y phi)');
    expect(isInvariant(canonical('J*cos(Delta_x Delta_y phi)'), map(1))).toBe(true);
    expect(isInvariant(mixed, map(1))).toBe(false);
    expect(isInvariant(canonical('phi (T_x phi)', 'real'), map(1))).toBe(false);
    expect(isInvariant(canonical('phi^3', 'real'), map(1))).toBe(true);
    expect(isInvariant(canonical('phi^3', 'real'), map(-1))).toBe(false);
  });

  it('does not change under any translation of a polynomial action', () => {
    const shift = fc.tuple(fc.integer({ min: -3, max: 3 }), fc.integer({ min: -3, max: 3 }));
    fc.assert(
      fc.property(shift, shift, shift, (u, v, w) => {
        const at = ([i, j]: readonly [number, number]): string => `(T_x^${i} T_y^${j} phi)`;
        const moved = ([i, j]: readonly [number, number]): [number, number] => [i + w[0], j + w[1]];
        expect(same(`phi ${at(u)} ${at(v)}`, `${at(w)} ${at(moved(u))} ${at(moved(v))}`, 'real')).toBe(true);
      }),
      { numRuns: 25 },
    );
  });
});

describe('special angles', () => {
  it('have the values of the cosine and sine, and no others are known', () => {
    for (let n = -30; n <= 30; n++) {
      const values = specialAngle(
        Coefficient.symbol('pi').mul(Coefficient.integer(n)).div(Coefficient.integer(12)),
      );
      expect(values !== undefined).toBe(n % 2 === 0 || n % 3 === 0);
      if (!values) continue;
      expect(values.cos.toNumber(new Map())).toBeCloseTo(Math.cos((n * Math.PI) / 12), 12);
      expect(values.sin.toNumber(new Map())).toBeCloseTo(Math.sin((n * Math.PI) / 12), 12);
    }
    expect(specialAngle(Coefficient.one)).toBeUndefined();
    expect(specialAngle(Coefficient.symbol('J'))).toBeUndefined();
  });
});
