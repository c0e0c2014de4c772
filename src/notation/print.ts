// Trees and exact values in plain ASCII notation. What is printed here reads back: readTree(printTree(t)) is t up to
// spans, and the text of a coefficient has the coefficient's value.

import type { Coefficient, CoefficientTerm } from '../exact/coefficient.ts';
import type { Quotient } from '../exact/quotient.ts';
import { Rational } from '../exact/rational.ts';
import { clearedQuotient, type LayoutFactor, layoutTerm, orderedTerms } from './coefficientLayout.ts';
import { isOperatorValued, type Tree } from './tree.ts';

const inParentheses = (text: string): string => `(${text})`;
const ONE_HALF = Rational.of(1, 2);

/** The decimal digits of a number ≥ 0 whose denominator divides a power of ten, else undefined. */
function decimal(value: Rational): string | undefined {
  if (value.sign < 0) return undefined;
  let rest = value.den;
  let [twos, fives] = [0, 0];
  for (; rest % 2n === 0n; rest /= 2n) twos++;
  for (; rest % 5n === 0n; rest /= 5n) fives++;
  if (rest !== 1n) return undefined;
  const places = Math.max(twos, fives);
  if (places === 0) return `${value.num}`;
  const digits = `${(value.num * 10n ** BigInt(places)) / value.den}`.padStart(places + 1, '0');
  return `${digits.slice(0, -places)}.${digits.slice(-places)}`;
}

/** Written without parentheses wherever it stands. */
function isAtom(tree: Tree): boolean {
  if (tree.kind === 'number') return decimal(tree.value) !== undefined;
  return tree.kind === 'symbol' || tree.kind === 'call' || tree.kind === 'operator';
}

const atom = (tree: Tree): string => (isAtom(tree) ? printTree(tree) : inParentheses(printTree(tree)));
const atomOrPower = (tree: Tree): string => (tree.kind === 'power' ? printTree(tree) : atom(tree));

/** What follows a minus sign. */
const unsigned = (tree: Tree): string =>
  tree.kind === 'sum' || tree.kind === 'negate' ? inParentheses(printTree(tree)) : printTree(tree);

function printSum(terms: readonly Tree[]): string {
  return terms
    .map((term, i) => {
      if (term.kind === 'negate') return `${i === 0 ? '-' : ' - '}${unsigned(term.operand)}`;
      return `${i === 0 ? '' : ' + '}${unsigned(term)}`;
    })
    .join('');
}

/** Factors that physicists set apart by white space: operators, and what they act on. */
function isDerivative(tree: Tree): boolean {
  return (
    tree.kind === 'apply' || (tree.kind === 'power' && tree.base.kind === 'apply') || isOperatorValued(tree)
  );
}

function printProduct(factors: readonly Tree[]): string {
  return factors
    .map((factor, i) => {
      const joint = i === 0 ? '' : isDerivative(factor) ? ' ' : '*';
      if (factor.kind === 'apply' && i === factors.length - 1) return `${joint}${printTree(factor)}`;
      if (factor.kind === 'quotient' && i === 0) return printTree(factor);
      return `${joint}${atomOrPower(factor)}`;
    })
    .join('');
}

function printNumerator(tree: Tree): string {
  // x d_x phi/2 would leave the reader in doubt
  const isPlainProduct =
    tree.kind === 'product' && !isOperatorValued(tree) && tree.factors.at(-1)!.kind !== 'apply';
  return isPlainProduct || tree.kind === 'quotient' ? printTree(tree) : atomOrPower(tree);
}

function printExponent(tree: Tree): string {
  // a^1/2 would be refused as ambiguous
  if (tree.kind === 'number' && tree.value.isOne) return '(1)';
  if (tree.kind === 'negate' && tree.operand.kind === 'number' && isAtom(tree.operand))
    return printTree(tree);
  return tree.kind === 'call' ? inParentheses(printTree(tree)) : atom(tree);
}

/** The operators of an `apply`: a string of them, or one in parentheses. */
function printRun(operator: Tree): string {
  if (operator.kind === 'product' && operator.factors.every(isOperatorValued))
    return operator.factors.map(atomOrPower).join(' ');
  return atomOrPower(operator);
}

/** A tree in plain notation. Reads back to the same tree up to spans when every number in it is a decimal ≥ 0, as in
 *  trees that were read; other numbers are written as signs and quotients and read back to the same value. */
export function printTree(tree: Tree): string {
  switch (tree.kind) {
    case 'number': {
      const { value } = tree;
      return decimal(value) ?? value.toString();
    }
    case 'symbol':
      return tree.name;
    case 'operator':
      return `${tree.name}_${tree.axis}`;
    case 'apply': {
      const isName = tree.operand.kind === 'symbol' || tree.operand.kind === 'call';
      return `${printRun(tree.operator)} ${isName ? printTree(tree.operand) : inParentheses(printTree(tree.operand))}`;
    }
    case 'call':
      return `${tree.name}(${tree.args.map(printTree).join(', ')})`;
    case 'sum':
      return printSum(tree.terms);
    case 'negate':
      return `-${unsigned(tree.operand)}`;
    case 'product':
      return printProduct(tree.factors);
    case 'quotient':
      return `${printNumerator(tree.numerator)}/${atomOrPower(tree.denominator)}`;
    case 'power':
      return `${atom(tree.base)}^${printExponent(tree.exponent)}`;
  }
}

function printFactor(factor: LayoutFactor): string {
  const base = factor.kind === 'integer' ? `${factor.value}` : factor.name;
  const { exponent } = factor;
  if (exponent.isOne) return base;
  if (factor.kind === 'integer' && exponent.equals(ONE_HALF)) return `sqrt(${base})`;
  return `${base}^${exponent.isInteger ? exponent : inParentheses(exponent.toString())}`;
}

function printTerm(
  term: CoefficientTerm,
  last: readonly string[] | undefined,
): { isNegative: boolean; text: string } {
  const { isNegative, numerator, denominator } = layoutTerm(term, last);
  const top = numerator.length === 0 ? '1' : numerator.map(printFactor).join('*');
  if (denominator.length === 0) return { isNegative, text: top };
  const bottom = denominator.map(printFactor).join('*');
  return { isNegative, text: `${top}/${denominator.length === 1 ? bottom : inParentheses(bottom)}` };
}

/** An exact coefficient, e.g. `beta*a^2/(2*b)`, `-beta*a^4/24`, `sqrt(3)/2 + pi`. Sums stand without parentheses.
 *  @param last names that go last in a product, usually the spacings; by default names of one letter. */
export function printCoefficient(c: Coefficient, last?: readonly string[]): string {
  if (c.isZero) return '0';
  return orderedTerms(c)
    .map((t, i) => {
      const { isNegative, text } = printTerm(t, last);
      const sign = i === 0 ? (isNegative ? '-' : '') : isNegative ? ' - ' : ' + ';
      return `${sign}${text}`;
    })
    .join('');
}

/** A quotient, e.g. `J1*J2/(J1 + J2)`. */
export function printQuotient(q: Quotient, last?: readonly string[]): string {
  const whole = q.asCoefficient;
  if (whole) return printCoefficient(whole, last);
  const { numerator, denominator } = clearedQuotient(q);
  const side = (c: Coefficient): string => {
    const text = printCoefficient(c, last);
    return c.terms.length > 1 ? inParentheses(text) : text;
  };
  const bottom = printCoefficient(denominator, last);
  return `${side(numerator)}/${inParentheses(bottom)}`;
}
