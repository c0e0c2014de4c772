import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import type { LinearForm } from '../../src/model/action.ts';
import type { Lattice } from '../../src/model/geometry.ts';
import type { ShiftAnalysis, ShiftFamily } from '../../src/symmetry/family.ts';
import { analyseShifts, type CorrectionMonomial, testShiftFamily } from '../../src/symmetry/shifts.ts';
import { fieldsOf, formsOf, latticeOf, Operators } from './systems.ts';

type Build = (o: Operators) => LaurentPolynomial[];

function analyse(
  lattice: Lattice,
  onLattice: Build,
  inContinuum: Build | null,
  values: 'angle' | 'real' = 'angle',
  corrections: CorrectionMonomial[] = [],
): ShiftAnalysis {
  const o = new Operators(lattice.axes.length);
  return analyseShifts({
    lattice,
    fields: fieldsOf(lattice, values, 'phi'),
    latticeForms: formsOf(...onLattice(o)),
    continuumForms: inContinuum && formsOf(...inContinuum(o)),
    corrections,
  });
}

const statuses = (a: ShiftAnalysis): Record<string, string> =>
  Object.fromEntries(a.symmetries.map((s) => [s.family.profile, s.status]));

const sheet = latticeOf('tau', 'x', 'y');
const plane = latticeOf('x', 'y');
const plaquette: Build = (o) => [o.delta(0), o.delta(1).mul(o.delta(2))];

