// One member of every family on real lattices of growing size: the sums must scale with the exact exponent. Static
// families: one time slice at unit time spacing. Along directions on which the family does not depend one site stands
// for all.

import type { Matching } from '../limit/matching.ts';
import type { Case } from '../model/case.ts';
import { timeAxis } from '../model/geometry.ts';
import { type Configuration, isLocal, type Profile } from '../rough/profile.ts';
import { timeSpacings } from '../rough/scaling.ts';
import { fitPower, judgeFit } from './fit.ts';
import { LatticeBox, onSites } from './latticeSum.ts';
import { parametersAt } from './parameters.ts';
import { familySample } from './sampleField.ts';
import type { WitnessRecord } from './witness.ts';

/** Sizes by the number of directions along which the family varies; each doubles the one before. */
const SIZES: readonly (readonly number[])[] = [
  [8, 16, 32],
  [16, 32, 64],
  [8, 16, 32],
  [4, 8, 16],
];
/** Sums smaller than this, compared with one term of order one per site, are rounding. */
const ROUNDING = 1e-9;

/** Undefined for families that do not fit on a periodic lattice, move in time, or have no exact result. */
export function familyWitness(
  configuration: Configuration,
  profile: Profile,
  theCase: Case,
  matching: Matching,
): WitnessRecord | undefined {
  if (configuration.undecided !== undefined) return undefined;
  const varying = directionsOf(profile, theCase.lattice.axes.length);
  const sizes = SIZES[varying.filter((v) => v).length];
  if (!sizes) return undefined;
  const values: number[] = [];
  const largest: number[] = [];
  for (const size of sizes) {
    const sum = familySum(profile, varying, size, sizes[0]!, theCase, matching);
    if (!sum) return undefined;
    values.push(sum.action);
    largest.push(sum.scale);
  }
  const exact = configuration.lattice;
  const isRounding = values.every((v, i) => Math.abs(v) <= ROUNDING * largest[i]!);
  const base = { kind: 'configuration', subject: configuration.profile, sizes, values } as const;
  if (exact === 'zero' || isRounding)
    return {
      ...base,
      predicted: { exponent: exact === 'zero' ? 0 : exact.a.toNumber() },
      fitted: { exponent: 0 },
      verdict: exact === 'zero' && isRounding ? 'confirms' : 'contradicts',
      text: isRounding
        ? `the lattice sums vanish to rounding${exact === 'zero' ? ', as they must' : `, but scale like a^${exact.a} exactly`}`
        : 'the lattice sums do not vanish, but are identically zero exactly',
    };
  const fit = fitPower(
    sizes.map((n) => 1 / n),
    values,
  );
  const predicted = exact.a.toNumber();
  return {
    ...base,
    predicted: { exponent: predicted },
    fitted: { exponent: fit.exponent },
    verdict: judgeFit(fit, predicted),
    text: `lattice sums scale like a^${fit.exponent.toFixed(2)}, exactly a^${exact.a}`,
  };
}

/** True for the axes on which the family depends. */
function directionsOf(profile: Profile, dimension: number): boolean[] {
  return Array.from({ length: dimension }, (_, k) =>
    profile.terms.some(
      (t) =>
        !t.phase[k]!.isZero ||
        t.polynomial.some((m) => m.exponents[k]! > 0) ||
        t.factors.some((f) => (isLocal(f) ? [f.row] : f.rows).some((row) => row[k] !== 0)),
    ),
  );
}

/** Action of the family above that of the background, and the size that a sum of order-one terms would have. */
function familySum(
  profile: Profile,
  varying: readonly boolean[],
  size: number,
  period: number,
  theCase: Case,
  matching: Matching,
): { action: number; scale: number } | undefined {
  const { lattice, fields, parent, expand } = theCase;
  const time = timeAxis(lattice);
  const early = timeSpacings(lattice);
  const spacings = new Map(lattice.limits.map((s) => [s, early.has(s) ? 1 : 1 / size]));
  const parameters = parametersAt(theCase, matching.scaling, spacings);
  const box = new LatticeBox(
    varying.map((v) => (v ? size : 1)),
    parameters,
  );
  const values = new Map<string, Float64Array>();
  const constant = new Map<string, Float64Array>();
  for (const [j, { name }] of fields.entries()) {
    const mean = expand.background.get(name)?.toNumber() ?? 0;
    const sample = familySample(profile, j, size, period, time);
    if (!sample) return undefined;
    values.set(
      name,
      onSites(box.box, (site) => mean + sample(site)),
    );
    constant.set(
      name,
      onSites(box.box, () => mean),
    );
  }
  const copies = varying.reduce((n, v, k) => (v || k === time ? n : n * size), 1);
  let [action, scale] = [0, 0];
  for (const { expression } of parent.terms) {
    action += copies * (box.sum(expression, values) - box.sum(expression, constant));
    scale += copies * box.sites;
  }
  const largest = Math.max(...theCase.parameters.map((p) => Math.abs(parameters.get(p.name)!)), 1);
  return { action, scale: scale * largest };
}
