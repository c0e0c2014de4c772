import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import { growthExponent } from '../../src/symmetry/completeness.ts';
import { analyseShifts } from '../../src/symmetry/shifts.ts';
import { fieldsOf, formsOf, latticeOf, Operators } from './systems.ts';

/** Rank by elimination of dense rows modulo the prime 1000003, with BigInt. */
function denseRank(rows: bigint[][]): number {
  const p = 1000003n;
  const m = rows.map((r) => r.map((x) => ((x % p) + p) % p));
  const power = (x: bigint, k: bigint): bigint => {
    let [out, base, n] = [1n, x, k];
    for (; n > 0n; n /= 2n) {
      if (n % 2n === 1n) out = (out * base) % p;
      base = (base * base) % p;
    }
    return out;
  };
  let rank = 0;
  for (let c = 0; c < (m[0]?.length ?? 0); c++) {
    const at = m.findIndex((r, i) => i >= rank && r[c] !== 0n);
    if (at < 0) continue;
    [m[rank], m[at]] = [m[at]!, m[rank]!];
    const inverse = power(m[rank]![c]!, p - 2n);
    for (let i = rank + 1; i < m.length; i++) {
      const factor = (m[i]![c]! * inverse) % p;
      if (factor !== 0n) m[i] = m[i]!.map((x, k) => (x + (p - factor) * m[rank]![k]!) % p);
    }
    rank++;
  }
  return rank;
}

/** Solutions of integer stencils on an n × n box by brute force. */
function boxSolutions(stencils: LaurentPolynomial[], n: number): number {
  const rows: bigint[][] = [];
  for (const s of stencils)
    for (let x = -n; x <= n; x++)
      for (let y = -n; y <= n; y++) {
        const points = s.terms.map((t) => [x + t.exponents[0]!, y + t.exponents[1]!, t.weight] as const);
        if (!points.every(([u, v]) => u >= 0 && v >= 0 && u < n && v < n)) continue;
        const row = new Array<bigint>(n * n).fill(0n);
        for (const [u, v, w] of points) row[u * n + v] = w.asRational!.num;
        rows.push(row);
      }
  return n * n - denseRank(rows);
}

