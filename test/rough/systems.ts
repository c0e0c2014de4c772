// Shipped cases with their analyses, for families written down in a test.

import { readFileSync } from 'node:fs';
import { expandAction } from '../../src/limit/expansion.ts';
import type { Density } from '../../src/limit/jets.ts';
import { matchProposal, proposalDensity } from '../../src/limit/matching.ts';
import type { Case } from '../../src/model/case.ts';
import { readCase } from '../../src/model/caseFile.ts';
import { linearForms } from '../../src/model/linearForms.ts';
import { readTree } from '../../src/notation/parse.ts';
import { analyseConfigurations, type RoughInput } from '../../src/rough/configurations.ts';
import type { Configuration, Scaling } from '../../src/rough/profile.ts';
import type { PointGroupAnalysis } from '../../src/symmetry/pointGroup.ts';
import { analyseShifts } from '../../src/symmetry/shifts.ts';

const noPointGroup = { elements: [] } as unknown as PointGroupAnalysis;

/** Analyses of a shipped case; its own claims are left out. */
export function analysed(name: string): RoughInput {
  const file = new URL(`../../cases/${name}.yaml`, import.meta.url);
  const theCase: Case = { ...readCase(readFileSync(file), `${name}.yaml`), claims: [] };
  let density: Density | undefined;
  const expansion = expandAction(theCase, (space) => {
    density = proposalDensity(theCase, space)!;
    return (m) => density!.terms.has(m);
  });
  const shifts = analyseShifts({
    lattice: theCase.lattice,
    fields: theCase.fields,
    latticeForms: theCase.parent.terms.flatMap((t) => linearForms(t.expression)),
    continuumForms: linearForms(theCase.proposal!.lagrangian),
  });
  return {
    case: theCase,
    expansion,
    matching: matchProposal(theCase, expansion, theCase.proposal!),
    proposalDensity: density!,
    shifts,
    pointGroup: noPointGroup,
  };
}

/** The input with one claimed family and no families from the shift analysis. */
export function claiming(input: RoughInput, profile: string): RoughInput {
  const theCase: Case = {
    ...input.case,
    claims: [
      {
        id: 'family',
        kind: 'configuration',
        position: { file: '', line: 1, column: 1 },
        profile: { text: profile, tree: readTree(profile) },
        field: input.case.fields[0]!.name,
        suppressed: { continuum: undefined, lattice: undefined },
        exponent: undefined,
        truncates: undefined,
      },
    ],
  };
  return { ...input, case: theCase, shifts: { ...input.shifts, symmetries: [] } };
}

export const on = (input: RoughInput, profile: string): Configuration =>
  analyseConfigurations(claiming(input, profile)).byClaim.get('family')!;

/** `a^-1 l^1 t^1`, or `zero`; the power of the time spacing only where it does not cancel. */
export function text(scaling: Scaling | null): string {
  if (scaling === null) return 'none';
  if (scaling === 'zero') return 'zero';
  const time = scaling.timeSpacing === undefined ? '' : ` b^${scaling.timeSpacing}`;
  return `a^${scaling.a} l^${scaling.l} t^${scaling.t}${time}`;
}
