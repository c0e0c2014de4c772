// Case texts for tests. A mark ¦ in an edit says by hand where an error must be reported; it is taken out before reading.

import { readCase } from '../../src/model/caseFile.ts';
import { InputError } from '../../src/notation/source.ts';

export const base = `case: sheet
title: Rotors
lattice:
  axes:
    tau: {spacing: b, role: time}
    x:   {spacing: a}
    y:   {spacing: a}
fields:
  phi: {values: angle}
parameters:
  J0: {positive: true}
  J:  {}
parent:
  action:
    - {name: time-link, term: "J0*(1 - cos(Delta_tau phi))"}
    - {name: x-link, term: "J*(1 - cos(Delta_x phi))"}
  compactness: cosine
proposal:
  parameters: {K0: {positive: true}, K: {}}
  lagrangian: "K0/2 (d_tau phi)^2 + K/2 (d_x phi)^2"
  matching: {K0: "J0*b/a^2", K: "J/b"}
expand: {beyond-leading: 4}
claims:
  - {id: charge, shift: "1", status: survives}
  - {id: wall, configuration: "theta(x)", suppressed: {continuum: yes, lattice: no}}
  - {id: artefacts, corrections: {begin: 2}}
`;

/** The base case with one passage replaced. Throws when the passage is not there exactly once. */
export function edited(passage: string, replacement: string): string {
  if (base.split(passage).length !== 2) throw new Error(`"${passage}" is not in the base case once`);
  return base.replace(passage, () => replacement);
}

/** A marked text without its mark, and where the mark stood: one-based, columns in UTF-16 units. */
export function unmarked(text: string): { text: string; line: number; column: number } {
  const [before, after, ...more] = text.split('¦');
  if (before === undefined || after === undefined || more.length > 0) throw new Error('one mark is needed');
  const lines = before.split('\n');
  return { text: before + after, line: lines.length, column: lines.at(-1)!.length + 1 };
}

/** The error of reading a case. Anything else than an InputError is rethrown; no error at all is one. */
export function errorOf(input: string | Uint8Array): InputError {
  try {
    readCase(input, 'sheet.yaml');
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error('the case was accepted');
}
