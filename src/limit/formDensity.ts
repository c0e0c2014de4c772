// From an expression to a density in jets: on the lattice by the Taylor moments of its stencils about the centre of their support,
// in the continuum by its derivatives as they stand.

import { Coefficient } from '../exact/coefficient.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { Expression, LinearForm } from '../model/action.ts';
import { formsOf } from '../model/expression.ts';
import { addTerm, Density, type JetMonomial, type JetSpace } from './jets.ts';
import { composeDensity, type FormSeries, type Truncation } from './series.ts';

/** Centre of the bounding box of the supports of all linear forms in an expression, in lattice units. */
export function supportCentre(expression: Expression, dimension: number): Rational[] {
  const low = new Array<number>(dimension).fill(Number.POSITIVE_INFINITY);
  const high = new Array<number>(dimension).fill(Number.NEGATIVE_INFINITY);
  for (const form of formsOf(expression))
    for (const stencil of form.values())
      for (const { exponents } of stencil.terms)
        for (const [k, e] of exponents.entries()) {
          low[k] = Math.min(low[k]!, e);
          high[k] = Math.max(high[k]!, e);
        }
  return low.map((l, k) => (Number.isFinite(l) ? rational(l + high[k]!, 2) : Rational.zero));
}

/** The summands of an expression, each as a constant weight times a factor to be expanded about its own centre. */
export function summands(expression: Expression): { weight: Coefficient; factor: Expression }[] {
  if (expression.kind === 'sum') return expression.terms.flatMap(summands);
  if (expression.kind !== 'product') return [{ weight: Coefficient.one, factor: expression }];
  let weight = Coefficient.one;
  const factors: Expression[] = [];
  for (const f of expression.factors) {
    if (f.kind === 'constant') weight = weight.mul(f.value);
    else factors.push(f);
  }
  if (factors.length === 0) return [{ weight, factor: { kind: 'constant', value: Coefficient.one } }];
  if (factors.length > 1) return [{ weight, factor: { kind: 'product', factors } }];
  return summands(factors[0]!).map((t) => ({ weight: t.weight.mul(weight), factor: t.factor }));
}

/** True when some function of the expression acts on an undifferentiated field, so that no order in the spacings bounds
 *  the number of fields. `meanWeight` gives the value of a linear form on a constant field. */
export function needsFieldCut(expression: Expression, keepsConstant: (form: LinearForm) => boolean): boolean {
  switch (expression.kind) {
    case 'constant':
    case 'linear':
      return false;
    case 'sum':
      return expression.terms.some((t) => needsFieldCut(t, keepsConstant));
    case 'product':
      return expression.factors.some((f) => needsFieldCut(f, keepsConstant));
    case 'power':
      return expression.exponent < 0
        ? formsOf(expression.base).some(keepsConstant)
        : needsFieldCut(expression.base, keepsConstant);
    case 'function':
      return formsOf(expression.argument).some(keepsConstant);
  }
}

/** Multi-indices with |α| ≤ order that vanish along the axes outside `extended`. */
function multiIndices(extended: readonly boolean[], order: number): number[][] {
  let indices: number[][] = [[]];
  for (const isExtended of extended)
    indices = indices.flatMap((alpha) => {
      const left = isExtended ? order - alpha.reduce((x, y) => x + y, 0) : 0;
      return Array.from({ length: left + 1 }, (_, k) => [...alpha, k]);
    });
  return indices;
}

/** Taylor moments of the stencils of a linear form about a centre, as a series in jets (undivided: no spacings).
 *  The constant background adds a field-independent part. */
function latticeForm(
  space: JetSpace,
  centre: readonly Rational[],
  background: ReadonlyMap<string, Rational>,
): FormSeries {
  return (form, order) => {
    const out = new Map<JetMonomial, Coefficient>();
    for (const [name, stencil] of form) {
      const field = space.fields.indexOf(name);
      const offsets = stencil.terms.map(({ exponents }) =>
        exponents.map((e, k) => rational(e).sub(centre[k]!)),
      );
      const extended = centre.map((_, k) => offsets.some((v) => !v[k]!.isZero));
      const powers = offsets.map((v) => v.map((x, k) => dividedPowers(x, extended[k] ? order : 0)));
      for (const alpha of multiIndices(extended, order)) {
        let moment = Coefficient.zero;
        for (const [i, { weight }] of stencil.terms.entries()) {
          let factor = Rational.one;
          for (const [k, n] of alpha.entries()) if (n > 0) factor = factor.mul(powers[i]![k]![n]!);
          if (!factor.isZero) moment = moment.add(weight.scale(factor));
        }
        if (!moment.isZero) addTerm(out, space.monomial([{ field, derivative: alpha }]), moment);
      }
      const mean = background.get(name);
      if (mean) {
        const total = stencil.terms.reduce((s, t) => s.add(t.weight), Coefficient.zero);
        addTerm(out, '', total.scale(mean));
      }
    }
    return out;
  };
}

/** 1, v, v²/2!, …, v^n/n!. */
function dividedPowers(v: Rational, n: number): Rational[] {
  const out = [Rational.one];
  for (let k = 1; k <= n; k++) out.push(out[k - 1]!.mul(v).div(rational(k)));
  return out;
}

/** A differential operator as it stands. */
function continuumForm(space: JetSpace, background: ReadonlyMap<string, Rational>): FormSeries {
  return (form, order) => {
    const out = new Map<JetMonomial, Coefficient>();
    for (const [name, operator] of form) {
      const field = space.fields.indexOf(name);
      const mean = background.get(name);
      for (const { exponents, weight } of operator.terms) {
        const degree = exponents.reduce((x, y) => x + y, 0);
        if (degree <= order) addTerm(out, space.monomial([{ field, derivative: exponents }]), weight);
        if (mean && degree === 0) addTerm(out, '', weight.scale(mean));
      }
    }
    return out;
  };
}

/** True when a constant field changes the form. */
export const keepsConstantOnLattice = (form: LinearForm): boolean =>
  [...form.values()].some((s) => !s.terms.reduce((sum, t) => sum.add(t.weight), Coefficient.zero).isZero);

/** True when the form holds the undifferentiated field. */
export const keepsConstantInContinuum = (form: LinearForm): boolean =>
  [...form.values()].some((s) => s.terms.some((t) => t.exponents.every((e) => e === 0)));

/** Density of a continuum Lagrangian, in its own parameters, not in normal form.
 *  Throws LimitError and ExpansionPointError. */
export function continuumDensity(
  lagrangian: Expression,
  space: JetSpace,
  cut: Truncation,
  background: ReadonlyMap<string, Rational> = new Map(),
): Density {
  return composeDensity(lagrangian, cut, continuumForm(space, background), space);
}

/** Lattice density of one term per cell, undivided (no spacings), each summand about the centre of its own support. */
export function undividedDensity(
  expression: Expression,
  space: JetSpace,
  cut: Truncation,
  background: ReadonlyMap<string, Rational>,
): Density {
  let sum = Density.zero(space);
  for (const { weight, factor } of summands(expression)) {
    const centre = supportCentre(factor, space.axes.length);
    sum = sum.add(composeDensity(factor, cut, latticeForm(space, centre, background), space).scale(weight));
  }
  return sum;
}
