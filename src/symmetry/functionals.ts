// Candidate sets of free arguments: sublattices of integer linear functionals ℓ of the coordinates, each with a complement.
// A set ℓ_1 … ℓ_k is used when its k × k minors have no common factor (every value of ℓ occurs) and one of them is ±1, so
// that the functionals and the remaining coordinate axes are unimodular coordinates of the lattice. Subspaces are told
// apart by their minors (Plücker coordinates).

/** Functionals ℓ (rows, one entry per axis) with complement coordinates. */
export interface FreeDirections {
  readonly rows: readonly (readonly number[])[];
  /** Axes whose coordinates complete ℓ to unimodular coordinates. */
  readonly complement: readonly number[];
  /** Basis of the lattice points with ℓ = 0, one vector per complement axis: entry 1 on that axis, 0 on the other
   *  complement axes. */
  readonly kernel: readonly (readonly number[])[];
}

/** Subsets of 0 … n − 1 with k elements, in lexicographic order. */
export function subsets(n: number, k: number, from = 0): number[][] {
  if (k === 0) return [[]];
  const out: number[][] = [];
  for (let i = from; i <= n - k; i++) for (const rest of subsets(n, k - 1, i + 1)) out.push([i, ...rest]);
  return out;
}

function determinant(m: readonly (readonly number[])[]): number {
  if (m.length === 0) return 1;
  if (m.length === 1) return m[0]![0]!;
  let sum = 0;
  m[0]!.forEach((x, c) => {
    if (x !== 0)
      sum += (c % 2 === 0 ? x : -x) * determinant(m.slice(1).map((r) => r.filter((_, k) => k !== c)));
  });
  return sum;
}

export function gcdOf(numbers: Iterable<number>): number {
  let g = 0;
  for (const n of numbers) {
    let [x, y] = [g, Math.abs(n)];
    while (y !== 0) [x, y] = [y, x % y];
    g = x;
  }
  return g;
}

const minors = (rows: readonly (readonly number[])[], dimension: number): [number[], number][] =>
  subsets(dimension, rows.length).map((axes) => [axes, determinant(rows.map((r) => axes.map((k) => r[k]!)))]);

/** Completes functionals to unimodular coordinates; undefined when the rows are dependent, when not every value of ℓ
 *  occurs, or when no set of axes is a complement. */
export function freeDirections(
  rows: readonly (readonly number[])[],
  dimension: number,
): FreeDirections | undefined {
  // the last axes are eliminated last, so that profiles are written in the first coordinates
  const unit = minors(rows, dimension)
    .reverse()
    .find(([, minor]) => Math.abs(minor) === 1);
  if (!unit) return undefined;
  const [solved, sign] = unit;
  const complement = Array.from({ length: dimension }, (_, k) => k).filter((k) => !solved.includes(k));
  const square = rows.map((r) => solved.map((k) => r[k]!));
  const kernel = complement.map((axis) => {
    // Cramer's rule for ℓ_solved r_solved = −ℓ_axis with determinant ±1
    const vector = new Array<number>(dimension).fill(0);
    vector[axis] = 1;
    solved.forEach((k, c) => {
      const replaced = square.map((r, i) => r.map((x, j) => (j === c ? -rows[i]![axis]! : x)));
      const entry = determinant(replaced) * sign;
      vector[k] = entry === 0 ? 0 : entry;
    });
    return vector;
  });
  return { rows, complement, kernel };
}

/** Vectors with entries −1, 0, 1 on the given axes, first non-zero entry 1: coordinates first, then by number of entries. */
function smallVectors(dimension: number, axes: readonly number[]): number[][] {
  let out: number[][] = [[]];
  for (let k = 0; k < dimension; k++)
    out = out.flatMap((v) => (axes.includes(k) ? [0, 1, -1] : [0]).map((e) => [...v, e]));
  const support = (v: readonly number[]): number => v.filter((e) => e !== 0).length;
  const order = (v: readonly number[]): number[] => [
    support(v),
    ...v.map((e) => (e === 0 ? 2 : e < 0 ? 1 : 0)),
  ];
  const compare = (x: readonly number[], y: readonly number[]): number => {
    const at = x.findIndex((e, i) => e !== y[i]);
    return at < 0 ? 0 : x[at]! - y[at]!;
  };
  return out.filter((v) => v.find((e) => e !== 0) === 1).sort((x, y) => compare(order(x), order(y)));
}

const enumerated = new Map<string, readonly FreeDirections[]>();

/** All candidate sets, largest first: subsets of the coordinates, and combinations with entries −1, 0, 1 among the axes
 *  given as oblique, spanned by further functionals where given. The full set and the empty one are included. */
export function candidateDirections(
  dimension: number,
  oblique: readonly number[],
  further: readonly (readonly number[])[] = [],
): readonly FreeDirections[] {
  const key = `${dimension};${oblique.join()};${further.join(' ')}`;
  const found = enumerated.get(key);
  if (found) return found;
  const axes = Array.from({ length: dimension }, (_, k) =>
    Array.from({ length: dimension }, (_, i) => (i === k ? 1 : 0)),
  );
  const vectors = [
    ...axes,
    ...smallVectors(dimension, oblique).filter((v) => gcdOf(v) && v.filter((e) => e !== 0).length > 1),
  ];
  vectors.push(...further.map((v) => [...v]));
  const out: FreeDirections[] = [];
  for (let k = dimension; k >= 0; k--) {
    const seen = new Set<string>();
    for (const subset of k === dimension ? [axes.map((_, i) => i)] : subsets(vectors.length, k)) {
      const rows = subset.map((i) => vectors[i]!);
      const plucker = minors(rows, dimension).map(([, m]) => m);
      const g = gcdOf(plucker);
      if (g === 0) continue;
      const sign = plucker.find((m) => m !== 0)! < 0 ? -1 : 1;
      const id = plucker.map((m) => (m * sign) / g).join();
      if (g !== 1 || seen.has(id)) continue;
      seen.add(id);
      const directions = freeDirections(rows, dimension);
      if (directions) out.push(directions);
    }
  }
  enumerated.set(key, out);
  return out;
}

/** True when every functional of the first set is an integer combination of those of the second. */
export const isSpannedBy = (rows: readonly (readonly number[])[], directions: FreeDirections): boolean =>
  directions.kernel.every((v) => rows.every((row) => row.reduce((s, e, k) => s + e * v[k]!, 0) === 0));
