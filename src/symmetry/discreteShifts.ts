// Shifts of an angle by multiples of 2π/N that no continuous shift contains. For fixed free directions and signs, N is the
// common divisor of the group sums. Write M for the conditions on an open box. The solutions of M λ ∈ 2πZ form a torus times a
// finite group, the torsion of Z^m / M Z^n, and λ = (2π/N) v maps to w = M v / N there. Modulo a prime q the torsion is visible
// as a drop of the rank of M, and the w of a set of families explain it iff they fill the drop.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { ModularEchelon, PRIMES, PrimeField } from '../exact/matrix.ts';
import type { ShiftSystem } from './constantSystem.ts';
import { type FreeDirections, gcdOf } from './functionals.ts';
import { Box, conditionsOn, edgeLengths } from './openBox.ts';
import { groups } from './polynomialSolutions.ts';
import type { FoundFamily } from './restriction.ts';

const SMALL_PRIMES = [2, 3, 5, 7, 11, 13];

/** Shifts (2π/order) ε f(ℓ) of one field with integer f. */
export interface DiscreteFamily extends FoundFamily {
  readonly order: number;
}

export interface DiscreteSearch {
  readonly families: readonly DiscreteFamily[];
  /** Primes at which the finite group was looked at. */
  readonly primes: readonly number[];
  /** Those at which the families do not explain it. */
  readonly openPrimes: readonly number[];
}

interface Candidate {
  readonly free: FreeDirections;
  readonly phase: readonly number[];
  readonly field: number;
  readonly order: number;
}

/** Discrete shifts of the angles among the fields. The conditions must have integer weights. */
export function discreteShifts(
  system: ShiftSystem,
  directions: readonly FreeDirections[],
  angles: readonly boolean[],
): DiscreteSearch {
  const box = new Box(new Array<number>(system.axes.length).fill(edgeLengths(system)[0]!), 0);
  const conditions = [...conditionsOn(box, system.forms, system.fields.length)];
  const unknowns = box.sites.length * system.fields.length;
  const images = imagesOf(conditions, unknowns);
  const fullRank = addAll(images, conditions.length, PRIMES[0]).rank;
  const candidates = directions.flatMap((free) => candidatesOf(system, free, angles));
  const primes = [...new Set([...SMALL_PRIMES, ...candidates.flatMap((c) => primeFactors(c.order))])];
  const orders = new Map<Candidate, number>();
  const openPrimes = primes.filter((q) => {
    const echelon = addAll(images, conditions.length, q);
    for (const candidate of candidates) {
      if (candidate.order % q !== 0 || echelon.rank === fullRank) continue;
      const before = echelon.rank;
      for (const w of torsionVectors(candidate, box, conditions, system.fields.length))
        echelon.add({ columns: w.map((_, i) => i), values: w.map((x) => echelon.field.fromInteger(x)) });
      if (echelon.rank > before)
        orders.set(candidate, (orders.get(candidate) ?? 1) * primePart(candidate.order, q));
    }
    return echelon.rank < fullRank;
  });
  const families = candidates.flatMap((c) => {
    const order = orders.get(c);
    return order === undefined ? [] : [familyOf(c, order, system)];
  });
  return { families, primes, openPrimes };
}

type Row = { readonly columns: readonly number[]; readonly values: readonly number[] };

/** The columns of the conditions: what each unknown maps to. */
function imagesOf(conditions: readonly Row[], unknowns: number): Row[] {
  const images = Array.from({ length: unknowns }, () => ({
    columns: [] as number[],
    values: [] as number[],
  }));
  conditions.forEach((row, i) => {
    row.columns.forEach((c, k) => {
      images[c]!.columns.push(i);
      images[c]!.values.push(row.values[k]!);
    });
  });
  return images;
}

function addAll(rows: readonly Row[], columns: number, p: number): ModularEchelon {
  const field = new PrimeField(p);
  const echelon = new ModularEchelon(columns, field);
  for (const row of rows)
    echelon.add({ columns: row.columns, values: row.values.map((v) => field.fromInteger(v)) });
  return echelon;
}

function candidatesOf(system: ShiftSystem, free: FreeDirections, angles: readonly boolean[]): Candidate[] {
  const out: Candidate[] = [];
  for (let signs = 0; signs < 2 ** free.complement.length; signs++) {
    const phase = new Array<number>(system.axes.length).fill(0);
    free.complement.forEach((axis, i) => {
      phase[axis] = (signs >> i) % 2 === 1 ? 6 : 0;
    });
    const sums = groups(system, free, phase).map((g) => {
      const perField = system.fields.map(() => 0);
      for (const t of g.terms) perField[t.field]! += t.phase === 6 ? -t.weight : t.weight;
      return perField;
    });
    angles.forEach((isAngle, field) => {
      const order = isAngle ? gcdOf(sums.map((s) => s[field]!)) : 0;
      if (order > 1) out.push({ free, phase, field, order });
    });
  }
  return out;
}

/** w = M v / N for the vectors v of a candidate, one for each value of ℓ in the box. */
function torsionVectors(c: Candidate, box: Box, conditions: readonly Row[], fields: number): number[][] {
  const vectors = new Map<string, Map<number, number>>();
  for (const site of box.sites) {
    const key = c.free.rows.map((row) => row.reduce((s, e, k) => s + e * site[k]!, 0)).join();
    const vector = vectors.get(key) ?? new Map<number, number>();
    vectors.set(key, vector);
    const turn = site.reduce((s, x, k) => s + x * c.phase[k]!, 0) % 12;
    vector.set(box.number(site) * fields + c.field, turn === 6 ? -1 : 1);
  }
  return [...vectors.values()].map((v) =>
    conditions.map(
      (row) =>
        row.columns.reduce((sum, column, i) => sum + row.values[i]! * (v.get(column) ?? 0), 0) / c.order,
    ),
  );
}

function familyOf(c: Candidate, order: number, system: ShiftSystem): DiscreteFamily {
  const dimension = system.axes.length;
  // (2π/2) times a sign is π all the same
  const phase = order === 2 ? c.phase.map(() => 0) : c.phase;
  const amplitudes = system.fields.map((_, j) =>
    j === c.field
      ? LaurentPolynomial.constant(dimension, Coefficient.one)
      : LaurentPolynomial.zero(dimension),
  );
  return { free: c.free, phase, amplitudes, order };
}

function primeFactors(n: number): number[] {
  const out: number[] = [];
  let rest = n;
  for (let q = 2; q * q <= rest; q++)
    if (rest % q === 0) {
      out.push(q);
      while (rest % q === 0) rest /= q;
    }
  return rest > 1 ? [...out, rest] : out;
}

function primePart(n: number, q: number): number {
  let part = 1;
  for (let rest = n; rest % q === 0; rest /= q) part *= q;
  return part;
}
