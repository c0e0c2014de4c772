// types of the rough configurations; see configurations

import type { Rational } from '../exact/rational.ts';

/** S ∝ a^a ℓ^l t^t (time extent), or the action is identically zero on the family. */
export type Scaling = { readonly a: Rational; readonly l: Rational; readonly t: Rational } | 'zero';

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
  readonly truncates: boolean;
  readonly corrections: readonly CorrectionScaling[];
  /** By parent term name. */
  readonly byTerm: ReadonlyMap<string, Scaling>;
  /** Mixed effective action: lattice operators in the rough directions, derivatives in the smooth ones. */
  readonly mixedAction: string;
  /** Exact lattice exponent differs from the exponent of the continuum action. */
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
