// How an exact value is arranged on paper, before it is set in plain notation or LaTeX: one fraction a term, roots of
// primes gathered under one root sign, parameters before spacings.

import { Coefficient, type CoefficientTerm } from '../exact/coefficient.ts';
import type { Quotient } from '../exact/quotient.ts';
import { gcd, Rational } from '../exact/rational.ts';

/** base^exponent; the base is a positive integer or a name. Exponents are positive. */
export type LayoutFactor =
  | { readonly kind: 'integer'; readonly value: bigint; readonly exponent: Rational }
  | { readonly kind: 'name'; readonly name: string; readonly exponent: Rational };

/** ±(Π numerator)/(Π denominator); an empty list stands for 1. */
export interface TermLayout {
  readonly isNegative: boolean;
  readonly numerator: readonly LayoutFactor[];
  readonly denominator: readonly LayoutFactor[];
}

/** Products of primes under one root stay below this, so that reading them back can factor them. */
const LARGEST_RADICAND = 10n ** 12n;

/** Names in the order in which they are written: pi, then the others by alphabet, then the names that go last, in the
 *  order given. Without a list, names of one letter go last, because spacings usually are. */
function orderOf(last: readonly string[] | undefined): (x: string, y: string) => number {
  const rank = (name: string): number => {
    if (name === 'pi') return -1;
    if (last) return last.indexOf(name) + 1;
    return name.length === 1 ? 1 : 0;
  };
  return (x, y) => rank(x) - rank(y) || (x < y ? -1 : x > y ? 1 : 0);
}

const integer = (value: bigint, exponent = Rational.one): LayoutFactor[] =>
  value === 1n ? [] : [{ kind: 'integer', value, exponent }];

/** Roots of primes, those with the same exponent under one root sign. */
function roots(powers: readonly (readonly [string, Rational])[]): LayoutFactor[] {
  const out: { value: bigint; exponent: Rational }[] = [];
  for (const [generator, exponent] of powers) {
    const prime = BigInt(generator.slice(1));
    const same = out.find((r) => r.exponent.equals(exponent) && r.value * prime <= LARGEST_RADICAND);
    if (same) same.value *= prime;
    else out.push({ value: prime, exponent });
  }
  return out.flatMap((r) => integer(r.value, r.exponent));
}

/** Arrangement of one term. `last`: names that go last. */
export function layoutTerm(term: CoefficientTerm, last?: readonly string[]): TermLayout {
  const order = orderOf(last);
  const primes = term.powers.filter(([g]) => g.startsWith('#'));
  const names = term.powers.filter(([g]) => !g.startsWith('#')).sort((x, y) => order(x[0], y[0]));
  const side = (sign: number): LayoutFactor[] =>
    names.flatMap(([name, e]): LayoutFactor[] =>
      e.sign === sign ? [{ kind: 'name', name, exponent: e.abs() }] : [],
    );
  return {
    isNegative: term.factor.sign < 0,
    numerator: [...integer(term.factor.abs().num), ...roots(primes), ...side(1)],
    denominator: [...integer(term.factor.den), ...side(-1)],
  };
}

/** Terms in the order in which they are written; a positive one first where there is one. */
export function orderedTerms(c: Coefficient): readonly CoefficientTerm[] {
  const first = c.terms.findIndex((t) => t.factor.sign > 0);
  if (first <= 0) return c.terms;
  return [c.terms[first]!, ...c.terms.slice(0, first), ...c.terms.slice(first + 1)];
}

/** The same quotient with integer factors and without negative powers or a common monomial, so that neither side holds
 *  a fraction. */
export function clearedQuotient(q: Quotient): {
  readonly numerator: Coefficient;
  readonly denominator: Coefficient;
} {
  const terms = [...q.numerator.terms, ...q.denominator.terms];
  let numerators = 0n;
  let denominators = 1n;
  const lowest = new Map<string, Rational>();
  for (const name of new Set(terms.flatMap((t) => t.powers.map(([g]) => g)))) {
    const exponents = terms.map((t) => t.powers.find(([g]) => g === name)?.[1] ?? Rational.zero);
    lowest.set(
      name,
      exponents.reduce((x, y) => (y.compare(x) < 0 ? y : x)),
    );
  }
  for (const t of terms) {
    numerators = gcd(numerators, t.factor.num);
    denominators = (denominators / gcd(denominators, t.factor.den)) * t.factor.den;
  }
  if (terms.length === 0 || numerators === 0n) return { numerator: q.numerator, denominator: q.denominator };
  const by = Coefficient.monomial(
    Rational.of(denominators, numerators),
    [...lowest].map(([name, e]) => [name, e.neg()]),
  );
  return { numerator: q.numerator.mul(by), denominator: q.denominator.mul(by) };
}
