// Exact linear algebra. Ranks of large sparse systems are found modulo a prime below 2^26, so that products of residues stay
// below 2^53 and the inner loops need no BigInt; echelon forms over Q are computed modulo a prime, lifted by rational
// reconstruction (P. S. Wang, Proc. SYMSAC 1981, 212) and verified exactly, with plain elimination where the lift fails.

import { gcd, Rational } from './rational.ts';

/** The two largest primes below 2^26 that are 1 modulo 24 and have 5 and 7 as squares: roots of unity of order 12 and the
 *  square roots of 2, 3, 5 and 7 exist modulo both. */
export const PRIMES: readonly [number, number] = [67108729, 67107289];

/** Non-zero entries of one row: strictly increasing columns, residues or integers as values. */
export interface SparseRow {
  readonly columns: readonly number[];
  readonly values: readonly number[];
}

/** Residues 0 … p − 1 modulo a prime p < 2^26, as floats that hold integers exactly. */
export class PrimeField {
  private readonly reciprocal: number;

  /** Throws RangeError when p is not below 2^26; primality is the caller's promise. */
  constructor(readonly p: number) {
    if (!(p >= 2 && p < 2 ** 26)) throw new RangeError(`${p} is not a prime below 2^26`);
    this.reciprocal = 1 / p;
  }

  multiply(x: number, y: number): number {
    const product = x * y;
    const rest = product - Math.floor(product * this.reciprocal) * this.p;
    return rest < 0 ? rest + this.p : rest >= this.p ? rest - this.p : rest;
  }
  /** Throws RangeError for 0. */
  invert(x: number): number {
    if (x === 0) throw new RangeError('zero has no inverse');
    let [r, s, t, u] = [this.p, x, 0, 1];
    while (s !== 0) {
      const q = Math.floor(r / s);
      [r, s] = [s, r - q * s];
      [t, u] = [u, t - q * u];
    }
    return t < 0 ? t + this.p : t;
  }
  /** x^k for any integer k. */
  power(x: number, k: number): number {
    let [out, base] = [1 % this.p, k < 0 ? this.invert(x) : x];
    for (let n = Math.abs(k); n > 0; n = Math.floor(n / 2)) {
      if (n % 2 === 1) out = this.multiply(out, base);
      base = this.multiply(base, base);
    }
    return out;
  }
  fromInteger(n: number | bigint): number {
    if (typeof n === 'bigint') {
      const rest = Number(n % BigInt(this.p));
      return rest < 0 ? rest + this.p : rest;
    }
    const rest = n % this.p;
    return rest < 0 ? rest + this.p : rest === 0 ? 0 : rest;
  }
  /** Throws RangeError when p divides the denominator. */
  fromRational(x: Rational): number {
    const top = this.fromInteger(x.num);
    return x.den === 1n ? top : this.multiply(top, this.invert(this.fromInteger(x.den)));
  }
  /** An element of exact multiplicative order n. Throws RangeError when n does not divide p − 1. */
  rootOfUnity(n: number): number {
    if ((this.p - 1) % n !== 0) throw new RangeError(`no root of unity of order ${n} modulo ${this.p}`);
    for (let g = 1; ; g++) {
      const z = this.power(g, (this.p - 1) / n);
      let isPrimitive = true;
      for (let k = 1; k < n && isPrimitive; k++) if (n % k === 0) isPrimitive = this.power(z, k) !== 1;
      if (isPrimitive) return z;
    }
  }
  /** A square root of x, or undefined (algorithm of Tonelli and Shanks). */
  squareRoot(x: number): number | undefined {
    const { p } = this;
    if (x === 0 || p === 2) return x;
    if (this.power(x, (p - 1) / 2) !== 1) return undefined;
    let [odd, twos] = [p - 1, 0];
    for (; odd % 2 === 0; odd /= 2) twos++;
    let z = 2;
    while (this.power(z, (p - 1) / 2) === 1) z++;
    let [c, root, t, m] = [this.power(z, odd), this.power(x, (odd + 1) / 2), this.power(x, odd), twos];
    while (t !== 1) {
      let i = 0;
      for (let s = t; s !== 1; i++) s = this.multiply(s, s);
      const b = this.power(c, 2 ** (m - i - 1));
      root = this.multiply(root, b);
      c = this.multiply(b, b);
      t = this.multiply(t, c);
      m = i;
    }
    return root;
  }
  /** The fraction n/d with |n|, d ≤ sqrt(p/2) and n ≡ x d, or undefined when there is none. */
  reconstruct(x: number): Rational | undefined {
    const bound = Math.floor(Math.sqrt(this.p / 2));
    let [r, s, t, u] = [this.p, x, 0, 1];
    while (s > bound) {
      const q = Math.floor(r / s);
      [r, s] = [s, r - q * s];
      [t, u] = [u, t - q * u];
    }
    return Math.abs(u) > bound || u === 0 ? undefined : Rational.of(s, u);
  }
}

