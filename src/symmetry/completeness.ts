// The completeness certificate: the dimension of all solutions of D λ = 0 on open boxes (lattice) or among polynomials up to
// a degree (continuum), by sparse ranks modulo two primes, against the dimension that the families found span there.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { ModularEchelon, PRIMES, PrimeField, type SparseRow } from '../exact/matrix.ts';
import type { ShiftSystem } from './constantSystem.ts';
import type { DiscreteSearch } from './discreteShifts.ts';
import type { CompletenessCertificate } from './family.ts';
import { Box, conditionsOn, edgeLengths, type ResidueForm, residueForms } from './openBox.ts';
import { exponentsUpTo } from './polynomialSolutions.ts';
import type { FoundFamily } from './restriction.ts';
import type { SearchResult } from './shiftSearch.ts';

/** Dimension of the solutions on the box, restricted to its inner part. */
function solutionsOn(box: Box, forms: readonly ResidueForm[], fields: number, field: PrimeField): number {
  const outer = box.outerCount * fields;
  const echelon = new ModularEchelon(box.sites.length * fields, field);
  let innerPivots = 0;
  for (const row of conditionsOn(box, forms, fields)) {
    const pivot = echelon.add(row);
    if (pivot !== undefined && pivot >= outer) innerPivots++;
  }
  return box.innerSites.length * fields - innerPivots;
}

/** Vectors of one family on the inner sites: the amplitude times ε on each set of sites with equal ℓ. */
function* familyVectors(family: FoundFamily, box: Box, field: PrimeField): Generator<SparseRow> {
  const fields = family.amplitudes.length;
  const isReal = family.phase.every((e) => e % 6 === 0);
  const root = isReal ? field.p - 1 : field.rootOfUnity(12);
  const amplitudes = family.amplitudes.map((p) =>
    p.terms.map((t) => ({ exponents: t.exponents, weight: field.fromRational(t.weight.asRational!) })),
  );
  for (const sign of isReal ? [1] : [1, -1]) {
    const byValue = new Map<string, { columns: number[]; values: number[] }>();
    for (const site of box.innerSites) {
      const argument = family.free.rows.map((row) => row.reduce((s, e, k) => s + e * site[k]!, 0)).join();
      const turn = site.reduce((s, x, k) => s + x * family.phase[k]!, 0) % 12;
      const character = field.power(root, isReal ? turn / 6 : (((sign * turn) % 12) + 12) % 12);
      const row = byValue.get(argument) ?? { columns: [], values: [] };
      byValue.set(argument, row);
      amplitudes.forEach((terms, j) => {
        let value = 0;
        for (const { exponents, weight } of terms) {
          let product = weight;
          exponents.forEach((e, k) => {
            for (let n = 0; n < e; n++) product = field.multiply(product, field.fromInteger(site[k]!));
          });
          value = (value + product) % field.p;
        }
        if (value === 0) return;
        row.columns.push(box.number(site) * fields + j);
        row.values.push(field.multiply(value, character));
      });
    }
    yield* byValue.values();
  }
}

function explainedOn(box: Box, families: readonly FoundFamily[], fields: number, field: PrimeField): number {
  const echelon = new ModularEchelon(box.sites.length * fields, field);
  for (const family of families) for (const row of familyVectors(family, box, field)) echelon.add(row);
  return echelon.rank;
}

interface Row {
  readonly size: readonly number[];
  readonly solutions: number;
  readonly explained: number;
}

function boxRows(system: ShiftSystem, families: readonly FoundFamily[], margin: number): Row[] {
  const dimension = system.axes.length;
  const fields = system.fields.length;
  const primes = PRIMES.map((p) => new PrimeField(p));
  const forms = primes.map((field) => residueForms(system, field));
  return edgeLengths(system).map((edge) => {
    const box = new Box(new Array<number>(dimension).fill(edge + 2 * margin), margin);
    // a rank modulo a prime never exceeds the true one: the larger of two counts the fewest solutions
    const solutions = Math.min(...primes.map((field, i) => solutionsOn(box, forms[i]!, fields, field)));
    const explained = Math.max(...primes.map((field) => explainedOn(box, families, fields, field)));
    return { size: new Array<number>(dimension).fill(edge), solutions, explained };
  });
}

