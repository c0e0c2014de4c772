// How one term of the lattice action scales on a family: on every region the value of F(u) − F(background) at the lowest
// order in ε that does not vanish, times the number of sites.

import { Coefficient } from '../exact/coefficient.ts';
import type { Rational } from '../exact/rational.ts';
import type { Expression, LinearForm } from '../model/action.ts';
import type { Lattice } from '../model/geometry.ts';
import { LimitError } from '../notation/source.ts';
import {
  addSeries,
  composeSeries,
  constantSeries,
  type EpsilonSeries,
  isZeroSeries,
} from './epsilonSeries.ts';
import { decisiveOrder, LatticeValues, siteCount } from './latticeValues.ts';
import type { Profile, Scaling } from './profile.ts';
import { dot, localFunctionals, type Region, regionsOf } from './regions.ts';
import { mostSingular, type ParameterScaling, scalingOf } from './scaling.ts';

/** What every scaling on the lattice needs. */
export interface LatticeSetting {
  readonly lattice: Lattice;
  readonly fields: readonly string[];
  /** Constant background by field name; absent means 0. */
  readonly background: ReadonlyMap<string, Rational>;
  readonly scaling: ParameterScaling;
}

/** Orders that are tried, as a multiple of the order at which the forms begin. Powers of fields above this are not
 *  looked for. */
const HIGHEST_POWER = 8;

/** All linear forms of an expression, as they stand. */
export function formsOf(expression: Expression): LinearForm[] {
  switch (expression.kind) {
    case 'constant':
      return [];
    case 'linear':
      return [expression.form];
    case 'sum':
      return expression.terms.flatMap(formsOf);
    case 'product':
      return expression.factors.flatMap(formsOf);
    case 'power':
      return formsOf(expression.base);
    case 'function':
      return formsOf(expression.argument);
  }
}

/** Sites that the forms of an expression touch, relative to the cell. */
export const offsetsOf = (forms: readonly LinearForm[]): (readonly number[])[] =>
  forms.flatMap((form) => [...form.values()].flatMap((p) => p.terms.map((t) => t.exponents)));

/** Scaling of one term of the parent, summed over all cells. Throws LimitError when the order at which it begins lies
 *  beyond those tried, and ExpansionPointError for a negative power of zero. */
export function latticeScaling(expression: Expression, profile: Profile, setting: LatticeSetting): Scaling {
  const forms = formsOf(expression);
  const offsets = offsetsOf(forms);
  if (offsets.length === 0) return 'zero';
  const decisive = decisiveOrder(profile, offsets);
  const reach = (row: readonly number[]): readonly [number, number] => {
    const along = offsets.map((v) => dot(row, v));
    return [-Math.max(...along), -Math.min(...along)];
  };
  const regions = regionsOf(localFunctionals(profile), setting.lattice.axes.length, reach);
  return mostSingular(
    regions.map((region) => {
      const density = leadingDensity(expression, forms, decisive, profile, region, setting);
      return scalingOf(density.mul(siteCount(setting.lattice, region)), setting.lattice, setting.scaling);
    }),
  );
}

/** Value of the linear form on the constant background. */
export function mean(form: LinearForm, background: ReadonlyMap<string, Rational>): Coefficient {
  let sum = Coefficient.zero;
  for (const [name, stencil] of form) {
    const value = background.get(name);
    if (value) for (const t of stencil.terms) sum = sum.add(t.weight.scale(value));
  }
  return sum;
}

/** Lowest non-vanishing part of F(u) − F(background) on one region; zero when it vanishes identically. */
function leadingDensity(
  expression: Expression,
  forms: readonly LinearForm[],
  decisive: number,
  profile: Profile,
  region: Region,
  setting: LatticeSetting,
): Coefficient {
  const { lattice, fields, background } = setting;
  const exact = new LatticeValues(profile, lattice, fields, region, decisive);
  const begins = new Map<LinearForm, number>();
  for (const form of forms) {
    const at = exact.form(form).findIndex((c) => !c.isZero);
    if (at >= 0) begins.set(form, at);
  }
  if (begins.size === 0 || vanishesOn(expression, begins, background)) return Coefficient.zero;
  const degree = polynomialDegree(expression);
  const highest =
    degree === undefined ? HIGHEST_POWER * Math.max(...begins.values()) : Math.max(degree, 1) * decisive;
  for (let order = 0; order <= highest; order++) {
    const values = order === decisive ? exact : new LatticeValues(profile, lattice, fields, region, order);
    const known = new Map<LinearForm, EpsilonSeries>();
    const formValue = (form: LinearForm): EpsilonSeries => {
      const value =
        known.get(form) ?? addSeries(values.form(form), constantSeries(mean(form, background), order));
      known.set(form, value);
      return value;
    };
    const density = differenceSeries(expression, order, formValue, background);
    if (!isZeroSeries(density)) return density.find((c) => !c.isZero)!;
  }
  // without smooth directions order zero is all there is, and a polynomial ends at its degree
  if (highest === 0 || degree !== undefined) return Coefficient.zero;
  throw new LimitError(
    `the action on this family begins with more than ${HIGHEST_POWER} powers of the field; higher ones are not looked for`,
  );
}

/** F(u) − F(background) through ε^order. */
function differenceSeries(
  expression: Expression,
  order: number,
  formValue: (form: LinearForm) => EpsilonSeries,
  background: ReadonlyMap<string, Rational>,
): EpsilonSeries {
  const value = composeSeries(expression, order, formValue);
  const constant = composeSeries(expression, 0, (form) => [mean(form, background)])[0]!;
  return addSeries(value, constantSeries(constant.neg(), order));
}

/** True when the action does not depend on the forms that are left, whatever their values. */
function vanishesOn(
  expression: Expression,
  begins: ReadonlyMap<LinearForm, number>,
  background: ReadonlyMap<string, Rational>,
): boolean {
  const numbers = new Map([...begins.keys()].map((form, i) => [form, i]));
  const formValue = (form: LinearForm): EpsilonSeries => {
    const i = numbers.get(form);
    const base = mean(form, background);
    return [i === undefined ? base : base.add(Coefficient.symbol(`@form${i}`))];
  };
  return isZeroSeries(differenceSeries(expression, 0, formValue, background));
}

/** Degree of a polynomial in the forms; undefined where a function or a negative power occurs. */
function polynomialDegree(e: Expression): number | undefined {
  const over = (parts: readonly Expression[], join: (x: number, y: number) => number): number | undefined => {
    const degrees = parts.map(polynomialDegree);
    return degrees.some((d) => d === undefined) ? undefined : (degrees as number[]).reduce(join, 0);
  };
  switch (e.kind) {
    case 'constant':
      return 0;
    case 'linear':
      return 1;
    case 'sum':
      return over(e.terms, (x, y) => Math.max(x, y));
    case 'product':
      return over(e.factors, (x, y) => x + y);
    case 'power': {
      const base = polynomialDegree(e.base);
      return e.exponent < 0 || base === undefined ? undefined : base * e.exponent;
    }
    case 'function':
      return undefined;
  }
}