describe('the completeness certificate', () => {
  const plane = latticeOf('x', 'y');
  const o = new Operators(2);
  const systems: [string, LaurentPolynomial[]][] = [
    ['one plaquette', [o.delta(0).mul(o.delta(1))]],
    ['both second differences', [o.second(0), o.second(1)]],
    ['the five-point Laplacian', [o.second(0).add(o.second(1))]],
    ['a diagonal pair', [o.T(0).mul(o.T(1)).sub(o.one), o.T(0).mul(o.T(1, -1)).sub(o.one)]],
    ['a triangle', [o.one.add(o.T(0)).add(o.T(1))]],
    ['an antidiagonal and a second difference', [o.T(0).mul(o.T(1, -1)).sub(o.one), o.second(0)]],
    ['a second and a mixed difference', [o.second(0), o.delta(0).mul(o.delta(1))]],
  ];

  it.each(systems)('counts the solutions of %s as a dense elimination does', (_, stencils) => {
    const { lattice } = analyseShifts({
      lattice: plane,
      fields: fieldsOf(plane, 'real', 'phi'),
      latticeForms: formsOf(...stencils),
      continuumForms: null,
    });
    for (const row of lattice.rows.slice(0, 3))
      expect(row.solutions).toBe(boxSolutions(stencils, row.size[0]!));
    for (const row of lattice.rows) expect(row.explained).toBeLessThanOrEqual(row.solutions);
  });

  it('counts the solutions of random stencils as a dense elimination does', () => {
    const stencils = fc
      .array(
        fc.tuple(
          fc.integer({ min: -1, max: 1 }),
          fc.integer({ min: -1, max: 1 }),
          fc.constantFrom(-2, -1, 1, 3),
        ),
        { minLength: 2, maxLength: 4 },
      )
      .map((terms) =>
        LaurentPolynomial.of(
          2,
          terms.map(([x, y, w]) => ({ exponents: [x, y], weight: Coefficient.integer(w) })),
        ),
      )
      .filter((s) => !s.isZero);
    fc.assert(
      fc.property(stencils, stencils, (s, t) => {
        const { lattice } = analyseShifts({
          lattice: plane,
          fields: fieldsOf(plane, 'real', 'phi'),
          latticeForms: formsOf(s, t),
          continuumForms: null,
        });
        const [row] = lattice.rows;
        for (const r of lattice.rows) expect(r.explained).toBeLessThanOrEqual(r.solutions);
        // counts on interiors are smaller, and axes along which nothing changes are dropped
        if (lattice.text.includes('interior') || row!.size.length < 2) return;
        expect(row!.solutions).toBe(boxSolutions([s, t], row!.size[0]!));
      }),
      { numRuns: 40 },
    );
  });

  it('leaves the solutions of a fractal generator unexplained and says how fast they grow', () => {
    const { lattice } = analyseShifts({
      lattice: plane,
      fields: fieldsOf(plane, 'real', 'phi'),
      latticeForms: formsOf(o.one.add(o.T(0)).add(o.T(1))),
      continuumForms: null,
    });
    expect(lattice.complete).toBe(false);
    expect(lattice.growth).toBe(1);
    expect(lattice.text).toContain('grows like the size L to the power 1');
  });

  // dimension of the polynomials of degree ≤ n annihilated by all operators: published entries ps-*, "elementary; computed
  // here", verified with exact rational rank in two programs
  const polynomials: [string, number, number[][][], number[]][] = [
    ['d_x d_y', 2, [[[1, 1]]], [1, 3, 5, 7, 9, 11, 13]],
    [
      'the Laplacian in two dimensions',
      2,
      [
        [
          [2, 0],
          [0, 2],
        ],
      ],
      [1, 3, 5, 7, 9, 11, 13],
    ],
    [
      'the Laplacian in three dimensions',
      3,
      [
        [
          [2, 0, 0],
          [0, 2, 0],
          [0, 0, 2],
        ],
      ],
      [1, 4, 9, 16, 25, 36],
    ],
    ['all second derivatives', 2, [[[2, 0]], [[1, 1]], [[0, 2]]], [1, 3, 3, 3, 3]],
    ['the three mixed derivatives', 3, [[[1, 1, 0]], [[0, 1, 1]], [[1, 0, 1]]], [1, 4, 7, 10, 13, 16]],
    ['d_x d_y d_z', 3, [[[1, 1, 1]]], [1, 4, 10, 19, 31, 46]],
  ];
  it.each(polynomials)('counts the polynomials that %s annihilates', (_, dimension, operators, expected) => {
    const lattice = latticeOf(...['x', 'y', 'z'].slice(0, dimension));
    const forms = formsOf(
      ...operators.map((terms) =>
        LaurentPolynomial.of(
          dimension,
          terms.map((exponents) => ({ exponents, weight: Coefficient.one })),
        ),
      ),
    );
    const { continuum } = analyseShifts({
      lattice,
      fields: fieldsOf(lattice, 'real', 'phi'),
      latticeForms: formsOf(new Operators(dimension).one),
      continuumForms: forms,
    });
    expect(continuum!.rows.slice(0, expected.length).map((r) => r.solutions)).toEqual(expected);
  });

  it('reads the growth exponent off the counts', () => {
    expect(growthExponent([4, 4, 4])).toBe(0);
    expect(growthExponent([5, 7, 9, 11])).toBe(1);
    expect(growthExponent([9, 16, 25, 36])).toBe(2);
    expect(growthExponent([1, 5, 7, 9, 11])).toBe(1);
    expect(growthExponent([0, 0, 0])).toBeUndefined();
    expect(growthExponent([1, 2, 4, 8, 16])).toBeUndefined();
  });
});
