// Powers of a, ℓ and t with which an action scales on a family, for jumps of fixed height at fixed ℓ and t, when the parent's
// parameters scale so that the proposal's stay fixed. Every extended direction of space has ℓ/a sites, every direction pinned
// at a jump O(1) of them; time is taken to the continuum first.

import type { CoefficientTerm } from '../exact/coefficient.ts';
import { Coefficient } from '../exact/coefficient.ts';
import { type Rational, rational } from '../exact/rational.ts';
import { summands } from '../limit/expansion.ts';
import { Density, type JetMonomial } from '../limit/jets.ts';
import type { Expression, LinearForm } from '../model/action.ts';
import { type Lattice, spaceAxes, timeAxis } from '../model/geometry.ts';
import type { FamilyProfile } from './familyProfile.ts';
import { continuumOrder, latticeOrder } from './onFamily.ts';
import type { Scaling } from './profile.ts';
import { type Region, rankOn, regionsOf } from './regions.ts';

/** Exponents of a parameter in each spacing: parameters that are missing stay fixed. */
export type ParameterScaling = ReadonlyMap<string, ReadonlyMap<string, Rational>>;

/** Scaling with the power of the time spacing still in it; none is left in a proper limit. */
export interface FullScaling {
  readonly a: Rational;
  readonly b: Rational;
  readonly l: Rational;
  readonly t: Rational;
}

/** What scaling needs to know about a case. */
export class ScalingSetting {
  readonly space: readonly number[];
  readonly time: number | undefined;
  private readonly timeSpacing: string | undefined;

  constructor(
    readonly lattice: Lattice,
    private readonly parameters: ParameterScaling,
  ) {
    this.space = spaceAxes(lattice);
    this.time = timeAxis(lattice);
    this.timeSpacing = this.time === undefined ? undefined : lattice.axes[this.time]!.spacing;
  }

  /** Powers of the space spacings together (a) and of the time spacing (b) in a coefficient term. */
  powersOf(term: CoefficientTerm): { a: Rational; b: Rational } {
    let a = rational(0);
    let b = rational(0);
    const add = (spacing: string, n: Rational): void => {
      if (spacing === this.timeSpacing && !this.space.some((k) => this.lattice.axes[k]!.spacing === spacing))
        b = b.add(n);
      else a = a.add(n);
    };
    for (const [generator, exponent] of term.powers) {
      if (this.lattice.limits.includes(generator)) add(generator, exponent);
      for (const [spacing, s] of this.parameters.get(generator) ?? []) add(spacing, s.mul(exponent));
    }
    return { a, b };
  }

  /** Numbers of extended and pinned directions of space and of time. */
  extent(region: Region): { space: number; pinned: number; time: number; pinnedTime: number } {
    const pinned = rankOn(region.pinned, this.space);
    const all = rankOn(
      region.pinned,
      this.lattice.axes.map((_, k) => k),
    );
    const hasTime = this.time === undefined ? 0 : 1;
    const pinnedTime = Math.min(hasTime, all - pinned);
    return { space: this.space.length - pinned, pinned, time: hasTime - pinnedTime, pinnedTime };
  }
}

/** The more singular of two scalings: time spacing first, then a, then the larger system. */
function moreSingular(x: FullScaling | undefined, y: FullScaling | undefined): FullScaling | undefined {
  if (!x || !y) return x ?? y;
  const order = x.b.compare(y.b) || x.a.compare(y.a) || y.l.compare(x.l) || y.t.compare(x.t);
  return order <= 0 ? x : y;
}

export const mostSingular = (scalings: Iterable<FullScaling | undefined>): FullScaling | undefined =>
  [...scalings].reduce<FullScaling | undefined>(moreSingular, undefined);

export const asScaling = (s: FullScaling | undefined): Scaling => (s ? { a: s.a, l: s.l, t: s.t } : 'zero');

/** Scaling of one parent term; undefined when it is identically zero on the family. Parts whose coefficients scale alike are
 *  taken together, so that they may cancel. */
