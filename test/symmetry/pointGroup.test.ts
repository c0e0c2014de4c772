import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import { Rational } from '../../src/exact/rational.ts';
import type { Expression } from '../../src/model/action.ts';
import type { Field } from '../../src/model/geometry.ts';
import { crystalClass } from '../../src/symmetry/crystalClass.ts';
import { analysePointGroup, type PointGroupAnalysis } from '../../src/symmetry/pointGroup.ts';
import { type InlineCase, inlineCase, kinetic } from '../inlineCase.ts';
import { latticeOf } from './systems.ts';

function groupOf(parts: InlineCase): PointGroupAnalysis {
  const { lattice, fields, parent } = inlineCase(parts);
  return analysePointGroup({ lattice, fields, terms: parent.terms });
}

const neighbours = (axes: readonly string[]): Record<string, string> =>
  Object.fromEntries(axes.map((x) => [`${x}-link`, `J*(1 - cos(Delta_${x} phi))`]));

describe('the holohedry of orthogonal lattices', () => {
  // International Tables for Crystallography vol. A (holohedry orders); hypercubic: J. H. Conway and N. J. A. Sloane, Sphere
  // Packings, Lattices and Groups (published entries aut-square, aut-rect, aut-cubic, aut-hypercubic4).
  it.each([
    [['x', 'y'], {}, 8],
    [['x', 'y'], { y: 'c' }, 4],
    [['x', 'y', 'z'], {}, 48],
    [['x', 'y', 'z', 'w'], {}, 384],
  ] as const)(
    'over %j with own spacings %j has order %i, and nearest-neighbour links have it all',
    (axes, spacings, order) => {
      const group = groupOf({ axes, spacings, time: false, parameters: ['J'], action: neighbours(axes) });
      expect([group.holohedry, group.order]).toEqual([order, order]);
    },
  );
});

describe('the point group of an action', () => {
  it('is that of the stencil: 5-point and 9-point Laplacians have all 8 elements', () => {
    // published entries stencil-sym-lap2d-5pt and stencil-sym-lap2d-9pt, common practice, no source
    const five = 'phi (T_x + T_x^-1 + T_y + T_y^-1 - 4) phi';
    const nine =
      'phi (4 T_x + 4 T_x^-1 + 4 T_y + 4 T_y^-1 + T_x T_y + T_x T_y^-1 + T_x^-1 T_y + T_x^-1 T_y^-1 - 20) phi';
    for (const term of [five, nine])
      expect(groupOf({ time: false, values: 'real', action: { term } }).order).toBe(8);
  });

  it('shrinks with the action: anisotropic links, a diagonal link, a chiral stencil', () => {
    const rectangle = groupOf({
      parameters: ['J', 'K'],
      action: { x: 'J*(1 - cos(Delta_x phi))', y: 'K*(1 - cos(Delta_y phi))' },
    });
    expect([rectangle.order, rectangle.name]).toEqual([4, '2mm']);
    const diagonal = groupOf({
      parameters: ['J'],
      action: { ...neighbours(['x', 'y']), diagonal: 'J*(1 - cos((T_x T_y - 1) phi))' },
    });
    expect([diagonal.order, diagonal.name]).toEqual([4, '2mm']);
    expect(diagonal.generators).toContain('x <-> y');
    // A product of three neighbours around a site that turns one way only: quarter turns, no mirror.
    const chiral = groupOf({
      time: false,
      values: 'real',
      action: {
        swirl:
          'phi (T_x phi) (T_x^2 T_y phi) + phi (T_y phi) (T_y^2 T_x^-1 phi) + phi (T_x^-1 phi) (T_x^-2 T_y^-1 phi) + phi (T_y^-1 phi) (T_y^-2 T_x phi)',
      },
    });
    expect([chiral.order, chiral.name]).toEqual([4, '4']);
    expect(chiral.fieldReflection).toBe(false);
  });

  it('tells reflections of time and of the field apart from the space part', () => {
    const even = groupOf({ parameters: ['J0', 'J'], action: { time: kinetic, ...neighbours(['x', 'y']) } });
    expect([even.order, even.timeReflection, even.fieldReflection]).toEqual([8, true, true]);
    const odd = groupOf({
      axes: ['x'],
      parameters: ['J', 'g'],
      action: { link: 'J*(1 - cos(Delta_x phi))', drift: 'g*sin(Delta_x phi)' },
    });
    // x → −x maps sin(Δφ) to −sin(Δφ); with φ → −φ it is a symmetry again, and the space part counts it.
    expect([odd.order, odd.fieldReflection]).toEqual([2, false]);
    const cubic = groupOf({
      values: 'real',
      parameters: ['g'],
      action: { cube: 'g*phi^3', link: 'g*(Delta_x phi)^2' },
    });
    expect(cubic.fieldReflection).toBe(false);
  });

  it('permutes fields of one kind', () => {
    const { lattice, fields, parent } = inlineCase({
      fields: ['phi', 'chi'],
      parameters: ['J', 'g'],
      action: {
        x: 'J*(1 - cos(Delta_x phi))',
        y: 'J*(1 - cos(Delta_y chi))',
        mix: 'g*(1 - cos(phi - chi))',
      },
    });
    const group = analysePointGroup({ lattice, fields, terms: parent.terms });
    expect(group.order).toBe(8);
    expect(group.elements.some((e) => e.fields[0]!.field === 1)).toBe(true);
  });
});

