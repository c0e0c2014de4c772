// What the bench compares must itself be right: the momentum polynomial vanishes on total derivatives and agrees with
// the sum over all assignments written out, and the inputs of T2 are what they are said to be.

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { totalDerivative } from '../../src/limit/eulerOperator.ts';
import { Density, JetSpace } from '../../src/limit/jets.ts';
import { equivalences, inventedDensities } from './equivalenceTask.ts';
import { momentumValue } from './momentumPolynomial.ts';
import { median } from './timing.ts';

const space = new JetSpace(['phi'], ['x', 'y']);
const monomialOf = (derivatives: readonly (readonly number[])[]): Density =>
  new Density(
    space,
    new Map([[space.monomial(derivatives.map((derivative) => ({ field: 0, derivative }))), Coefficient.one]]),
  );
const derivatives = fc.array(fc.tuple(fc.nat(2), fc.nat(2)), { minLength: 2, maxLength: 4 });
const momenta = (i: number): number[] => [i, 2 * i + 1];

describe('the momentum polynomial', () => {
  it('vanishes on total derivatives', () => {
    fc.assert(
      fc.property(derivatives, fc.nat(1), (alphas, axis) => {
        expect(momentumValue(totalDerivative(monomialOf(alphas), axis), momenta).isZero).toBe(true);
      }),
    );
  });
  it('is (k1 q2 + k2 q1)/2 for ∂x φ ∂y φ, with the second momentum minus the first', () => {
    // k = (1, 3), q = (−1, −3): (1·(−3) + (−1)·3)/2 = −3.
    expect(
      momentumValue(
        monomialOf([
          [1, 0],
          [0, 1],
        ]),
        momenta,
      ).toString(),
    ).toBe('-3');
  });
  it('is k1 k2 k3 for (∂x φ)³, with momenta 1, 2 and −3', () => {
    expect(
      momentumValue(
        monomialOf([
          [1, 0],
          [1, 0],
          [1, 0],
        ]),
        momenta,
      ).toString(),
    ).toBe('-6');
  });
});

describe('the invented input of T2', () => {
  for (const method of ['normal form', 'Euler operator'] as const)
    for (const mode of ['sparse', 'dense'] as const)
      it(`has an equivalent and an inequivalent pair for 4 derivatives, ${mode}, by the ${method}`, () => {
        expect(equivalences(inventedDensities(4, mode), method)).toEqual([true, false]);
      });
  it('is the same in every run', () => {
    expect(inventedDensities(8, 'sparse')).toEqual(inventedDensities(8, 'sparse'));
    expect(inventedDensities(8, 'sparse')[0]).toHaveLength(12);
  });
});

describe('the median', () => {
  it('is the middle value, or the mean of the two in the middle', () => {
    expect([median([3, 1, 2]), median([4, 1, 3, 2])]).toEqual([2, 2.5]);
  });
});
