// What a case declares before anything is said about it: axes, spacings, fields, parameters, and the settings that refer to
// them.

import { Rational } from '../exact/rational.ts';
import { shortened } from '../notation/part.ts';
import type { ExpandSettings } from './case.ts';
import { type CaseText, isYes } from './caseText.ts';
import type { Axis, Field, FieldValues, Lattice, Parameter } from './geometry.ts';
import { MOST_AXES, MOST_FIELDS, MOST_PARAMETERS } from './limits.ts';
import type { CaseData } from './schema.ts';
import type { Path } from './yamlSource.ts';

export interface Declarations {
  readonly lattice: Lattice;
  readonly fields: readonly Field[];
  readonly parameters: readonly Parameter[];
  readonly proposalParameters: readonly Parameter[];
  readonly expand: ExpandSettings;
}

/** Reads all declarations. Throws InputError, also where two of them share a name. */
export function readDeclarations(data: CaseData, text: CaseText): Declarations {
  const declared = new DeclaredNames(text);
  const axes = readAxes(data, text, declared);
  const lattice = { axes, limits: readLimits(data, text, axes) };
  const fields = readFields(data, text, declared, axes);
  const parameters = readParameters(data.parameters, ['parameters'], 'parameter', text, declared);
  const proposalParameters = readParameters(
    data.proposal?.parameters,
    ['proposal', 'parameters'],
    'parameter of the proposal',
    text,
    declared,
  );
  return { lattice, fields, parameters, proposalParameters, expand: readExpand(data, text, fields) };
}

/** Names and what they stand for; no name stands for two things. */
class DeclaredNames {
  private readonly kinds = new Map<string, string>();

  constructor(private readonly text: CaseText) {}

  /** Declares the name in a key, or in the value of a spacing, which axes may share. */
  declare(written: string, kind: string, path: Path, at: 'key' | 'value' = 'key'): string {
    const name = this.text.name(written, path, at);
    const other = this.kinds.get(name);
    if (other !== undefined && !(kind === 'spacing' && other === kind))
      this.text.fail(`"${name}" is already the name of a ${other}`, 'rename one of them', path, at);
    this.kinds.set(name, kind === 'axis' ? 'coordinate' : kind);
    return name;
  }
}

function readAxes(data: CaseData, text: CaseText, declared: DeclaredNames): Axis[] {
  const path = ['lattice', 'axes'];
  const entries = Object.entries(data.lattice.axes);
  if (entries.length === 0) text.fail('there is no axis', 'name at least one, e.g. x: {spacing: a}', path);
  if (entries.length > MOST_AXES)
    text.fail(
      `there are ${entries.length} axes`,
      `use 1 to ${MOST_AXES}`,
      [...path, entries[MOST_AXES]![0]],
      'key',
    );
  const [, secondTime] = entries.filter(([, axis]) => axis.role === 'time');
  if (secondTime)
    text.fail('there is a second time axis', 'keep role: time on one axis', [...path, secondTime[0], 'role']);
  const names = entries.map(([key]) => declared.declare(key, 'axis', [...path, key]));
  return entries.map(([key, { spacing, role }], i) => ({
    name: names[i]!,
    spacing: declared.declare(spacing, 'spacing', [...path, key, 'spacing'], 'value'),
    role: role ?? 'space',
  }));
}

/** The spacings in the order of the limits: as given, or that of time first. */
function readLimits(data: CaseData, text: CaseText, axes: readonly Axis[]): string[] {
  const timeFirst = [...axes.filter((x) => x.role === 'time'), ...axes];
  const spacings = [...new Set(timeFirst.map((x) => x.spacing))];
  if (!data.limits) return spacings;
  const list = `write [${spacings.join(', ')}] in the order of your limits`;
  const given = data.limits.map((written, i) => {
    const name = text.name(written, ['limits', i], 'value');
    if (!spacings.includes(name)) text.fail(`"${name}" is not a spacing`, list, ['limits', i]);
    return name;
  });
  const repeated = given.findIndex((name, i) => given.indexOf(name) < i);
  if (repeated >= 0) text.fail(`"${given[repeated]}" stands twice in the limits`, list, ['limits', repeated]);
  const absent = spacings.find((s) => !given.includes(s));
  if (absent !== undefined) text.fail(`the spacing "${absent}" is missing in the limits`, list, ['limits']);
  return given;
}

function readFields(data: CaseData, text: CaseText, declared: DeclaredNames, axes: readonly Axis[]): Field[] {
  const entries = Object.entries(data.fields);
  if (entries.length === 0)
    text.fail('there is no field', 'declare one, e.g. phi: {values: angle}', ['fields']);
  if (entries.length > MOST_FIELDS)
    text.fail(
      `there are ${entries.length} fields`,
      `use at most ${MOST_FIELDS}`,
      ['fields', entries[MOST_FIELDS]![0]],
      'key',
    );
  return entries.map(([key, { values, at }]): Field => {
    const path = ['fields', key];
    const name = declared.declare(key, 'field', path);
    const offset = at?.map((v, i) => text.exact(v, [...path, 'at', i])) ?? axes.map(() => Rational.zero);
    if (offset.length !== axes.length)
      text.fail(
        `"at" has ${offset.length} entries for ${axes.length} axes`,
        'give one entry for each axis, in their order',
        [...path, 'at'],
      );
    if (offset.some((v) => !v.isZero))
      text.fail(
        'a field stands off the sites',
        'this version handles fields on the sites; leave "at" out, or write the model in site fields',
        [...path, 'at'],
        'key',
      );
    return { name, values: readValues(values, text, [...path, 'values']), at: offset };
  });
}

function readValues(values: string, text: CaseText, path: Path): FieldValues {
  if (values === 'angle' || values === 'real') return { kind: values };
  return text.fail(
    `fields with the values "${shortened(values)}" are not analysed`,
    'this version handles angles and real fields; write angle or real instead',
    path,
  );
}

function readParameters(
  data: CaseData['parameters'],
  path: Path,
  kind: string,
  text: CaseText,
  declared: DeclaredNames,
): Parameter[] {
  const entries = Object.entries(data ?? {});
  if (entries.length > MOST_PARAMETERS)
    text.fail(`there are ${entries.length} parameters`, `use at most ${MOST_PARAMETERS}`, path);
  return entries.map(([key, value]) => ({
    name: declared.declare(key, kind, [...path, key]),
    positive: isYes(value?.positive ?? false),
  }));
}

function readExpand(data: CaseData, text: CaseText, fields: readonly Field[]): ExpandSettings {
  const path = ['expand', 'background'];
  const background = new Map<string, Rational>();
  for (const [key, value] of Object.entries(data.expand?.background ?? {}))
    background.set(fieldNamed(key, fields, text, [...path, key], 'key'), text.exact(value, [...path, key]));
  return {
    beyondLeading: data.expand?.['beyond-leading'] ?? 4,
    fields: data.expand?.fields,
    background,
  };
}

/** The declared field that is written in a key or a value. Throws InputError when there is none of that name. */
export function fieldNamed(
  written: string,
  fields: readonly Field[],
  text: CaseText,
  path: Path,
  at: 'key' | 'value',
): string {
  const name = text.name(written, path, at);
  if (fields.some((f) => f.name === name)) return name;
  return text.fail(
    `"${name}" is not a field`,
    `the fields are ${fields.map((f) => f.name).join(', ')}`,
    path,
    at,
  );
}
