// Expressions put together so that equal ones look alike: constants are folded, linear forms merged, like terms collected,
// products and powers flattened.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import type { FunctionName } from '../notation/tree.ts';
import type { Expression, LinearForm } from './action.ts';
import { boundedCoefficientPower, boundedOperatorProduct, boundedProduct } from './bounds.ts';

/** A constant as an expression. */
export const constantOf = (value: Coefficient): Expression => ({ kind: 'constant', value });

/** The linear form with every operator replaced; operators that vanish are left out. */
function mapOperators(form: LinearForm, map: (p: LaurentPolynomial) => LaurentPolynomial): LinearForm {
  return new Map([...form].map(([name, p]) => [name, map(p)] as const).filter(([, p]) => !p.isZero));
}

const linearOrZero = (form: LinearForm): Expression =>
  form.size === 0 ? constantOf(Coefficient.zero) : { kind: 'linear', form };

/** Operator times linear form. Throws RangeError when it grows too large. */
export const composed = (operator: LaurentPolynomial, form: LinearForm): Expression =>
  linearOrZero(mapOperators(form, (p) => boundedOperatorProduct(p, operator)));

/** Canonical name of an expression: equal names mean equal expressions. */
function keyOf(e: Expression): string {
  switch (e.kind) {
    case 'constant':
      return coefficientKey(e.value);
    case 'linear': {
      const parts = [...e.form].map(([name, p]) => `${name}:${p.terms.map(operatorTermKey).join('&')}`);
      return `<${parts.sort().join(' ')}>`;
    }
    case 'sum':
      return `(${e.terms.map(keyOf).sort().join('+')})`;
    case 'product':
      return `(${e.factors.map(keyOf).sort().join('*')})`;
    case 'power':
      return `${keyOf(e.base)}^${e.exponent}`;
    case 'function':
      return `${e.name}[${keyOf(e.argument)}]`;
  }
}

const coefficientKey = (c: Coefficient): string =>
  `{${c.terms.map((t) => `${t.factor}·${t.key}`).join(';')}}`;
const operatorTermKey = (t: LaurentPolynomial['terms'][number]): string =>
  `${t.exponents.join(',')}${coefficientKey(t.weight)}`;

/** A term as constant × rest. */
function splitConstant(e: Expression): { weight: Coefficient; rest: Expression } {
  if (e.kind !== 'product') return { weight: Coefficient.one, rest: e };
  const [first, ...others] = e.factors;
  if (first?.kind !== 'constant') return { weight: Coefficient.one, rest: e };
  return {
    weight: first.value,
    rest: others.length === 1 ? others[0]! : { kind: 'product', factors: others },
  };
}

/** The terms of a sum, or of a constant times a sum. */
function summands(e: Expression): readonly Expression[] {
  if (e.kind === 'sum') return e.terms;
  const { weight, rest } = splitConstant(e);
  return rest.kind === 'sum' ? rest.terms.map((t) => productOf([constantOf(weight), t])) : [e];
}

/** Sum with constants added up, linear forms merged and like terms collected. Throws RangeError as productOf does. */
export function sumOf(terms: readonly Expression[]): Expression {
  let constant = Coefficient.zero;
  const linear = new Map<string, LaurentPolynomial>();
  const others = new Map<string, { weight: Coefficient; rest: Expression }>();
  for (const t of terms.flatMap(summands)) {
    if (t.kind === 'constant') constant = constant.add(t.value);
    else if (t.kind === 'linear')
      for (const [name, p] of t.form) linear.set(name, linear.get(name)?.add(p) ?? p);
    else {
      const { weight, rest } = splitConstant(t);
      const key = keyOf(rest);
      const old = others.get(key);
      others.set(key, { weight: old ? old.weight.add(weight) : weight, rest });
    }
  }
  const form = mapOperators(linear, (p) => p);
  const out: Expression[] = constant.isZero ? [] : [constantOf(constant)];
  for (const { weight, rest } of others.values())
    if (!weight.isZero) out.push(productOf([constantOf(weight), rest]));
  if (form.size > 0) out.push({ kind: 'linear', form });
  if (out.length === 0) return constantOf(Coefficient.zero);
  return out.length === 1 ? out[0]! : { kind: 'sum', terms: out };
}

/** Product with constants multiplied into one, into a linear form that stands alone, and equal factors made a power.
 *  Throws RangeError when a constant grows too large. */
