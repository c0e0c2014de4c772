import { describe, expect, it } from 'vitest';
import { checkCase } from '../../src/check.ts';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Rational } from '../../src/exact/rational.ts';
import { Density, JetSpace } from '../../src/limit/jets.ts';
import { normalForm } from '../../src/limit/normalForm.ts';
import { printMonomial } from '../../src/limit/printDensity.ts';
import { variationForms } from '../../src/symmetry/brokenShift.ts';
import type { ShiftFamily } from '../../src/symmetry/family.ts';
import { forbiddingSymmetry, type LatticeSymmetries } from '../../src/symmetry/forbidden.ts';
import { hasInvariantCompletion } from '../../src/symmetry/invariantCompletion.ts';
import { type InlineCase, inlineCase, kinetic } from '../inlineCase.ts';
import { fieldsOf, latticeOf } from './systems.ts';

/** What forbids each term that only the proposal has. */
function forbidden(parts: InlineCase): Record<string, string | null | undefined> {
  const { analyses } = checkCase(inlineCase(parts), []);
  const extra = analyses.matching!.differences.filter((d) => d.kind === 'only-in-proposal');
  return Object.fromEntries(
    extra.map((d) => [printMonomial(analyses.expansion.space, d.monomial), d.forbiddenBy]),
  );
}

const sheetWith = (term: string, more: Partial<InlineCase> = {}): Record<string, string | null | undefined> =>
  forbidden({
    parameters: ['J0', 'J'],
    action: { time: kinetic, plaquette: 'J*(1 - cos(Delta_x Delta_y phi))' },
    lagrangian: `K0/2 (d_tau phi)^2 + K/2 (d_x d_y phi)^2 + c*${term}`,
    proposalParameters: ['K0', 'K', 'c'],
    ...more,
  });

