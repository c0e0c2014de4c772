import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { canonicalAction, isSameAction } from '../../src/model/canonicalAction.ts';
import { crystalClass } from '../../src/symmetry/crystalClass.ts';
import { analysePointGroup, type PointGroupAnalysis } from '../../src/symmetry/pointGroup.ts';
import { type InlineCase, inlineCase, kinetic } from '../inlineCase.ts';

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