/** Certificate for the lattice families of a search; `axes` are the names of the axes of the case. */
export function latticeCompleteness(
  system: ShiftSystem,
  search: SearchResult,
  discrete: DiscreteSearch | undefined,
  axes: readonly string[],
): CompletenessCertificate {
  let rows = boxRows(system, search.families, 0);
  const isExplained = (r: Row): boolean => r.solutions === r.explained;
  let where = 'open boxes';
  const dimension = system.axes.length;
  if (!rows.every(isExplained) && dimension <= 3) {
    // near corners a box has solutions that do not extend to the lattice: count on the interior instead
    const inner = boxRows(system, search.families, 1);
    if (unexplained(inner) < unexplained(rows)) {
      rows = inner;
      where = 'the interior of open boxes';
    }
  }
  const boxes = listed(rows.map((r) => (dimension === 1 ? `${r.size[0]}` : `${r.size[0]}^${dimension}`)));
  const place = `on ${where} ${boxes} in ${system.axes.map((k) => axes[k]).join(', ')}`;
  const complete = rows.every(isExplained) && (discrete === undefined || discrete.openPrimes.length === 0);
  return certificate(rows, complete, [
    summary(rows, place, 'the size L', system),
    discrete ? discreteText(discrete) : '',
    ...remarks(system, search),
  ]);
}

function discreteText({ families, primes, openPrimes }: DiscreteSearch): string {
  if (openPrimes.length > 0)
    return `incomplete: discrete shifts modulo ${openPrimes.join(', ')} are not all explained`;
  return `${families.length === 0 ? 'no discrete shifts' : 'discrete shifts complete'} modulo ${primes.join(', ')}`;
}

const unexplained = (rows: readonly Row[]): number =>
  rows.reduce((sum, r) => sum + r.solutions - r.explained, 0);

const listed = (items: readonly string[]): string =>
  items.length <= 4 ? items.join(', ') : `${items[0]}, ${items[1]}, …, ${items.at(-1)}`;

function certificate(
  rows: readonly Row[],
  complete: boolean,
  texts: readonly string[],
): CompletenessCertificate {
  return {
    rows,
    primes: PRIMES,
    complete,
    growth: growthExponent(rows.map((r) => r.solutions)),
    text: texts.filter((t) => t !== '').join('; '),
  };
}

/** Complete, or how many parameters the families leave unexplained and how their number grows. */
function summary(rows: readonly Row[], place: string, scale: string, system: ShiftSystem): string {
  const counts = rows.map((r) => r.solutions - r.explained);
  if (counts.every((n) => n === 0))
    return system.axes.length === 0
      ? 'complete: no shift may depend on the coordinates'
      : `complete ${place} modulo two primes`;
  const growth = growthExponent(counts);
  const grows =
    growth === undefined
      ? ''
      : growth === 0
        ? ', a number that does not grow'
        : `, a number that grows like ${scale} to the power ${growth}`;
  return `incomplete: ${place} the families leave ${counts.join(', ')} parameters unexplained${grows}`;
}

function remarks(system: ShiftSystem, search: SearchResult): string[] {
  const beyond = search.polynomialsContinueBeyond;
  const { localFunctions: local } = search;
  return [
    local === 0
      ? ''
      : `a gauge redundancy: ${local} free function${local === 1 ? '' : 's'} of all coordinates shift${local === 1 ? 's' : ''} the fields together, and polynomial and staggered shifts inside it are not listed`,
    beyond === undefined
      ? ''
      : `polynomial shifts continue beyond degree ${beyond}, up to which they are listed`,
    system.isGeneric ? 'for generic values of the parameters in the weights' : '',
  ];
}

/** Degree of the polynomial in the size that the counts at consecutive sizes follow, the smallest sizes left out where they
 *  do not fit yet; undefined for no solutions or when too few sizes are known. */
