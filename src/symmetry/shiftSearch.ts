// The search for shift families λ = p ε f(ℓ): free directions from all coordinates down to none, characters of order 1, 2, 3,
// 4 and 6 on the complement, polynomial prefactors up to a bound, and what is contained in larger families taken out.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial, type LaurentTerm } from '../exact/laurentPolynomial.ts';
import {
  ModularEchelon,
  PRIMES,
  PrimeField,
  primitiveVector,
  reducedEchelon,
  remainder,
} from '../exact/matrix.ts';
import { Rational } from '../exact/rational.ts';
import { onAllAxes, type ShiftSystem } from './constantSystem.ts';
import { candidateDirections, type FreeDirections, gcdOf, isSpannedBy } from './functionals.ts';
import {
  type Amplitudes,
  groups,
  polynomialSolutions,
  solutionBound,
  type Twelfths,
} from './polynomialSolutions.ts';
import { degreeOf, type FoundFamily, restrictedRank, restrictions } from './restriction.ts';

/** Highest degree of a prefactor that is listed when new ones appear at every degree tried. */
export const LISTED_DEGREE = 3;
const HIGHEST_DEGREE = 4;

export interface SearchResult {
  readonly families: readonly FoundFamily[];
  /** Degree up to which polynomial prefactors are listed although more of them follow; undefined: none follow. */
  readonly polynomialsContinueBeyond: number | undefined;
  /** Number of free functions of all coordinates that shift several fields together. */
  readonly localFunctions: number;
}

/** Candidates for the free directions of a system; `oblique` are the axes of the case that may be combined. */
export function directionsOf(system: ShiftSystem, oblique: readonly number[]): readonly FreeDirections[] {
  const dimension = system.axes.length;
  const mayCombine = system.axes.flatMap((axis, i) => (dimension <= 3 || oblique.includes(axis) ? [i] : []));
  return candidateDirections(dimension, mayCombine, stencilLines(system));
}

/** Searches a system for continuous shifts. Under a gauge redundancy only functions of
 *  coordinates with constant amplitudes are listed: the rest are mixtures with gauge transformations. */
export function searchShifts(system: ShiftSystem, candidates: readonly FreeDirections[]): SearchResult {
  const localFunctions = localFunctionCount(system);
  const isGauge = localFunctions > 0 && system.fields.length > 1;
  const degree = isGauge ? 0 : degreeBound(system);
  const families: FoundFamily[] = [];
  let beyond: number | undefined;
  for (const free of candidates) {
    if (isGauge && !free.rows.every((row) => row.filter((e) => e !== 0).length === 1)) continue;
    for (const phase of characters(system, free).slice(0, isGauge ? 1 : undefined)) {
      const larger = families.filter((f) => f.free !== free);
      const fresh = newAmplitudes(system, free, phase, degree, larger);
      const continues =
        !isGauge &&
        fresh.some((a) => degreeOf(a) === degree) &&
        newAmplitudes(system, free, phase, degree + 1, larger).some((a) => degreeOf(a) === degree + 1);
      const listed = continues ? Math.min(degree, LISTED_DEGREE) : degree;
      if (continues) beyond = listed;
      for (const amplitudes of fresh)
        if (degreeOf(amplitudes) <= listed) families.push({ free, phase, amplitudes });
    }
  }
  return { families, polynomialsContinueBeyond: beyond, localFunctions: isGauge ? localFunctions : 0 };
}

/** Number of fields minus the rank of the conditions over the field of rational functions of the operators, found at a point
 *  modulo a prime: that many free functions of all coordinates solve the conditions. */
function localFunctionCount(system: ShiftSystem): number {
  const field = new PrimeField(PRIMES[0]);
  const point = system.axes.map((_, k) => field.power(48271, k + 2));
  const echelon = new ModularEchelon(system.fields.length, field);
  for (const form of system.forms)
    echelon.add({
      columns: form.map((t) => t.field),
      values: form.map((t) =>
        t.exponents.reduce(
          (w, e, k) => field.multiply(w, field.power(point[k]!, e)),
          field.fromInteger(t.weight),
        ),
      ),
    });
  return system.fields.length - echelon.rank;
}

