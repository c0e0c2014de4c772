// The one tree that plain notation (and later LaTeX) is read into. It says what was written, not what it means:
// whether a symbol is a field, a parameter or a coordinate is decided in src/model/.

import type { Rational } from '../exact/rational.ts';

/** Half-open range of UTF-16 offsets in the string that was read. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

/** Elementary operators along one axis: shift, forward, backward and central difference (undivided), derivative. */
export type OperatorName = 'T' | 'Delta' | 'Deltab' | 'Deltac' | 'd';

export type Tree =
  /** An exact number; `pi` is a symbol. */
  | { readonly kind: 'number'; readonly value: Rational; readonly span: Span }
  /** A name: field, parameter, spacing, coordinate or `pi`. ASCII spelling (`phi` for φ). */
  | { readonly kind: 'symbol'; readonly name: string; readonly span: Span }
  /** A single elementary operator, not yet applied; powers are `power` nodes around it. */
  | { readonly kind: 'operator'; readonly name: OperatorName; readonly axis: string; readonly span: Span }
  /** An operator-valued tree acting on the one factor that follows it. */
  | { readonly kind: 'apply'; readonly operator: Tree; readonly operand: Tree; readonly span: Span }
  /** f(argument, …): a named function (cos, …) or a profile of a claim (f, theta, delta_site, …). */
  | { readonly kind: 'call'; readonly name: string; readonly args: readonly Tree[]; readonly span: Span }
  | { readonly kind: 'sum'; readonly terms: readonly Tree[]; readonly span: Span }
  | { readonly kind: 'negate'; readonly operand: Tree; readonly span: Span }
  | { readonly kind: 'product'; readonly factors: readonly Tree[]; readonly span: Span }
  | { readonly kind: 'quotient'; readonly numerator: Tree; readonly denominator: Tree; readonly span: Span }
  | { readonly kind: 'power'; readonly base: Tree; readonly exponent: Tree; readonly span: Span };

/** Functions with a Taylor series that the notation knows. */
export const FUNCTION_NAMES = ['cos', 'sin', 'tan', 'exp', 'log', 'sqrt', 'cosh', 'sinh'] as const;
export type FunctionName = (typeof FUNCTION_NAMES)[number];

/** True for a tree that still waits for something to act on, such as `T_x - 2 + T_x^-1`. A sum or product is
 *  operator-valued when one of its parts is; numbers in it mean multiples of the identity. */
export function isOperatorValued(tree: Tree): boolean {
  switch (tree.kind) {
    case 'operator':
      return true;
    case 'sum':
      return tree.terms.some(isOperatorValued);
    case 'product':
      return tree.factors.some(isOperatorValued);
    case 'negate':
      return isOperatorValued(tree.operand);
    case 'quotient':
      return isOperatorValued(tree.numerator);
    case 'power':
      return isOperatorValued(tree.base);
    default:
      return false;
  }
}

/** The number that a tree of signs and quotients of literals stands for (`-1/2`, `(3)`), else undefined. */
export function rationalValue(tree: Tree): Rational | undefined {
  switch (tree.kind) {
    case 'number':
      return tree.value;
    case 'negate':
      return rationalValue(tree.operand)?.neg();
    case 'quotient': {
      const denominator = rationalValue(tree.denominator);
      if (!denominator || denominator.isZero) return undefined;
      return rationalValue(tree.numerator)?.div(denominator);
    }
    default:
      return undefined;
  }
}