describe('shift symmetries on the lattice and in the continuum', () => {
  it('of plaquette rotors in 2+1 are f(x) + g(y), line-like, and both lists are complete', () => {
    const a = analyse(sheet, plaquette, (o) => [o.T(0), o.T(1).mul(o.T(2))]);
    expect(statuses(a)).toEqual({ 'f(x)': 'survives', 'g(y)': 'survives' });
    expect(a.symmetries.map((s) => [s.growth, s.redundancy])).toEqual([
      [1, false],
      [1, false],
    ]);
    expect(a.lattice.complete).toBe(true);
    expect(a.lattice.growth).toBe(1);
    expect(a.continuum?.complete).toBe(true);
  });

  it('of face and cube rotors in 3+1 are functions of one and of two coordinates', () => {
    const space = latticeOf('tau', 'x', 'y', 'z');
    const faces = (d: (k: number) => LaurentPolynomial) => [d(1).mul(d(2)), d(2).mul(d(3)), d(3).mul(d(1))];
    const f = analyse(
      space,
      (o) => [o.delta(0), ...faces((k) => o.delta(k))],
      (o) => [o.T(0), ...faces((k) => o.T(k))],
    );
    expect(statuses(f)).toEqual({ 'f(x)': 'survives', 'g(y)': 'survives', 'h(z)': 'survives' });
    const c = analyse(
      space,
      (o) => [o.delta(0), o.delta(1).mul(o.delta(2)).mul(o.delta(3))],
      (o) => [o.T(0), o.T(1).mul(o.T(2)).mul(o.T(3))],
    );
    expect(statuses(c)).toEqual({ 'f(x, y)': 'survives', 'g(x, z)': 'survives', 'h(y, z)': 'survives' });
    expect(c.symmetries.map((s) => s.growth)).toEqual([2, 2, 2]);
    expect([f.lattice.growth, c.lattice.growth]).toEqual([1, 2]);
    expect([f, c].every((a) => a.lattice.complete && a.continuum?.complete)).toBe(true);
  });

  it('become redundancies when the parameter may depend on time', () => {
    const a = analyse(
      sheet,
      (o) => [o.delta(1).mul(o.delta(2))],
      (o) => [o.T(1).mul(o.T(2))],
    );
    expect(statuses(a)).toEqual({ 'f(x, tau)': 'survives', 'g(y, tau)': 'survives' });
    expect(a.symmetries.map((s) => [s.growth, s.redundancy])).toEqual([
      [1, true],
      [1, true],
    ]);
    expect(a.lattice.complete).toBe(true);
  });

  it('of ordinary rotors are the constant alone', () => {
    const a = analyse(
      sheet,
      (o) => [0, 1, 2].map((k) => o.delta(k)),
      (o) => [0, 1, 2].map((k) => o.T(k)),
    );
    expect(statuses(a)).toEqual({ '1': 'survives' });
    expect(a.lattice.complete && a.continuum?.complete).toBe(true);
  });

  it('of central differences include three staggered constants that the continuum misses', () => {
    const a = analyse(
      plane,
      (o) => [o.central(0), o.central(1)],
      (o) => [o.T(0), o.T(1)],
      'real',
    );
    expect(statuses(a)).toEqual({
      '1': 'survives',
      '(-1)^x': 'lattice-only',
      '(-1)^y': 'lattice-only',
      '(-1)^(x+y)': 'lattice-only',
    });
    expect(a.lattice.complete).toBe(true);
  });

  it('of the product of central differences come with staggered partners', () => {
    const a = analyse(
      plane,
      (o) => [o.central(0).mul(o.central(1))],
      (o) => [o.T(0).mul(o.T(1))],
      'real',
    );
    expect(statuses(a)).toEqual({
      'f(x)': 'survives',
      'g(y)': 'survives',
      '(-1)^x g(y)': 'lattice-only',
      '(-1)^y f(x)': 'lattice-only',
    });
    expect(a.lattice.complete).toBe(true);
  });

  it('may run along diagonals, where arbitrary functions already hold every staggered partner', () => {
    const a = analyse(
      plane,
      (o) => [
        o
          .T(0)
          .mul(o.T(1))
          .sub(o.one)
          .mul(o.T(0).mul(o.T(1, -1)).sub(o.one)),
      ],
      (o) => [o.T(0).pow(2).sub(o.T(1).pow(2))],
    );
    expect(statuses(a)).toEqual({ 'f(x+y)': 'survives', 'g(x-y)': 'survives' });
    expect(a.lattice.complete && a.continuum?.complete).toBe(true);
  });

  it('may be staggered although a larger family runs through the same points', () => {
    const a = analyse(
      plane,
      (o) => [o.T(1, 2).sub(o.one), o.delta(0).mul(o.delta(1))],
      (o) => [o.T(1), o.T(0).mul(o.T(1))],
      'real',
    );
    expect(statuses(a)).toEqual({ 'f(x)': 'survives', '(-1)^y': 'lattice-only' });
    expect(a.lattice.complete).toBe(true);
  });

  it('may be waves of three, four or six steps', () => {
    const a = analyse(latticeOf('x'), (o) => [o.one.add(o.T(0)).add(o.T(0, 2))], null, 'real');
    expect(a.symmetries.map((s) => s.family.profile)).toEqual(['cos(2*pi*x/3)']);
    const b = analyse(latticeOf('x'), (o) => [o.one.add(o.T(0, 2))], null, 'real');
    expect(b.symmetries.map((s) => s.family.profile)).toEqual(['cos(pi*x/2)']);
    const c = analyse(latticeOf('x'), (o) => [o.one.sub(o.T(0)).add(o.T(0, 2)).pow(2)], null, 'real');
    expect(c.symmetries.map((s) => s.family.profile)).toEqual(['cos(pi*x/3)', 'x cos(pi*x/3)']);
    expect([a, b, c].every((x) => x.lattice.complete)).toBe(true);
  });

  it('compare functions of x - y on a lattice with two spacings in lattice steps', () => {
    const lattice: Lattice = {
      axes: [
        { name: 'x', spacing: 'a', role: 'space' },
        { name: 'y', spacing: 'c', role: 'space' },
      ],
      limits: ['a', 'c'],
    };
    const diagonal: Build = (o) => [o.T(0).mul(o.T(1)).sub(o.one)];
    const [a, c] = [Coefficient.symbol('a'), Coefficient.symbol('c')];
    const scaled = analyse(lattice, diagonal, (o) => [o.T(0).scale(a).add(o.T(1).scale(c))]);
    expect(statuses(scaled)['f(x-y)']).toBe('survives');
    const plain = analyse(lattice, diagonal, (o) => [o.T(0).add(o.T(1))]);
    expect(statuses(plain)['f(x-y)']).toBe('lattice-only');
  });

  it('may be functions of a combination read off the stencil', () => {
    const a = analyse(plane, (o) => [o.T(0, 2).mul(o.T(1, -1)).sub(o.one)], null);
    expect(a.symmetries.map((s) => s.family.profile)).toEqual(['f(x+2*y)']);
    expect(a.lattice.complete).toBe(true);
  });

  it('of second differences are polynomials', () => {
    const chain = latticeOf('tau', 'x');
    const a = analyse(
      chain,
      (o) => [o.delta(0), o.second(1)],
      (o) => [o.T(0), o.T(1).pow(2)],
    );
    expect(statuses(a)).toEqual({ '1': 'survives', x: 'survives' });
    const b = analyse(
      plane,
      (o) => [o.second(0), o.second(1)],
      (o) => [o.T(0).pow(2), o.T(1).pow(2)],
    );
    expect(statuses(b)).toEqual({ '1': 'survives', x: 'survives', y: 'survives', 'x y': 'survives' });
    expect(a.lattice.complete && b.lattice.complete && b.continuum?.complete).toBe(true);
  });

  it('include a polynomial that no smaller one announces', () => {
    const a = analyse(
      plane,
      (o) => [o.delta(0).pow(2).mul(o.delta(1)), o.delta(0).mul(o.delta(1).pow(2))],
      (o) => [o.T(0).pow(2).mul(o.T(1)), o.T(0).mul(o.T(1).pow(2))],
    );
    expect(statuses(a)).toEqual({ 'f(x)': 'survives', 'g(y)': 'survives', 'x y': 'survives' });
    expect(a.lattice.complete && a.continuum?.complete).toBe(true);
  });

  it('of the Laplacian are harmonic polynomials without end, and the certificate says so', () => {
    const a = analyse(
      sheet,
      (o) => [o.delta(0), o.second(1).add(o.second(2))],
      (o) => [o.T(0), o.T(1).pow(2).add(o.T(2).pow(2))],
      'real',
    );
    expect(Object.keys(statuses(a))).toEqual([
      '1',
      'x',
      'y',
      'x^2 - y^2',
      'x y',
      'x^3 - 3*x*y^2',
      '3*x^2*y - y^3',
    ]);
    expect(new Set(Object.values(statuses(a)))).toEqual(new Set(['survives']));
    expect(a.lattice.complete).toBe(false);
    expect(a.lattice.growth).toBe(1);
    expect(a.lattice.text).toContain('polynomial shifts continue beyond degree 3');
    expect(a.continuum?.text).toContain('polynomial shifts continue beyond degree 3');
  });

  it('survive when only the part of highest degree is common to lattice and continuum', () => {
    // forward differences: x^3 - 3 x y^2 - 3 x^2 is annihilated by (T_x - 1)^2 + (T_y - 1)^2, x^3 - 3 x y^2 is not
    const a = analyse(
      plane,
      (o) => [o.delta(0).pow(2).add(o.delta(1).pow(2))],
      (o) => [o.T(0).pow(2).add(o.T(1).pow(2))],
      'real',
    );
    const [smooth, waves] = [true, false].map((is) =>
      a.symmetries.filter((s) => s.family.phase.every((x) => x.isZero) === is),
    );
    expect(smooth!.map((s) => s.status)).toEqual(new Array(7).fill('survives'));
    // (i - 1)^2 + (-i - 1)^2 = 0: waves of four steps that the continuum does not have
    expect(new Set(waves!.map((s) => s.status))).toEqual(new Set(['lattice-only']));
    const cubic = a.symmetries.find((s) => s.family.profile.startsWith('x^3 - 3*x*y^2'));
    expect(cubic?.family.profile).not.toBe('x^3 - 3*x*y^2');
    expect(
      testShiftFamily(
        cubic!.family,
        formsOf(new Operators(2).T(0).pow(2).add(new Operators(2).T(1).pow(2))),
        'continuum',
      ),
    ).toBe(false);
    // discrete harmonic x^4 - 6 x^2 y^2 + y^4 - x^2 - y^2 has lower terms that the continuum does not
    const o = new Operators(2);
    const lap = formsOf(o.second(0).add(o.second(1)));
    const quartic = polynomialFamily([
      [[4, 0], 1],
      [[2, 2], -6],
      [[0, 4], 1],
    ]);
    const corrected = polynomialFamily([
      [[4, 0], 1],
      [[2, 2], -6],
      [[0, 4], 1],
      [[2, 0], -1],
      [[0, 2], -1],
    ]);
    expect(testShiftFamily(quartic, lap, 'lattice')).toBe(false);
    expect(testShiftFamily(corrected, lap, 'lattice')).toBe(true);
  });

  it('are broken by the lowest correction whose equation of motion they change', () => {
    const corrections: CorrectionMonomial[] = [
      { order: 2, text: '(d_x d_y^2 phi)^2', derivatives: twice(0, [1, 2]) },
      { order: 4, text: '(d_x^2 phi)^2', derivatives: twice(0, [2, 0]) },
      { order: 6, text: '(d_x^3 phi)^2', derivatives: twice(0, [3, 0]) },
    ];
    const a = analyse(
      plane,
      (o) => [o.second(0), o.delta(0).mul(o.delta(1))],
      (o) => [o.T(0).mul(o.T(1))],
      'angle',
      corrections,
    );
    expect(statuses(a)).toEqual({ 'f(y)': 'survives', x: 'survives', 'f(x)': 'continuum-only' });
    expect(a.symmetries.map((s) => s.brokenBy)).toEqual([null, null, { text: '(d_x^2 phi)^2', order: 4 }]);
  });

  it('of weights with parameters hold for generic parameters, and the certificate says so', () => {
    const weight = Coefficient.symbol('r');
    const build: Build = (o) => [o.delta(0).add(o.delta(1).scale(weight))];
    const a = analyse(plane, build, (o) => [o.T(0).add(o.T(1).scale(weight))], 'real');
    expect(statuses(a)).toEqual({ '1': 'survives' });
    expect(a.lattice.text).toContain('generic');
    expect(a.lattice.complete).toBe(false);
  });
});

