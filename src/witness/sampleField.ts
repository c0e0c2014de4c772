// One member of a configuration family on a periodic lattice. All numbers are made from names, so that repeated runs are
// the same.

import { isLocal, type Profile, type ProfileFactor, type ProfileTerm } from '../rough/profile.ts';
import { dot } from '../rough/regions.ts';

/** A value per site; coordinates in lattice steps. */
export type SiteField = (site: readonly number[]) => number;

/** One round of the FNV-1a hash. */
const mix = (hash: number, value: number): number => Math.imul(hash ^ value, 16777619);

const hashOf = (name: string): number => [...name].reduce((h, c) => mix(h, c.charCodeAt(0)), 2166136261 | 0);

/** A number in [-1, 1) that depends on the name and the arguments alone. */
function sample(name: number, values: readonly number[]): number {
  let hash = values.reduce((h, v) => mix(mix(h, v & 255), v >> 8), name);
  hash = Math.imul(hash ^ (hash >>> 15), 2246822519);
  hash = Math.imul(hash ^ (hash >>> 13), 3266489917);
  return ((hash ^ (hash >>> 16)) >>> 0) / 2 ** 31 - 1;
}

/** Height of steps and single sites, in radians: nothing special about it. */
const HEIGHT = 1.3;
/** Phase of waves, which a profile leaves open. */
const PHASE = 0.6;

/** The values of one field on a member of the family: undefined when it does not fit on one (coordinates) or moves
 *  in time. Free functions repeat after `period` sites, so that lattices of different size see the same roughness. */
export function familySample(
  profile: Profile,
  field: number,
  size: number,
  period: number,
  time: number | undefined,
): SiteField | undefined {
  const terms = profile.terms.filter((t) => t.field === field);
  const isPolynomial = terms.some((t) => t.polynomial.some((m) => m.exponents.some((e) => e > 0)));
  if (isPolynomial || terms.some((t) => dependsOn(t, time))) return undefined;
  const parts = terms.map((term) => {
    const weight = term.polynomial[0]!.weight.toNumber(new Map()) * heightOf(term);
    const values = [waveOf(term), ...term.factors.map((f) => factorOf(f, size, period))];
    return (site: readonly number[]): number => values.reduce((p, value) => p * value(site), weight);
  });
  return (site) => parts.reduce((sum, part) => sum + part(site), 0);
}

/** Independent heights differ, so that they do not cancel by chance. */
const heightOf = (term: ProfileTerm): number =>
  term.height === undefined ? 1 : HEIGHT * (1 + 0.13 * (Number(term.height) - 1));

function waveOf({ phase }: ProfileTerm): SiteField {
  if (phase.every((p) => p.isZero)) return () => 1;
  const wave = phase.map((p) => 2 * Math.PI * p.toNumber());
  return (site) => Math.cos(dot(wave, site) + PHASE);
}

function dependsOn(term: ProfileTerm, axis: number | undefined): boolean {
  if (axis === undefined) return false;
  return (
    !term.phase[axis]!.isZero ||
    term.factors.some((f) => (isLocal(f) ? [f.row] : f.rows).some((row) => row[axis] !== 0))
  );
}

function factorOf(f: ProfileFactor, size: number, period: number): SiteField {
  const wrap = (n: number, by: number): number => ((n % by) + by) % by;
  if (isLocal(f))
    return f.kind === 'step'
      ? (site) => (wrap(dot(f.row, site), size) >= size / 2 ? 1 : 0)
      : (site) => (wrap(dot(f.row, site), size) === size / 2 ? 1 : 0);
  const { rows } = f;
  if (f.kind === 'smooth')
    return (site) =>
      rows.reduce((p, row, i) => p * Math.sin((2 * Math.PI * dot(row, site)) / size + 0.4 + i), 0.8);
  const name = hashOf(f.name);
  const value: SiteField = (site) =>
    sample(
      name,
      rows.map((row) => wrap(dot(row, site), period)),
    );
  return f.isInteger ? (site) => Math.round(2 * value(site)) : value;
}
