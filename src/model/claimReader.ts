// Claims: one statement each, with what that statement needs. What a profile means is checked where the analyses read it; here
// its notation, its coordinates and its functions are.

import { readTree } from '../notation/parse.ts';
import { NotationError } from '../notation/source.ts';
import type { Tree } from '../notation/tree.ts';
import type { CaseReader } from './caseFile.ts';
import type { Claim, ProfileText, Status } from './claim.ts';
import type { Field, Lattice } from './geometry.ts';
import { type ClaimData, STATEMENTS } from './schema.ts';
import type { Path } from './yamlSource.ts';

/** Reads all claims. Throws InputError. */
export function readClaims(
  claims: readonly ClaimData[],
  reader: CaseReader,
  lattice: Lattice,
  fields: readonly Field[],
): Claim[] {
  const seen = new Set<string>();
  return claims.map((data, i) => {
    const path = ['claims', i];
    if (seen.has(data.id))
      reader.fail(`a second claim has the id "${data.id.slice(0, 40)}"`, 'give every claim its own id', [
        ...path,
        'id',
      ]);
    seen.add(data.id);
    return readClaim(data, path, reader, lattice, fields);
  });
}

/** Keys that a statement may have beside it. */
const COMPANIONS: Record<(typeof STATEMENTS)[number], readonly (keyof ClaimData)[]> = {
  shift: ['status', 'field'],
  winding: ['status'],
  rotation: ['status'],
  boost: ['status'],
  dilatation: ['status'],
  'point-group': ['status'],
  configuration: ['suppressed', 'exponent', 'truncates', 'field'],
  duality: ['status'],
  corrections: [],
  count: ['group'],
};

function readClaim(
  data: ClaimData,
  path: Path,
  reader: CaseReader,
  lattice: Lattice,
  fields: readonly Field[],
): Claim {
  const statements = STATEMENTS.filter((s) => data[s] !== undefined);
  const [kind] = statements;
  if (kind === undefined || statements.length > 1)
    return reader.fail(
      kind === undefined
        ? `claim "${data.id.slice(0, 40)}" states nothing`
        : `this claim states both ${statements.join(' and ')}`,
      `write exactly one of ${STATEMENTS.join(', ')}`,
      path,
    );
  for (const key of Object.keys(data) as (keyof ClaimData)[])
    if (key !== 'id' && key !== kind && !COMPANIONS[kind].includes(key))
      reader.fail(`"${key}" does not belong to a ${kind} claim`, 'leave it out', [...path, key], true);
  const base = { id: data.id, position: reader.source.positionOf(path) };
  const status = (): Status =>
    data.status ??
    reader.fail(
      `the ${kind} claim has no status`,
      'add status: survives, continuum-only, lattice-only or absent',
      path,
    );
  switch (kind) {
    case 'shift':
      return {
        ...base,
        kind,
        profile: profile(data.shift!, [...path, kind], reader, lattice),
        field: fieldOf(data, path, reader, fields),
        status: status(),
      };
    case 'point-group':
      return {
        ...base,
        kind,
        order: data['point-group']!.order,
        name: data['point-group']!.name,
        status: status(),
      };
    case 'configuration':
      return configuration(data, path, reader, lattice, fields, base);
    case 'corrections':
      return {
        ...base,
        kind,
        begin: correctionsBegin(data.corrections!.begin, [...path, kind, 'begin'], reader, lattice),
      };
    case 'count': {
      if (data.group === undefined) reader.fail('the count claim has no group', 'add group: U(1)', path);
      const formula = reader.inString([...path, kind], data.count!, readTree);
      return { ...base, kind, formula, text: data.count!, group: data.group! };
    }
    default:
      return { ...base, kind, text: statementText(data[kind]), status: data.status };
  }
}

const statementText = (value: unknown): string => (typeof value === 'string' ? value : JSON.stringify(value));

