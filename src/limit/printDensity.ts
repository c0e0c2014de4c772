// Jet monomials and densities in plain notation and LaTeX. The plain text reads back to the same monomial: factors with
// few derivatives first, equal factors as powers, parentheses around every derivative that is not alone.

import type { Coefficient } from '../exact/coefficient.ts';
import { latexCoefficient, latexName } from '../notation/latexWrite.ts';
import { printCoefficient } from '../notation/print.ts';
import type { Density, JetMonomial, JetSpace, JetVariable } from './jets.ts';

interface RepeatedFactor {
  readonly variable: JetVariable;
  readonly repeats: number;
}

const orderOf = (derivative: readonly number[]): number => derivative.reduce((x, y) => x + y, 0);

/** Fewer derivatives first, then by field, then derivatives along earlier axes first. */
function compareVariables(x: JetVariable, y: JetVariable): number {
  const byOrder = orderOf(x.derivative) - orderOf(y.derivative);
  if (byOrder !== 0 || x.field !== y.field) return byOrder || x.field - y.field;
  const axis = x.derivative.findIndex((n, k) => n !== y.derivative[k]);
  return axis < 0 ? 0 : y.derivative[axis]! - x.derivative[axis]!;
}

function repeatedFactors(space: JetSpace, monomial: JetMonomial): RepeatedFactor[] {
  const out: { variable: JetVariable; repeats: number }[] = [];
  for (const variable of space.factors(monomial).sort(compareVariables)) {
    const previous = out.at(-1);
    if (previous && compareVariables(previous.variable, variable) === 0) previous.repeats++;
    else out.push({ variable, repeats: 1 });
  }
  return out;
}

/** How one notation writes the pieces of a monomial. */
interface Hand {
  readonly name: (name: string) => string;
  readonly derivative: (axis: string, power: number) => string;
  readonly power: (base: string, exponent: number) => string;
  readonly parentheses: (text: string) => string;
}

const PLAIN: Hand = {
  name: (name) => name,
  derivative: (axis, power) => (power === 1 ? `d_${axis}` : `d_${axis}^${power}`),
  power: (base, exponent) => `${base}^${exponent}`,
  parentheses: (text) => `(${text})`,
};

const LATEX: Hand = {
  name: latexName,
  derivative: (axis, power) => `\\partial_{${latexName(axis)}}${power === 1 ? '' : `^{${power}}`}`,
  power: (base, exponent) => `${base}^{${exponent}}`,
  parentheses: (text) => `\\left(${text}\\right)`,
};

function writeMonomial(space: JetSpace, monomial: JetMonomial, hand: Hand): string {
  const factors = repeatedFactors(space, monomial);
  if (factors.length === 0) return '1';
  const derivatives = factors.filter((f) => orderOf(f.variable.derivative) > 0).length;
  return factors
    .map(({ variable, repeats }) => {
      const operators = variable.derivative.flatMap((n, k) =>
        n > 0 ? [hand.derivative(space.axes[k]!, n)] : [],
      );
      const text = [...operators, hand.name(space.fields[variable.field]!)].join(' ');
      if (operators.length === 0) return repeats === 1 ? text : hand.power(text, repeats);
      if (repeats > 1) return hand.power(hand.parentheses(text), repeats);
      return derivatives > 1 ? hand.parentheses(text) : text;
    })
    .join(' ');
}

/** A jet monomial in plain notation, e.g. `phi^2 (d_x phi)^2`; `1` for the empty one. */
export function printMonomial(space: JetSpace, monomial: JetMonomial): string {
  return writeMonomial(space, monomial, PLAIN);
}

/** A jet monomial in LaTeX, e.g. `\left(\partial_{x} \partial_{y} \phi\right)^{2}`. */
export function latexMonomial(space: JetSpace, monomial: JetMonomial): string {
  return writeMonomial(space, monomial, LATEX);
}

/** Fewer derivatives first, then fewer fields, then by the factors from the left. */
function orderedTerms({ space, terms }: Density): [JetMonomial, Coefficient][] {
  const degree = (m: JetMonomial): number => orderOf(space.degree(m));
  const sorted = new Map([...terms.keys()].map((m) => [m, space.factors(m).sort(compareVariables)]));
  return [...terms].sort(([m], [n]) => {
    const bySize = degree(m) - degree(n) || m.length - n.length;
    if (bySize !== 0) return bySize;
    const other = sorted.get(n)!;
    for (const [i, variable] of sorted.get(m)!.entries()) {
      const byFactor = compareVariables(variable, other[i]!);
      if (byFactor !== 0) return byFactor;
    }
    return 0;
  });
}

function writeDensity(density: Density, hand: Hand, coefficientText: (c: Coefficient) => string): string {
  const terms = orderedTerms(density).map(([m, c]) => {
    const isNegative = c.asMonomial !== undefined && c.asMonomial.factor.sign < 0;
    const size = isNegative ? c.neg() : c;
    const weight = size.terms.length > 1 ? hand.parentheses(coefficientText(size)) : coefficientText(size);
    if (m === '') return { isNegative, text: weight };
    const monomial = writeMonomial(density.space, m, hand);
    return { isNegative, text: size.isOne ? monomial : `${weight} ${monomial}` };
  });
  if (terms.length === 0) return '0';
  return terms
    .map(
      ({ isNegative, text }, i) => `${i === 0 ? (isNegative ? '-' : '') : isNegative ? ' - ' : ' + '}${text}`,
    )
    .join('');
}

/** A density in plain notation, e.g. `mu0/2 (d_tau phi)^2 - beta*a^4/(24*b) phi^2 d_x phi`; `0` when it is zero. Reads
 *  back to the same density. @param last names that go last in coefficients, usually the spacings. */
export function printDensity(density: Density, last?: readonly string[]): string {
  return writeDensity(density, PLAIN, (c) => printCoefficient(c, last));
}

/** A density in LaTeX. @param last names that go last in coefficients, usually the spacings. */
export function latexDensity(density: Density, last?: readonly string[]): string {
  return writeDensity(density, LATEX, (c) => latexCoefficient(c, last));
}
