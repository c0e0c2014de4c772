// The linear conditions D λ = 0 of a case in one shape for the lattice and the continuum. Weights with parameters are split by
// their power products: every part must vanish separately, which finds the shifts with rational weights that hold for all
// values of the parameters. An axis along which some condition forbids any change of λ is dropped at once.

import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { gcd } from '../exact/rational.ts';
import type { LinearForm } from '../model/action.ts';
import { LimitError } from '../notation/source.ts';

export type SystemKind = 'lattice' | 'continuum';

/** One term c T^v φ_j or c ∂^v φ_j with an integer weight. */
export interface IntegerTerm {
  readonly field: number;
  readonly exponents: readonly number[];
  readonly weight: number;
}

/** The conditions on λ_1 … λ_F over the axes that are left. */
export interface ShiftSystem {
  readonly kind: SystemKind;
  /** Number of axes of the case. */
  readonly fullDimension: number;
  /** Axes of the case on which λ may depend at all, in order. */
  readonly axes: readonly number[];
  readonly fields: readonly string[];
  /** Conditions with rational weights: Σ_j D_j λ_j = 0 for each. */
  readonly forms: readonly (readonly IntegerTerm[])[];
  /** The same conditions over the axes that are left, before parameters were split off. */
  readonly unsplit: readonly (readonly (LaurentPolynomial | undefined)[])[];
  /** True when weights with different power products of parameters had to be split. */
  readonly isGeneric: boolean;
  /** True when the conditions on the lattice have integer weights as they stand, so that angles may be shifted. */
  readonly isIntegral: boolean;
}

type Row = readonly (LaurentPolynomial | undefined)[];

/** Reads the conditions. Throws LimitError for weights beyond 2^53. */
export function shiftSystem(
  kind: SystemKind,
  forms: readonly LinearForm[],
  fields: readonly string[],
  dimension: number,
): ShiftSystem {
  let rows: Row[] = forms.map((form) => fields.map((name) => form.get(name))).filter(isNonZero);
  const axes = Array.from({ length: dimension }, (_, k) => k);
  for (let k = dimension - 1; k >= 0; k--) {
    if (!fields.every((_, j) => rows.some((row) => forbidsChange(row, j, k, kind)))) continue;
    axes.splice(k, 1);
    rows = rows.map((row) => row.map((d) => d && withoutAxis(d, k, kind))).filter(isNonZero);
  }
  const parts = rows.flatMap(integerForms);
  const distinct = new Map(parts.map((f) => [f.key, f.terms]));
  return {
    kind,
    fullDimension: dimension,
    axes,
    fields,
    forms: [...distinct.values()],
    unsplit: rows,
    isGeneric: rows.some((row) => powerProducts(row).size > 1),
    isIntegral: rows.every((row) =>
      row.every((d) => !d || d.terms.every((t) => t.weight.asRational?.isInteger)),
    ),
  };
}

const isNonZero = (row: Row): boolean => row.some((d) => d && !d.isZero);

/** True when the condition says that λ of one field does not change along an axis: T^u (T_k − 1) or ∂_k alone. */
function forbidsChange(row: Row, field: number, axis: number, kind: SystemKind): boolean {
  if (row.some((d, j) => j !== field && d && !d.isZero)) return false;
  const terms = row[field]?.terms ?? [];
  const isUnit = (difference: readonly number[]): boolean =>
    difference.every((e, k) => Math.abs(e) === (k === axis ? 1 : 0));
  if (kind === 'continuum') return terms.length === 1 && isUnit(terms[0]!.exponents);
  const [x, y] = terms;
  return (
    terms.length === 2 &&
    isUnit(x!.exponents.map((e, k) => e - y!.exponents[k]!)) &&
    x!.weight.equals(y!.weight.neg()) &&
    (x!.weight.isOne || y!.weight.isOne)
  );
}

/** T_k → 1 or ∂_k → 0. */
function withoutAxis(d: LaurentPolynomial, axis: number, kind: SystemKind): LaurentPolynomial {
  const kept = kind === 'lattice' ? d.terms : d.terms.filter((t) => t.exponents[axis] === 0);
  return LaurentPolynomial.of(
    d.dimension - 1,
    kept.map((t) => ({ exponents: t.exponents.filter((_, k) => k !== axis), weight: t.weight })),
  );
}

const powerProducts = (row: Row): Set<string> =>
  new Set(row.flatMap((d) => d?.terms.flatMap((t) => t.weight.terms.map((c) => c.key)) ?? []));

/** The parts of a condition by power product, denominators cleared; a common factor stays, because angles feel it. */
function integerForms(row: Row): { key: string; terms: IntegerTerm[] }[] {
  return [...powerProducts(row)].map((product) => {
    const terms = row.flatMap((d, field) =>
      (d?.terms ?? []).flatMap((t) => {
        const part = t.weight.terms.find((c) => c.key === product);
        return part ? [{ field, exponents: t.exponents, factor: part.factor }] : [];
      }),
    );
    let den = 1n;
    for (const t of terms) den = (den / gcd(den, t.factor.den)) * t.factor.den;
    const scaled = terms.map((t) => {
      const weight = Number(t.factor.num * (den / t.factor.den));
      if (!Number.isSafeInteger(weight))
        throw new LimitError('shift symmetries are searched for weights below 2^53 only');
      return { field: t.field, exponents: t.exponents, weight };
    });
    return { key: JSON.stringify(scaled), terms: scaled };
  });
}

/** Puts entries over the axes that are left back among all axes of the case. */
export function onAllAxes(system: ShiftSystem, entries: readonly number[]): number[] {
  const out = new Array<number>(system.fullDimension).fill(0);
  system.axes.forEach((axis, i) => {
    out[axis] = entries[i]!;
  });
  return out;
}
