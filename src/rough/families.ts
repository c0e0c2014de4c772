// The families that are examined without being asked for: free functions, steps and single sites on every subset of the space
// directions, sums of functions of one coordinate each, rough in one direction and smooth in another, and what the shift
// analysis found. Families that a lattice symmetry maps into each other are examined once.

import { type Lattice, spaceAxes } from '../model/geometry.ts';
import { readTree } from '../notation/parse.ts';
import { NotationError } from '../notation/source.ts';
import type { ShiftAnalysis } from '../symmetry/family.ts';
import type { PointGroupAnalysis } from '../symmetry/pointGroup.ts';
import { type FamilyProfile, type ProfileFactor, readFamilyProfile } from './familyProfile.ts';

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

/** All families to examine besides the claimed ones. */
export function defaultFamilies(
  lattice: Lattice,
  field: string,
  shifts: ShiftAnalysis,
  pointGroup: PointGroupAnalysis,
): FamilyProfile[] {
  const found = shifts.symmetries
    .filter(
      (s) =>
        s.family.discrete === undefined &&
        (s.family.free.length > 0 || s.family.phase.some((p) => !p.isZero)),
    )
    .map((s) => s.family.profile);
  const seen = new Set<string>();
  return [...defaultTexts(lattice), ...found].flatMap((text) => {
    const profile = readable(text, lattice, field);
    if (!profile) return [];
    const orbit = pointGroup.elements.map((e) => imageKey(profile, e.matrix));
    const key = [...orbit].sort()[0] ?? imageKey(profile, []);
    if (seen.has(key)) return [];
    seen.add(key);
    return [profile];
  });
}

/** A family found by the shift analysis may hold functions that profiles lack (waves); those are left out. */
function readable(text: string, lattice: Lattice, field: string): FamilyProfile | undefined {
  try {
    return readFamilyProfile(text, readTree(text), lattice, field);
  } catch (error) {
    if (error instanceof NotationError) return undefined;
    throw error;
  }
}

/** Name of the family after a lattice map; reflections do not matter, since f(-x) is as free as f(x). */
function imageKey(profile: FamilyProfile, matrix: readonly (readonly number[])[]): string {
  const image = (functional: readonly number[]): string => {
    const moved =
      matrix.length === 0
        ? [...functional]
        : functional.map((_, i) => functional.reduce((sum, n, k) => sum + n * matrix[k]![i]!, 0));
    const first = moved.find((n) => n !== 0) ?? 1;
    return moved.map((n) => (first < 0 ? -n : n)).join(',');
  };
  const factorKey = (f: ProfileFactor): string => {
    switch (f.kind) {
      case 'free':
      case 'smooth':
        return `${f.kind}(${f.arguments.map(image).sort().join(';')})`;
      case 'step':
      case 'site':
        return `${f.kind}(${image(f.functional)})`;
      case 'staggered':
        return `parity(${image(f.parity)})`;
      case 'coordinate':
        return `coordinate ${f.axis}^${f.power}`;
    }
  };
  return profile.terms
    .map((t) => `${t.weight}:${t.factors.map(factorKey).sort().join('*')}`)
    .sort()
    .join('+');
}
