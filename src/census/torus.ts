// Shift symmetries on a periodic space lattice: the solutions of D λ = 0 with values in U(1) are U(1)^r times a finite group,
// with r the number of unknowns minus the rank over Q. The primes that divide the order of the finite group are those at which
// the rank drops (elementary divisors).

import type { Coefficient } from '../exact/coefficient.ts';
import { ModularEchelon, PRIMES, PrimeField, rank } from '../exact/matrix.ts';
import { Rational } from '../exact/rational.ts';
import type { LinearForm } from '../model/action.ts';
import { type Field, type Lattice, spaceAxes } from '../model/geometry.ts';
import { residue } from '../symmetry/genericPoint.ts';

/** Below this number of unknowns the rank is also found over Q. */
const MOST_EXACT_UNKNOWNS = 36;
const SMALL_PRIMES = [2, 3, 5, 7, 11, 13];

export interface TorusShiftCount {
  /** Number of U(1) factors. */
  readonly free: number;
  /** Primes up to 13 at which the finite part is non-trivial, with the number of its factors Z_d that they divide; empty also
   *  when a weight is not an integer, because then the shifts of angles are not defined. */
  readonly torsionPrimes: readonly { readonly prime: number; readonly factors: number }[];
  /** `exact`: over Q; otherwise the larger of two ranks modulo large primes (generic parameters). */
  readonly method: 'exact' | 'two primes';
}

/** Time-independent shifts on the periodic lattice with the given sizes, one per space axis in order. Conditions of the form
 *  T_tau λ = λ hold by themselves. Without `torsion` only the
 *  U(1) factors are counted. Throws RangeError for sizes that do not fit the lattice. */
export function torusShiftCount(
  forms: readonly LinearForm[],
  lattice: Lattice,
  fields: readonly Field[],
  sizes: readonly number[],
  { torsion = true }: { readonly torsion?: boolean } = {},
): TorusShiftCount {
  const axes = spaceAxes(lattice);
  if (sizes.length !== axes.length || !sizes.every((n) => Number.isInteger(n) && n > 0))
    throw new RangeError('one positive size per space axis is needed');
  const unknowns = sizes.reduce((n, size) => n * size, 1) * fields.length;
  const modulo = (p: number): number => {
    const field = new PrimeField(p);
    const echelon = new ModularEchelon(unknowns, field);
    const weights = (form: LinearForm) => torusTerms(form, axes, fields, (w) => residue(w, field));
    for (const form of forms)
      for (const row of translates(weights(form), sizes, fields.length)) echelon.add(row);
    return echelon.rank;
  };
  const isRational = forms.every((form) =>
    [...form.values()].every((d) => d.terms.every((t) => t.weight.asRational)),
  );
  const isExact = isRational && unknowns <= MOST_EXACT_UNKNOWNS;
  const fullRank = isExact
    ? exactRank(forms, axes, fields, sizes, unknowns)
    : Math.max(...PRIMES.map(modulo));
  const isIntegral = forms.every((form) =>
    [...form.values()].every((d) => d.terms.every((t) => t.weight.asRational?.isInteger)),
  );
  const torsionPrimes = (isIntegral && torsion ? SMALL_PRIMES : [])
    .map((prime) => ({ prime, factors: fullRank - modulo(prime) }))
    .filter((t) => t.factors > 0);
  return { free: unknowns - fullRank, torsionPrimes, method: isExact ? 'exact' : 'two primes' };
}

interface TorusTerm<W> {
  readonly field: number;
  readonly step: readonly number[];
  readonly weight: W;
}

/** The terms of a form with T_tau → 1. */
function torusTerms<W>(
  form: LinearForm,
  axes: readonly number[],
  fields: readonly Field[],
  weight: (w: Coefficient) => W,
): TorusTerm<W>[] {
  return fields.flatMap(({ name }, field) =>
    (form.get(name)?.terms ?? []).map((t) => ({
      field,
      step: axes.map((k) => t.exponents[k]!),
      weight: weight(t.weight),
    })),
  );
}

/** One row per site of the torus; columns may repeat where the stencil meets itself around the torus. */
function* translates<W>(
  terms: readonly TorusTerm<W>[],
  sizes: readonly number[],
  fields: number,
): Generator<{ columns: number[]; values: W[] }> {
  const values = terms.map((t) => t.weight);
  const sites = sizes.reduce<number[][]>(
    (all, size) => all.flatMap((s) => Array.from({ length: size }, (_, i) => [...s, i])),
    [[]],
  );
  for (const site of sites) {
    const columns = terms.map(({ field, step }) => {
      const at = sizes.reduce((n, size, k) => n * size + ((((site[k]! + step[k]!) % size) + size) % size), 0);
      return at * fields + field;
    });
    yield { columns, values };
  }
}

function exactRank(
  forms: readonly LinearForm[],
  axes: readonly number[],
  fields: readonly Field[],
  sizes: readonly number[],
  unknowns: number,
): number {
  const rows: Rational[][] = [];
  for (const form of forms)
    for (const row of translates(
      torusTerms(form, axes, fields, (w) => w.asRational!),
      sizes,
      fields.length,
    )) {
      const dense = new Array<Rational>(unknowns).fill(Rational.zero);
      row.columns.forEach((c, i) => {
        dense[c] = dense[c]!.add(row.values[i]!);
      });
      if (dense.some((x) => !x.isZero)) rows.push(dense);
    }
  return rank(rows, unknowns);
}
