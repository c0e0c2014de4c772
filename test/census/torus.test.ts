import { describe, expect, it } from 'vitest';
import { torusShiftCount } from '../../src/census/torus.ts';
import type { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import { fieldsOf, formsOf, latticeOf, Operators } from '../symmetry/systems.ts';

type Published = { L: number[]; rank: number; torsion: number[] }[];

const entry = (...rows: [number[], number, number[]?][]): Published =>
  rows.map(([L, rank, torsion = []]) => ({ L, rank, torsion }));

const cases: [string, number, (o: Operators) => LaurentPolynomial[], Published][] = [
  [
    // published entry plaq2d-ZN. N. Seiberg, S.-H. Shao, SciPost Phys. 10 (2021) 027; P. Gorantla, H.T. Lam, N. Seiberg,
    // S.-H. Shao, J. Math. Phys. 62 (2021) 102301 (equation numbers not checked)
    'the plaquette in two dimensions: Lx + Ly - 1',
    2,
    (o) => [o.delta(1).mul(o.delta(2))],
    entry(
      [[1, 1], 1],
      [[2, 2], 3],
      [[2, 3], 4],
      [[3, 3], 5],
      [[3, 4], 6],
      [[3, 5], 7],
      [[4, 4], 7],
      [[4, 5], 8],
      [[1, 4], 4],
      [[6, 5], 10],
      [[8, 8], 15],
    ),
  ],
  [
    // published entry faces3d-ZN. N. Seiberg, S.-H. Shao, SciPost Phys. 9 (2020) 046; SciPost Phys. 10 (2021) 003
    // (equation numbers not checked)
    'the three faces in three dimensions: Lx + Ly + Lz - 2',
    3,
    (o) => [o.delta(1).mul(o.delta(2)), o.delta(2).mul(o.delta(3)), o.delta(3).mul(o.delta(1))],
    entry(
      [[2, 2, 2], 4],
      [[2, 2, 3], 5],
      [[2, 3, 4], 7],
      [[3, 3, 3], 7],
      [[4, 4, 4], 10],
      [[2, 3, 5], 8],
      [[1, 3, 4], 6],
    ),
  ],
  [
    // published entry cube3d-ZN, same sources
    'the cube in three dimensions',
    3,
    (o) => [o.delta(1).mul(o.delta(2)).mul(o.delta(3))],
    entry(
      [[2, 2, 2], 7],
      [[2, 2, 3], 10],
      [[2, 3, 4], 18],
      [[3, 3, 3], 19],
      [[4, 4, 4], 37],
      [[2, 3, 5], 22],
      [[1, 3, 4], 12],
    ),
  ],
  [
    // published entry dipole2d-ZN. P. Gorantla, H.T. Lam, N. Seiberg, S.-H. Shao, arXiv:2209.10030 (number not checked);
    // closed form derived and checked there
    'all second differences in two dimensions: U(1) x Z_Lx x Z_Ly',
    2,
    (o) => [o.delta(1).pow(2), o.delta(2).pow(2), o.delta(1).mul(o.delta(2))],
    entry(
      [[2, 2], 1, [2, 2]],
      [[2, 3], 1, [6]],
      [[3, 3], 1, [3, 3]],
      [[4, 4], 1, [4, 4]],
      [[4, 6], 1, [2, 12]],
      [[3, 6], 1, [3, 6]],
      [[5, 5], 1, [5, 5]],
      [[6, 6], 1, [6, 6]],
      [[2, 8], 1, [2, 8]],
      [[6, 9], 1, [3, 18]],
    ),
  ],
];

describe('shift symmetries on a periodic lattice', () => {
  it.each(cases)('agree with the published count for %s', (_, dimension, build, published) => {
    const lattice = latticeOf('tau', ...['x', 'y', 'z'].slice(0, dimension));
    const o = new Operators(dimension + 1);
    const forms = formsOf(o.delta(0), ...build(o));
    for (const { L, rank, torsion } of published) {
      const count = torusShiftCount(forms, lattice, fieldsOf(lattice, 'angle', 'phi'), L);
      expect(count.free).toBe(rank);
      const factors = [2, 3, 5, 7, 11, 13].flatMap((prime) => {
        const n = torsion.filter((d) => d % prime === 0).length;
        return n > 0 ? [{ prime, factors: n }] : [];
      });
      expect(count.torsionPrimes).toEqual(factors);
    }
  });

  it('are counted exactly on small lattices and by two primes on large ones, with the same result', () => {
    const lattice = latticeOf('x', 'y');
    const o = new Operators(2);
    const forms = formsOf(o.delta(0).mul(o.delta(1)));
    const count = (...sizes: number[]) =>
      torusShiftCount(forms, lattice, fieldsOf(lattice, 'angle', 'phi'), sizes);
    expect(count(6, 6)).toEqual({ free: 11, torsionPrimes: [], method: 'exact' });
    expect(count(6, 7)).toEqual({ free: 12, torsionPrimes: [], method: 'two primes' });
  });

  it('of central differences see the parity of the lattice', () => {
    const lattice = latticeOf('x');
    const o = new Operators(1);
    const count = (n: number) =>
      torusShiftCount(formsOf(o.central(0)), lattice, fieldsOf(lattice, 'real', 'phi'), [n]).free;
    expect([3, 4, 5, 6].map(count)).toEqual([1, 2, 1, 2]);
  });

  it('count every field', () => {
    const lattice = latticeOf('x');
    const o = new Operators(1);
    const forms = [new Map([['phi', o.delta(0)]]), new Map([['chi', o.second(0)]])];
    expect(torusShiftCount(forms, lattice, fieldsOf(lattice, 'angle', 'phi', 'chi'), [5])).toEqual({
      free: 2,
      torsionPrimes: [{ prime: 5, factors: 1 }],
      method: 'exact',
    });
  });

  it('need one size per space axis', () => {
    const lattice = latticeOf('tau', 'x', 'y');
    expect(() => torusShiftCount([], lattice, fieldsOf(lattice, 'angle', 'phi'), [3])).toThrow(RangeError);
  });
});