describe('a term that only the proposal has', () => {
  it('is forbidden in the ring-exchange sheet when a free function of one coordinate changes it', () => {
    expect(sheetWith('(d_x phi)^2')).toEqual({ '(d_x phi)^2': 'the shift phi -> phi + f(x)' });
    expect(sheetWith('(d_x^2 phi)^2')).toEqual({ '(d_x^2 phi)^2': 'the shift phi -> phi + f(x)' });
    expect(sheetWith('phi^2')).toEqual({ 'phi^2': 'the shift phi -> phi + f(x)' });
  });

  it('is allowed, and will be generated, when it is built from what the shifts leave alone', () => {
    // (∂τ∂x∂yφ)² is invariant under everything that the lattice action is.
    expect(sheetWith('(d_tau d_x d_y phi)^2')).toEqual({ '(d_tau d_x d_y phi)^2': null });
  });

  it('is forbidden by reflections of space, of time and of the field', () => {
    expect(sheetWith('(d_x d_y phi)^3')).toEqual({
      '(d_x d_y phi)^3': expect.stringMatching(/y -> -y|x -> -x|phi -> -phi/),
    });
    expect(
      forbidden({
        values: 'real',
        axes: ['x'],
        parameters: ['J'],
        action: { time: 'J*(Delta_tau phi)^2', x: 'J*(Delta_x phi)^2', well: 'J*phi^4' },
        lagrangian: 'K0*(d_tau phi)^2 + K*(d_x phi)^2 + u*phi^4 + c*phi^3',
        proposalParameters: ['K0', 'K', 'u', 'c'],
      }),
    ).toEqual({ 'phi^3': 'the field reflection phi -> -phi' });
    expect(Object.values(sheetWith('(d_tau phi) (d_x d_y phi)^3'))).toEqual([
      expect.stringMatching(/tau -> -tau|x -> -x|y -> -y/),
    ]);
  });

  it('is forbidden by the discrete shift that is left, or allowed when the whole proposal keeps it', () => {
    const clock = (well: string, extra: string) =>
      forbidden({
        parameters: ['J0', 'J', 'v'],
        action: { time: kinetic, x: 'J*(1 - cos(Delta_x phi))', field: `v*${well}` },
        axes: ['x'],
        lagrangian: `K0/2 (d_tau phi)^2 + K/2 (d_x phi)^2 + w*${well} + c*${extra}`,
        proposalParameters: ['K0', 'K', 'w', 'c'],
      });
    expect(clock('(1 - cos(2 phi))', 'phi^3')['phi^3']).toMatch(/^the shift phi -> phi \+ pi/);
    // a well without a quadratic term: the extra well of the proposal has one, with and without the half turn
    expect(clock('(1 - cos(2 phi))^2', '(1 - cos(phi))')['phi^2']).toMatch(/^the shift phi -> phi \+ pi/);
    expect(clock('(1 - cos(2 phi))^2', '(1 - cos(2 phi))')['phi^2']).toBeNull();
    expect(clock('(1 - cos(phi))^2', 'phi^2')['phi^2']).toMatch(/^the period phi -> phi \+ 2 pi/);
  });

  it('is forbidden by a shift proportional to x although its variation is a total derivative', () => {
    // φ → φ + c x turns (∂φ)² into (∂φ)² + 2c ∂φ + c²: the last term is extensive, and for an angle 2c ∂φ counts windings.
    const chain = (values: 'angle' | 'real', term: string) =>
      forbidden({
        axes: ['x'],
        values,
        parameters: ['J0', 'J'],
        action: {
          time: values === 'angle' ? kinetic : 'J0/2 (Delta_tau phi)^2',
          hop: values === 'angle' ? 'J*(1 - cos(Delta_x Deltab_x phi))' : 'J/2 (Delta_x Deltab_x phi)^2',
        },
        lagrangian: `K0/2 (d_tau phi)^2 + K/2 (d_x^2 phi)^2 + c*${term}`,
        proposalParameters: ['K0', 'K', 'c'],
      });
    for (const values of ['angle', 'real'] as const) {
      expect(chain(values, '(d_x phi)^2')).toEqual({ '(d_x phi)^2': 'the shift phi -> phi + x' });
      expect(chain(values, '(d_tau d_x^2 phi)^2')).toEqual({ '(d_tau d_x^2 phi)^2': null });
    }
  });

  it('is forbidden for an angle when a winding is left over, and allowed for a real field', () => {
    // With the exact shift by x alone, ∂xφ ∂yφ varies into c ∂yφ: no extensive constant, but the winding along y.
    const tilted = (values: 'angle' | 'real') =>
      forbidden({
        values,
        parameters: ['J0', 'J', 'G'],
        action: {
          time: values === 'angle' ? kinetic : 'J0/2 (Delta_tau phi)^2',
          hop: values === 'angle' ? 'J*(1 - cos(Delta_x Deltab_x phi))' : 'J/2 (Delta_x Deltab_x phi)^2',
          skew:
            values === 'angle'
              ? 'G*(1 - cos((Delta_y + Delta_x Deltab_x) phi))'
              : 'G/2 ((Delta_y + Delta_x Deltab_x) phi)^2',
        },
        lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x^2 phi)^2 + L/2 (d_y phi)^2 + c*(d_x phi)*(d_y phi)',
        proposalParameters: ['K0', 'K', 'L', 'c'],
      });
    expect(tilted('angle')['(d_y phi) (d_x phi)'] ?? tilted('angle')['(d_x phi) (d_y phi)']).toMatch(
      /shift phi -> phi \+ x/,
    );
  });

  it('is allowed where it is part of an invariant combination', () => {
    const laplacian = (extra: string) =>
      forbidden({
        values: 'real',
        parameters: ['J0', 'J'],
        action: {
          time: 'J0/2 (Delta_tau phi)^2',
          bending: 'J/2 ((Delta_x Deltab_x + Delta_y Deltab_y) phi)^2',
        },
        lagrangian: `K0/2 (d_tau phi)^2 + K/2 ((d_x^2 + d_y^2) phi)^2 + c*${extra}`,
        proposalParameters: ['K0', 'K', 'c'],
      });
    const quartic = laplacian('((d_x^2 + d_y^2) phi)^4');
    expect(Object.keys(quartic)).toHaveLength(5);
    expect(new Set(Object.values(quartic))).toEqual(new Set([null]));
    expect(laplacian('(d_x d_y phi)^4')).toEqual({
      '(d_x d_y phi)^4': expect.stringMatching(/^the shift phi -> phi \+ x y/),
    });
    expect(laplacian('((d_x phi)^2 + (d_y phi)^2)')).toEqual({
      '(d_x phi)^2': 'the shift phi -> phi + x',
      '(d_y phi)^2': 'the shift phi -> phi + y',
    });
  });
});