describe('the point group of nested and shifted functions', () => {
  const chain = (hop: string, values: 'angle' | 'real' = 'real') =>
    groupOf({
      axes: ['x'],
      values,
      parameters: ['J0', 'J'],
      action: { time: 'J0*(1 - cos(Delta_tau phi))', hop },
    });

  it('uses the parity of functions of sums and products', () => {
    expect(chain('J*tan(Delta_x phi)^2').fieldReflection).toBe(true);
    expect(chain('J*tan(Delta_x phi)').fieldReflection).toBe(false);
    expect(chain('J*cos(phi^2 (T_x phi))').fieldReflection).toBe(true);
    expect(chain('J*sinh(phi^3)*sin(T_x phi)').fieldReflection).toBe(true);
    expect(chain('J*sqrt(1 + phi^2 + (T_x phi)^4)').order).toBe(1);
    expect(chain('J*sqrt(1 + phi^4 + (T_x phi)^4)').order).toBe(2);
  });

  it('knows that phases are angles', () => {
    expect(chain('J*cos(Delta_x phi + pi)', 'angle').fieldReflection).toBe(true);
    expect(chain('J*cos(Delta_x phi + pi/3)', 'angle').fieldReflection).toBe(false);
    // sin(u + pi/2) = cos u: the two links differ in writing only
    const square = groupOf({
      parameters: ['J'],
      action: { x: 'J*sin(Delta_x phi + pi/2)', y: 'J*cos(Delta_y phi)' },
    });
    expect([square.order, square.name, square.fieldReflection]).toEqual([8, '4mm', true]);
  });
});

describe('generators', () => {
  it('are few: none of them is superfluous', () => {
    expect(groupOf({ parameters: ['J'], action: neighbours(['x', 'y']) }).generators).toEqual([
      'x -> -x',
      'x <-> y',
    ]);
    expect(
      groupOf({ parameters: ['J'], action: { term: 'J*(1 - cos((T_x T_y - 1) phi))' } }).generators,
    ).toEqual(['x <-> y', '(x, y) -> (-x, -y)']);
    const turn = groupOf({
      time: false,
      values: 'real',
      action: {
        swirl:
          'phi (T_x phi) (T_x^2 T_y phi) + phi (T_y phi) (T_y^2 T_x^-1 phi) + phi (T_x^-1 phi) (T_x^-2 T_y^-1 phi) + phi (T_y^-1 phi) (T_y^-2 T_x phi)',
      },
    });
    expect(turn.generators).toHaveLength(1);
    expect(turn.generators[0]).toMatch(/^\(x, y\) -> \((y, -x|-y, x)\)$/);
  });
});

