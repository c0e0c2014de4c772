// The author's claims, as read from a case file. A claim is judged in src/claims/, after the analyses.

import type { SourcePosition } from '../notation/source.ts';
import type { Tree } from '../notation/tree.ts';

export type Status = 'survives' | 'continuum-only' | 'lattice-only' | 'absent';

/** A profile string with its tree, e.g. `f(x) + g(y)`. */
export interface ProfileText {
  readonly text: string;
  readonly tree: Tree;
}

interface ClaimBase {
  readonly id: string;
  /** Where the claim stands in the case file. */
  readonly position: SourcePosition;
}

export type Claim = ClaimBase &
  (
    | {
        readonly kind: 'shift';
        readonly profile: ProfileText;
        readonly field: string;
        readonly status: Status;
      }
    | {
        readonly kind: 'point-group';
        readonly order: number | undefined;
        readonly name: string | undefined;
        readonly status: Status;
      }
    | {
        readonly kind: 'configuration';
        readonly profile: ProfileText;
        readonly field: string;
        readonly suppressed: {
          readonly continuum: boolean | undefined;
          readonly lattice: boolean | undefined;
        };
        /** Claimed exponents of a and ℓ, as exact rationals in text form, when given. */
        readonly exponent: { readonly a: string; readonly l: string } | undefined;
        readonly truncates: boolean | undefined;
      }
    | {
        readonly kind: 'corrections';
        /** Smallest relative order with a non-vanishing correction; per spacing or over all spacings together. */
        readonly begin: number | ReadonlyMap<string, number>;
      }
    /** Number of U(1) or Z_N factors of the shift symmetries on a periodic lattice, as a formula in Lx, Ly, … */
    | { readonly kind: 'count'; readonly formula: Tree; readonly text: string; readonly group: string }
    /** Decided by later analyses: kept whole so that a report can name them. */
    | {
        readonly kind: 'winding' | 'rotation' | 'boost' | 'dilatation' | 'duality';
        readonly text: string;
        readonly status: Status | undefined;
      }
  );
