// Which exact symmetry of the lattice forbids a monomial of a continuum Lagrangian. A point element forbids it when it maps it
// to minus itself up to a total derivative, the whole group when the average over the group (Reynolds operator) is a total
// derivative, a continuous shift when the first variation is none. A shift by a polynomial does not decay, so it must also
// leave no extensive constant, the monomial on the shift itself: an exact symmetry of the lattice is one of the effective action
// with its constant.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial, type LaurentTerm } from '../exact/laurentPolynomial.ts';
import { type Rational, rational } from '../exact/rational.ts';
import { Density, type JetMonomial, type JetSpace, type JetVariable } from '../limit/jets.ts';
import type { LinearForm } from '../model/action.ts';
import { type Field, type Lattice, timeAxis } from '../model/geometry.ts';
import { variationForms } from './brokenShift.ts';
import { transformDensity } from './continuumElement.ts';
import type { CoordinatePolynomial, ShiftAnalysis, ShiftFamily } from './family.ts';
import { elementText, type PointElement, type PointGroupAnalysis } from './pointGroup.ts';
import { testShiftFamily } from './shiftTest.ts';

export interface LatticeSymmetries {
  readonly space: JetSpace;
  readonly lattice: Lattice;
  readonly fields: readonly Field[];
  readonly pointGroup: PointGroupAnalysis;
  readonly shifts: ShiftAnalysis;
  readonly isTotalDerivative: (density: Density) => boolean;
}

/** The symmetry that forbids the monomial, in words, or null when none does: then nothing protects against it and it will be
 *  generated. Symmetries with a smooth parameter only: staggered shifts do not act on continuum fields. */
export function forbiddingSymmetry(monomial: JetMonomial, symmetries: LatticeSymmetries): string | null {
  const density = new Density(symmetries.space, new Map([[monomial, Coefficient.one]]));
  return (
    forbiddingShift(density, symmetries) ??
    forbiddingPeriod(density, symmetries) ??
    forbiddingMap(density, symmetries)
  );
}

function forbiddingShift(density: Density, { space, shifts, fields }: LatticeSymmetries): string | undefined {
  const forms = [...variationForms(density, space.fields), ...windingForms(density, fields)];
  const family = shifts.symmetries.find(
    ({ lattice, family: f }) =>
      lattice &&
      f.discrete === undefined &&
      f.phase.every((p) => p.isZero) &&
      (!testShiftFamily(f, forms, 'continuum') || leavesConstant(density, f)),
  )?.family;
  if (!family) return undefined;
  const moved = fields.filter((_, i) => (family.prefactor[i]?.length ?? 0) > 0).map((f) => f.name);
  return moved.length === 1
    ? `the shift ${moved[0]} -> ${moved[0]} + ${family.profile}`
    : `the shift by ${family.profile}`;
}

/** True when a shift by a polynomial leaves a field-independent term: Π ∂^α λ does not vanish identically. */
function leavesConstant(density: Density, { free, prefactor }: ShiftFamily): boolean {
  if (free.length > 0) return false;
  const sum = [...density.terms].reduce((total, [monomial, coefficient]) => {
    const value = density.space
      .factors(monomial)
      .reduce(
        (product, f) => product.mul(derivativeAt(prefactor[f.field] ?? [], f.derivative)),
        Coefficient.one,
      );
    return total.add(coefficient.mul(value));
  }, Coefficient.zero);
  return !sum.isZero;
}

/** ∂^α of a polynomial, with its coordinates kept as generators. */
function derivativeAt(polynomial: CoordinatePolynomial, alpha: readonly number[]): Coefficient {
  return polynomial.reduce((sum, { exponents, weight }) => {
    let factor = 1;
    for (const [k, n] of alpha.entries()) for (let i = 0; i < n; i++) factor *= exponents[k]! - i;
    if (factor === 0) return sum;
    const powers = exponents.map((e, k): [string, Rational] => [`coordinate ${k}`, rational(e - alpha[k]!)]);
    return sum.add(weight.mul(Coefficient.monomial(rational(factor), powers)));
  }, Coefficient.zero);
}

