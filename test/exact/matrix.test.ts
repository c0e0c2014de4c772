import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rootPowers } from '../../src/exact/cyclotomic.ts';
import {
  kernel,
  ModularEchelon,
  PRIMES,
  PrimeField,
  primitiveVector,
  rank,
  rankModulo,
  reducedEchelon,
  type SparseRow,
} from '../../src/exact/matrix.ts';
import { Rational, rational } from '../../src/exact/rational.ts';

const sparse = (row: readonly number[]): SparseRow => {
  const columns = row.flatMap((x, c) => (x === 0 ? [] : [c]));
  return { columns, values: columns.map((c) => row[c]!) };
};
const exact = (rows: readonly (readonly number[])[]): Rational[][] =>
  rows.map((r) => r.map((x) => rational(x)));
const transpose = (rows: readonly (readonly number[])[], columns: number): number[][] =>
  Array.from({ length: columns }, (_, c) => rows.map((r) => r[c]!));

const matrices = fc.tuple(fc.integer({ min: 1, max: 6 }), fc.integer({ min: 1, max: 6 })).chain(([n, m]) =>
  fc
    .array(fc.array(fc.integer({ min: -3, max: 3 }), { minLength: m, maxLength: m }), {
      minLength: n,
      maxLength: n,
    })
    .map((rows) => ({ rows, columns: m })),
);

/** Rank by the largest non-zero minor, with determinants expanded along the first row. */
function rankByMinors(rows: readonly (readonly number[])[], columns: number): number {
  const det = (m: readonly (readonly number[])[]): number =>
    m.length === 0
      ? 1
      : m[0]!.reduce(
          (sum, x, c) =>
            x === 0
              ? sum
              : sum + (c % 2 === 0 ? x : -x) * det(m.slice(1).map((r) => r.filter((_, k) => k !== c))),
          0,
        );
  const choices = (n: number, k: number): number[][] =>
    k === 0
      ? [[]]
      : Array.from({ length: n }, (_, i) => i).flatMap((i) => choices(i, k - 1).map((rest) => [...rest, i]));
  for (let k = Math.min(rows.length, columns); k > 0; k--)
    for (const r of choices(rows.length, k))
      for (const c of choices(columns, k)) if (det(r.map((i) => c.map((j) => rows[i]![j]!))) !== 0) return k;
  return 0;
}

describe('linear algebra over Q and modulo a prime', () => {
  it('gives a matrix and its transpose the same rank, the order of the largest non-zero minor', () => {
    fc.assert(
      fc.property(matrices, ({ rows, columns }) => {
        const expected = rankByMinors(rows, columns);
        expect(rank(exact(rows), columns)).toBe(expected);
        expect(rank(exact(transpose(rows, columns)), rows.length)).toBe(expected);
        for (const p of PRIMES) expect(rankModulo(rows.map(sparse), columns, p)).toBe(expected);
      }),
      { numRuns: 60 },
    );
  });

  it('finds kernels that the matrix annihilates and that complete the rank to the number of columns', () => {
    fc.assert(
      fc.property(matrices, ({ rows, columns }) => {
        const m = exact(rows);
        const basis = kernel(m, columns);
        expect(basis.length + rank(m, columns)).toBe(columns);
        expect(rank(basis, columns)).toBe(basis.length);
        for (const row of m)
          for (const v of basis)
            expect(row.reduce((s, x, c) => s.add(x.mul(v[c]!)), Rational.zero).isZero).toBe(true);
      }),
      { numRuns: 60 },
    );
  });

  it('reduces to an echelon form that does not depend on the order and scale of the rows', () => {
    fc.assert(
      fc.property(matrices, ({ rows, columns }) => {
        const form = reducedEchelon(exact(rows), columns);
        const other = exact([...rows].reverse()).map((r, i) => r.map((x) => x.mul(rational(i + 2, 3))));
        expect(reducedEchelon(other, columns)).toEqual(form);
        expect(reducedEchelon(form.rows, columns)).toEqual(form);
        form.pivots.forEach((p, i) => {
          form.rows.forEach((r, k) => {
            expect(r[p]!.equals(k === i ? Rational.one : Rational.zero)).toBe(true);
          });
        });
      }),
      { numRuns: 60 },
    );
  });

  it('stays exact where the entries are too large to be lifted from one prime', () => {
    const big = 10n ** 30n;
    const m = [
      [Rational.of(big), Rational.of(big + 1n)],
      [Rational.of(big - 1n), Rational.of(big)],
    ];
    expect(rank(m, 2)).toBe(2);
    const singular = [m[0]!, m[0]!.map((x) => x.mul(Rational.of(7, 3)))];
    expect(rank(singular, 2)).toBe(1);
    expect(kernel(singular, 2)[0]![0]!.equals(Rational.of(-(big + 1n), big))).toBe(true);
    const p = Rational.of(PRIMES[0]);
    expect(rank([[p]], 1)).toBe(1);
    expect(rank([[p.inv()]], 1)).toBe(1);
  });

  it('loses rank modulo the primes that divide the elementary divisors', () => {
    const rows = [sparse([2, 0]), sparse([0, 15])];
    expect([2, 3, 5, 7].map((p) => rankModulo(rows, 2, p))).toEqual([1, 1, 1, 2]);
  });

  it('tells the pivot of an added row, and undefined for a dependent one', () => {
    const echelon = new ModularEchelon(3, new PrimeField(7));
    expect(echelon.add({ columns: [1, 2], values: [1, 6] })).toBe(1);
    expect(echelon.add({ columns: [0, 1], values: [1, 6] })).toBe(0);
    expect(echelon.add({ columns: [0, 2], values: [1, 6] })).toBeUndefined();
    expect([0, 1, 2].map((c) => echelon.hasPivot(c))).toEqual([true, true, false]);
  });
});

