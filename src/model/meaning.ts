// From the tree of a string to its meaning in a case: exact constants, operators, and expressions in linear forms of the
// fields. Constants are folded and linear forms merged on the way, so that equal expressions look alike.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { Quotient } from '../exact/quotient.ts';
import { type Rational, rational } from '../exact/rational.ts';
import { NotationError } from '../notation/source.ts';
import { FUNCTION_NAMES, type FunctionName, rationalValue, type Span, type Tree } from '../notation/tree.ts';
import type { Expression, LinearForm } from './action.ts';
import { type Names, unknownFunction, unknownName } from './names.ts';
import { elementaryOperator } from './stencil.ts';

/** Largest integer power that is read; larger ones would only exhaust memory. */
const HIGHEST_POWER = 24;

/** Runs exact arithmetic and turns what it cannot do into an error at the place. */
function exactly<T>(span: Span, compute: () => T): T {
  try {
    return compute();
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    throw new NotationError(error.message, 'rewrite the expression so that it stays exact', span.start);
  }
}

/** A field-free expression: declared constants, pi, square roots, rational powers. Throws NotationError. */
export function readQuotient(tree: Tree, names: Names): Quotient {
  const recurse = (t: Tree): Quotient => readQuotient(t, names);
  switch (tree.kind) {
    case 'number':
      return Quotient.of(Coefficient.rational(tree.value));
    case 'symbol':
      if (tree.name !== 'pi' && !names.constants.has(tree.name)) {
        if (names.fields.includes(tree.name))
          throw new NotationError(
            `the field "${tree.name}" stands where a constant belongs`,
            'use parameters and spacings only',
            tree.span.start,
          );
        throw unknownName(tree.name, tree.span, names);
      }
      return Quotient.of(Coefficient.symbol(tree.name));
    case 'sum':
      return tree.terms.map(recurse).reduce((x, y) => x.add(y));
    case 'negate':
      return recurse(tree.operand).neg();
    case 'product':
      return tree.factors.map(recurse).reduce((x, y) => x.mul(y));
    case 'quotient': {
      const denominator = recurse(tree.denominator);
      if (denominator.isZero)
        throw new NotationError(
          'the denominator is zero',
          'divide by something else',
          tree.denominator.span.start,
        );
      return recurse(tree.numerator).div(denominator);
    }
    case 'power': {
      const base = recurse(tree.base);
      const exponent = exponentOf(tree.exponent);
      if (base.isZero && exponent.sign < 0)
        throw new NotationError(
          'zero has no negative power',
          'correct the base or the exponent',
          tree.base.span.start,
        );
      return exactly(tree.span, () => base.pow(exponent));
    }
    case 'call':
      if (tree.name === 'sqrt') {
        const argument = recurse(onlyArgument(tree));
        return exactly(tree.span, () => argument.pow(rational(1, 2)));
      }
      if (!(FUNCTION_NAMES as readonly string[]).includes(tree.name))
        throw unknownFunction(tree.name, tree.span, names);
      return Quotient.of(functionOfConstant(tree, recurse(onlyArgument(tree))));
    case 'operator':
    case 'apply':
      throw new NotationError(
        'an operator stands where a constant belongs',
        'use parameters and spacings only',
        tree.span.start,
      );
  }
}

type Call = Extract<Tree, { kind: 'call' }>;

function onlyArgument(tree: Call): Tree {
  const [argument] = tree.args;
  if (tree.args.length !== 1 || !argument)
    throw new NotationError(
      `${tree.name} has one argument`,
      `write ${tree.name}(…) with one`,
      tree.span.start,
    );
  return argument;
}

/** Values that stay exact: functions at 0, log at 1. */
function functionOfConstant(tree: Call, argument: Quotient): Coefficient {
  if (argument.isZero && tree.name !== 'log')
    return ['cos', 'exp', 'cosh'].includes(tree.name) ? Coefficient.one : Coefficient.zero;
  if (tree.name === 'log' && argument.asCoefficient?.isOne) return Coefficient.zero;
  throw new NotationError(
    `${tree.name} of a constant has no exact value here`,
    'declare a parameter for it',
    tree.span.start,
  );
}

function exponentOf(tree: Tree): Rational {
  const value = rationalValue(tree);
  if (!value)
    throw new NotationError(
      'an exponent must be a rational number',
      'write e.g. 2, -1 or (1/2)',
      tree.span.start,
    );
  if (value.abs().compare(rational(HIGHEST_POWER)) > 0)
    throw new NotationError(
      `the exponent ${value} is beyond ${HIGHEST_POWER}`,
      'use a smaller one',
      tree.span.start,
    );
  return value;
}

function readCoefficient(tree: Tree, names: Names): Coefficient {
  const value = readQuotient(tree, names).asCoefficient;
  if (!value)
    throw new NotationError(
      'this divides by a sum of parameters',
      'declare a parameter for the quotient',
      tree.span.start,
    );
  return value;
}