/** For angles the derivative ∂_k φ is a total derivative of something that is not single-valued: it counts windings, and must
 *  not be left over in the variation. The variation (∂^α λ)(∂^β φ) of a quadratic monomial is, up to derivatives of
 *  single-valued fields, ± (∂^{α+β−e_k} λ) ∂_k φ for any k in β; these are the forms in front of ∂_k φ. */
function windingForms(density: Density, fields: readonly Field[]): LinearForm[] {
  const { space } = density;
  const dimension = space.axes.length;
  const sums = new Map<string, { field: string; terms: LaurentTerm[] }>();
  for (const [monomial, coefficient] of density.terms) {
    if (monomial.length !== 2) continue;
    const [x, y] = space.factors(monomial) as [JetVariable, JetVariable];
    for (const [moved, kept] of [
      [x, y],
      [y, x],
    ] as const) {
      const k = kept.derivative.findIndex((n) => n > 0);
      if (k < 0 || fields[kept.field]!.values.kind !== 'angle') continue;
      const order = kept.derivative.reduce((sum, n) => sum + n, 0);
      const exponents = moved.derivative.map((n, i) => n + kept.derivative[i]! - (i === k ? 1 : 0));
      const weight = order % 2 === 1 ? coefficient : coefficient.neg();
      const key = `${kept.field},${k},${moved.field}`;
      const sum = sums.get(key) ?? { field: space.fields[moved.field]!, terms: [] };
      sums.set(key, sum);
      sum.terms.push({ exponents, weight });
    }
  }
  return [...sums.values()].map(
    ({ field, terms }) => new Map([[field, LaurentPolynomial.of(dimension, terms)]]),
  );
}

/** A polynomial in an undifferentiated angle is not periodic, whatever the action. */
function forbiddingPeriod(density: Density, { space, fields }: LatticeSymmetries): string | undefined {
  for (const monomial of density.terms.keys())
    for (const { field, derivative } of space.factors(monomial))
      if (fields[field]!.values.kind === 'angle' && derivative.every((n) => n === 0))
        return `the period ${space.fields[field]} -> ${space.fields[field]} + 2 pi, which allows periodic functions only`;
  return undefined;
}

function forbiddingMap(density: Density, symmetries: LatticeSymmetries): string | null {
  const { pointGroup, isTotalDerivative } = symmetries;
  const flips = pointGroup.elements.filter((e) =>
    isTotalDerivative(transformDensity(density, e).add(density)),
  );
  if (flips.length > 0) return simplest(flips, symmetries);
  const average = pointGroup.elements.reduce(
    (sum, e) => sum.add(transformDensity(density, e)),
    Density.zero(symmetries.space),
  );
  return isTotalDerivative(average) ? 'the point group as a whole' : null;
}

/** The element that changes least, in words. */
function simplest(elements: readonly PointElement[], { lattice, fields }: LatticeSymmetries): string {
  const names = lattice.axes.map((x) => x.name);
  const describe = (e: PointElement): string => {
    const map = elementText(e.matrix, names);
    const signs = e.fields.flatMap((image, i) =>
      image.field === i && image.sign === 1
        ? []
        : [`${fields[i]!.name} -> ${image.sign < 0 ? '-' : ''}${fields[image.field]!.name}`],
    );
    return [...(map === 'identity' ? [] : [map]), ...signs].join(' with ');
  };
  const time = timeAxis(lattice);
  const isTimeOnly = (e: PointElement): boolean =>
    e.matrix.every((row, i) => row[i] === 1 || (i === time && row[i] === -1));
  const kind = (e: PointElement): string =>
    e.matrix.every((row, i) => row[i] === 1)
      ? 'the field reflection'
      : isTimeOnly(e)
        ? 'the time reflection'
        : 'the lattice map';
  const sorted = [...elements].sort((x, y) => describe(x).length - describe(y).length);
  return `${kind(sorted[0]!)} ${describe(sorted[0]!)}`;
}