describe('discrete shifts of angles', () => {
  it('are what an on-site anisotropy leaves', () => {
    const a = analyse(sheet, (o) => [o.delta(0), o.delta(1), o.delta(2), o.times(2, o.one)], null);
    expect(a.symmetries.map((s) => [s.family.profile, s.family.discrete])).toEqual([['pi', 2]]);
    const b = analyse(sheet, (o) => [o.delta(0), o.delta(1).mul(o.delta(2)), o.times(3, o.one)], null);
    expect(b.symmetries.map((s) => s.family.profile)).toEqual(['2*pi/3*f(x)', '2*pi/3*g(y)']);
    // signs do not matter for shifts by pi
    const c = analyse(plane, (o) => [o.delta(0).mul(o.delta(1)), o.times(2, o.one)], null);
    expect(c.symmetries.map((s) => s.family.profile)).toEqual(['pi*f(x)', 'pi*g(y)']);
    expect([a, b, c].every((x) => x.lattice.complete)).toBe(true);
  });

  it('may be local functions with integer values', () => {
    const a = analyse(plane, (o) => [o.times(2, o.delta(0)), o.delta(1)], null);
    expect(a.symmetries.map((s) => s.family.profile)).toEqual(['1', 'pi*f(x)']);
    expect(a.lattice.complete).toBe(true);
    const local = analyse(latticeOf('x'), (o) => [o.times(17, o.one)], null);
    expect(local.symmetries.map((s) => s.family.profile)).toEqual(['2*pi/17*f(x)']);
  });

  it('are not listed where a continuous family contains them', () => {
    // pi/2 (-1)^(x+y) is f(x) + g(y) modulo 2 pi
    const a = analyse(plane, (o) => [o.delta(0).mul(o.delta(1))], null);
    expect(a.symmetries.map((s) => s.family.profile)).toEqual(['f(x)', 'g(y)']);
    expect(a.lattice.text).toContain('no discrete shifts modulo 2');
  });

  it('do not exist for real fields', () => {
    expect(analyse(plane, (o) => [o.times(2, o.delta(0)), o.delta(1)], null, 'real').symmetries.length).toBe(
      1,
    );
  });
});

