// Discrete constant shifts of a continuum Lagrangian. A shift by 2π/N moves the arguments of periodic functions by multiples of
// 2π and must not move anything else.

import { Rational } from '../exact/rational.ts';
import type { Expression, LinearForm } from '../model/action.ts';
import type { ShiftFamily } from './family.ts';

/** True when φ_j → φ_j + 2π c_j/N leaves the Lagrangian as it is, c_j the constant amplitudes of a discrete family. Families
 *  with a free argument, a sign or a coordinate in them are no shifts of smooth fields by constants: false. */
export function isDiscreteContinuumShift(
  family: ShiftFamily,
  lagrangian: Expression,
  fields: readonly string[],
): boolean {
  const { discrete, prefactor } = family;
  if (discrete === undefined || family.free.length > 0 || family.phase.some((p) => !p.isZero)) return false;
  const turns = new Map<string, Rational>();
  for (const [j, name] of fields.entries())
    for (const { exponents, weight } of prefactor[j] ?? []) {
      const amplitude = weight.asRational;
      if (!amplitude || exponents.some((n) => n !== 0)) return false;
      turns.set(name, amplitude.div(Rational.of(discrete)));
    }
  return isInvariant(lagrangian, turns);
}

function isInvariant(e: Expression, turns: ReadonlyMap<string, Rational>): boolean {
  const recurse = (x: Expression): boolean => isInvariant(x, turns);
  switch (e.kind) {
    case 'constant':
      return true;
    case 'linear':
      return movement(e.form, turns)?.isZero ?? false;
    case 'sum':
      return e.terms.every(recurse);
    case 'product':
      return e.factors.every(recurse);
    case 'power':
      return recurse(e.base);
    case 'function': {
      const isPeriodic = e.name === 'cos' || e.name === 'sin' || e.name === 'tan';
      if (isPeriodic && e.argument.kind === 'linear')
        return movement(e.argument.form, turns)?.isInteger ?? false;
      return recurse(e.argument);
    }
  }
}

/** By how many turns of 2π a form moves; undefined when a parameter stands in it. */
function movement(form: LinearForm, turns: ReadonlyMap<string, Rational>): Rational | undefined {
  let sum = Rational.zero;
  for (const [name, operator] of form)
    for (const { exponents, weight } of operator.terms) {
      if (exponents.some((n) => n !== 0)) continue;
      const factor = weight.asRational;
      if (!factor) return undefined;
      sum = sum.add(factor.mul(turns.get(name) ?? Rational.zero));
    }
  return sum;
}
