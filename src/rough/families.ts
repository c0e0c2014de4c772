// The families that are examined without being asked for: free functions, steps and single sites on every subset of the space
// directions, sums of functions of one coordinate each, rough in one direction and smooth in another, and what the shift
// analysis found. Families that a lattice symmetry maps into each other are examined once.

import { Rational } from '../exact/rational.ts';
import { type Field, type Lattice, spaceAxes } from '../model/geometry.ts';
import { readTree } from '../notation/parse.ts';
import type { ShiftAnalysis } from '../symmetry/family.ts';
import type { PointGroupAnalysis } from '../symmetry/pointGroup.ts';
import { isLocal, type Profile, type ProfileFactor } from './profile.ts';
import { readConfiguration, shiftConfiguration } from './readConfiguration.ts';
import { dot } from './regions.ts';

const FREE = ['f', 'g', 'h'];

/** Profiles in words, in the notation of claims. */
function defaultTexts(lattice: Lattice): string[] {
  const names = spaceAxes(lattice).map((k) => lattice.axes[k]!.name);
  const subsets = names
    .reduce<string[][]>((all, name) => all.concat(all.map((s) => [...s, name])), [[]])
    .filter((s) => s.length > 0)
    .sort((x, y) => x.length - y.length);
  const product = (call: string, s: readonly string[]): string => s.map((x) => `${call}(${x})`).join(' ');
  const sums =
    names.length > 1 && names.length <= FREE.length
      ? [names.map((x, i) => `${FREE[i]}(${x})`).join(' + ')]
      : [];
  const mixed = names.flatMap((x) => names.filter((y) => y !== x).map((y) => `f(${x}) s(${y})`));
  return [
    ...subsets.map((s) => `f(${s.join(', ')})`),
    ...sums,
    ...subsets.map((s) => product('theta', s)),
    ...subsets.map((s) => product('delta_site', s)),
    ...mixed,
  ];
}

/** All families to examine besides the claimed ones: for every field the default ones, then what the shift analysis found. */
export function defaultFamilies(
  lattice: Lattice,
  fields: readonly Field[],
  shifts: ShiftAnalysis,
  pointGroup: PointGroupAnalysis,
): Profile[] {
  const found = shifts.symmetries
    .filter(
      ({ family }) =>
        family.discrete === undefined && (family.free.length > 0 || family.phase.some((p) => !p.isZero)),
    )
    .map((s) => shiftConfiguration(s.family));
  const read = (field: string, text: string): Profile =>
    readConfiguration(
      readTree(text),
      lattice,
      fields,
      field,
      fields.length === 1 ? text : `${field}: ${text}`,
    );
  const texts = defaultTexts(lattice);
  const all = [...fields.flatMap(({ name }) => texts.map((text) => read(name, text))), ...found];
  const seen = new Set<string>();
  return all.filter((profile) => {
    // An element that permutes the fields would need the profile's fields permuted too; those merge nothing.
    const elements = pointGroup.elements.filter((e) => e.fields.every((f, i) => f.field === i));
    const [key] = elements.map((e) => imageKey(profile, e.matrix)).sort();
    const name = key ?? imageKey(profile, []);
    if (seen.has(name)) return false;
    seen.add(name);
    return true;
  });
}

/** Name of the family after a lattice map; reflections do not matter, since f(-x) is as free as f(x). */
function imageKey(profile: Profile, matrix: readonly (readonly number[])[]): string {
  const moved = (row: readonly number[]): number[] =>
    matrix.length === 0
      ? [...row]
      : row.map((_, i) =>
          dot(
            row,
            matrix.map((m) => m[i]!),
          ),
        );
  const image = (row: readonly number[]): string => {
    const out = moved(row);
    const first = out.find((n) => n !== 0) ?? 1;
    return out.map((n) => (n === 0 ? 0 : first < 0 ? -n : n)).join(',');
  };
  const factorKey = (f: ProfileFactor): string =>
    isLocal(f) ? `${f.kind}(${image(f.row)})` : `${f.kind}(${f.rows.map(image).sort().join(';')})`;
  const twelfths = (phase: readonly Rational[]): string =>
    image(phase.map((p) => Number(p.mul(Rational.of(12)).num)));
  // Letters and heights are dummies; a polynomial is compared only with itself.
  return profile.terms
    .map((t) => {
      const polynomial = t.polynomial.map(
        (m) => `${m.exponents.some((n) => n > 0) ? m.exponents : ''}${m.weight.asRational ?? 'pi'}`,
      );
      return `${t.field}|${polynomial.join('+')}|${twelfths(t.phase)}|${t.factors.map(factorKey).sort().join('*')}`;
    })
    .sort()
    .join(' + ');
}