/** For two axes, functionals that are constant along the difference of two points of a stencil. */
function stencilLines(system: ShiftSystem): number[][] {
  if (system.axes.length !== 2 || system.kind === 'continuum') return [];
  const lines = new Map<string, number[]>();
  for (const form of system.forms)
    for (const s of form)
      for (const t of form) {
        const [x, y] = s.exponents.map((e, k) => e - t.exponents[k]!) as [number, number];
        const g = gcdOf([x, y]);
        if (g === 0 || Math.max(Math.abs(x), Math.abs(y)) / g < 2) continue;
        const line = [y / g, -x / g];
        if (line[0]! > 0) lines.set(line.join(), line);
      }
  return [...lines.values()].sort((a, b) => a[0]! - b[0]! || a[1]! - b[1]!);
}

/** Prefactors of degree above Σ (extent − 1) over the conditions would need a condition of higher order. */
function degreeBound(system: ShiftSystem): number {
  let bound = 1;
  for (const form of system.forms) {
    let extent = 0;
    for (let k = 0; k < system.axes.length; k++) {
      const reach = form.map((t) => t.exponents[k]!);
      extent += Math.max(...reach) - (system.kind === 'lattice' ? Math.min(...reach) : 0);
    }
    bound += Math.max(0, extent - 1);
  }
  return Math.min(HIGHEST_DEGREE, bound);
}

/** Choices of the phases in twelfths: all multiples of 1/2, of 1/3, of 1/4 or of 1/6; one of each conjugate pair. */
function phaseChoices(axes: number): number[][] {
  const out = new Map<string, number[]>();
  for (const step of [12, 6, 4, 3, 2]) {
    let tuples: number[][] = [[]];
    for (let k = 0; k < axes; k++)
      tuples = tuples.flatMap((t) => Array.from({ length: 12 / step }, (_, i) => [...t, i * step]));
    for (const t of tuples) {
      const conjugate = t.map((e) => (12 - e) % 12).join();
      if (!out.has(t.join()) && !out.has(conjugate)) out.set(t.join(), t);
    }
  }
  const support = (t: readonly number[]): number => t.filter((e) => e !== 0).length;
  const compare = (x: readonly number[], y: readonly number[]): number => {
    const at = x.findIndex((e, k) => e !== y[k]);
    return at < 0 ? 0 : y[at]! - x[at]!;
  };
  return [...out.values()].sort((x, y) => support(x) - support(y) || compare(x, y));
}

const choices = new Map<number, number[][]>();

/** Characters for which constant amplitudes solve the conditions modulo a prime; polynomial solutions need one, because
 *  differences of a solution are solutions. */
function characters(system: ShiftSystem, free: FreeDirections): Twelfths[] {
  const { complement } = free;
  const all = choices.get(complement.length) ?? phaseChoices(complement.length);
  choices.set(complement.length, all);
  const field = new PrimeField(PRIMES[0]);
  const root = field.rootOfUnity(12);
  const powers = Array.from({ length: 12 }, (_, k) => field.power(root, k));
  const trivial = new Array<number>(system.axes.length).fill(0);
  // constant amplitudes feel no derivative, but a character feels every shift
  const conditions = groups(system, free, trivial).map((g) =>
    system.kind === 'lattice' ? g.terms : g.terms.filter((t) => t.exponents.every((e) => e === 0)),
  );
  const fields = system.fields.length;
  const allows = (choice: readonly number[]): boolean => {
    const echelon = fields > 1 ? new ModularEchelon(fields, field) : undefined;
    for (const terms of conditions) {
      const sums = new Array<number>(fields).fill(0);
      for (const { field: j, exponents, weight } of terms) {
        let turn = 0;
        for (let k = 0; k < choice.length; k++) turn += choice[k]! * exponents[k]!;
        const value = field.multiply(field.fromInteger(weight), powers[((turn % 12) + 12) % 12]!);
        sums[j] = (sums[j]! + value) % field.p;
      }
      if (!echelon) {
        if (sums[0] !== 0) return false;
      } else {
        echelon.add({ columns: sums.map((_, j) => j), values: sums });
        if (echelon.rank === fields) return false;
      }
    }
    return true;
  };
  const tried = system.kind === 'lattice' ? all : all.slice(0, 1);
  return tried.filter(allows).map((choice) => {
    const phase = [...trivial];
    complement.forEach((axis, i) => {
      phase[axis] = choice[i]!;
    });
    return phase;
  });
}

