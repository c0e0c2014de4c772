// A case from a few strings, for tests of the analyses.

import type { Case } from '../src/model/case.ts';
import { readCase } from '../src/model/caseFile.ts';

export interface InlineCase {
  /** Space axes; tau with spacing b comes first unless `time` is false. */
  readonly axes?: readonly string[];
  readonly spacings?: Readonly<Record<string, string>>;
  readonly time?: boolean;
  readonly fields?: readonly string[];
  readonly values?: 'angle' | 'real';
  readonly parameters?: readonly string[];
  readonly action: Readonly<Record<string, string>>;
  readonly lagrangian?: string;
  readonly proposalParameters?: readonly string[];
  readonly claims?: readonly string[];
  readonly expand?: string;
}

const declared = (names: readonly string[]): string =>
  `{${names.map((n) => `${n}: {positive: true}`).join(', ')}}`;

export function inlineCase(parts: InlineCase): Case {
  const { axes = ['x', 'y'], fields = ['phi'], values = 'angle', parameters = [], claims = [] } = parts;
  const lines = [
    'case: inline',
    'title: Inline',
    'lattice:',
    '  axes:',
    ...(parts.time === false ? [] : ['    tau: {spacing: b, role: time}']),
    ...axes.map((x) => `    ${x}: {spacing: ${parts.spacings?.[x] ?? 'a'}}`),
    'fields:',
    ...fields.map((f) => `  ${f}: {values: ${values}}`),
    `parameters: ${declared(parameters)}`,
    'parent:',
    '  action:',
    ...Object.entries(parts.action).map(([name, term]) => `    - {name: ${name}, term: "${term}"}`),
    ...(parts.lagrangian === undefined
      ? []
      : [
          'proposal:',
          `  parameters: ${declared(parts.proposalParameters ?? [])}`,
          `  lagrangian: "${parts.lagrangian}"`,
        ]),
    `expand: ${parts.expand ?? '{beyond-leading: 4}'}`,
    ...(claims.length === 0 ? [] : ['claims:', ...claims.map((c) => `  - ${c}`)]),
  ];
  return readCase(`${lines.join('\n')}\n`, 'inline.yaml');
}

export const kinetic = 'J0*(1 - cos(Delta_tau phi))';

/** Ring exchange on a sheet. */
export const sheet = inlineCase({
  parameters: ['J0', 'J'],
  action: { time: kinetic, plaquette: 'J*(1 - cos(Delta_x Delta_y phi))' },
  lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x d_y phi)^2',
  proposalParameters: ['K0', 'K'],
});