describe('several fields', () => {
  it('shift together where the action ties them', () => {
    const lattice = latticeOf('x');
    const o = new Operators(1);
    const forms: LinearForm[] = [
      new Map([
        ['phi', o.one],
        ['chi', o.times(-2, o.one)],
      ]),
      new Map([['chi', o.delta(0)]]),
    ];
    const a = analyseShifts({
      lattice,
      fields: fieldsOf(lattice, 'real', 'phi', 'chi'),
      latticeForms: forms,
      continuumForms: null,
    });
    expect(a.symmetries.map((s) => s.family.profile)).toEqual(['phi: 2; chi: 1']);
    expect(a.lattice.complete).toBe(true);
  });

  it('of lattice Maxwell theory have a gauge redundancy that the certificate names', () => {
    const o = new Operators(3);
    const names = ['A_tau', 'A_x', 'A_y'];
    const strength = (i: number, j: number): LinearForm =>
      new Map([
        [names[j]!, o.delta(i)],
        [names[i]!, o.times(-1, o.delta(j))],
      ]);
    const a = analyseShifts({
      lattice: sheet,
      fields: fieldsOf(sheet, 'angle', ...names),
      latticeForms: [strength(0, 1), strength(0, 2), strength(1, 2)],
      continuumForms: null,
    });
    expect(a.lattice.complete).toBe(false);
    expect(a.lattice.text).toContain('1 free function of all coordinates');
    // an open box has sites − 1 gauge parameters that act, and no flat connection besides
    expect(a.lattice.rows.map((r) => r.solutions)).toEqual(
      a.lattice.rows.map((r) => (r.size[0]! + 1) ** 3 - 1 - corners(r.size[0]!)),
    );
  });
});

