// What an action or Lagrangian means: an expression in linear forms of the fields. On the lattice the operators of a
// linear form are stencils (Laurent polynomials in the shifts, lattice units); in the continuum they are polynomials in
// the derivatives. Everything else is common to both.

import type { Coefficient } from '../exact/coefficient.ts';
import type { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import type { SourcePosition } from '../notation/source.ts';
import type { FunctionName } from '../notation/tree.ts';

/** u = Σ_j D_j φ_j, by field name; no zero operators. */
export type LinearForm = ReadonlyMap<string, LaurentPolynomial>;

export type Expression =
  | { readonly kind: 'constant'; readonly value: Coefficient }
  | { readonly kind: 'linear'; readonly form: LinearForm }
  | { readonly kind: 'sum'; readonly terms: readonly Expression[] }
  | { readonly kind: 'product'; readonly factors: readonly Expression[] }
  /** Integer power; negative only where the base has a non-zero constant part. */
  | { readonly kind: 'power'; readonly base: Expression; readonly exponent: number }
  | { readonly kind: 'function'; readonly name: FunctionName; readonly argument: Expression };

/** One named term of the parent action, summed over all cells. */
export interface ActionTerm {
  readonly name: string;
  readonly expression: Expression;
  /** The string as written. */
  readonly text: string;
  /** Where the string stands in the case file. */
  readonly position?: SourcePosition;
}
