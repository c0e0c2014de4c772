// Whether a jet monomial can be part of a density that shifts leave alone: (∂_x²φ)⁴ alone changes under φ → φ + x² − y², but
// (∂_x²φ + ∂_y²φ)⁴ does not. The densities with the gradings that the shifts respect form a finite space; invariance is a set of
// linear equations for their coefficients. As in brokenShift.ts the first variation must be a total derivative. A shift by a
// polynomial λ(r) must also leave no constant. A constant has a meaning only where the density is the same at both ends of a
// lattice that are joined with the shift, that is, when it does not change at all under λ(r + v) − λ(r): this fixes the
// representative modulo total derivatives, (∂_xφ)² and not −φ ∂_x²φ for λ = x.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { rank } from '../exact/matrix.ts';
import { Rational } from '../exact/rational.ts';
import { Density, type JetMonomial, type JetSpace, type JetVariable } from '../limit/jets.ts';
import { normalForm } from '../limit/normalForm.ts';
import type { LinearForm } from '../model/action.ts';
import { LimitError } from '../notation/source.ts';
import type { ShiftFamily } from './family.ts';

/** More monomials than this are not searched. */
const MOST_MONOMIALS = 300;

export interface CompletionInput {
  readonly space: JetSpace;
  /** Linear forms in the shift that must vanish for the density to be invariant; linear in the density. */
  readonly conditions: (density: Density) => readonly LinearForm[];
}

/** True when some density that all families leave alone has the monomial in its normal form; undefined when the search would be
 *  too large or leaves the rational numbers. The monomial must be its own normal form. */
export function hasInvariantCompletion(
  monomial: JetMonomial,
  families: readonly ShiftFamily[],
  input: CompletionInput,
): boolean | undefined {
  const { space } = input;
  const monomials = monomialsBeside(monomial, families, space);
  if (!monomials) return undefined;
  const unknowns = new Density(space, new Map(monomials.map((m, i) => [m, Coefficient.symbol(`@${i}`)])));
  const equations = [
    ...families.flatMap((f) => input.conditions(unknowns).flatMap((form) => valuesOn(f, form, space))),
    ...families
      .filter(isPolynomial)
      .flatMap((f) => differences(f, space).flatMap((d) => variation(unknowns, d))),
    ...separated(polynomialConstant(unknowns, families)),
  ];
  const rows: Rational[][] = [];
  for (const equation of equations) {
    const row = coefficientRow(equation, monomials.length);
    if (!row) return undefined;
    rows.push(row);
  }
  const share = sharesOf(monomial, monomials, space);
  if (!share) return undefined;
  return rank([...rows, share], monomials.length) > rank(rows, monomials.length);
}

/** How much of the monomial each of the others has in its normal form; undefined where that is not known. */
function sharesOf(
  monomial: JetMonomial,
  monomials: readonly JetMonomial[],
  space: JetSpace,
): Rational[] | undefined {
  try {
    return monomials.map(
      (m) => normalForm(new Density(space, new Map([[m, Coefficient.one]]))).get(monomial).asRational!,
    );
  } catch (error) {
    if (error instanceof LimitError) return undefined;
    throw error;
  }
}

/** The numbers of fields and derivatives of a monomial: one entry per field, then one per axis. */
function gradesOf(monomial: JetMonomial, space: JetSpace): number[] {
  const counts = new Array<number>(space.fields.length).fill(0);
  for (const { field } of space.factors(monomial)) counts[field]!++;
  return [...counts, ...space.degree(monomial)];
}

/** Differences of grades that the families mix: of the terms of one amplitude, and of the axes in one functional. */
function mixedGrades(families: readonly ShiftFamily[], space: JetSpace): number[][] {
  const unit = (i: number): number[] =>
    Array.from({ length: space.fields.length + space.axes.length }, (_, k) => (k === i ? 1 : 0));
  const fromFirst = (grades: readonly number[][]): number[][] =>
    grades.slice(1).map((g) => g.map((n, k) => n - grades[0]![k]!));
  return families.flatMap(({ prefactor, free }) => [
    ...fromFirst(
      prefactor.flatMap((p, field) =>
        p.map(({ exponents }) => [...unit(field).slice(0, space.fields.length), ...exponents]),
      ),
    ),
    ...free.flatMap((row) =>
      fromFirst(row.flatMap((n, k) => (n === 0 ? [] : [unit(space.fields.length + k)]))),
    ),
  ]);
}