/** A growing echelon form modulo a prime: rows are added one by one and reduced by those before. */
export class ModularEchelon {
  private readonly pivotColumns: (Int32Array | undefined)[];
  private readonly pivotValues: (Float64Array | undefined)[];
  private readonly work: Float64Array;
  private count = 0;

  constructor(
    readonly columns: number,
    readonly field: PrimeField,
  ) {
    this.pivotColumns = new Array(columns).fill(undefined);
    this.pivotValues = new Array(columns).fill(undefined);
    this.work = new Float64Array(columns);
  }

  get rank(): number {
    return this.count;
  }
  hasPivot(column: number): boolean {
    return this.pivotColumns[column] !== undefined;
  }

  /** Adds a row of residues; returns its pivot column, or undefined when it depends on the rows before. Columns may come in
   *  any order and repeat. */
  add(row: SparseRow): number | undefined {
    const { work, columns } = this;
    const { p } = this.field;
    let first = columns;
    let last = -1;
    for (let i = 0; i < row.columns.length; i++) {
      const c = row.columns[i]!;
      const sum = work[c]! + row.values[i]!;
      work[c] = sum >= p ? sum - p : sum;
      if (c < first) first = c;
      if (c > last) last = c;
    }
    for (let c = first; c <= last; c++) {
      if (work[c] === 0) continue;
      if (this.pivotColumns[c] === undefined) {
        this.keep(c, last);
        return c;
      }
      last = Math.max(last, this.eliminate(c));
    }
    return undefined;
  }

  /** Subtracts the pivot row of a column from the work row; returns the last column touched. */
  private eliminate(column: number): number {
    const { work } = this;
    const { p } = this.field;
    const reciprocal = 1 / p;
    const where = this.pivotColumns[column]!;
    const values = this.pivotValues[column]!;
    const factor = p - work[column]!;
    work[column] = 0;
    for (let i = 1; i < where.length; i++) {
      const k = where[i]!;
      const sum = work[k]! + factor * values[i]!;
      const rest = sum - Math.floor(sum * reciprocal) * p;
      work[k] = rest < 0 ? rest + p : rest >= p ? rest - p : rest;
    }
    return where[where.length - 1]!;
  }

  private keep(lead: number, last: number): void {
    const { work, field } = this;
    const scale = field.invert(work[lead]!);
    const where: number[] = [];
    const values: number[] = [];
    for (let c = lead; c <= last; c++) {
      const value = work[c]!;
      if (value === 0) continue;
      where.push(c);
      values.push(field.multiply(value, scale));
      work[c] = 0;
    }
    this.pivotColumns[lead] = Int32Array.from(where);
    this.pivotValues[lead] = Float64Array.from(values);
    this.count++;
  }

  /** Pivot columns in ascending order and the fully reduced rows, dense. */
  reduced(): { pivots: number[]; rows: Float64Array[] } {
    const pivots = this.pivotColumns.flatMap((row, c) => (row ? [c] : []));
    const rows: Float64Array[] = pivots.map((c) => {
      const dense = new Float64Array(this.columns);
      this.pivotColumns[c]!.forEach((k, i) => {
        dense[k] = this.pivotValues[c]![i]!;
      });
      return dense;
    });
    for (let i = rows.length - 1; i >= 0; i--)
      for (let k = 0; k < i; k++) {
        const factor = rows[k]![pivots[i]!]!;
        if (factor === 0) continue;
        for (let c = pivots[i]!; c < this.columns; c++) {
          const value = rows[i]![c]!;
          if (value === 0) continue;
          const rest = rows[k]![c]! - this.field.multiply(factor, value);
          rows[k]![c] = rest < 0 ? rest + this.field.p : rest;
        }
      }
    return { pivots, rows };
  }
}

/** Rank of a sparse integer matrix modulo a prime p < 2^26. A lower bound on the rank over Q, and equal to it for all but
 *  finitely many primes. */
export function rankModulo(rows: Iterable<SparseRow>, columns: number, p: number): number {
  const field = new PrimeField(p);
  const echelon = new ModularEchelon(columns, field);
  for (const row of rows)
    echelon.add({ columns: row.columns, values: row.values.map((v) => field.fromInteger(v)) });
  return echelon.rank;
}