describe('residues', () => {
  it.each(PRIMES)('modulo %i multiply, invert and come back from fractions like BigInt', (p) => {
    const field = new PrimeField(p);
    const element = fc.integer({ min: 1, max: p - 1 });
    fc.assert(
      fc.property(element, element, (x, y) => {
        expect(BigInt(field.multiply(x, y))).toBe((BigInt(x) * BigInt(y)) % BigInt(p));
        expect(field.multiply(x, field.invert(x))).toBe(1);
      }),
    );
    fc.assert(
      fc.property(fc.integer({ min: -5000, max: 5000 }), fc.integer({ min: 1, max: 5000 }), (n, d) => {
        expect(field.reconstruct(field.fromRational(rational(n, d)))!.equals(rational(n, d))).toBe(true);
      }),
    );
  });

  it.each(PRIMES)('modulo %i hold the roots of unity and square roots that the symmetries need', (p) => {
    const field = new PrimeField(p);
    for (let k = 2; k * k <= p; k++) expect(p % k).not.toBe(0);
    const z = field.rootOfUnity(12);
    expect(field.power(z, 6)).toBe(p - 1);
    expect(field.power(z, 4)).not.toBe(1);
    for (const n of [2, 3, 5, 7]) expect(field.power(field.squareRoot(n)!, 2)).toBe(n);
    expect(field.power(field.squareRoot(p - 1)!, 2)).toBe(p - 1);
  });
});

describe('roots of unity', () => {
  it('have powers that multiply as complex numbers do', () => {
    for (const n of [1, 2, 3, 4, 5, 6, 8, 12]) {
      rootPowers(n).forEach((vector, k) => {
        const at = (m: number): [number, number] => [
          Math.cos((2 * Math.PI * m) / n),
          Math.sin((2 * Math.PI * m) / n),
        ];
        const sum = vector.reduce<[number, number]>(
          ([re, im], c, i) => [re + c * at(i)[0], im + c * at(i)[1]],
          [0, 0],
        );
        expect(sum[0]).toBeCloseTo(at(k)[0], 12);
        expect(sum[1]).toBeCloseTo(at(k)[1], 12);
      });
    }
    expect([1, 2, 3, 4, 5, 6, 8, 12].map((n) => rootPowers(n)[0]!.length)).toEqual([1, 1, 2, 2, 4, 2, 4, 4]);
  });
});

describe('primitive vectors', () => {
  it('have coprime integer entries and keep the direction', () => {
    expect(primitiveVector([rational(-2, 3), rational(4, 5), Rational.zero]).map(String)).toEqual([
      '-5',
      '6',
      '0',
    ]);
  });
});