/** All monomials with grades that the families can mix with those of the given one. */
function monomialsBeside(
  monomial: JetMonomial,
  families: readonly ShiftFamily[],
  space: JetSpace,
): JetMonomial[] | undefined {
  const mixed = mixedGrades(families, space).filter((g) => g.some((n) => n !== 0));
  const derivatives = (g: readonly number[]): number =>
    g.slice(space.fields.length).reduce((x, y) => x + y, 0);
  if (mixed.some((g) => derivatives(g) !== 0)) return undefined;
  const isDefined = definedFactors(families, space);
  const found = new Map([[gradesOf(monomial, space).join(), gradesOf(monomial, space)]]);
  const monomials: JetMonomial[] = [];
  for (const grades of found.values()) {
    const here = monomialsOf(grades, space, isDefined, MOST_MONOMIALS - monomials.length);
    if (!here) return undefined;
    monomials.push(...here);
    for (const g of mixed)
      for (const sign of [1, -1]) {
        const next = grades.map((n, k) => n + sign * g[k]!);
        if (next.every((n) => n >= 0)) found.set(next.join(), next);
      }
  }
  return monomials;
}

const isPolynomial = (family: ShiftFamily): boolean => family.free.length === 0;

/** The shifts ∂_k λ, which span the differences λ(r + v) − λ(r) together with their own derivatives. */
function differences(family: ShiftFamily, space: JetSpace): ShiftFamily[] {
  return space.axes.map((_, axis) => ({
    ...family,
    prefactor: family.prefactor.map((p) => partial(LaurentPolynomial.of(space.axes.length, p), axis).terms),
  }));
}

/** The first variation under a shift by a polynomial: its coefficients in front of products of jets and coordinates. */
function variation(density: Density, family: ShiftFamily): Coefficient[] {
  const { space } = density;
  const sums = new Map<string, Coefficient>();
  for (const [monomial, coefficient] of density.terms)
    for (const [i, factor] of space.factors(monomial).entries())
      for (const { exponents, weight } of derivativeOf(family, factor).terms) {
        const key = `${monomial.slice(0, i)}${monomial.slice(i + 1)}|${exponents.join()}`;
        const term = coefficient.mul(weight);
        sums.set(key, sums.get(key)?.add(term) ?? term);
      }
  return [...sums.values()].filter((c) => !c.isZero);
}

/** False for factors that no density invariant under the differences of the families can have: ∂^α φ where a multiple of r^α is
 *  among them. It only shortens the search; the equations hold the rest. */
function definedFactors(families: readonly ShiftFamily[], space: JetSpace): (factor: JetVariable) => boolean {
  const excluded = new Set<string>();
  const exclude = (family: ShiftFamily): void => {
    const terms = family.prefactor.flatMap((p, field) => p.map((t) => `${field}:${t.exponents.join()}`));
    if (terms.length === 1) excluded.add(terms[0]!);
    if (terms.length > 0) for (const d of differences(family, space)) exclude(d);
  };
  for (const f of families.filter(isPolynomial)) for (const d of differences(f, space)) exclude(d);
  return ({ field, derivative }) => !excluded.has(`${field}:${derivative.join()}`);
}

/** Multi-indices below a bound, axis by axis. */
const multiIndices = (bound: readonly number[]): number[][] =>
  bound.reduce<number[][]>(
    (out, n) => out.flatMap((alpha) => Array.from({ length: n + 1 }, (_, i) => [...alpha, i])),
    [[]],
  );

/** The monomials with given grades; undefined beyond `most`. */
function monomialsOf(
  grades: readonly number[],
  space: JetSpace,
  isDefined: (factor: JetVariable) => boolean,
  most: number,
): JetMonomial[] | undefined {
  const counts = grades.slice(0, space.fields.length);
  const fields = counts.flatMap((n, field) => new Array<number>(n).fill(field));
  const out: JetMonomial[] = [];
  /** Appends factors so that those of one field do not descend. */
  const extend = (chosen: readonly JetVariable[], left: readonly number[]): boolean => {
    const field = fields[chosen.length];
    if (field === undefined) {
      if (left.every((n) => n === 0)) out.push(space.monomial(chosen));
      return out.length <= most;
    }
    const last = chosen.at(-1);
    const isNext = (alpha: readonly number[]): boolean =>
      last?.field !== field || compare(alpha, last.derivative) >= 0;
    return multiIndices(left)
      .map((derivative): JetVariable => ({ field, derivative }))
      .filter((f) => isNext(f.derivative) && isDefined(f))
      .every((f) =>
        extend(
          [...chosen, f],
          left.map((n, k) => n - f.derivative[k]!),
        ),
      );
  };
  return extend([], grades.slice(space.fields.length)) ? out : undefined;
}

