// The linear forms on which an action depends. A shift of the fields leaves the action as it is if it annihilates all of
// them, so the list must not be longer than necessary: a polynomial part P(u_1..u_m) depends only on the annihilator of its
// lineality space {w : P(u + s w) = P(u) for all u, s}, e.g. (u_1 + u_2)² on u_1 + u_2 alone.

import { Coefficient } from '../exact/coefficient.ts';
import type { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { reducedEchelon } from '../exact/matrix.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { Expression, LinearForm } from './action.ts';
import { formsOf } from './expression.ts';

/** The essential linear forms of an expression, without repetition. What enters the action only linearly and sums or
 *  integrates to zero (a total difference on the lattice, a total derivative in the continuum) is left out.
 *
 *  The list is minimal over the rational numbers; weights with parameters count as independent of each other, and a
 *  polynomial with very many monomials keeps its forms as they stand. */
export function linearForms(expression: Expression, kind: 'lattice' | 'continuum' = 'lattice'): LinearForm[] {
  return withoutRepetition(formsOfSum(distributed(expression, Coefficient.one), kind));
}

function withoutRepetition(forms: readonly LinearForm[]): LinearForm[] {
  return forms.filter((f, i) => f.size > 0 && forms.findIndex((g) => sameForm(f, g)) === i);
}

const sameForm = (x: LinearForm, y: LinearForm): boolean =>
  x.size === y.size && [...x].every(([name, p]) => y.get(name)?.equals(p) ?? false);

/** The terms of an expression with constant factors multiplied in. */
function distributed(e: Expression, weight: Coefficient): Expression[] {
  if (e.kind === 'sum') return e.terms.flatMap((t) => distributed(t, weight));
  const [first, second, ...more] = e.kind === 'product' ? e.factors : [];
  if (first?.kind === 'constant' && second)
    return distributed(
      more.length === 0 ? second : { kind: 'product', factors: [second, ...more] },
      weight.mul(first.value),
    );
  if (weight.isOne) return [e];
  return [{ kind: 'product', factors: [{ kind: 'constant', value: weight }, e] }];
}

/** Forms of a sum of terms. Only at the top of an action (`kind` given) may total differences be left out. */
function formsOfSum(terms: readonly Expression[], kind: 'lattice' | 'continuum' | undefined): LinearForm[] {
  const polynomial = terms.filter(isPolynomial);
  const others = terms.filter((t) => !isPolynomial(t));
  return [...polynomialForms(polynomial, kind), ...others.flatMap(formsInside)];
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

/** Forms inside products, negative powers and functions: there nothing sums to zero on its own. */
function formsInside(e: Expression): LinearForm[] {
  switch (e.kind) {
    case 'constant':
      return [];
    case 'linear':
      return [e.form];
    case 'sum':
      return formsOfSum(distributed(e, Coefficient.one), undefined);
    case 'product':
      return e.factors.flatMap(formsInside);
    case 'power':
      return formsInside(e.base);
    case 'function':
      return formsInside(e.argument);
  }
}

/** Exponents of u_1..u_m → weight, by name of the exponents. */
type Polynomial = Map<string, { readonly exponents: readonly number[]; readonly weight: Coefficient }>;

/** Most monomials of a polynomial for which the minimal set is worked out, and most products on the way to them. */
const MOST_MONOMIALS = 2000;
const MOST_PRODUCTS = 100_000;

/** The polynomial has more monomials than are worked out. */
class TooLarge extends Error {}

function polynomialForms(
  terms: readonly Expression[],
  kind: 'lattice' | 'continuum' | undefined,
): LinearForm[] {
  const all = withoutRepetition(terms.flatMap(formsOf));
  try {
    const variables = independent(all);
    const polynomial = expanded(terms, variables);
    polynomial.delete(new Array(variables.forms.length).fill(0).join(','));
    if (kind) dropTotal(polynomial, variables.forms, kind);
    return essential(polynomial, variables.forms);
  } catch (error) {
    if (!(error instanceof TooLarge)) throw error;
    return all;
  }
}

/** Linearly independent forms u_i over Q, and every form as a combination of them. */
interface Variables {
  readonly forms: readonly LinearForm[];
  readonly combination: (form: LinearForm) => readonly Rational[];
}

function independent(all: readonly LinearForm[]): Variables {
  // One row for each site and power product of parameters, one column for each form.
  const rows = new Map<string, Rational[]>();
  for (const [column, form] of all.entries())
    for (const [name, operator] of form)
      for (const { exponents, weight } of operator.terms)
        for (const { factor, key } of weight.terms) {
          const place = `${name}|${exponents.join(',')}|${key}`;
          const row = rows.get(place) ?? all.map(() => Rational.zero);
          row[column] = factor;
          rows.set(place, row);
        }
  const echelon = reducedEchelon([...rows.values()], all.length);
  return {
    forms: echelon.pivots.map((column) => all[column]!),
    combination: (form) => {
      const column = all.findIndex((f) => sameForm(f, form));
      return echelon.rows.map((row) => row[column]!);
    },
  };
}

function addTo(p: Polynomial, exponents: readonly number[], weight: Coefficient): void {
  const key = exponents.join(',');
  const sum = p.get(key)?.weight.add(weight) ?? weight;
  if (sum.isZero) p.delete(key);
  else p.set(key, { exponents, weight: sum });
  if (p.size > MOST_MONOMIALS) throw new TooLarge();
}

function multiply(x: Polynomial, y: Polynomial): Polynomial {
  if (x.size * y.size > MOST_PRODUCTS) throw new TooLarge();
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

/** A sum of polynomial terms in the variables u_i. */
function expanded(terms: readonly Expression[], variables: Variables): Polynomial {
  const exponentsOf = (variable: number): number[] => variables.forms.map((_, k) => (k === variable ? 1 : 0));
  const constant = (value: Coefficient): Polynomial => {
    const out: Polynomial = new Map();
    addTo(out, exponentsOf(-1), value);
    return out;
  };
  const recurse = (e: Expression): Polynomial => {
    switch (e.kind) {
      case 'constant':
        return constant(e.value);
      case 'linear': {
        const out: Polynomial = new Map();
        for (const [i, factor] of variables.combination(e.form).entries())
          addTo(out, exponentsOf(i), Coefficient.rational(factor));
        return out;
      }
      case 'sum':
        return expanded(e.terms, variables);
      case 'product':
        return e.factors.map(recurse).reduce(multiply);
      case 'power': {
        const base = recurse(e.base);
        return Array.from({ length: e.exponent }, () => base).reduce(multiply, constant(Coefficient.one));
      }
      case 'function':
        throw new Error('a function is no polynomial');
    }
  };
  const out: Polynomial = new Map();
  for (const t of terms)
    for (const { exponents, weight } of recurse(t).values()) addTo(out, exponents, weight);
  return out;
}

const degreeOf = (exponents: readonly number[]): number => exponents.reduce((sum, n) => sum + n, 0);

/** Leaves the linear part out when it sums to zero over the lattice or integrates to zero over space and time. */
function dropTotal(p: Polynomial, forms: readonly LinearForm[], kind: 'lattice' | 'continuum'): void {
  const linear = [...p.values()].filter((t) => degreeOf(t.exponents) === 1);
  const form = combined(linear.map((t) => [t.weight, forms[t.exponents.indexOf(1)]!]));
  if ([...form.values()].every((operator) => valueOnConstant(operator, kind).isZero))
    for (const t of linear) p.delete(t.exponents.join(','));
}

/** What an operator makes of the constant 1: zero for a total difference or derivative. */
function valueOnConstant(operator: LaurentPolynomial, kind: 'lattice' | 'continuum'): Coefficient {
  const terms =
    kind === 'lattice' ? operator.terms : operator.terms.filter((t) => t.exponents.every((n) => n === 0));
  return terms.reduce((sum, t) => sum.add(t.weight), Coefficient.zero);
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
  const { rows: basis } = reducedEchelon([...rows.values()], forms.length);
  return basis.map((row) => combined(row.map((factor, i) => [Coefficient.rational(factor), forms[i]!])));
}

/** Σ weight × form, without zero operators. */
function combined(terms: readonly (readonly [weight: Coefficient, form: LinearForm])[]): LinearForm {
  const out = new Map<string, LaurentPolynomial>();
  for (const [weight, form] of terms) {
    if (weight.isZero) continue;
    for (const [name, operator] of form) {
      const scaled = operator.scale(weight);
      out.set(name, out.get(name)?.add(scaled) ?? scaled);
    }
  }
  for (const [name, operator] of out) if (operator.isZero) out.delete(name);
  return out;
}