/** Polynomial shifts and free functions of single coordinates, in the plane. */
const shift = (profile: string, terms: [number[], number][], free: number[][] = []): ShiftFamily => ({
  prefactor: [terms.map(([exponents, w]) => ({ exponents, weight: Coefficient.integer(w) }))],
  phase: [Rational.zero, Rational.zero],
  free,
  discrete: undefined,
  profile,
});
const [one, x, y, saddle] = [
  shift('1', [[[0, 0], 1]]),
  shift('x', [[[1, 0], 1]]),
  shift('y', [[[0, 1], 1]]),
  shift('x^2 - y^2', [
    [[2, 0], 1],
    [[0, 2], -1],
  ]),
];

describe('a monomial as part of an invariant density', () => {
  const space = new JetSpace(['phi'], ['x', 'y']);
  const parts = (derivatives: number[][], families: ShiftFamily[]): (boolean | undefined)[] =>
    [...normalForm(density([[1, derivatives]])).terms.keys()].map((m) =>
      hasInvariantCompletion(m, families, {
        space,
        conditions: (d) => variationForms(d, space.fields),
      }),
    );
  function density(terms: [number, number[][]][]): Density {
    return terms.reduce((sum, [c, derivatives]) => {
      const m = space.monomial(derivatives.map((derivative) => ({ field: 0, derivative })));
      return sum.add(new Density(space, new Map([[m, Coefficient.integer(c)]])));
    }, Density.zero(space));
  }

  // A. Nicolis, R. Rattazzi, E. Trincherini, Phys. Rev. D 79 (2009) 064036: (∂φ)² and (∂φ)² □φ change by a total derivative
  // under φ → φ + b·x; the first leaves the constant b², the second none.
  it('is one of the cubic galileon for shifts linear in the coordinates, but not of a bare gradient', () => {
    expect(
      parts(
        [
          [1, 0],
          [1, 0],
          [0, 2],
        ],
        [one, x, y],
      ),
    ).toEqual([true]);
    expect(
      parts(
        [
          [1, 0],
          [1, 0],
        ],
        [x],
      ),
    ).toEqual([false]);
    expect(
      parts(
        [
          [1, 0],
          [1, 0],
          [1, 0],
        ],
        [x],
      ),
    ).toEqual([false]);
    expect(
      parts(
        [
          [1, 0],
          [1, 0],
          [1, 0],
        ],
        [y],
      ),
    ).toEqual([true]);
  });

  it('is the square of the Laplacian for saddles, with either representative modulo total derivatives', () => {
    expect(
      parts(
        [
          [2, 0],
          [2, 0],
        ],
        [one, x, y, saddle],
      ),
    ).toEqual([true]);
    expect(
      parts(
        [
          [2, 0],
          [0, 2],
        ],
        [one, x, y, saddle],
      ),
    ).toEqual([true]);
    expect(
      parts(
        [
          [1, 0],
          [0, 1],
        ],
        [saddle],
      ),
    ).toEqual([false]);
  });

  it('is possible under each of two shifts and not under both', () => {
    // ∂xφ ∂yφ leaves no constant for x or y, and 2 for x + y
    expect(
      [x, y].map(
        (f) =>
          parts(
            [
              [1, 0],
              [0, 1],
            ],
            [f!],
          )[0],
      ),
    ).toEqual([true, true]);
    expect(
      parts(
        [
          [1, 0],
          [0, 1],
        ],
        [x, y],
      ),
    ).toEqual([false]);
  });

  it('counts constants in a representative that the differences of the shifts leave alone', () => {
    // (x, x) and (0, x) shift both fields by x independently, so (∂xφ)² leaves a constant; −φ ∂x²φ would leave none, but it
    // is not the same at both ends of a lattice that are joined with the shift.
    const two = new JetSpace(['phi', 'chi'], ['x', 'y']);
    const linear = [{ exponents: [1, 0], weight: Coefficient.one }];
    const both = { ...x!, fields: two.fields, prefactor: [linear, linear] };
    const second = { ...both, prefactor: [[], linear] };
    const monomial = (...fields: number[]) =>
      two.monomial(fields.map((field) => ({ field, derivative: [1, 0] })));
    const isPossible = (m: string, families: ShiftFamily[]): boolean | undefined =>
      hasInvariantCompletion(m, families, {
        space: two,
        conditions: (d) => variationForms(d, two.fields),
      });
    // (∂xφ − ∂xχ)² is left by the common shift alone
    expect([monomial(0, 0), monomial(0, 1)].map((m) => isPossible(m, [both]))).toEqual([true, true]);
    expect([monomial(0, 0), monomial(0, 1)].map((m) => isPossible(m, [both, second]))).toEqual([
      false,
      false,
    ]);
  });

  it('is what free functions leave alone', () => {
    const f = shift('f(x)', [[[0, 0], 1]], [[1, 0]]);
    const diagonal = shift('f(x + y)', [[[0, 0], 1]], [[1, 1]]);
    expect(
      parts(
        [
          [2, 1],
          [2, 1],
        ],
        [f],
      ),
    ).toEqual([true]);
    expect(
      parts(
        [
          [2, 0],
          [2, 0],
        ],
        [f],
      ),
    ).toEqual([false]);
    // (∂x − ∂y)φ squared contains (∂xφ)², which alone changes
    expect(
      parts(
        [
          [1, 0],
          [1, 0],
        ],
        [diagonal],
      ),
    ).toEqual([true]);
    expect(
      parts(
        [
          [1, 0],
          [1, 0],
        ],
        [diagonal, f],
      ),
    ).toEqual([false]);
    expect(
      parts(
        [
          [0, 0],
          [0, 0],
        ],
        [diagonal],
      ),
    ).toEqual([false]);
  });
});