/** An operator-valued tree; a constant is a multiple of the identity. Throws NotationError. */
export function readOperatorValue(tree: Tree, names: Names): LaurentPolynomial {
  const dimension = names.axes.length;
  const recurse = (t: Tree): LaurentPolynomial => readOperatorValue(t, names);
  if (!holdsOperator(tree)) return LaurentPolynomial.constant(dimension, readCoefficient(tree, names));
  switch (tree.kind) {
    case 'operator': {
      const axis = names.axes.indexOf(tree.axis);
      if (axis < 0)
        throw new NotationError(
          `"${tree.axis}" is not an axis`,
          `the axes are ${names.axes.join(', ')}`,
          tree.span.start,
        );
      if (tree.name === 'd' && names.kind === 'lattice')
        throw new NotationError(
          `the derivative d_${tree.axis} stands in a lattice action`,
          `write a difference, e.g. Delta_${tree.axis}`,
          tree.span.start,
        );
      if (tree.name !== 'd' && names.kind === 'continuum')
        throw new NotationError(
          `the lattice operator ${tree.name}_${tree.axis} stands in a continuum Lagrangian`,
          `write the derivative d_${tree.axis}`,
          tree.span.start,
        );
      return elementaryOperator(tree.name, axis, dimension);
    }
    case 'sum':
      return tree.terms.map(recurse).reduce((x, y) => x.add(y));
    case 'negate':
      return recurse(tree.operand).neg();
    case 'product':
      return tree.factors.map(recurse).reduce((x, y) => x.mul(y));
    case 'quotient': {
      const divisor = readCoefficient(tree.denominator, names);
      if (divisor.isZero)
        throw new NotationError(
          'the denominator is zero',
          'divide by something else',
          tree.denominator.span.start,
        );
      return exactly(tree.span, () => recurse(tree.numerator).scale(Coefficient.one.div(divisor)));
    }
    case 'power': {
      const exponent = exponentOf(tree.exponent);
      if (!exponent.isInteger || (exponent.sign < 0 && names.kind === 'continuum'))
        throw new NotationError(
          `an operator has no power ${exponent}`,
          'use a whole number',
          tree.exponent.span.start,
        );
      return exactly(tree.span, () => recurse(tree.base).pow(Number(exponent.num)));
    }
    default:
      throw new NotationError('this is not an operator', 'write operators and numbers only', tree.span.start);
  }
}

function holdsOperator(tree: Tree): boolean {
  switch (tree.kind) {
    case 'operator':
      return true;
    case 'sum':
      return tree.terms.some(holdsOperator);
    case 'product':
      return tree.factors.some(holdsOperator);
    case 'negate':
      return holdsOperator(tree.operand);
    case 'quotient':
      return holdsOperator(tree.numerator);
    case 'power':
      return holdsOperator(tree.base);
    default:
      return false;
  }
}

/** An expression in the fields. Throws NotationError. */
export function readExpression(tree: Tree, names: Names): Expression {
  const recurse = (t: Tree): Expression => readExpression(t, names);
  if (!holdsField(tree, names)) return { kind: 'constant', value: readCoefficient(tree, names) };
  switch (tree.kind) {
    case 'symbol': {
      const identity = LaurentPolynomial.constant(names.axes.length, Coefficient.one);
      return { kind: 'linear', form: new Map([[tree.name, identity]]) };
    }
    case 'apply':
      return applyOperator(tree, names);
    case 'sum':
      return sumOf(tree.terms.map(recurse));
    case 'negate':
      return productOf([minusOne, recurse(tree.operand)]);
    case 'product':
      return productOf(tree.factors.map(recurse));
    case 'quotient': {
      const denominator = recurse(tree.denominator);
      if (denominator.kind !== 'constant')
        return productOf([recurse(tree.numerator), { kind: 'power', base: denominator, exponent: -1 }]);
      if (denominator.value.isZero)
        throw new NotationError(
          'the denominator is zero',
          'divide by something else',
          tree.denominator.span.start,
        );
      const inverse = exactly(tree.denominator.span, () => Coefficient.one.div(denominator.value));
      return productOf([recurse(tree.numerator), { kind: 'constant', value: inverse }]);
    }
    case 'power':
      return powerOf(tree, names);
    case 'call': {
      if (!(FUNCTION_NAMES as readonly string[]).includes(tree.name))
        throw unknownFunction(tree.name, tree.span, names);
      return { kind: 'function', name: tree.name as FunctionName, argument: recurse(onlyArgument(tree)) };
    }
    case 'number':
    case 'operator':
      throw new NotationError(
        'an operator has nothing to act on',
        'write the field after it',
        tree.span.start,
      );
  }
}

const minusOne: Expression = { kind: 'constant', value: Coefficient.integer(-1) };

