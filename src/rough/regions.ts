// Regions of the lattice on which a family with steps and single sites looks the same: for every functional ρ of a step or
// site, ρ·r is far to the left, far to the right, or one of the few values at which a stencil reaches across. A region is
// an affine sublattice r = base + Σ t_i w_i, with the far functionals on given sides; its number of sites is the product
// of the extents along the w_i.

import { isLocal, type Profile } from './profile.ts';

export interface Region {
  /** One point, in lattice steps. */
  readonly base: readonly number[];
  /** Integer basis w_i of the directions in which the region extends. */
  readonly directions: readonly (readonly number[])[];
  /** Rows that are held near a value, independent of each other. */
  readonly near: readonly (readonly number[])[];
  /** Side of every functional that grows along the region: -1 or 1, by its text. */
  readonly sides: ReadonlyMap<string, -1 | 1>;
}

export const dot = (x: readonly number[], y: readonly number[]): number =>
  x.reduce((sum, e, k) => sum + e * y[k]!, 0);

export const rowKey = (row: readonly number[]): string => row.join(',');

/** Functionals of the steps and sites of a family, up to their sign. */
export function localFunctionals(profile: Profile): number[][] {
  const out = new Map<string, number[]>();
  for (const term of profile.terms)
    for (const factor of term.factors) {
      if (!isLocal(factor)) continue;
      const first = factor.row.find((e) => e !== 0)!;
      const row = factor.row.map((e) => (e === 0 ? 0 : first < 0 ? -e : e));
      out.set(rowKey(row), row);
    }
  return [...out.values()];
}

/** All regions. @param reach the values of ρ·r at which the functional counts as near, [lowest, highest]. */
export function regionsOf(
  functionals: readonly (readonly number[])[],
  dimension: number,
  reach: (row: readonly number[]) => readonly [number, number],
): Region[] {
  return independentSubsets(functionals, dimension).flatMap((near) => {
    const solve = latticeSolver(near, dimension);
    const far = functionals.filter((row) => solve.directions.some((w) => dot(row, w) !== 0));
    const restricted = far.map((row) => solve.directions.map((w) => dot(row, w)));
    const sidesList = signVectors(restricted);
    return valueTuples(near.map(reach)).flatMap((values) => {
      const base = solve.point(values);
      if (!base) return [];
      return sidesList.map((signs) => ({
        base,
        directions: solve.directions,
        near,
        sides: new Map(far.map((row, i) => [rowKey(row), signs[i]!])),
      }));
    });
  });
}

/** ρ·(r + v) on a region: its side where it grows along the region, its value elsewhere. */
export function positionOn(
  region: Region,
  row: readonly number[],
  offset: readonly number[],
): { readonly side: -1 | 1 } | { readonly value: number } {
  const side = region.sides.get(rowKey(row));
  if (side !== undefined) return { side };
  const opposite = region.sides.get(rowKey(row.map((e) => (e === 0 ? 0 : -e))));
  if (opposite !== undefined) return { side: opposite === 1 ? -1 : 1 };
  return { value: dot(row, region.base) + dot(row, offset) };
}

function independentSubsets(rows: readonly (readonly number[])[], dimension: number): number[][][] {
  let subsets: number[][][] = [[]];
  for (const row of rows)
    subsets = [...subsets, ...subsets.map((s) => [...s, [...row]])].filter(
      (s) => latticeSolver(s, dimension).directions.length === dimension - s.length,
    );
  return subsets;
}

function valueTuples(ranges: readonly (readonly [number, number])[]): number[][] {
  let out: number[][] = [[]];
  for (const [low, high] of ranges)
    out = out.flatMap((t) => Array.from({ length: high - low + 1 }, (_, i) => [...t, low + i]));
  return out;
}

/** Integer solutions of rows·r = values by unimodular column operations (Hermite normal form): rows·U = [H 0] with H lower
 *  triangular; the last columns of U span the integer kernel. */
function latticeSolver(
  rows: readonly (readonly number[])[],
  dimension: number,
): { directions: number[][]; point: (values: readonly number[]) => number[] | undefined } {
  // columns of U, and their images under the rows
  const columns = Array.from({ length: dimension }, (_, k) =>
    Array.from({ length: dimension }, (_, i): number => (i === k ? 1 : 0)),
  );
  let pivots = 0;
  for (const row of rows) {
    const image = (k: number): number => dot(row, columns[k]!);
    for (;;) {
      const rest = columns.map((_, k) => k).filter((k) => k >= pivots && image(k) !== 0);
      if (rest.length === 0) break;
      rest.sort((i, j) => Math.abs(image(i)) - Math.abs(image(j)) || i - j);
      const [small, ...others] = rest as [number, ...number[]];
      if (others.length === 0) {
        [columns[pivots], columns[small]] = [columns[small]!, columns[pivots]!];
        pivots++;
        break;
      }
      for (const k of others) {
        const times = Math.trunc(image(k) / image(small));
        columns[k] = columns[k]!.map((e, i) => e - times * columns[small]![i]!);
      }
    }
  }
  const point = (values: readonly number[]): number[] | undefined => {
    let r = new Array<number>(dimension).fill(0);
    for (const [i, row] of rows.entries()) {
      const column = columns[i]!;
      const times = (values[i]! - dot(row, r)) / dot(row, column);
      if (!Number.isInteger(times)) return undefined;
      r = r.map((e, k) => e + times * column[k]!);
    }
    return r;
  };
  return { directions: columns.slice(pivots), point };
}

/** Sign vectors that a set of homogeneous linear functionals takes on the open cells of their arrangement. */
function signVectors(rows: readonly (readonly number[])[]): (-1 | 1)[][] {
  let out: (-1 | 1)[][] = [[]];
  for (let i = 0; i < rows.length; i++)
    out = out
      .flatMap((signs): (-1 | 1)[][] => [
        [...signs, -1],
        [...signs, 1],
      ])
      .filter((signs) => isFeasible(signs.map((s, j) => rows[j]!.map((e) => e * s))));
  return out;
}

/** True when all strict inequalities row·t > 0 have a common solution (Fourier–Motzkin elimination). */
function isFeasible(rows: readonly (readonly number[])[]): boolean {
  if (rows.some((row) => row.every((e) => e === 0))) return false;
  const [first] = rows;
  if (!first) return true;
  const k = first.findIndex((e) => e !== 0);
  const positive = rows.filter((row) => row[k]! > 0);
  const negative = rows.filter((row) => row[k]! < 0);
  const without = rows.filter((row) => row[k] === 0);
  const combined = positive.flatMap((p) => negative.map((n) => p.map((e, i) => e * -n[k]! + n[i]! * p[k]!)));
  return isFeasible([...without, ...combined]);
}