describe('the symmetry that is named', () => {
  const space = new JetSpace(['phi'], ['x', 'y']);
  const lattice = latticeOf('x', 'y');
  const symmetries = (families: ShiftFamily[], values: 'real' | 'angle'): LatticeSymmetries => ({
    space,
    lattice,
    fields: fieldsOf(lattice, values, 'phi'),
    pointGroup: { elements: [] } as unknown as LatticeSymmetries['pointGroup'],
    shifts: {
      symmetries: families.map((family) => ({
        family,
        lattice: true,
        continuum: null,
        status: 'lattice-only',
        growth: 0,
        redundancy: false,
        brokenBy: null,
      })),
      lattice: { rows: [], primes: [], complete: true, growth: 0, text: '' },
      continuum: null,
    },
    isTotalDerivative: (d) => d.terms.size > 0 && normalForm(d).isZero,
  });
  const product = (...derivatives: number[][]) =>
    space.monomial(derivatives.map((derivative) => ({ field: 0, derivative })));

  it('is a pair of shifts when only both together forbid', () => {
    expect(forbiddingSymmetry(product([1, 0], [0, 1]), symmetries([one!, x!, y!], 'real'))).toBe(
      'the shifts phi -> phi + x and phi -> phi + y together',
    );
  });

  it('is the period of an angle, unless the whole Lagrangian has it', () => {
    const bare = symmetries([], 'angle');
    expect(forbiddingSymmetry(product([0, 0], [0, 0]), bare)).toMatch(/^the period phi -> phi \+ 2 pi/);
    expect(forbiddingSymmetry(product([0, 0], [0, 0]), { ...bare, isPeriodic: () => true })).toBeNull();
    expect(forbiddingSymmetry(product([1, 0], [1, 0]), bare)).toBeNull();
  });
});
