// Where on the lattice a family looks alike. A step or a single site distinguishes the far left, the far right and the O(1)
// positions near the jump of its functional; everywhere else the family is the same in bulk. A region assigns one of these to
// every localising functional; the sites of a region fill the directions that are not pinned.

import type { FamilyProfile, Functional } from './familyProfile.ts';

/** Far to the left or right of the jump, or at the given distance from it. */
export type Place = 'left' | 'right' | number;

export interface Region {
  /** Places by the key of the localising functional. */
  readonly places: ReadonlyMap<string, Place>;
  /** Number of independent functionals that are pinned near a jump, among all axes. */
  readonly pinned: readonly Functional[];
}

export const functionalKey = (f: Functional): string => f.join(',');

/** Value of an integer functional at an offset. */
export const valueAt = (f: Functional, offset: readonly number[]): number =>
  f.reduce((sum, n, k) => sum + n * offset[k]!, 0);

/** All regions of a family for operators that reach at most `reach` sites along any localising functional. */
export function regionsOf(profile: FamilyProfile, reach: number): Region[] {
  const localising = new Map<string, Functional>();
  for (const { factors } of profile.terms)
    for (const f of factors)
      if (f.kind === 'step' || f.kind === 'site') localising.set(functionalKey(f.functional), f.functional);
  const near = Array.from({ length: 2 * reach + 1 }, (_, i) => i - reach);
  const places: Place[] = ['left', 'right', ...near];
  let regions: Region[] = [{ places: new Map(), pinned: [] }];
  for (const [key, functional] of localising)
    regions = regions.flatMap((r) =>
      places.map((place) => ({
        places: new Map(r.places).set(key, place),
        pinned: typeof place === 'number' ? [...r.pinned, functional] : r.pinned,
      })),
    );
  return regions;
}

/** Rank over Q of some integer functionals, restricted to the given axes. */
export function rankOn(functionals: readonly Functional[], axes: readonly number[]): number {
  const rows = functionals.map((f) => axes.map((k) => f[k]!));
  let rank = 0;
  for (let column = 0; column < axes.length && rank < rows.length; column++) {
    const pivot = rows.findIndex((r, i) => i >= rank && r[column] !== 0);
    if (pivot < 0) continue;
    [rows[rank], rows[pivot]] = [rows[pivot]!, rows[rank]!];
    const lead = rows[rank]!;
    for (let i = rank + 1; i < rows.length; i++) {
      const factor = rows[i]![column]!;
      if (factor !== 0) rows[i] = rows[i]!.map((x, k) => x * lead[column]! - factor * lead[k]!);
    }
    rank++;
  }
  return rank;
}