/** Value of Σ_r (Σ of products of fields) on a periodic sheet, with a field given by a function of the site. */
type Sheet = (x: number, y: number) => number;
type Monomial = { weight: number; wave: boolean; sites: readonly (readonly [number, number])[] };
const EDGE = 7;
function sheetSum(action: readonly Monomial[], f: Sheet): number {
  let sum = 0;
  for (let x = 0; x < EDGE; x++)
    for (let y = 0; y < EDGE; y++)
      for (const { weight, wave, sites } of action) {
        const values = sites.map(([i, j]) => f(x + i, y + j));
        sum += weight * (wave ? Math.cos(values.reduce((p, v) => p - v)) : values.reduce((p, v) => p * v));
      }
  return sum;
}
const wrapped = (n: number): number => ((n % EDGE) + EDGE) % EDGE;
const generic: Sheet = (x, y) => Math.sin(12.9898 * wrapped(x) + 78.233 * wrapped(y) + 0.3) * 1.7;

describe('the group that is found', () => {
  const offset = fc.tuple(fc.integer({ min: -1, max: 1 }), fc.integer({ min: -1, max: 1 }));
  const monomial = fc.record({
    weight: fc.integer({ min: 1, max: 2 }),
    wave: fc.boolean(),
    // different sites, so that no cosine has the constant argument u − u
    sites: fc.uniqueArray(offset, { minLength: 2, maxLength: 3, selector: String }),
  });

  it('is the set of maps that leave the value of the action on a rough field as it is', () => {
    fc.assert(
      fc.property(fc.array(monomial, { minLength: 1, maxLength: 3 }), (action) => {
        const text = action.map(({ weight, wave, sites }) => {
          const at = sites.map(([i, j]) => `(T_x^${i} T_y^${j} phi)`);
          return `${weight}*${wave ? `cos(${at.join(' - ')})` : at.join('*')}`;
        });
        const group = groupOf({ time: false, values: 'real', action: { term: text.join(' + ') } });
        const found = new Set(group.elements.map((e) => `${e.matrix.flat().join()};${e.fields[0]!.sign}`));
        const before = sheetSum(action, generic);
        for (const [a, b, c, d] of [
          [1, 0, 0, 1],
          [0, 1, 1, 0],
        ] as const)
          for (const s of [1, -1])
            for (const t of [1, -1])
              for (const sign of [1, -1]) {
                // the inverse of a signed permutation is its transpose, and both run over the whole group
                const [p, q, r, u] = [s * a, s * b, t * c, t * d];
                const moved: Sheet = (x, y) => sign * generic(p * x + q * y, r * x + u * y);
                const isSame = Math.abs(sheetSum(action, moved) - before) < 1e-8;
                expect(found.has(`${[p, q, r, u].map((n) => n + 0).join()};${sign}`)).toBe(isSame);
              }
      }),
      { numRuns: 60 },
    );
  });

  it('exchanges fields with the same values only', () => {
    const { lattice, parent } = inlineCase({
      fields: ['phi', 'chi'],
      values: 'real',
      time: false,
      action: { term: '(Delta_x phi)^2 + (Delta_x chi)^2' },
    });
    const at = lattice.axes.map(() => Rational.zero);
    const elements = (moduli: readonly [number, number]): number =>
      analysePointGroup({
        lattice,
        fields: ['phi', 'chi'].map((name, i) => ({
          name,
          values: { kind: 'residue', modulus: moduli[i]! },
          at,
        })),
        terms: parent.terms,
      }).elements.length;
    expect(elements([3, 3])).toBe(2 * elements([2, 3]));
  });
});