export function growthExponent(counts: readonly number[]): number | undefined {
  if (counts.every((n) => n === 0)) return undefined;
  for (let from = 0; from < counts.length - 1; from++) {
    let differences = counts.slice(from);
    for (let degree = 0; differences.length > 1; degree++) {
      differences = differences.slice(1).map((n, i) => n - differences[i]!);
      if (differences.every((n) => n === 0)) return degree;
    }
  }
  return counts.length === 1 ? 0 : undefined;
}

/** Certificate for the continuum families of a search, among polynomials of total degree 0 … n. */
export function continuumCompleteness(system: ShiftSystem, search: SearchResult): CompletenessCertificate {
  const dimension = system.axes.length;
  const size = (n: number): number => exponentsUpTo(dimension, n).length * system.fields.length;
  let highest = 3;
  while (highest < 6 && size(highest + 1) <= 300) highest++;
  if (dimension === 0) highest = 0;
  const primes = PRIMES.map((p) => new PrimeField(p));
  const vectors = search.families.flatMap((f) => familyPolynomials(f, highest));
  const rows = Array.from({ length: highest + 1 }, (_, n): Row => {
    const counts = primes.map((field) => polynomialCounts(system, n, vectors, field));
    return {
      size: [n],
      solutions: Math.min(...counts.map((c) => c.solutions)),
      explained: Math.max(...counts.map((c) => c.explained)),
    };
  });
  const complete = rows.every((r) => r.solutions === r.explained);
  return certificate(rows, complete, [
    summary(rows, `among polynomials of degree 0 to ${highest}`, 'the degree', system),
    ...remarks(system, search),
  ]);
}

/** p times products of the functionals, up to a total degree. */
function familyPolynomials(family: FoundFamily, highest: number): (readonly LaurentPolynomial[])[] {
  const dimension = family.amplitudes[0]!.dimension;
  const degreeOf = (a: readonly LaurentPolynomial[]): number =>
    Math.max(...a.flatMap((p) => p.terms.map((t) => t.exponents.reduce((s, e) => s + e, 0))));
  let out: (readonly LaurentPolynomial[])[] = [family.amplitudes];
  for (const row of family.free.rows) {
    const functional = LaurentPolynomial.of(
      dimension,
      row.map((e, k) => ({
        exponents: row.map((_, i) => (i === k ? 1 : 0)),
        weight: Coefficient.integer(e),
      })),
    );
    out = out.flatMap((first) => {
      const powers = [first];
      for (let a = first; degreeOf(a) < highest; powers.push(a)) a = a.map((p) => p.mul(functional));
      return powers;
    });
  }
  return out;
}

/** In the basis of divided powers, where ∂^α only lowers exponents. */
function polynomialCounts(
  system: ShiftSystem,
  degree: number,
  vectors: readonly (readonly LaurentPolynomial[])[],
  field: PrimeField,
): { solutions: number; explained: number } {
  const basis = exponentsUpTo(system.axes.length, degree);
  const index = new Map(basis.map((b, i) => [b.join(), i]));
  const fields = system.fields.length;
  const equations = new ModularEchelon(basis.length * fields, field);
  for (const form of residueForms(system, field))
    for (const gamma of basis) {
      const inside = form.flatMap((t) => {
        const at = index.get(gamma.map((e, k) => e + t.exponents[k]!).join());
        return at === undefined ? [] : [{ column: at * fields + t.field, value: t.weight }];
      });
      equations.add({ columns: inside.map((x) => x.column), values: inside.map((x) => x.value) });
    }
  const spanned = new ModularEchelon(basis.length * fields, field);
  for (const amplitudes of vectors) {
    const columns: number[] = [];
    const values: number[] = [];
    let fits = true;
    amplitudes.forEach((p, j) => {
      for (const t of p.terms) {
        const at = index.get(t.exponents.join());
        if (at === undefined) fits = false;
        else {
          let value = field.fromRational(t.weight.asRational!);
          for (const e of t.exponents) for (let n = 2; n <= e; n++) value = field.multiply(value, n);
          columns.push(at * fields + j);
          values.push(value);
        }
      }
    });
    if (fits) spanned.add({ columns, values });
  }
  return { solutions: basis.length * fields - equations.rank, explained: spanned.rank };
}