function configuration(
  data: ClaimData,
  path: Path,
  reader: CaseReader,
  lattice: Lattice,
  fields: readonly Field[],
  base: Pick<Claim, 'id' | 'position'>,
): Claim {
  if (!data.suppressed && !data.exponent && data.truncates === undefined)
    reader.fail(
      'the configuration claim says nothing',
      'add suppressed: {continuum: yes, lattice: yes}, exponent or truncates',
      path,
    );
  const exponent = data.exponent && {
    a: reader.exact(data.exponent.a, [...path, 'exponent', 'a']).toString(),
    l: reader.exact(data.exponent.l, [...path, 'exponent', 'l']).toString(),
  };
  return {
    ...base,
    kind: 'configuration',
    profile: profile(data.configuration!, [...path, 'configuration'], reader, lattice),
    field: fieldOf(data, path, reader, fields),
    suppressed: { continuum: yes(data.suppressed?.continuum), lattice: yes(data.suppressed?.lattice) },
    exponent,
    truncates: yes(data.truncates),
  };
}

function yes(value: boolean | 'yes' | 'no' | undefined): boolean | undefined {
  return typeof value === 'string' ? value === 'yes' : value;
}

function fieldOf(data: ClaimData, path: Path, reader: CaseReader, fields: readonly Field[]): string {
  const names = fields.map((f) => f.name);
  if (data.field === undefined)
    return names.length === 1
      ? names[0]!
      : reader.fail(
          'the claim does not say which field it is about',
          `add field: ${names.join(' or ')}`,
          path,
        );
  const tree = reader.inString([...path, 'field'], data.field, readTree);
  const name = tree.kind === 'symbol' ? tree.name : data.field;
  return names.includes(name)
    ? name
    : reader.fail(`"${data.field.slice(0, 40)}" is no field`, `the fields are ${names.join(', ')}`, [
        ...path,
        'field',
      ]);
}

function correctionsBegin(
  begin: number | Readonly<Record<string, number>>,
  path: Path,
  reader: CaseReader,
  lattice: Lattice,
): number | Map<string, number> {
  if (typeof begin === 'number') return begin;
  for (const spacing of Object.keys(begin))
    if (!lattice.limits.includes(spacing))
      reader.fail(
        `"${spacing}" is not a spacing`,
        `the spacings are ${lattice.limits.join(', ')}`,
        [...path, spacing],
        true,
      );
  return new Map(Object.entries(begin));
}

/** Functions that a profile may hold: free, step, one site, smooth. */
const PROFILE_FUNCTIONS = ['f', 'g', 'h', 'theta', 'delta_site', 's', 'u'];

function profile(text: string, path: Path, reader: CaseReader, lattice: Lattice): ProfileText {
  const axes = lattice.axes.map((x) => x.name);
  const tree = reader.inString(path, text, (t) => {
    const read = readTree(t);
    refuseForeign(read, axes);
    return read;
  });
  return { text, tree };
}

function refuseForeign(tree: Tree, axes: readonly string[]): void {
  const recurse = (t: Tree): void => refuseForeign(t, axes);
  switch (tree.kind) {
    case 'number':
      return;
    case 'symbol':
      if (tree.name !== 'pi' && !axes.includes(tree.name))
        throw new NotationError(
          `"${tree.name}" is no coordinate`,
          `the coordinates are ${axes.join(', ')}`,
          tree.span.start,
        );
      return;
    case 'call':
      if (!PROFILE_FUNCTIONS.includes(tree.name))
        throw new NotationError(
          `"${tree.name}" is no profile function`,
          `these are ${PROFILE_FUNCTIONS.join(', ')}`,
          tree.span.start,
        );
      tree.args.forEach(recurse);
      return;
    case 'sum':
      tree.terms.forEach(recurse);
      return;
    case 'product':
      tree.factors.forEach(recurse);
      return;
    case 'negate':
      recurse(tree.operand);
      return;
    case 'quotient':
      recurse(tree.numerator);
      recurse(tree.denominator);
      return;
    case 'power':
      recurse(tree.base);
      recurse(tree.exponent);
      return;
    case 'operator':
    case 'apply':
      throw new NotationError(
        'an operator stands in a profile',
        'write functions of the coordinates',
        tree.span.start,
      );
  }
}
