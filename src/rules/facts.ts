// Everything the analyses produced for one case, and what a rule may say about it.

import type { ClaimVerdict } from '../claims/verdict.ts';
import type { Expansion } from '../limit/expansion.ts';
import type { Matching } from '../limit/matching.ts';
import type { Case } from '../model/case.ts';
import type { ChargeEnergy, Configuration } from '../rough/profile.ts';
import type { ShiftAnalysis } from '../symmetry/family.ts';
import type { PointGroupAnalysis } from '../symmetry/pointGroup.ts';
import type { WitnessRecord } from '../witness/witness.ts';

/** Everything the analyses produced for one case. */
export interface Analyses {
  readonly case: Case;
  readonly expansion: Expansion;
  /** Undefined when the case has no proposal and none could be made. */
  readonly matching: Matching | undefined;
  /** The continuum Lagrangian that was proposed here, for a case without one; null where the author proposed one. */
  readonly proposed: string | null;
  readonly shifts: ShiftAnalysis;
  readonly pointGroup: PointGroupAnalysis;
  readonly configurations: readonly Configuration[];
  readonly charges: readonly ChargeEnergy[];
  readonly witness: readonly WitnessRecord[];
  readonly claims: readonly ClaimVerdict[];
  /** An angle field enters the parent through polynomials only, so that its period plays no part. */
  readonly compactAsReal: boolean;
  /** Sign of the quadratic form: `indefinite` when a quadratic coefficient has the wrong sign. */
  readonly quadraticForm: 'positive' | 'indefinite' | 'unknown';
}

/** What a rule says about a case. */
export interface Finding {
  readonly rule: string;
  readonly level: 'fault' | 'caution' | 'note';
  readonly statement: string;
  readonly why: string;
  readonly evidence: string;
  readonly mend: string;
}