/** Gauge parameters at sites beyond the box that no link inside it can tell apart. */
function corners(edge: number): number {
  // links start at the n^3 sites of the box; end points with two or three coordinates equal to n are on no link
  return 3 * edge + 1;
}

const twice = (
  field: number,
  derivative: number[],
): { readonly field: number; readonly derivative: readonly number[] }[] => [
  { field, derivative },
  { field, derivative },
];

function polynomialFamily(terms: [number[], number][]): ShiftFamily {
  return {
    prefactor: [terms.map(([exponents, w]) => ({ exponents, weight: Coefficient.integer(w) }))],
    phase: terms[0]![0].map(() => Rational.zero),
    free: [],
    discrete: undefined,
    profile: '',
  };
}

describe('the direct test of a family', () => {
  const stencils = fc
    .array(
      fc.tuple(
        fc.integer({ min: -2, max: 2 }),
        fc.integer({ min: -2, max: 2 }),
        fc.integer({ min: -2, max: 2 }),
      ),
      {
        minLength: 1,
        maxLength: 5,
      },
    )
    .map((terms) =>
      LaurentPolynomial.of(
        2,
        terms.map(([x, y, w]) => ({ exponents: [x, y], weight: Coefficient.integer(w) })),
      ),
    );
  const factor = fc.constantFrom<(o: Operators) => LaurentPolynomial>(
    (o) => o.one,
    (o) => o.delta(0),
    (o) => o.delta(1),
    (o) => o.T(0).add(o.one),
    (o) => o.T(0).mul(o.T(1)).sub(o.one),
    (o) => o.T(0).mul(o.T(1)).add(o.one),
  );
  const families = fc.record({
    exponents: fc.tuple(fc.integer({ min: 0, max: 2 }), fc.integer({ min: 0, max: 1 })),
    signs: fc.tuple(fc.boolean(), fc.boolean()),
    free: fc.constantFrom<number[][]>([], [[1, 0]], [[1, 1]], [[1, -1]], [[0, 1]], [[2, 1]]),
  });

  it('agrees with inserting random functions into the stencil', () => {
    fc.assert(
      fc.property(stencils, factor, factor, families, fc.integer(), (raw, p, q, family, salt) => {
        const o = new Operators(2);
        const stencil = raw.mul(p(o)).mul(q(o));
        const f = (argument: string): number => {
          let h = salt % 1000;
          for (const c of argument) h = (h * 31 + c.charCodeAt(0) * 17 + 5) % 10007;
          return family.free.length === 0 ? 1 : h;
        };
        const lambda = (x: number, y: number): number => {
          const sign = ((family.signs[0] ? x : 0) + (family.signs[1] ? y : 0)) % 2 === 0 ? 1 : -1;
          const argument = family.free.map(([i, j]) => i! * x + j! * y).join();
          return x ** family.exponents[0] * y ** family.exponents[1] * sign * f(argument);
        };
        let vanishes = true;
        for (let x = -4; x <= 4; x++)
          for (let y = -4; y <= 4; y++) {
            const sum = stencil.terms.reduce(
              (s, t) => s + t.weight.toNumber(new Map()) * lambda(x + t.exponents[0]!, y + t.exponents[1]!),
              0,
            );
            if (sum !== 0) vanishes = false;
          }
        const half = rational(1, 2);
        const shift: ShiftFamily = {
          prefactor: [[{ exponents: family.exponents, weight: Coefficient.one }]],
          phase: family.signs.map((s) => (s ? half : Rational.zero)),
          free: family.free,
          discrete: undefined,
          profile: '',
        };
        expect(testShiftFamily(shift, formsOf(stencil), 'lattice')).toBe(vanishes);
      }),
      { numRuns: 300 },
    );
  });

  it('agrees with differentiating products of powers and exponentials of the free argument', () => {
    // f(ℓ) = exp(t ℓ) for symbolic t: D(∂) [x^m y^n e^{t ℓ}] = e^{t ℓ} D(∂ + t ℓ) x^m y^n, evaluated at integer t, x and y
    const falling = (n: number, k: number): number => (k === 0 ? 1 : n * falling(n - 1, k - 1));
    const choose = (n: number, k: number): number => falling(n, k) / falling(k, k);
    const derivative = (order: number, power: number, at: number, rate: number): number => {
      let sum = 0;
      for (let k = 0; k <= Math.min(order, power); k++)
        sum += choose(order, k) * falling(power, k) * at ** (power - k) * rate ** (order - k);
      return sum;
    };
    const operators = fc
      .array(
        fc.tuple(
          fc.integer({ min: 0, max: 2 }),
          fc.integer({ min: 0, max: 2 }),
          fc.integer({ min: -2, max: 2 }),
        ),
        {
          minLength: 1,
          maxLength: 3,
        },
      )
      .map((terms) =>
        LaurentPolynomial.of(
          2,
          terms.map(([x, y, w]) => ({ exponents: [x, y], weight: Coefficient.integer(w) })),
        ),
      );
    const powers = fc.tuple(fc.integer({ min: 0, max: 3 }), fc.integer({ min: 0, max: 3 }));
    const functional = fc.constantFrom<number[] | undefined>(undefined, [1, 0], [0, 1], [1, 1], [1, -1]);
    fc.assert(
      fc.property(operators, powers, functional, fc.boolean(), (d, [m, n], row, mix) => {
        const o = new Operators(2);
        const operator = mix ? d.mul(o.T(0).sub(o.T(1))) : d;
        let vanishes = true;
        for (const t of row ? [1, 2, 3, 4, 5, 6] : [0])
          for (let x = 1; x <= 5; x++)
            for (let y = 1; y <= 5; y++) {
              const sum = operator.terms.reduce(
                (s, { exponents, weight }) =>
                  s +
                  weight.toNumber(new Map()) *
                    derivative(exponents[0]!, m, x, t * (row?.[0] ?? 0)) *
                    derivative(exponents[1]!, n, y, t * (row?.[1] ?? 0)),
                0,
              );
              if (sum !== 0) vanishes = false;
            }
        const shift = { ...polynomialFamily([[[m, n], 1]]), free: row ? [row] : [] };
        expect(testShiftFamily(shift, formsOf(operator), 'continuum')).toBe(vanishes);
      }),
      { numRuns: 300 },
    );
  });

  it('weighs the derivatives of a polynomial', () => {
    const o = new Operators(2);
    const wave = formsOf(o.T(0).pow(2).sub(o.T(1).pow(2)));
    const sum = (w: number) =>
      polynomialFamily([
        [[3, 0], 1],
        [[1, 2], w],
      ]);
    expect([1, 2, 3, 4].map((w) => testShiftFamily(sum(w), wave, 'continuum'))).toEqual([
      false,
      false,
      true,
      false,
    ]);
  });

  it('confirms every family that the search lists, on both sides', () => {
    const a = analyse(sheet, plaquette, (o) => [o.T(0), o.T(1).mul(o.T(2))]);
    const o = new Operators(3);
    for (const s of a.symmetries) {
      expect(testShiftFamily(s.family, formsOf(...plaquette(o)), 'lattice')).toBe(s.lattice);
      expect(testShiftFamily(s.family, formsOf(o.T(0), o.T(1).mul(o.T(2))), 'continuum')).toBe(s.continuum);
    }
  });

  it('knows waves of any order: T^2 - 2 cos(2 pi/5) T + 1 has none that is rational, 1 + T + T^2 + T^3 + T^4 has', () => {
    const o = new Operators(1);
    const wave = (turn: Rational): ShiftFamily => ({ ...polynomialFamily([[[0], 1]]), phase: [turn] });
    const sum = [0, 1, 2, 3, 4].map((k) => o.T(0, k)).reduce((x, y) => x.add(y));
    for (let k = 0; k < 10; k++)
      expect(testShiftFamily(wave(rational(k, 10)), formsOf(sum), 'lattice')).toBe(k % 2 === 0 && k !== 0);
  });

  it('lets a discrete shift change a form by multiples of 2 pi', () => {
    const o = new Operators(1);
    const third = { ...polynomialFamily([[[0], 1]]), discrete: 3 };
    expect(testShiftFamily(third, formsOf(o.times(3, o.one)), 'lattice')).toBe(true);
    expect(testShiftFamily(third, formsOf(o.times(2, o.one)), 'lattice')).toBe(false);
    // 2 pi/6 (x^2 - x) under T - 2 + T^-1 changes by 2 pi/3
    const square = {
      ...polynomialFamily([
        [[2], 1],
        [[1], -1],
      ]),
      discrete: 2,
    };
    expect(testShiftFamily(square, formsOf(o.second(0)), 'lattice')).toBe(true);
    expect(testShiftFamily({ ...square, discrete: 3 }, formsOf(o.second(0)), 'lattice')).toBe(false);
  });

  it('takes a sign that depends on the free argument as part of the function', () => {
    const o = new Operators(2);
    const forms = formsOf(o.T(0).mul(o.T(1)));
    const signed = (free: number[][]): ShiftFamily => ({
      ...polynomialFamily([[[0, 0], 1]]),
      phase: [rational(1, 2), Rational.zero],
      free,
    });
    expect(testShiftFamily(signed([[1, 0]]), forms, 'continuum')).toBe(true);
    expect(testShiftFamily(signed([[0, 1]]), forms, 'continuum')).toBe(false);
  });
});