/** True when a field occurs, or an operator acts on something (which must then be a field). */
function holdsField(tree: Tree, names: Names): boolean {
  const recurse = (t: Tree): boolean => holdsField(t, names);
  switch (tree.kind) {
    case 'number':
      return false;
    case 'symbol':
      return names.fields.includes(tree.name);
    case 'operator':
    case 'apply':
      return true;
    case 'call':
      return tree.args.some(recurse);
    case 'sum':
      return tree.terms.some(recurse);
    case 'product':
      return tree.factors.some(recurse);
    case 'negate':
      return recurse(tree.operand);
    case 'quotient':
      return recurse(tree.numerator) || recurse(tree.denominator);
    case 'power':
      return recurse(tree.base);
  }
}

function powerOf(tree: Extract<Tree, { kind: 'power' }>, names: Names): Expression {
  const exponent = exponentOf(tree.exponent);
  const base = readExpression(tree.base, names);
  if (exponent.isInteger) return { kind: 'power', base, exponent: Number(exponent.num) };
  if (exponent.mul(rational(2)).isInteger) {
    const root: Expression = { kind: 'function', name: 'sqrt', argument: base };
    const odd = Number(exponent.num);
    return odd === 1 ? root : { kind: 'power', base: root, exponent: odd };
  }
  throw new NotationError(
    `a field expression has no power ${exponent} here`,
    'use whole numbers and square roots',
    tree.exponent.span.start,
  );
}

function applyOperator(tree: Extract<Tree, { kind: 'apply' }>, names: Names): Expression {
  const operand = readExpression(tree.operand, names);
  const operator = readOperatorValue(tree.operator, names);
  if (operand.kind === 'constant')
    throw new NotationError(
      'an operator acts on a constant',
      'let it act on a field, with parentheses if needed',
      tree.operand.span.start,
    );
  if (operand.kind === 'linear')
    return { kind: 'linear', form: mapForm(operand.form, (p) => p.mul(operator)) };
  if (names.kind === 'continuum')
    throw new NotationError(
      'a derivative acts on a product or a function of fields',
      'write it out by the product and chain rules',
      tree.span.start,
    );
  // A shift moves every field inside: T (F(u)) = F(T u), so a stencil of an expression is a sum of moved copies.
  return sumOf(
    operator.terms.map(({ exponents, weight }) => {
      const shift = LaurentPolynomial.of(exponents.length, [{ exponents, weight: Coefficient.one }]);
      return productOf([{ kind: 'constant', value: weight }, mapLinear(operand, (p) => p.mul(shift))]);
    }),
  );
}

function mapForm(form: LinearForm, map: (p: LaurentPolynomial) => LaurentPolynomial): LinearForm {
  const out = new Map<string, LaurentPolynomial>();
  for (const [name, p] of form) {
    const image = map(p);
    if (!image.isZero) out.set(name, image);
  }
  return out;
}

function mapLinear(e: Expression, map: (p: LaurentPolynomial) => LaurentPolynomial): Expression {
  const recurse = (x: Expression): Expression => mapLinear(x, map);
  switch (e.kind) {
    case 'constant':
      return e;
    case 'linear':
      return { kind: 'linear', form: mapForm(e.form, map) };
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

/** Sum with linear forms merged and constants added up. */
export function sumOf(terms: readonly Expression[]): Expression {
  let constant = Coefficient.zero;
  const linear = new Map<string, LaurentPolynomial>();
  const others: Expression[] = [];
  for (const t of terms.flatMap((x) => (x.kind === 'sum' ? x.terms : [x]))) {
    if (t.kind === 'constant') constant = constant.add(t.value);
    else if (t.kind === 'linear')
      for (const [name, p] of t.form) linear.set(name, linear.get(name)?.add(p) ?? p);
    else others.push(t);
  }
  for (const [name, p] of linear) if (p.isZero) linear.delete(name);
  const out: Expression[] = constant.isZero
    ? [...others]
    : [{ kind: 'constant', value: constant }, ...others];
  if (linear.size > 0) out.push({ kind: 'linear', form: linear });
  if (out.length === 0) return { kind: 'constant', value: Coefficient.zero };
  return out.length === 1 ? out[0]! : { kind: 'sum', terms: out };
}

/** Product with constants multiplied into one, and into a linear form that stands alone. */
export function productOf(factors: readonly Expression[]): Expression {
  let constant = Coefficient.one;
  const others: Expression[] = [];
  for (const f of factors.flatMap((x) => (x.kind === 'product' ? x.factors : [x]))) {
    if (f.kind === 'constant') constant = constant.mul(f.value);
    else others.push(f);
  }
  const [only] = others;
  if (only === undefined || constant.isZero)
    return { kind: 'constant', value: only ? Coefficient.zero : constant };
  if (others.length === 1 && only.kind === 'linear')
    return { kind: 'linear', form: mapForm(only.form, (p) => p.scale(constant)) };
  const all: Expression[] = constant.isOne ? others : [{ kind: 'constant', value: constant }, ...others];
  return all.length === 1 ? all[0]! : { kind: 'product', factors: all };
}
