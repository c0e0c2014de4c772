// Numerical values of the parent's parameters along the limit.

import type { Case } from '../model/case.ts';

/** Values of spacings and parameters at one point of the limit: every parameter is one at unit spacings and scales so that
 *  the proposal's parameters stay fixed. @param spacings value of every spacing. */
export function parametersAt(
  theCase: Case,
  scaling: ReadonlyMap<string, ReadonlyMap<string, { toNumber(): number }>>,
  spacings: ReadonlyMap<string, number>,
): Map<string, number> {
  const values = new Map(spacings);
  for (const { name } of theCase.parameters) {
    let value = 1;
    for (const [spacing, power] of scaling.get(name) ?? [])
      value *= spacings.get(spacing)! ** power.toNumber();
    values.set(name, value);
  }
  return values;
}