/** True when the two characters differ by a character of ℓ alone. */
function sameOnKernel(x: Twelfths, y: Twelfths, free: FreeDirections): boolean {
  const trivial = (sign: number): boolean =>
    free.kernel.every((v) => v.reduce((s, e, k) => s + e * (x[k]! - sign * y[k]!), 0) % 12 === 0);
  return trivial(1) || trivial(-1);
}

/** A basis of the solutions modulo those that larger families give on the same free directions. */
function newAmplitudes(
  system: ShiftSystem,
  free: FreeDirections,
  phase: Twelfths,
  degree: number,
  larger: readonly FoundFamily[],
): Amplitudes[] {
  const containing = larger.filter(
    (f) => isSpannedBy(free.rows, f.free) && sameOnKernel(phase, f.phase, f.free),
  );
  // restrictions are solutions: when as many are independent modulo a prime as there can be solutions, nothing is new
  if (
    containing.length > 0 &&
    restrictedRank(containing, free, degree) === solutionBound(system, free, phase, degree)
  )
    return [];
  const solutions = polynomialSolutions(system, free, phase, degree);
  const explained = containing.flatMap((f) => restrictions(f, free, degree));
  const columns = new MonomialColumns([...solutions, ...explained]);
  const known = reducedEchelon(
    explained.map((a) => columns.vector(a)),
    columns.size,
  );
  const rest = solutions
    .map((a) => remainder(columns.vector(a), known))
    .filter((v) => v.some((x) => !x.isZero));
  const { rows } = reducedEchelon(rest, columns.size);
  return rows
    .map((row) => columns.amplitudes(primitiveVector(row), system))
    .sort((x, y) => degreeOf(x) - degreeOf(y));
}

/** Amplitude vectors as rows: highest monomials first, so that echelon pivots are leading monomials. */
class MonomialColumns {
  private readonly columns: { field: number; exponents: readonly number[] }[];
  private readonly index: Map<string, number>;

  constructor(amplitudes: readonly Amplitudes[]) {
    const found = new Map<string, { field: number; exponents: readonly number[] }>();
    for (const a of amplitudes)
      a.forEach((p, field) => {
        for (const { exponents } of p.terms) found.set(`${field}:${exponents.join()}`, { field, exponents });
      });
    const total = (e: readonly number[]): number => e.reduce((s, n) => s + n, 0);
    this.columns = [...found.values()].sort((x, y) => {
      const degree = total(y.exponents) - total(x.exponents);
      if (degree !== 0) return degree;
      const at = x.exponents.findIndex((e, k) => e !== y.exponents[k]);
      return at < 0 ? x.field - y.field : y.exponents[at]! - x.exponents[at]!;
    });
    this.index = new Map(this.columns.map((c, i) => [`${c.field}:${c.exponents.join()}`, i]));
  }
  get size(): number {
    return this.columns.length;
  }
  vector(amplitudes: Amplitudes): Rational[] {
    const out = new Array<Rational>(this.size).fill(Rational.zero);
    amplitudes.forEach((p, field) => {
      for (const t of p.terms) out[this.index.get(`${field}:${t.exponents.join()}`)!] = t.weight.asRational!;
    });
    return out;
  }
  amplitudes(vector: readonly Rational[], system: ShiftSystem): Amplitudes {
    return system.fields.map((_, field) =>
      LaurentPolynomial.of(
        system.axes.length,
        vector.flatMap((x, i): LaurentTerm[] =>
          x.isZero || this.columns[i]!.field !== field
            ? []
            : [{ exponents: this.columns[i]!.exponents, weight: Coefficient.rational(x) }],
        ),
      ),
    );
  }
}

/** The functionals of a family over all axes of the case. */
export const functionalsOf = (system: ShiftSystem, family: FoundFamily): number[][] =>
  family.free.rows.map((row) => onAllAxes(system, row));