export function productOf(factors: readonly Expression[]): Expression {
  let constant = Coefficient.one;
  const powers = new Map<string, { base: Expression; exponent: number }>();
  for (const f of factors.flatMap((x) => (x.kind === 'product' ? x.factors : [x]))) {
    if (f.kind === 'constant') {
      constant = boundedProduct(constant, f.value);
      continue;
    }
    const { base, exponent } = f.kind === 'power' ? f : { base: f, exponent: 1 };
    const key = keyOf(base);
    powers.set(key, { base, exponent: (powers.get(key)?.exponent ?? 0) + exponent });
  }
  if (constant.isZero) return constantOf(constant);
  const others = [...powers.values()].flatMap(({ base, exponent }): Expression[] => {
    if (exponent === 0) return [];
    return [exponent === 1 ? base : { kind: 'power', base, exponent }];
  });
  const [only] = others;
  if (only === undefined) return constantOf(constant);
  if (others.length === 1 && only.kind === 'linear')
    return linearOrZero(
      mapOperators(only.form, (p) =>
        boundedOperatorProduct(p, LaurentPolynomial.constant(p.dimension, constant)),
      ),
    );
  const all = constant.isOne ? others : [constantOf(constant), ...others];
  return all.length === 1 ? all[0]! : { kind: 'product', factors: all };
}

/** Integer power, taken into products and powers. Throws RangeError for a negative power of a constant that
 *  has none, and when a constant grows too large. */
export function powerOf(base: Expression, exponent: number): Expression {
  if (exponent === 0) return constantOf(Coefficient.one);
  if (exponent === 1) return base;
  switch (base.kind) {
    case 'constant':
      return constantOf(boundedCoefficientPower(base.value, exponent));
    case 'product':
      return productOf(base.factors.map((f) => powerOf(f, exponent)));
    case 'power':
      return powerOf(base.base, base.exponent * exponent);
    case 'function':
      // sqrt(u)^2 is u wherever the root exists
      if (base.name === 'sqrt' && exponent % 2 === 0) return powerOf(base.argument, exponent / 2);
      return { kind: 'power', base, exponent };
    default:
      return { kind: 'power', base, exponent };
  }
}

/** The expression with all its fields moved: T F(u) = F(T u). */
export function shifted(e: Expression, shift: LaurentPolynomial): Expression {
  const recurse = (x: Expression): Expression => shifted(x, shift);
  switch (e.kind) {
    case 'constant':
      return e;
    case 'linear':
      return composed(shift, e.form);
    case 'sum':
      return { kind: 'sum', terms: e.terms.map(recurse) };
    case 'product':
      return { kind: 'product', factors: e.factors.map(recurse) };
    case 'power':
      return { ...e, base: recurse(e.base) };
    case 'function':
      return { ...e, argument: recurse(e.argument) };
  }
}

/** All linear forms as they stand, through sums, products, powers and functions. */
export function formsOf(e: Expression): LinearForm[] {
  switch (e.kind) {
    case 'constant':
      return [];
    case 'linear':
      return [e.form];
    case 'sum':
      return e.terms.flatMap(formsOf);
    case 'product':
      return e.factors.flatMap(formsOf);
    case 'power':
      return formsOf(e.base);
    case 'function':
      return formsOf(e.argument);
  }
}

/** Number of constants, functions, powers and stencil terms in an expression. */
export function partCount(e: Expression): number {
  switch (e.kind) {
    case 'constant':
      return 1;
    case 'linear':
      return [...e.form.values()].reduce((n, p) => n + p.terms.length, 0);
    case 'sum':
      return e.terms.reduce((n, t) => n + partCount(t), 0);
    case 'product':
      return e.factors.reduce((n, f) => n + partCount(f), 0);
    case 'power':
      return 1 + partCount(e.base);
    case 'function':
      return 1 + partCount(e.argument);
  }
}

/** Largest exponent of a power in the expression, in size. */
export function highestPower(e: Expression): number {
  switch (e.kind) {
    case 'constant':
    case 'linear':
      return 1;
    case 'sum':
      return Math.max(...e.terms.map(highestPower));
    case 'product':
      return Math.max(...e.factors.map(highestPower));
    case 'power':
      return Math.max(Math.abs(e.exponent), highestPower(e.base));
    case 'function':
      return highestPower(e.argument);
  }
}

/** Value where every field is a constant, given the value of each linear form; undefined where it is not exact.
 *  @param at value of a function at a constant */
export function valueOnConstants(
  e: Expression,
  formValue: (form: LinearForm) => Coefficient,
  at: (name: FunctionName, point: Coefficient) => Coefficient | undefined,
): Coefficient | undefined {
  const all = (parts: readonly Expression[]): Coefficient[] | undefined => {
    const values = parts.map((p) => valueOnConstants(p, formValue, at));
    return values.every((v) => v !== undefined) ? values : undefined;
  };
  switch (e.kind) {
    case 'constant':
      return e.value;
    case 'linear':
      return formValue(e.form);
    case 'sum':
      return all(e.terms)?.reduce((x, y) => x.add(y));
    case 'product': {
      const values = e.factors.map((f) => valueOnConstants(f, formValue, at));
      if (values.some((v) => v?.isZero)) return Coefficient.zero;
      return all(e.factors)?.reduce((x, y) => x.mul(y));
    }
    case 'power': {
      const [base] = all([e.base]) ?? [];
      if (!base || (e.exponent < 0 && !base.asMonomial)) return undefined;
      return boundedCoefficientPower(base, e.exponent);
    }
    case 'function': {
      const [point] = all([e.argument]) ?? [];
      return point && at(e.name, point);
    }
  }
}