function compare(x: readonly number[], y: readonly number[]): number {
  const k = x.findIndex((n, i) => n !== y[i]);
  return k < 0 ? 0 : x[k]! - y[k]!;
}

/** ∂^α (p f(ℓ)) / f for f = exp(Σ s_i ℓ_i): a polynomial in the coordinates and, after them, in the s_i. It vanishes iff
 *  ∂^α (p f(ℓ)) does for every f. */
function derivativeOf(
  { prefactor, free }: ShiftFamily,
  { field, derivative }: JetVariable,
): LaurentPolynomial {
  const axes = derivative.length;
  const dimension = axes + free.length;
  let value = LaurentPolynomial.of(
    dimension,
    (prefactor[field] ?? []).map(({ exponents, weight }) => ({
      exponents: [...exponents, ...free.map(() => 0)],
      weight,
    })),
  );
  for (const [k, n] of derivative.entries()) {
    const slope = free.reduce(
      (sum, row, i) =>
        sum.add(LaurentPolynomial.variable(dimension, axes + i).scale(Coefficient.integer(row[k]!))),
      LaurentPolynomial.zero(dimension),
    );
    for (let i = 0; i < n && !value.isZero; i++) value = partial(value, k).add(value.mul(slope));
  }
  return value;
}

const partial = (p: LaurentPolynomial, axis: number): LaurentPolynomial =>
  LaurentPolynomial.of(
    p.dimension,
    p.terms
      .filter((t) => t.exponents[axis] !== 0)
      .map(({ exponents, weight }) => ({
        exponents: exponents.map((n, k) => (k === axis ? n - 1 : n)),
        weight: weight.mul(Coefficient.integer(exponents[axis]!)),
      })),
  );

/** The coefficients of independent functions in a linear form at a family. */
function valuesOn(family: ShiftFamily, form: LinearForm, space: JetSpace): Coefficient[] {
  const dimension = space.axes.length + family.free.length;
  let sum = LaurentPolynomial.zero(dimension);
  for (const [name, operator] of form)
    for (const { exponents, weight } of operator.terms)
      sum = sum.add(
        derivativeOf(family, { field: space.fields.indexOf(name), derivative: exponents }).scale(weight),
      );
  return sum.terms.map((t) => t.weight);
}

/** What a density is on the shift by any combination Σ t_k λ_k of the polynomial families, t_k the generators `@tk`; coordinates
 *  are generators `@xk`. */
export function polynomialConstant(density: Density, families: readonly ShiftFamily[]): Coefficient {
  const polynomials = families.filter(isPolynomial);
  const atFactor = (factor: JetVariable): Coefficient =>
    polynomials.reduce(
      (total, family, k) =>
        derivativeOf(family, factor).terms.reduce((sum, { exponents, weight }) => {
          const powers = exponents.map((n, axis): [string, Rational] => [`@x${axis}`, Rational.of(n)]);
          return sum.add(
            weight.mul(Coefficient.monomial(Rational.one, [...powers, [`@t${k}`, Rational.one]])),
          );
        }, total),
      Coefficient.zero,
    );
  let sum = Coefficient.zero;
  if (polynomials.length === 0) return sum;
  for (const [monomial, coefficient] of density.terms)
    sum = sum.add(
      density.space.factors(monomial).reduce((x, f) => (x.isZero ? x : x.mul(atFactor(f))), coefficient),
    );
  return sum;
}

const isUnknown = (generator: string): boolean => /^@\d+$/.test(generator);

/** The coefficients of the power products of all generators but the unknowns `@i`. */
function separated(value: Coefficient): Coefficient[] {
  const groups = new Map<string, Coefficient>();
  for (const { factor, powers } of value.terms) {
    const key = JSON.stringify(powers.flatMap(([g, n]) => (isUnknown(g) ? [] : [g, n.toString()])));
    const term = Coefficient.monomial(
      factor,
      powers.filter(([g]) => isUnknown(g)),
    );
    groups.set(key, groups.get(key)?.add(term) ?? term);
  }
  return [...groups.values()];
}

/** A linear combination of the unknowns `@i` as a row; undefined for anything else. */
function coefficientRow(value: Coefficient, length: number): Rational[] | undefined {
  const row = new Array<Rational>(length).fill(Rational.zero);
  for (const { factor, powers } of value.terms) {
    const [name, ...others] = powers.map(([g]) => g);
    if (name === undefined || others.length > 0 || !isUnknown(name)) return undefined;
    row[Number(name.slice(1))] = factor;
  }
  return row;
}
