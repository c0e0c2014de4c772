import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Rational } from '../../src/exact/rational.ts';
import { type CorrectionMonomial, firstBreaking } from '../../src/symmetry/brokenShift.ts';
import type { ShiftFamily } from '../../src/symmetry/family.ts';

const family = (exponents: number[], free: number[][] = []): ShiftFamily => ({
  prefactor: [[{ exponents, weight: Coefficient.one }]],
  phase: [Rational.zero, Rational.zero],
  free,
  discrete: undefined,
  profile: '',
});

const monomial = (
  order: number,
  coefficient: number | undefined,
  ...derivatives: number[][]
): CorrectionMonomial => ({
  order,
  text: derivatives.map((d) => d.join('')).join(' '),
  derivatives: derivatives.map((derivative) => ({ field: 0, derivative })),
  ...(coefficient === undefined ? {} : { coefficient: Coefficient.integer(coefficient) }),
});

const first = (f: ShiftFamily, ...corrections: CorrectionMonomial[]) =>
  firstBreaking(f, corrections, ['phi'], ['x', 'y']);

describe('the correction that breaks a shift', () => {
  it('is the lowest one whose variation is no total derivative', () => {
    const corrections = [monomial(4, undefined, [2, 0], [2, 0]), monomial(2, undefined, [1, 1], [1, 1])];
    expect(first(family([0, 0], [[1, 0]]), ...corrections)).toEqual({ text: '20 20', order: 4 });
    expect(first(family([0, 0], [[0, 1]]), ...corrections)).toBeNull();
    expect(first(family([2, 2]), ...corrections)).toEqual({ text: '11 11', order: 2 });
  });

  it('leaves polynomials of lower degree than the derivatives alone', () => {
    expect(first(family([3, 0]), monomial(2, undefined, [2, 0], [2, 0]))).toBeNull();
    expect(first(family([4, 0]), monomial(2, undefined, [2, 0], [2, 0]))).not.toBeNull();
  });

  it('is cubic where the variation of a cubic term is no total derivative', () => {
    expect(first(family([1, 0]), monomial(2, undefined, [1, 0], [1, 0], [1, 0]))).not.toBeNull();
    expect(first(family([0, 0]), monomial(2, undefined, [1, 0], [1, 0], [1, 0]))).toBeNull();
  });

  it('adds quadratic monomials whose effects cancel', () => {
    // ∂_x^4 λ + ∂_y^4 λ = 0 for λ = x^4 - y^4
    const quartic: ShiftFamily = {
      ...family([4, 0]),
      prefactor: [
        [
          { exponents: [4, 0], weight: Coefficient.one },
          { exponents: [0, 4], weight: Coefficient.integer(-1) },
        ],
      ],
    };
    const order = (c: number | undefined) => [monomial(2, c, [2, 0], [2, 0]), monomial(2, c, [0, 2], [0, 2])];
    expect(first(quartic, ...order(1))).toBeNull();
    expect(first(quartic, ...order(undefined))).toEqual({ text: '20 20', order: 2 });
  });

  // A. Nicolis, R. Rattazzi, E. Trincherini, Phys. Rev. D 79 (2009) 064036: the cubic galileon (∂φ)² □φ is invariant under
  // φ → φ + b·x up to a total derivative
  it('adds monomials of one order when their coefficients are known: the galileon keeps linear shifts', () => {
    const galileon = (c: number): CorrectionMonomial[] => [
      monomial(2, 1, [1, 0], [1, 0], [2, 0]),
      monomial(2, c, [1, 0], [1, 0], [0, 2]),
      monomial(2, 1, [0, 1], [0, 1], [2, 0]),
      monomial(2, 1, [0, 1], [0, 1], [0, 2]),
    ];
    for (const linear of [
      [1, 0],
      [0, 1],
    ]) {
      expect(first(family(linear), ...galileon(1))).toBeNull();
      expect(first(family([2, 0]), ...galileon(1))).not.toBeNull();
    }
    expect(first(family([0, 0], [[1, 0]]), ...galileon(2))).not.toBeNull();
  });
});
