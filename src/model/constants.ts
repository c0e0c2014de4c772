// Field-free expressions: declared parameters, spacings, pi, roots of rationals, integer and rational powers. Everything is
// exact, and what would grow without bound is refused before it does.

import { Coefficient } from '../exact/coefficient.ts';
import { Quotient } from '../exact/quotient.ts';
import { type Rational, rational } from '../exact/rational.ts';
import { NotationError } from '../notation/source.ts';
import { FUNCTION_NAMES, type FunctionName, rationalValue, type Span, type Tree } from '../notation/tree.ts';
import { boundedCoefficient, boundedPower } from './bounds.ts';
import { HIGHEST_CONSTANT_POWER } from './limits.ts';
import { type Names, unknownFunction, unknownName } from './names.ts';

/** A refusal at a place in the string. */
export function refuse(problem: string, mend: string, span: Span): never {
  throw new NotationError(problem, mend, span.start);
}

/** Runs exact arithmetic; what it cannot do becomes a NotationError at the place. */
export function exactly<T>(span: Span, compute: () => T): T {
  try {
    return compute();
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return refuse(
      error.message,
      'rewrite the expression so that it stays exact and short, or declare a parameter for a part',
      span,
    );
  }
}

/** The quotient itself. Throws RangeError when it has outgrown the limits. */
function bounded(q: Quotient): Quotient {
  boundedCoefficient(q.numerator);
  boundedCoefficient(q.denominator);
  return q;
}

/** base^exponent. Roots of parameters need a positive parameter: sqrt(J^2) is |J| otherwise. Throws NotationError. */
export function constantPower(base: Quotient, exponent: Rational, names: Names, span: Span): Quotient {
  if (base.isZero && exponent.sign < 0)
    return refuse('zero has no negative power', 'correct the base or the exponent', span);
  if (exponent.isInteger) {
    const one = Quotient.of(Coefficient.one);
    const multiply = (x: Quotient, y: Quotient): Quotient => bounded(x.mul(y));
    const positive = exactly(span, () => boundedPower(one, base, exponent.abs().num, multiply));
    return exponent.sign < 0 ? one.div(positive) : positive;
  }
  for (const generator of [...base.numerator.generators, ...base.denominator.generators])
    if (generator !== 'pi' && !generator.startsWith('#') && !names.positive.has(generator))
      return refuse(
        `this is a root of "${generator}", which is not declared positive`,
        `declare ${generator}: {positive: true} where that is so`,
        span,
      );
  return exactly(span, () => bounded(base.pow(exponent)));
}

/** Exact value of a function at a constant: at 0 for most functions, at 1 for log, at a product of positive numbers and
 *  parameters for sqrt; undefined where there is none in the ring. */
export function valueAtConstant(name: FunctionName, point: Coefficient): Coefficient | undefined {
  if (name === 'log') return point.isOne ? Coefficient.zero : undefined;
  if (name === 'sqrt' && point.asMonomial?.factor.sign === 1) return point.pow(rational(1, 2));
  if (!point.isZero) return undefined;
  return name === 'cos' || name === 'exp' || name === 'cosh' ? Coefficient.one : Coefficient.zero;
}

/** The one argument of a function. Throws NotationError for another number of them. */
export function onlyArgument(tree: Extract<Tree, { kind: 'call' }>): Tree {
  const [argument] = tree.args;
  if (tree.args.length === 1 && argument) return argument;
  return refuse(`${tree.name} has one argument`, `write ${tree.name}(…) with one`, tree.span);
}

/** True for the functions of the notation. */
export const isFunctionName = (name: string): name is FunctionName =>
  (FUNCTION_NAMES as readonly string[]).includes(name);

/** A function at a constant. Throws NotationError where its value is not exact. */
export function functionOfConstant(
  name: FunctionName,
  argument: Quotient,
  names: Names,
  span: Span,
): Quotient {
  if (name === 'sqrt') return constantPower(argument, rational(1, 2), names, span);
  const point = argument.asCoefficient;
  const value = point && valueAtConstant(name, point);
  if (value) return Quotient.of(value);
  return refuse(`${name} of a constant has no exact value here`, 'declare a parameter for it', span);
}

/** The exponent that a tree stands for. Throws NotationError when it is not a rational number of moderate size. */
export function exponentOf(tree: Tree): Rational {
  const value = rationalValue(tree);
  if (!value) return refuse('an exponent must be a rational number', 'write e.g. 2, -1 or (1/2)', tree.span);
  const bound = BigInt(HIGHEST_CONSTANT_POWER);
  if (value.abs().compare(rational(HIGHEST_CONSTANT_POWER)) > 0 || value.den > bound)
    return refuse(
      `the exponent is beyond ${HIGHEST_CONSTANT_POWER}`,
      'use a smaller one, or declare a parameter for the power',
      tree.span,
    );
  return value;
}

/** A field-free expression. Throws NotationError with the offset of what is wrong. */
export function readQuotient(tree: Tree, names: Names): Quotient {
  const recurse = (t: Tree): Quotient => readQuotient(t, names);
  const combine = (parts: readonly Tree[], join: (x: Quotient, y: Quotient) => Quotient): Quotient =>
    exactly(tree.span, () => parts.map(recurse).reduce((x, y) => bounded(join(x, y))));
  switch (tree.kind) {
    case 'number':
      return Quotient.of(Coefficient.rational(tree.value));
    case 'symbol':
      if (tree.name === 'pi' || names.constants.has(tree.name))
        return Quotient.of(Coefficient.symbol(tree.name));
      if (names.fields.includes(tree.name))
        return refuse(
          `the field "${tree.name}" stands where a constant belongs`,
          'use parameters, spacings and numbers there',
          tree.span,
        );
      throw unknownName(tree.name, tree.span, names);
    case 'sum':
      return combine(tree.terms, (x, y) => x.add(y));
    case 'negate':
      return recurse(tree.operand).neg();
    case 'product':
      return combine(tree.factors, (x, y) => x.mul(y));
    case 'quotient': {
      const denominator = recurse(tree.denominator);
      if (denominator.isZero)
        return refuse('the denominator is zero', 'divide by something else', tree.denominator.span);
      const numerator = recurse(tree.numerator);
      return exactly(tree.span, () => bounded(numerator.div(denominator)));
    }
    case 'power':
      return constantPower(recurse(tree.base), exponentOf(tree.exponent), names, tree.span);
    case 'call':
      if (!isFunctionName(tree.name)) throw unknownFunction(tree.name, tree.span, names);
      return functionOfConstant(tree.name, recurse(onlyArgument(tree)), names, tree.span);
    case 'operator':
    case 'apply':
      return refuse(
        'an operator stands where a constant belongs',
        'use parameters, spacings and numbers there',
        tree.span,
      );
  }
}

/** A field-free expression without a sum of parameters under a slash. Throws NotationError. */
export function readCoefficient(tree: Tree, names: Names): Coefficient {
  return (
    readQuotient(tree, names).asCoefficient ??
    refuse('this divides by a sum of parameters', 'declare a parameter for the quotient', tree.span)
  );
}
