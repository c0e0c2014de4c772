// How exact values become pieces of a report: one place that pairs the plain notation with its LaTeX.

import type { Coefficient } from '../exact/coefficient.ts';
import type { Quotient } from '../exact/quotient.ts';
import type { Rational } from '../exact/rational.ts';
import { Density, type JetMonomial, type JetSpace } from '../limit/jets.ts';
import { latexDensity, latexMonomial, printDensity, printMonomial } from '../limit/printDensity.ts';
import { latexCoefficient, latexQuotient, latexTree } from '../notation/latexWrite.ts';
import { readTree } from '../notation/parse.ts';
import { printCoefficient, printQuotient } from '../notation/print.ts';
import type { Scaling } from '../rough/profile.ts';
import { formula, type Piece } from './document.ts';

/** A coefficient such as `beta*a^2/(2*b)`, the spacings last. */
export const coefficientPiece = (c: Coefficient, spacings: readonly string[]): Piece =>
  formula(printCoefficient(c, spacings), latexCoefficient(c, spacings));

/** A quotient such as `J1*J2/(J1 + J2)`. */
export const quotientPiece = (q: Quotient, spacings: readonly string[]): Piece =>
  formula(printQuotient(q, spacings), latexQuotient(q, spacings));

/** A jet monomial such as `(d_x d_y phi)^2`. */
export const monomialPiece = (space: JetSpace, monomial: JetMonomial): Piece =>
  formula(printMonomial(space, monomial), latexMonomial(space, monomial));

/** Notation that the analyses wrote as text, e.g. a profile `f(x) + g(y)`; without LaTeX when it does not read back. */
export function notationPiece(text: string): Piece {
  try {
    return formula(text, latexTree(readTree(text)));
  } catch {
    return formula(text);
  }
}

const power = (base: string, exponent: Rational): string =>
  exponent.isZero
    ? ''
    : exponent.isOne
      ? base
      : exponent.isInteger
        ? `${base}^${exponent}`
        : `${base}^(${exponent})`;
const latexPower = (base: string, exponent: Rational): string =>
  exponent.isZero ? '' : exponent.isOne ? base : `${base}^{${exponent}}`;

/** `a^-1 l t` for an action that scales like a^{-1} ℓ t, `a^0` for one that stays finite in the limit. */
export function scalingPiece(scaling: Scaling | null): Piece {
  if (scaling === null) return '-';
  if (scaling === 'zero') return 'zero';
  const { a, l, t } = scaling;
  const text = [power('a', a), power('l', l), power('t', t)].filter((s) => s !== '').join(' ');
  const latex = [latexPower('a', a), latexPower('\\ell', l), latexPower('t', t)]
    .filter((s) => s !== '')
    .join('\\,');
  return text === '' ? formula('a^0', 'a^{0}') : formula(text, latex);
}

/** Coefficient times monomial as one expression that reads back. */
export function termPiece(
  space: JetSpace,
  { coefficient, monomial }: { readonly coefficient: Coefficient; readonly monomial: JetMonomial },
  spacings: readonly string[],
): { readonly text: string; readonly latex: string } {
  const density = new Density(space, new Map([[monomial, coefficient]]));
  return { text: printDensity(density, spacings), latex: latexDensity(density, spacings) };
}
