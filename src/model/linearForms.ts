// The linear forms on which an action depends. A shift of the fields leaves the action as it is if it annihilates all of
// them, so the list must not be longer than necessary: a polynomial part P(u_1..u_m) depends only on the annihilator of its
// lineality space {w : P(u + s w) = P(u)}, e.g. (u_1 + u_2)² on u_1 + u_2 alone.

import { Coefficient } from '../exact/coefficient.ts';
import type { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { Expression, LinearForm } from './action.ts';

/** The essential linear forms of an expression, without repetition. Forms that enter only linearly and sum to zero over the
 *  lattice (total differences) are left out. */
export function linearForms(expression: Expression): LinearForm[] {
  const parts = expression.kind === 'sum' ? expression.terms : [expression];
  const polynomial = parts.filter(isPolynomial);
  const others = parts.filter((p) => !isPolynomial(p));
  const forms = [...polynomialForms(polynomial), ...others.flatMap(argumentForms)];
  return forms.filter((f, i) => f.size > 0 && forms.findIndex((g) => sameForm(f, g)) === i);
}

function isPolynomial(e: Expression): boolean {
  switch (e.kind) {
    case 'constant':
    case 'linear':
      return true;
    case 'sum':
      return e.terms.every(isPolynomial);
    case 'product':
      return e.factors.every(isPolynomial);
    case 'power':
      return e.exponent >= 0 && isPolynomial(e.base);
    case 'function':
      return false;
  }
}

/** All forms as they stand, through functions, products and powers. */
function argumentForms(e: Expression): LinearForm[] {
  switch (e.kind) {
    case 'constant':
      return [];
    case 'linear':
      return [e.form];
    case 'sum':
      // A sum inside a product or a function may still hold polynomial parts with fewer forms.
      return linearForms(e);
    case 'product':
      return e.factors.flatMap(argumentForms);
    case 'power':
      return argumentForms(e.base);
    case 'function':
      return argumentForms(e.argument);
  }
}

function sameForm(x: LinearForm, y: LinearForm): boolean {
  return x.size === y.size && [...x].every(([name, p]) => y.get(name)?.equals(p) ?? false);
}

/** Exponents of u_1..u_m → coefficient. */
type Polynomial = Map<string, { exponents: number[]; weight: Coefficient }>;

/** Highest number of forms in one polynomial for which the minimal set is worked out. */
const MOST_FORMS = 12;

function polynomialForms(parts: readonly Expression[]): LinearForm[] {
  const all: LinearForm[] = [];
  for (const form of parts.flatMap(allForms)) if (!all.some((g) => sameForm(form, g))) all.push(form);
  if (all.length > MOST_FORMS) return all;
  const expanded: Polynomial = new Map();
  for (const p of parts) for (const t of expand(p, all).values()) addTo(expanded, t.exponents, t.weight);
  for (const [key, t] of expanded) {
    const degree = t.exponents.reduce((x, y) => x + y, 0);
    if (degree === 0 || (degree === 1 && isTotalDifference(all[t.exponents.indexOf(1)]!)))
      expanded.delete(key);
  }
  return essential(expanded, all);
}

function allForms(e: Expression): LinearForm[] {
  switch (e.kind) {
    case 'linear':
      return [e.form];
    case 'sum':
      return e.terms.flatMap(allForms);
    case 'product':
      return e.factors.flatMap(allForms);
    case 'power':
      return allForms(e.base);
    default:
      return [];
  }
}

/** True when the weights of every operator add up to zero: summed over the lattice the form vanishes. */
const isTotalDifference = (form: LinearForm): boolean =>
  [...form.values()].every((p) => p.terms.reduce((s, t) => s.add(t.weight), Coefficient.zero).isZero);

function addTo(p: Polynomial, exponents: number[], weight: Coefficient): void {
  const key = exponents.join(',');
  const sum = p.get(key)?.weight.add(weight) ?? weight;
  if (sum.isZero) p.delete(key);
  else p.set(key, { exponents, weight: sum });
}

function multiply(x: Polynomial, y: Polynomial): Polynomial {
  const out: Polynomial = new Map();
  for (const s of x.values())
    for (const t of y.values())
      addTo(
        out,
        s.exponents.map((n, i) => n + t.exponents[i]!),
        s.weight.mul(t.weight),
      );
  return out;
}

function expand(e: Expression, forms: readonly LinearForm[]): Polynomial {
  const unit = (i: number): number[] => forms.map((_, k) => (k === i ? 1 : 0));
  const out: Polynomial = new Map();
  switch (e.kind) {
    case 'constant':
      addTo(out, unit(-1), e.value);
      return out;
    case 'linear':
      addTo(out, unit(forms.findIndex((f) => sameForm(f, e.form))), Coefficient.one);
      return out;
    case 'sum':
      for (const t of e.terms)
        for (const { exponents, weight } of expand(t, forms).values()) addTo(out, exponents, weight);
      return out;
    case 'product':
      return e.factors.map((f) => expand(f, forms)).reduce(multiply);
    case 'power': {
      const base = expand(e.base, forms);
      addTo(out, unit(-1), Coefficient.one);
      return Array.from({ length: e.exponent }, () => base).reduce(multiply, out);
    }
    case 'function':
      throw new Error('a function is no polynomial');
  }
}

/** Basis of the annihilator of the lineality space: the rows w ↦ Σ_i w_i ∂P/∂u_i, one for each monomial and each power
 *  product of parameters, reduced over Q. */
function essential(p: Polynomial, forms: readonly LinearForm[]): LinearForm[] {
  const rows = new Map<string, Rational[]>();
  for (const { exponents, weight } of p.values())
    for (const [i, n] of exponents.entries()) {
      if (n === 0) continue;
      const lowered = exponents.map((m, k) => (k === i ? m - 1 : m)).join(',');
      for (const term of weight.terms) {
        const key = `${lowered}|${term.key}`;
        const row = rows.get(key) ?? forms.map(() => Rational.zero);
        row[i] = row[i]!.add(term.factor.mul(rational(n)));
        rows.set(key, row);
      }
    }
  return independentRows([...rows.values()]).map((row) => combine(row, forms));
}

/** Reduced echelon rows of a rational matrix. */
function independentRows(rows: readonly Rational[][]): Rational[][] {
  const basis: { pivot: number; row: Rational[] }[] = [];
  const minus = (row: Rational[], other: Rational[], by: Rational): Rational[] =>
    by.isZero ? row : row.map((x, i) => x.sub(other[i]!.mul(by)));
  for (const original of rows) {
    const row = basis.reduce((r, b) => minus(r, b.row, r[b.pivot]!), original);
    const pivot = row.findIndex((x) => !x.isZero);
    if (pivot < 0) continue;
    const scaled = row.map((x) => x.div(row[pivot]!));
    for (const b of basis) b.row = minus(b.row, scaled, b.row[pivot]!);
    basis.push({ pivot, row: scaled });
  }
  return basis.sort((x, y) => x.pivot - y.pivot).map((b) => b.row);
}

function combine(row: readonly Rational[], forms: readonly LinearForm[]): LinearForm {
  const out = new Map<string, LaurentPolynomial>();
  for (const [i, factor] of row.entries()) {
    if (factor.isZero) continue;
    for (const [name, operator] of forms[i]!) {
      const scaled = operator.scale(Coefficient.rational(factor));
      out.set(name, out.get(name)?.add(scaled) ?? scaled);
    }
  }
  for (const [name, operator] of out) if (operator.isZero) out.delete(name);
  return out;
}