/** Weights of a stencil by offset. */
type Weights = [number[], string][];
const laplacian = (dimension: number): Weights => [
  [new Array(dimension).fill(0), `${-2 * dimension}`],
  ...Array.from({ length: 2 * dimension }, (_, i): [number[], string] => [
    Array.from({ length: dimension }, (__, k) => (k === i >> 1 ? (i % 2 === 0 ? 1 : -1) : 0)),
    '1',
  ]),
];
/** All offsets with entries −1, 0, 1 and the given number of non-zero entries. */
const shell = (dimension: number, size: number, weight: string): Weights =>
  Array.from({ length: 3 ** dimension }, (_, n): [number[], string] => [
    Array.from({ length: dimension }, (__, k) => (Math.floor(n / 3 ** k) % 3) - 1),
    weight,
  ]).filter(([v]) => v.filter((x) => x !== 0).length === size);

describe('symmetry orders of published stencils about their expansion point', () => {
  /** ψ(r) (D φ)(r) pins the stencil to the point r; two kinds of values keep the fields from being exchanged. Elements that
   *  do not change the fields preserve the weights, all of them preserve the weights up to one sign. */
  function orders(weights: Weights): { strict: number; up_to_sign: number } {
    const dimension = weights[0]![0].length;
    const lattice = latticeOf(...['x', 'y', 'z', 'w'].slice(0, dimension));
    const field = (name: string, kind: 'real' | 'integer'): Field => ({
      name,
      values: { kind },
      at: lattice.axes.map(() => Rational.zero),
    });
    const stencil = LaurentPolynomial.of(
      dimension,
      weights.map(([exponents, w]) => ({ exponents, weight: Coefficient.rational(Rational.parse(w)) })),
    );
    const one = LaurentPolynomial.constant(dimension, Coefficient.one);
    const expression: Expression = {
      kind: 'product',
      factors: [
        { kind: 'linear', form: new Map([['psi', one]]) },
        { kind: 'linear', form: new Map([['phi', stencil]]) },
      ],
    };
    const { order, elements } = analysePointGroup({
      lattice,
      fields: [field('psi', 'real'), field('phi', 'integer')],
      terms: [{ expression }],
    });
    return { strict: elements.filter((e) => e.fields.every((f) => f.sign === 1)).length, up_to_sign: order };
  }

  // published.json: stencil-sym-*; common practice, no source; computed there over all images of a spanning set of offsets.
  // Half-integer offsets (plaq-centre) are doubled, which changes no symmetry.
  const cross: Weights = [
    [[1, 1], '1'],
    [[1, -1], '-1'],
    [[-1, 1], '-1'],
    [[-1, -1], '1'],
  ];
  it.each<[string, Weights, number, number]>([
    ['lap2d-5pt', laplacian(2), 8, 8],
    ['lap2d-9pt', [[[0, 0], '-10/3'], ...shell(2, 1, '2/3'), ...shell(2, 2, '1/6')], 8, 8],
    [
      'bih2d-13pt',
      [
        [[0, 0], '20'],
        ...shell(2, 1, '-8'),
        ...shell(2, 2, '2'),
        ...shell(2, 1, '1').map(([v, w]): [number[], string] => [v.map((n) => 2 * n), w]),
      ],
      8,
      8,
    ],
    ['mixed-cross', cross.map(([v, w]): [number[], string] => [v, `${w}/4`]), 4, 8],
    ['plaq-centre', cross, 4, 8],
    [
      'plaq-corner',
      [
        [[1, 1], '1'],
        [[1, 0], '-1'],
        [[0, 1], '-1'],
        [[0, 0], '1'],
      ],
      2,
      2,
    ],
    ['lap3d-7pt', laplacian(3), 48, 48],
    ['lap-fcc-nn', [[[0, 0, 0], '-3'], ...shell(3, 2, '1/4')], 48, 48],
    ['lap-bcc-nn', [[[0, 0, 0], '-2'], ...shell(3, 3, '1/4')], 48, 48],
    ['lap4d-9pt', laplacian(4), 384, 384],
  ])('stencil-sym-%s', (_, weights, strict, upToSign) => {
    expect(orders(weights)).toEqual({ strict, up_to_sign: upToSign });
  });
});

