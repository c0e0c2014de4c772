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
