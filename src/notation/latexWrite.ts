// Trees and exact values in LaTeX, for papers. Only commands of amsmath and of KaTeX's strict mode are used.

import type { Coefficient, CoefficientTerm } from '../exact/coefficient.ts';
import type { Quotient } from '../exact/quotient.ts';
import { Rational } from '../exact/rational.ts';
import { clearedQuotient, type LayoutFactor, layoutTerm, orderedTerms } from './coefficientLayout.ts';
import { isGreekName } from './greek.ts';
import { FUNCTION_NAMES, isOperatorValued, type OperatorName, type Tree } from './tree.ts';

const ONE_HALF = Rational.of(1, 2);
const parentheses = (latex: string): string => `\\left(${latex}\\right)`;
const isFunction = (name: string): boolean => (FUNCTION_NAMES as readonly string[]).includes(name);

const ESCAPES: ReadonlyMap<string, string> = new Map([
  ...Array.from('_$&#%{}', (c) => [c, `\\${c}`] as const),
  ['\\', '\\backslash '],
  ['^', '\\hat{}'],
  ['~', '\\sim '],
]);

/** A word without underscores: a letter, a Greek letter, digits, or an upright name. */
function latexWord(word: string): string {
  if (isGreekName(word)) return `\\${word}`;
  if (/^([A-Za-z]|[0-9]+)$/.test(word)) return word;
  return `\\mathrm{${Array.from(word, (c) => ESCAPES.get(c) ?? c).join('')}}`;
}

/** A name: `mu0` → `\mu_{0}`, `J_1` → `J_{1}`, `pi_phi` → `\pi_{\phi}`, `Lx` → `\mathrm{Lx}`. */
export function latexName(name: string): string {
  const [whole = '', ...subscripts] = name.split('_');
  const numbered = /^([A-Za-z]+)([0-9]+)$/.exec(whole);
  const head = numbered ? numbered[1]! : whole;
  const below = [...(numbered ? [numbered[2]!] : []), ...subscripts].filter((s) => s !== '');
  return below.length === 0 ? latexWord(head) : `${latexWord(head)}_{${below.map(latexWord).join(',')}}`;
}

const OPERATOR_HEADS: Readonly<Record<OperatorName, string>> = {
  T: 'T',
  Delta: '\\Delta',
  Deltab: '\\Delta^{-}',
  Deltac: '\\Delta^{c}',
  d: '\\partial',
};

/** A row of factors; a dot where two numbers, or a number and a fraction, would run together. */
function row(factors: readonly { latex: string; startsWithNumber: boolean }[]): string {
  return factors
    .map((f, i) => (i === 0 ? f.latex : `${f.startsWithNumber ? ' \\cdot ' : ' '}${f.latex}`))
    .join('');
}

function startsWithNumber(tree: Tree): boolean {
  switch (tree.kind) {
    case 'number':
      return true;
    case 'power':
      return startsWithNumber(tree.base);
    case 'quotient':
      return startsWithNumber(tree.numerator);
    case 'product':
      return startsWithNumber(tree.factors[0]!);
    default:
      return false;
  }
}

function latexNumber(value: Rational): string {
  const size = value.abs();
  const latex = size.isInteger ? `${size.num}` : `\\frac{${size.num}}{${size.den}}`;
  return value.sign < 0 ? `-${latex}` : latex;
}

/** What follows a minus sign. */
const unsigned = (tree: Tree): string =>
  tree.kind === 'sum' || tree.kind === 'negate' ? parentheses(latexTree(tree)) : latexTree(tree);

function latexFactor(tree: Tree, isLast: boolean): string {
  const closed =
    tree.kind !== 'sum' &&
    tree.kind !== 'negate' &&
    tree.kind !== 'product' &&
    (tree.kind !== 'apply' || isLast) &&
    !(tree.kind === 'number' && tree.value.sign < 0);
  return closed ? latexTree(tree) : parentheses(latexTree(tree));
}

function latexPower(base: Tree, exponent: Tree): string {
  const above = latexTree(exponent);
  const isWhole = exponent.kind === 'number' && exponent.value.isInteger && exponent.value.num > 1n;
  if (base.kind === 'call' && isFunction(base.name) && base.name !== 'sqrt' && isWhole)
    return `\\${base.name}^{${above}}${latexArguments(base.args)}`;
  const isSimple =
    base.kind === 'symbol' ||
    (base.kind === 'number' && base.value.isInteger && base.value.sign >= 0) ||
    (base.kind === 'call' && !isFunction(base.name)) ||
    (base.kind === 'operator' && base.name !== 'Deltab' && base.name !== 'Deltac');
  return `${isSimple ? latexTree(base) : parentheses(latexTree(base))}^{${above}}`;
}

