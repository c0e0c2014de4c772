// Numerical witnesses of exact results. They confirm or contradict; they decide nothing.

import type { RoughInput } from '../rough/configurations.ts';
import type { Configuration, Profile } from '../rough/profile.ts';
import { familyWitness } from './familyWitness.ts';
import { smoothLimitWitness } from './smoothLimit.ts';
import type { WitnessRecord } from './witness.ts';

export interface WitnessInput extends RoughInput {
  readonly configurations: readonly Configuration[];
  readonly profiles: ReadonlyMap<string, Profile>;
}

/** All witnesses of a case: one for every family that fits on a periodic lattice, and one for the smooth limit. None
 *  when no scaling of the parameters has a limit. */
export function runWitnesses(input: WitnessInput): WitnessRecord[] {
  const { case: theCase, matching, expansion } = input;
  if (matching.scalingProblem !== undefined) return [];
  const families = input.configurations.map((c) =>
    familyWitness(c, input.profiles.get(c.profile)!, theCase, matching),
  );
  return [...families, smoothLimitWitness(theCase, expansion, matching)].filter((r) => r !== undefined);
}