/** A dense exact matrix, by rows. */
export type RationalMatrix = readonly (readonly Rational[])[];

/** Row-reduced echelon form: pivot columns in ascending order and the rows that belong to them. */
export interface ReducedEchelon {
  readonly pivots: readonly number[];
  readonly rows: RationalMatrix;
}

/** The row-reduced echelon form over Q, exactly. */
export function reducedEchelon(matrix: RationalMatrix, columns: number): ReducedEchelon {
  return liftedEchelon(matrix, columns) ?? eliminated(matrix, columns);
}

/** Echelon form modulo a prime, lifted to Q and kept only when every given row is an exact combination of the lifted ones.
 *  The rank modulo p is at most the rank over Q, so then the two row spaces agree. */
function liftedEchelon(matrix: RationalMatrix, columns: number): ReducedEchelon | undefined {
  const field = new PrimeField(PRIMES[0]);
  const echelon = new ModularEchelon(columns, field);
  for (const row of matrix) {
    const where = row.flatMap((x, c) => (x.isZero ? [] : [c]));
    if (where.some((c) => row[c]!.den % BigInt(field.p) === 0n)) return undefined;
    echelon.add({ columns: where, values: where.map((c) => field.fromRational(row[c]!)) });
  }
  const { pivots, rows } = echelon.reduced();
  const lifted: Rational[][] = [];
  for (const row of rows) {
    const entries = Array.from(row, (x) => (x === 0 ? Rational.zero : field.reconstruct(x)));
    if (!entries.every((x) => x !== undefined)) return undefined;
    lifted.push(entries);
  }
  const candidate = { pivots, rows: lifted };
  return matrix.every((row) => remainder(row, candidate).every((x) => x.isZero)) ? candidate : undefined;
}

/** The row with all pivots of an echelon form eliminated: zero iff the row lies in its row space. */
export function remainder(row: readonly Rational[], echelon: ReducedEchelon): Rational[] {
  const out = [...row];
  echelon.pivots.forEach((pivot, i) => {
    const factor = row[pivot]!;
    if (factor.isZero) return;
    echelon.rows[i]!.forEach((x, c) => {
      if (!x.isZero) out[c] = out[c]!.sub(factor.mul(x));
    });
  });
  return out;
}

/** Gauss–Jordan elimination in rational arithmetic. */
function eliminated(matrix: RationalMatrix, columns: number): ReducedEchelon {
  const rows = matrix.map((row) => [...row]);
  const pivots: number[] = [];
  for (let c = 0; c < columns && pivots.length < rows.length; c++) {
    const at = rows.findIndex((row, i) => i >= pivots.length && !row[c]!.isZero);
    if (at < 0) continue;
    const here = pivots.length;
    [rows[here], rows[at]] = [rows[at]!, rows[here]!];
    const scale = rows[here]![c]!.inv();
    const pivotRow = rows[here]!.map((x) => (x.isZero ? x : x.mul(scale)));
    rows[here] = pivotRow;
    rows.forEach((row, i) => {
      const factor = row[c]!;
      if (i === here || factor.isZero) return;
      rows[i] = row.map((x, k) => (pivotRow[k]!.isZero ? x : x.sub(factor.mul(pivotRow[k]!))));
    });
    pivots.push(c);
  }
  return { pivots, rows: rows.slice(0, pivots.length) };
}

/** Rank over Q. */
export const rank = (matrix: RationalMatrix, columns: number): number =>
  reducedEchelon(matrix, columns).pivots.length;

/** A basis of the vectors that the matrix annihilates, one for each column without a pivot: entry 1 there, other entries
 *  only in pivot columns to its left. */
export function kernel(matrix: RationalMatrix, columns: number): Rational[][] {
  const { pivots, rows } = reducedEchelon(matrix, columns);
  const isPivot = new Set(pivots);
  const basis: Rational[][] = [];
  for (let c = 0; c < columns; c++) {
    if (isPivot.has(c)) continue;
    const vector = new Array<Rational>(columns).fill(Rational.zero);
    vector[c] = Rational.one;
    pivots.forEach((pivot, i) => {
      vector[pivot] = rows[i]![c]!.neg();
    });
    basis.push(vector);
  }
  return basis;
}

/** The positive multiple of a vector whose entries are integers without a common factor. */
export function primitiveVector(vector: readonly Rational[]): Rational[] {
  let den = 1n;
  for (const x of vector) den = (den / gcd(den, x.den)) * x.den;
  let common = 0n;
  for (const x of vector) common = gcd(common, x.num * (den / x.den));
  return common === 0n ? [...vector] : vector.map((x) => x.mul(Rational.of(den, common)));
}