const latexArguments = (args: readonly Tree[]): string => parentheses(args.map(latexTree).join(', '));

function latexApply(operator: Tree, operand: Tree): string {
  const isRun = operator.kind === 'product' && operator.factors.every(isOperatorValued);
  const run = isRun
    ? operator.factors.map((f) => latexFactor(f, false)).join(' ')
    : latexFactor(operator, false);
  const isName = operand.kind === 'symbol' || operand.kind === 'call';
  return `${run} ${isName ? latexTree(operand) : parentheses(latexTree(operand))}`;
}

/** A tree in LaTeX (math mode). */
export function latexTree(tree: Tree): string {
  switch (tree.kind) {
    case 'number':
      return latexNumber(tree.value);
    case 'symbol':
      return latexName(tree.name);
    case 'operator':
      return `${OPERATOR_HEADS[tree.name]}_{${latexName(tree.axis)}}`;
    case 'apply':
      return latexApply(tree.operator, tree.operand);
    case 'call':
      if (tree.name === 'sqrt') return `\\sqrt{${tree.args.map(latexTree).join(', ')}}`;
      return `${isFunction(tree.name) ? `\\${tree.name}` : latexName(tree.name)}${latexArguments(tree.args)}`;
    case 'sum':
      return tree.terms
        .map((t, i) => {
          if (t.kind === 'negate') return `${i === 0 ? '-' : ' - '}${unsigned(t.operand)}`;
          return `${i === 0 ? '' : ' + '}${unsigned(t)}`;
        })
        .join('');
    case 'negate':
      return `-${unsigned(tree.operand)}`;
    case 'product':
      return row(
        tree.factors.map((f, i) => ({
          latex: latexFactor(f, i === tree.factors.length - 1),
          startsWithNumber: startsWithNumber(f),
        })),
      );
    case 'quotient':
      return `\\frac{${latexTree(tree.numerator)}}{${latexTree(tree.denominator)}}`;
    case 'power':
      return latexPower(tree.base, tree.exponent);
  }
}

function latexLayoutFactor(factor: LayoutFactor): { latex: string; startsWithNumber: boolean } {
  const base = factor.kind === 'integer' ? `${factor.value}` : latexName(factor.name);
  const { exponent } = factor;
  if (exponent.isOne) return { latex: base, startsWithNumber: factor.kind === 'integer' };
  if (factor.kind === 'integer' && exponent.num === 1n) {
    const degree = exponent.equals(ONE_HALF) ? '' : `[${exponent.den}]`;
    return { latex: `\\sqrt${degree}{${base}}`, startsWithNumber: false };
  }
  return { latex: `${base}^{${exponent}}`, startsWithNumber: factor.kind === 'integer' };
}

function latexTerm(term: CoefficientTerm, last: readonly string[] | undefined): string {
  const { numerator, denominator } = layoutTerm(term, last);
  const top = numerator.length === 0 ? '1' : row(numerator.map(latexLayoutFactor));
  return denominator.length === 0 ? top : `\\frac{${top}}{${row(denominator.map(latexLayoutFactor))}}`;
}

/** An exact coefficient in LaTeX, e.g. `\frac{\beta a^{2}}{2 b}`. Sums stand without parentheses.
 *  @param last names that go last in a product, usually the spacings; by default names of one letter. */
export function latexCoefficient(c: Coefficient, last?: readonly string[]): string {
  if (c.isZero) return '0';
  return orderedTerms(c)
    .map((t, i) => {
      const isNegative = t.factor.sign < 0;
      const sign = i === 0 ? (isNegative ? '-' : '') : isNegative ? ' - ' : ' + ';
      return `${sign}${latexTerm(t, last)}`;
    })
    .join('');
}

/** A quotient in LaTeX, e.g. `\frac{\mathrm{J1} \mathrm{J2}}{…}`. */
export function latexQuotient(q: Quotient, last?: readonly string[]): string {
  const whole = q.asCoefficient;
  if (whole) return latexCoefficient(whole, last);
  const { numerator, denominator } = clearedQuotient(q);
  return `\\frac{${latexCoefficient(numerator, last)}}{${latexCoefficient(denominator, last)}}`;
}
