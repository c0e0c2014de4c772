// Linear forms of the fields as lists of weighted sites: what stands inside a cosine or an exponential of a lattice action.

import type { Coefficient } from '../exact/coefficient.ts';
import { compareExponents } from '../exact/laurentPolynomial.ts';
import type { LinearForm } from './action.ts';

/** A place of the lattice in lattice units, one entry per axis. */
export type Offset = readonly number[];

/** Σ weight · field(r + offset), sorted by offset and field; no zero weights, every site of a field once. */
export type SiteForm = readonly {
  readonly field: string;
  readonly offset: Offset;
  readonly weight: Coefficient;
}[];

/** The sites of a linear form in the shift operators. */
export const siteForm = (form: LinearForm): SiteForm =>
  sortForm(
    [...form].flatMap(([field, stencil]) =>
      stencil.terms.map(({ exponents, weight }) => ({ field, offset: exponents, weight })),
    ),
  );

/** The same form with its sites in order. */
export function sortForm(terms: SiteForm): SiteForm {
  return [...terms].sort(
    (x, y) => compareExponents(x.offset, y.offset) || (x.field < y.field ? -1 : x.field > y.field ? 1 : 0),
  );
}

export const negated = (form: SiteForm): SiteForm => form.map((t) => ({ ...t, weight: t.weight.neg() }));

export function addForms(x: SiteForm, y: SiteForm): SiteForm {
  const out = new Map<string, SiteForm[number]>();
  for (const t of [...x, ...y]) {
    const key = `${t.field}:${t.offset.join(',')}`;
    const old = out.get(key);
    const weight = old ? old.weight.add(t.weight) : t.weight;
    if (weight.isZero) out.delete(key);
    else out.set(key, { ...t, weight });
  }
  return sortForm([...out.values()]);
}

/** True when the first weight has a negative leading term: of u and −u, exactly one has. */
export const startsNegative = (form: SiteForm): boolean => form[0]!.weight.terms[0]!.factor.sign < 0;
