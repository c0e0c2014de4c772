// Rough configurations: families of profiles as they are read, and what is found about them.

import type { Rational } from '../exact/rational.ts';
import type { CoordinatePolynomial } from '../symmetry/family.ts';

/** A function of integer combinations of the coordinates, counted in lattice steps: one row per argument, one entry per
 *  axis. `free` may jump at every site, `smooth` varies on the scale of the whole system. */
export interface FunctionFactor {
  readonly kind: 'free' | 'smooth';
  readonly name: string;
  readonly rows: readonly (readonly number[])[];
  /** True for a free function with integer values, as in `2*pi f(x)`. */
  readonly isInteger?: boolean;
}

/** `step`: 1 where row·r ≥ 0 and 0 elsewhere; `site`: 1 where row·r = 0. The row is primitive. */
export interface LocalFactor {
  readonly kind: 'step' | 'site';
  readonly row: readonly number[];
}

export type ProfileFactor = FunctionFactor | LocalFactor;

/** True for steps and single sites. */
export const isLocal = (factor: ProfileFactor): factor is LocalFactor => 'row' in factor;

/** height · p(r) · cos(2π phase·r + const) · Π factors, for one field. */
export interface ProfileTerm {
  readonly field: number;
  /** Name of an independent height of order one; undefined where a function supplies generic values or a multiple of pi
   *  fixes the height. */
  readonly height: string | undefined;
  /** Coordinates count in units of the size of the system, so that a polynomial has a fixed height too. */
  readonly polynomial: CoordinatePolynomial;
  /** Entries in [0, 1), one per axis: 1/2 is staggered. */
  readonly phase: readonly Rational[];
  readonly factors: readonly ProfileFactor[];
}

/** A configuration family: the sum of its terms. */
export interface Profile {
  /** In the notation of claims. */
  readonly text: string;
  readonly terms: readonly ProfileTerm[];
}

/** S ∝ a^a ℓ^l t^t (t: extent in time), or the action is identically zero on the family. Several spacings of space axes
 *  go to zero together, and `a` counts them all. */
export type Scaling =
  | {
      readonly a: Rational;
      readonly l: Rational;
      readonly t: Rational;
      /** Power of the time spacing, which goes to zero first; present only where it does not cancel. */
      readonly timeSpacing?: Rational;
    }
  | 'zero';

export interface CorrectionScaling {
  /** Total relative order in the expansion. */
  readonly order: number;
  readonly scaling: Scaling;
  /** True when it scales like the leading term although the leading term is not zero. */
  readonly sameAsLeading: boolean;
}

export interface Configuration {
  readonly profile: string;
  /** True when the family came from the author's claims. */
  readonly claimed: boolean;
  readonly lattice: Scaling;
  readonly continuum: Scaling | null;
  readonly suppressed: { readonly lattice: boolean; readonly continuum: boolean | null };
  /** True when every non-vanishing order of the expansion is less singular than the one before. */
  readonly truncates: boolean;
  readonly corrections: readonly CorrectionScaling[];
  /** By parent term name. */
  readonly byTerm: ReadonlyMap<string, Scaling>;
  /** Mixed effective action: lattice operators in the rough directions, derivatives in the smooth ones. */
  readonly mixedAction: string;
  /** Why the exponents are not known, when they are not. */
  readonly undecided: string | undefined;
}

/** E ∝ a^{-p} ℓ^{-q} for the unit charge of a shift family on its smallest support. */
export interface ChargeEnergy {
  readonly family: string;
  readonly p: Rational;
  readonly q: Rational;
  readonly limitsCommute: boolean;
  readonly text: string;
  readonly undecided: string | undefined;
}
