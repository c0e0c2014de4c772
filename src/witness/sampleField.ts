// Concrete fields for the witnesses: one member of a configuration family, and a smooth periodic test field. All numbers are
// made from names, so that repeated runs are the same.

import type { FamilyProfile, ProfileFactor } from '../rough/familyProfile.ts';
import { genericValue } from '../rough/genericPoint.ts';
import { valueAt } from '../rough/regions.ts';
import type { SiteField } from './latticeSum.ts';

/** A number in [-1, 1] that depends on the name alone. */
const sample = (name: string): number => ((genericValue(name).toNumber() - 2 ** 30) / 2 ** 30) * 2 - 1;

/** Height of steps and single sites, in radians: nothing special about it. */
const HEIGHT = 1.3;

/** One member of the family on a periodic lattice, or undefined when it does not fit on one (coordinates) or moves in time.
 *  Free functions repeat after `period` sites, so that lattices of different size see the same roughness. */
export function familySample(
  profile: FamilyProfile,
  size: number,
  period: number,
  time: number | undefined,
): SiteField | undefined {
  const dependsOnTime = (f: ProfileFactor): boolean => {
    if (time === undefined) return false;
    switch (f.kind) {
      case 'free':
      case 'smooth':
        return f.arguments.some((a) => a[time] !== 0);
      case 'step':
      case 'site':
        return f.functional[time] !== 0;
      case 'staggered':
        return f.parity[time] !== 0;
      case 'coordinate':
        return true;
    }
  };
  const factors = profile.terms.flatMap((t) => t.factors);
  if (factors.some((f) => f.kind === 'coordinate' || dependsOnTime(f))) return undefined;
  return (site) =>
    profile.terms.reduce(
      (sum, t) =>
        sum + t.factors.reduce((p, f) => p * factorValue(f, site, size, period), t.weight.toNumber()),
      0,
    );
}

function factorValue(f: ProfileFactor, site: readonly number[], size: number, period: number): number {
  const wrap = (n: number, by = size): number => ((n % by) + by) % by;
  switch (f.kind) {
    case 'free':
      return sample(`${f.name} ${f.arguments.map((a) => wrap(valueAt(a, site), period)).join(',')}`);
    case 'smooth':
      return f.arguments.reduce(
        (p, a, i) => p * Math.sin((2 * Math.PI * valueAt(a, site)) / size + 0.4 + i),
        0.8,
      );
    case 'step':
      return wrap(valueAt(f.functional, site)) >= size / 2 ? HEIGHT : 0;
    case 'site':
      return wrap(valueAt(f.functional, site)) === size / 2 ? HEIGHT : 0;
    case 'staggered':
      return valueAt(f.parity, site) % 2 === 0 ? 0.9 : -0.9;
    case 'coordinate':
      return Number.NaN;
  }
}

/** A smooth field of period 1 in every direction, with its derivatives: a sum of products of sines. */
export class SmoothField {
  private readonly modes: readonly {
    amplitude: number;
    waves: readonly number[];
    phases: readonly number[];
  }[];

  constructor(dimension: number) {
    const axes = Array.from({ length: dimension }, (_, k) => k);
    this.modes = [
      { amplitude: 0.31, waves: axes.map(() => 1), phases: axes.map((k) => 0.3 + 0.7 * k) },
      { amplitude: 0.17, waves: axes.map((k) => (k === 0 ? 2 : 1)), phases: axes.map((k) => 1.1 + 0.4 * k) },
    ];
  }

  /** ∂^α of the field at a point of the unit cell. */
  derivative(point: readonly number[], alpha: readonly number[]): number {
    return this.modes.reduce((sum, { amplitude, waves, phases }) => {
      let product = amplitude;
      for (const [k, x] of point.entries()) {
        const wave = 2 * Math.PI * waves[k]!;
        const n = alpha[k]!;
        product *= wave ** n * Math.sin(wave * x + phases[k]! + (n * Math.PI) / 2);
      }
      return sum + product;
    }, 0);
  }
}
