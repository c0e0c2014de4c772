import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import { Density, JetSpace } from '../../src/limit/jets.ts';
import { normalForm } from '../../src/limit/normalForm.ts';
import { quadraticSign, signOf } from '../../src/limit/quadraticForm.ts';

const space = new JetSpace(['phi', 'chi'], ['x', 'y']);
const term = (weight: Coefficient, ...derivatives: [number, number][]): Density =>
  new Density(
    space,
    new Map([[space.monomial(derivatives.map((derivative) => ({ field: 0, derivative }))), weight]]),
  );
const J = Coefficient.symbol('J');
const positive = new Set(['J']);

describe('the sign of the quadratic part', () => {
  it('is positive for squares with positive weights, indefinite when one is negative, unknown when a sign is', () => {
    const square = term(J, [1, 0], [1, 0]);
    expect(quadraticSign(square, positive)).toBe('positive');
    expect(quadraticSign(square.add(term(J.neg(), [0, 1], [0, 1])), positive)).toBe('indefinite');
    expect(quadraticSign(square, new Set())).toBe('unknown');
    expect(quadraticSign(term(J, [0, 0], [0, 0], [0, 0]), positive)).toBe('unknown');
  });

  it('is that of the momentum polynomial, whichever way the density is integrated by parts', () => {
    // φ ∂x²φ = −(∂xφ)² and φ ∂x⁴φ = (∂x²φ)² modulo total derivatives.
    for (const [order, sign] of [
      [2, 'indefinite'],
      [4, 'positive'],
    ] as const) {
      const bare = term(J, [0, 0], [order, 0]);
      expect(quadraticSign(bare, positive)).toBe(sign);
      expect(quadraticSign(normalForm(bare), positive)).toBe(sign);
    }
  });

  it('finds momenta between the axes: (kx² + ky²)/1 − 3 kx ky is negative on the diagonal', () => {
    const form = term(J, [1, 0], [1, 0])
      .add(term(J, [0, 1], [0, 1]))
      .add(term(J.scale(rational(-3)), [1, 0], [0, 1]));
    expect(quadraticSign(form, positive)).toBe('indefinite');
  });

  it('does not guess about couplings between fields', () => {
    const mixed = new Density(
      space,
      new Map([
        [
          space.monomial([
            { field: 0, derivative: [1, 0] },
            { field: 1, derivative: [1, 0] },
          ]),
          J,
        ],
      ]),
    );
    expect(quadraticSign(mixed, positive)).toBe('unknown');
  });
});

describe('the sign of a coefficient', () => {
  it('needs declared signs, except under even powers', () => {
    const r = Coefficient.symbol('r');
    expect([signOf(J, positive), signOf(J.neg(), positive), signOf(r, positive)]).toEqual([1, -1, undefined]);
    expect(signOf(r.mul(r), positive)).toBe(1);
    expect(signOf(J.sub(Coefficient.one), positive)).toBeUndefined();
    expect(signOf(Coefficient.symbol('pi').scale(Rational.minusOne), positive)).toBe(-1);
  });
});
