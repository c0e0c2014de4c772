// What was decided about a claim.

import type { Claim } from '../model/claim.ts';

export type Verdict = 'holds' | 'fails' | 'undecided';

export interface ClaimVerdict {
  readonly claim: Claim;
  readonly verdict: Verdict;
  /** What the tool found, in one or two sentences with the formula. */
  readonly found: string;
  /** For shift claims that hold: the parameter may depend freely on time. */
  readonly redundancy?: boolean;
  /** For claims about corrections: the claimed first order and the one found. */
  readonly corrections?: { readonly claimed: number; readonly found: number };
}
