// Exponents. A contribution to the action is an exact coefficient in parameters, spacings, extents and generic values;
// after the parent's parameters are scaled so that the proposal's stay fixed, the most singular of its terms as the time
// spacing goes to zero, and then the others, is the exponent of the action.

import type { Coefficient, CoefficientTerm } from '../exact/coefficient.ts';
import { Rational } from '../exact/rational.ts';
import type { Lattice } from '../model/geometry.ts';
import { DURATION, SIZE } from './latticeValues.ts';
import type { Scaling } from './profile.ts';

/** Exponents by parameter and spacing, as in Matching.scaling. */
export type ParameterScaling = ReadonlyMap<string, ReadonlyMap<string, Rational>>;

type Exponents = Exclude<Scaling, 'zero'>;

/** Spacings that belong to time alone; they go to zero first. */
export const timeSpacings = (lattice: Lattice): Set<string> => {
  const ofSpace = new Set(lattice.axes.filter((x) => x.role === 'space').map((x) => x.spacing));
  return new Set(lattice.limits.filter((s) => !ofSpace.has(s)));
};

/** Exponents of one term of a contribution. @param early spacings that go to zero first. */
function exponentsOf(
  term: CoefficientTerm,
  lattice: Lattice,
  early: ReadonlySet<string>,
  scaling: ParameterScaling,
): Exponents {
  let [a, time, l, t] = [Rational.zero, Rational.zero, Rational.zero, Rational.zero];
  const count = (spacing: string, exponent: Rational): void => {
    if (early.has(spacing)) time = time.add(exponent);
    else a = a.add(exponent);
  };
  for (const [generator, exponent] of term.powers) {
    if (generator === SIZE) l = l.add(exponent);
    else if (generator === DURATION) t = t.add(exponent);
    else if (lattice.limits.includes(generator)) count(generator, exponent);
    else for (const [spacing, power] of scaling.get(generator) ?? []) count(spacing, power.mul(exponent));
  }
  return time.isZero ? { a, l, t } : { a, l, t, timeSpacing: time };
}

/** The most singular term of a contribution as the spacings go to zero; among equals the one that grows fastest with the
 *  size of the system, then with time. */
export function scalingOf(value: Coefficient, lattice: Lattice, scaling: ParameterScaling): Scaling {
  const early = timeSpacings(lattice);
  return mostSingular(value.terms.map((term) => exponentsOf(term, lattice, early, scaling)));
}

export function mostSingular(scalings: readonly Scaling[]): Scaling {
  return scalings.reduce<Scaling>((best, s) => {
    if (s === 'zero') return best;
    if (best === 'zero') return s;
    const order = compareSingularity(s, best) || best.l.compare(s.l) || best.t.compare(s.t);
    return order < 0 ? s : best;
  }, 'zero');
}

const timePower = (s: Exponents): Rational => s.timeSpacing ?? Rational.zero;

/** Negative when x is more singular than y as the time spacing and then the others go to zero, 0 when they scale alike. */
export const compareSingularity = (x: Exponents, y: Exponents): number =>
  timePower(x).compare(timePower(y)) || x.a.compare(y.a);

/** True when the action diverges as the time spacing and then the others go to zero. */
export function diverges(scaling: Scaling): boolean {
  if (scaling === 'zero') return false;
  const first = timePower(scaling).sign;
  return first < 0 || (first === 0 && scaling.a.sign < 0);
}