type Matrix = number[][];
const times = (x: Matrix, y: Matrix): Matrix =>
  x.map((r) => r.map((_, k) => r.reduce((s, m, j) => s + m * y[j]![k]!, 0)));
function generate(generators: readonly Matrix[]): Matrix[] {
  const found = new Map<string, Matrix>();
  const queue: Matrix[] = [
    [
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
    ],
  ];
  for (let m = queue.pop(); m; m = queue.pop()) {
    const key = JSON.stringify(m.map((r) => r.map((x) => x + 0)));
    if (found.has(key)) continue;
    found.set(key, m);
    for (const g of generators) queue.push(times(m, g));
  }
  return [...found.values()];
}
const minus = (m: Matrix): Matrix => m.map((r) => r.map((x) => -x));

describe('crystal class names', () => {
  const inversion: Matrix = [
    [-1, 0, 0],
    [0, -1, 0],
    [0, 0, -1],
  ];
  const twoZ: Matrix = [
    [-1, 0, 0],
    [0, -1, 0],
    [0, 0, 1],
  ];
  const twoX: Matrix = [
    [1, 0, 0],
    [0, -1, 0],
    [0, 0, -1],
  ];
  const four: Matrix = [
    [0, -1, 0],
    [1, 0, 0],
    [0, 0, 1],
  ];
  const threeCube: Matrix = [
    [0, 0, 1],
    [1, 0, 0],
    [0, 1, 0],
  ];
  const twoXY: Matrix = [
    [0, 1, 0],
    [1, 0, 0],
    [0, 0, -1],
  ];
  const three: Matrix = [
    [0, -1, 0],
    [1, -1, 0],
    [0, 0, 1],
  ];
  const six = times(
    three,
    times(
      three,
      minus(
        minus([
          [-1, 0, 0],
          [0, -1, 0],
          [0, 0, 1],
        ]),
      ),
    ),
  );
  // Orders of the 32 classes: International Tables for Crystallography vol. A.
  it.each([
    ['1', [], 1],
    ['-1', [inversion], 2],
    ['2', [twoZ], 2],
    ['m', [minus(twoZ)], 2],
    ['2/m', [twoZ, inversion], 4],
    ['222', [twoZ, twoX], 4],
    ['mm2', [twoZ, minus(twoX)], 4],
    ['mmm', [twoZ, twoX, inversion], 8],
    ['4', [four], 4],
    ['-4', [minus(four)], 4],
    ['4/m', [four, inversion], 8],
    ['422', [four, twoX], 8],
    ['4mm', [four, minus(twoX)], 8],
    ['-42m', [minus(four), twoX], 8],
    ['4/mmm', [four, twoX, inversion], 16],
    ['3', [three], 3],
    ['-3', [three, inversion], 6],
    ['32', [three, twoXY], 6],
    ['3m', [three, minus(twoXY)], 6],
    ['-3m', [three, twoXY, inversion], 12],
    ['6', [six], 6],
    ['-6', [three, minus(twoZ)], 6],
    ['6/m', [six, inversion], 12],
    ['622', [six, twoXY], 12],
    ['6mm', [six, minus(twoXY)], 12],
    ['-6m2', [three, minus(twoZ), twoXY], 12],
    ['6/mmm', [six, twoXY, inversion], 24],
    ['23', [twoZ, threeCube], 12],
    ['m-3', [twoZ, threeCube, inversion], 24],
    ['432', [four, threeCube], 24],
    ['-43m', [minus(four), threeCube], 24],
    ['m-3m', [four, threeCube, inversion], 48],
  ] as [string, Matrix[], number][])('%s is recognised from its %j…', (name, generators, order) => {
    const group = generate(generators);
    expect([crystalClass(group), group.length]).toEqual([name, order]);
  });
});