export function latticeScaling(
  expression: Expression,
  profile: FamilyProfile,
  setting: ScalingSetting,
): FullScaling | undefined {
  const groups = new Map<string, { powers: { a: Rational; b: Rational }; parts: Expression[] }>();
  for (const { weight, factor } of summands(expression))
    for (const term of weight.terms) {
      const powers = setting.powersOf(term);
      const key = `${powers.a},${powers.b}`;
      const group = groups.get(key) ?? { powers, parts: [] };
      groups.set(key, group);
      const value: Expression = { kind: 'constant', value: Coefficient.ofTerm(term) };
      group.parts.push({ kind: 'product', factors: [value, factor] });
    }
  const regions = regionsOf(profile, reachOf(expression));
  return mostSingular(
    [...groups.values()].map(({ powers, parts }) =>
      regionalScaling({ kind: 'sum', terms: parts }, powers, profile, regions, setting),
    ),
  );
}

function regionalScaling(
  expression: Expression,
  powers: { a: Rational; b: Rational },
  profile: FamilyProfile,
  regions: readonly Region[],
  setting: ScalingSetting,
): FullScaling | undefined {
  let best: FullScaling | undefined;
  const settled = new Set<string>();
  for (const region of regions) {
    // One position near a jump that costs something at zeroth order settles all positions pinned the same way.
    const pattern = JSON.stringify(region.pinned);
    if (settled.has(pattern)) continue;
    const order = latticeOrder(expression, profile, region, setting.time);
    if (!order) continue;
    if (order.space + order.time === 0) settled.add(pattern);
    const { space, time } = setting.extent(region);
    best = moreSingular(best, {
      a: powers.a.add(rational(order.space - space)),
      b: powers.b.add(rational(order.time - time)),
      l: rational(space - order.space),
      t: rational(time - order.time),
    });
  }
  return best;
}

/** Farthest offset of any stencil, along any direction with coefficients up to 2. */
function reachOf(expression: Expression): number {
  let reach = 0;
  const see = (form: LinearForm): void => {
    for (const stencil of form.values())
      for (const { exponents } of stencil.terms)
        reach = Math.max(
          reach,
          exponents.reduce((sum, n) => sum + Math.abs(n), 0),
        );
  };
  const visit = (e: Expression): void => {
    if (e.kind === 'linear') see(e.form);
    else if (e.kind === 'sum') e.terms.forEach(visit);
    else if (e.kind === 'product') e.factors.forEach(visit);
    else if (e.kind === 'power') visit(e.base);
    else if (e.kind === 'function') visit(e.argument);
  };
  visit(expression);
  return reach;
}

/** Scaling of the integral of a continuum density over space and time, regularised at the scale of the spacing. */
export function densityScaling(
  density: Density,
  profile: FamilyProfile,
  setting: ScalingSetting,
): FullScaling | undefined {
  const groups = new Map<
    string,
    { powers: { a: Rational; b: Rational }; terms: Map<JetMonomial, Coefficient> }
  >();
  for (const [m, c] of density.terms)
    for (const term of c.terms) {
      const powers = setting.powersOf(term);
      const key = `${powers.a},${powers.b}`;
      const group = groups.get(key) ?? { powers, terms: new Map<JetMonomial, Coefficient>() };
      groups.set(key, group);
      const value = Coefficient.ofTerm(term);
      group.terms.set(m, group.terms.get(m)?.add(value) ?? value);
    }
  const regions = regionsOf(profile, 0);
  return mostSingular(
    [...groups.values()].flatMap(({ powers, terms }) =>
      regions.map((region) => {
        const count = continuumOrder(new Density(density.space, terms), profile, region, setting.time);
        if (!count) return undefined;
        const { space, pinned, time, pinnedTime } = setting.extent(region);
        return {
          a: powers.a.add(rational(pinned - count.rough)),
          b: powers.b.add(rational(pinnedTime - count.roughTime)),
          l: rational(space - count.smooth),
          t: rational(time - count.smoothTime),
        };
      }),
    ),
  );
}
