// types of the matching; see matchProposal

import type { Quotient } from '../exact/quotient.ts';
import type { Rational } from '../exact/rational.ts';
import type { JetMonomial } from './jets.ts';

export type DifferenceKind = 'agrees' | 'wrong-coefficient' | 'missing-from-proposal' | 'only-in-proposal';

export interface MatchingDifference {
  readonly kind: DifferenceKind;
  readonly monomial: JetMonomial;
  /** Coefficient of the parent's expansion and of the proposal after matching, in parent parameters and spacings. */
  readonly parent: Quotient;
  readonly proposal: Quotient;
  /** proposal/parent when that is a rational number. */
  readonly ratio: Rational | undefined;
  /** Total relative order of the monomial in the expansion; undefined when it is not in the expansion. */
  readonly order: number | undefined;
  /** Only for only-in-proposal: the exact lattice symmetry that forbids it, or null when none does. */
  readonly forbiddenBy: string | null | undefined;
}

export interface Matching {
  /** Matched proposal parameters (given or solved). */
  readonly parameters: ReadonlyMap<string, Quotient>;
  readonly origin: 'given' | 'solved' | 'proposed';
  readonly differences: readonly MatchingDifference[];
  /** Suggested or applied field rescalings, in words with formula. */
  readonly rescalings: readonly string[];
  /** Why the leading order could not be solved, when it could not. */
  readonly undecided: string | undefined;
  /** Powers s_i with which a parent parameter must scale, Π spacing^s, so that the proposal's parameters stay fixed. */
  readonly scaling: ReadonlyMap<string, ReadonlyMap<string, Rational>>;
}
