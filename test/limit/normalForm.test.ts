import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { rational } from '../../src/exact/rational.ts';
import { Block } from '../../src/limit/block.ts';
import { eulerOperator, totalDerivative } from '../../src/limit/eulerOperator.ts';
import { Density, JetSpace, type JetVariable } from '../../src/limit/jets.ts';
import { isEquivalent, normalForm } from '../../src/limit/normalForm.ts';

const space = new JetSpace(['phi', 'chi'], ['x', 'y']);

const jet = (fields: number, order: number): fc.Arbitrary<JetVariable> =>
  fc.record({
    field: fc.integer({ min: 0, max: fields - 1 }),
    derivative: fc.tuple(fc.integer({ min: 0, max: order }), fc.integer({ min: 0, max: order })),
  });

/** Random densities of one or two fields with up to four factors a monomial. */
const densities = (fields: number, order = 2): fc.Arbitrary<Density> =>
  fc
    .array(
      fc.record({
        factors: fc.array(jet(fields, order), { minLength: 1, maxLength: 4 }),
        weight: fc.integer({ min: -5, max: 5 }),
      }),
      { minLength: 1, maxLength: 5 },
    )
    .map((terms) =>
      terms.reduce(
        (sum, t) =>
          sum.add(
            new Density(space, new Map([[space.monomial(t.factors), Coefficient.one]])).scale(
              Coefficient.integer(t.weight),
            ),
          ),
        Density.zero(space),
      ),
    );

const isEulerNull = (d: Density): boolean => space.fields.every((_, field) => eulerOperator(d, field).isZero);

const monomial = (...factors: [number, number][]): Density =>
  new Density(
    space,
    new Map([[space.monomial(factors.map((derivative) => ({ field: 0, derivative }))), Coefficient.one]]),
  );

describe('the normal form modulo total derivatives', () => {
  it('vanishes on every total derivative', () => {
    fc.assert(
      fc.property(densities(2), fc.integer({ min: 0, max: 1 }), (d, axis) => {
        expect(normalForm(totalDerivative(d, axis)).isZero).toBe(true);
      }),
      { numRuns: 60 },
    );
  });

  it('is zero exactly where the Euler operator of every field is zero', () => {
    fc.assert(
      fc.property(
        densities(2),
        densities(2),
        fc.integer({ min: 0, max: 1 }),
        fc.boolean(),
        (d, k, axis, exact) => {
          const sample = exact ? totalDerivative(k, axis) : totalDerivative(k, axis).add(d);
          expect(normalForm(sample).isZero).toBe(isEulerNull(sample));
        },
      ),
      { numRuns: 60 },
    );
  });

  it('differs from the density by a total derivative, as the Euler operator confirms', () => {
    fc.assert(
      fc.property(densities(2), (d) => {
        expect(isEulerNull(d.sub(normalForm(d)))).toBe(true);
      }),
      { numRuns: 60 },
    );
  });

  it('is idempotent, linear and independent of the representative', () => {
    fc.assert(
      fc.property(densities(1), densities(1), fc.integer({ min: 0, max: 1 }), (d, k, axis) => {
        const n = normalForm(d);
        expect(normalForm(n).equals(n)).toBe(true);
        expect(normalForm(d.add(k)).equals(n.add(normalForm(k)))).toBe(true);
        expect(normalForm(d.add(totalDerivative(k, axis))).equals(n)).toBe(true);
      }),
      { numRuns: 60 },
    );
  });

  it('does not depend on dividing out a derivative common to all factors', () => {
    // Multiplying every momentum polynomial by Π k_i^γ maps classes to classes one to one.
    fc.assert(
      fc.property(densities(1, 1), (d) => {
        const raised = new Density(
          space,
          new Map(
            [...d.terms].map(([m, c]) => [
              space.monomial(
                space.factors(m).map((f) => ({ ...f, derivative: f.derivative.map((n) => n + 1) })),
              ),
              c,
            ]),
          ),
        );
        const terms = [...normalForm(d).terms].filter(([m]) => m.length > 1);
        const expected = terms.length;
        expect([...normalForm(raised).terms].length).toBe(expected);
      }),
      { numRuns: 40 },
    );
  });

  it('chooses squares: φ ∂x²∂y² φ becomes (∂x∂y φ)²', () => {
    expect(normalForm(monomial([0, 0], [2, 2])).equals(monomial([1, 1], [1, 1]))).toBe(true);
    expect(normalForm(monomial([2, 0], [0, 2])).equals(monomial([1, 1], [1, 1]))).toBe(true);
    expect(
      normalForm(monomial([0, 0], [2, 0])).equals(monomial([1, 0], [1, 0]).scale(Coefficient.integer(-1))),
    ).toBe(true);
  });

  it('knows that the determinant φxx φyy − φxy² is a total derivative (Monge-Ampère null Lagrangian)', () => {
    expect(isEquivalent(monomial([2, 0], [0, 2]), monomial([1, 1], [1, 1]))).toBe(true);
    expect(isEquivalent(monomial([2, 0], [2, 0]), monomial([1, 1], [1, 1]))).toBe(false);
  });
});

/** Coefficients of the Molien-type series: dimension of S_n invariants in Q[k_1..k_n]⊗(axes) modulo Σk = 0, from
 *  characters: (1/n!) Σ_σ Π_axes [(1 − t) / Π_cycles (1 − t^len)]. An independent count. */
function molienDimension(n: number, degree: readonly number[]): number {
  const partitions = (left: number, most: number): number[][] =>
    left === 0
      ? [[]]
      : Array.from({ length: Math.min(left, most) }, (_, i) => i + 1).flatMap((k) =>
          partitions(left - k, k).map((p) => [k, ...p]),
        );
  let total = rational(0);
  for (const cycles of partitions(n, n)) {
    let centraliser = 1;
    const counts = new Map<number, number>();
    for (const c of cycles) {
      centraliser *= c;
      counts.set(c, (counts.get(c) ?? 0) + 1);
    }
    for (const c of counts.values()) for (let i = 2; i <= c; i++) centraliser *= i;
    let product = 1;
    for (const d of degree) {
      let series = new Array<number>(d + 1).fill(0);
      series[0] = 1;
      if (d >= 1) series[1] = -1;
      for (const c of cycles) {
        const next = [...series];
        for (let i = c; i <= d; i++) next[i]! += next[i - c]!;
        series = next;
      }
      product *= series[d]!;
    }
    total = total.add(rational(product, centraliser));
  }
  return total.toNumber();
}

describe('the dimension of a block modulo total derivatives', () => {
  it.each([
    [2, [2, 2]],
    [2, [3, 1]],
    [3, [3, 3]],
    [4, [4, 4]],
    [4, [8, 0]],
    [4, [2, 6]],
    [5, [3, 4]],
    [6, [4, 4]],
    [3, [2, 2, 2]],
  ])(
    'with %i equal fields and degree %j is the number of invariants that the characters of S_n give',
    (n, degree) => {
      expect(new Block([n], degree).standardCount).toBe(molienDimension(n, degree));
    },
  );
});
