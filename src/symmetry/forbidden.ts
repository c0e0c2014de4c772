// Which exact symmetry of the lattice forbids a monomial of a continuum Lagrangian. A point element forbids it when it maps it
// to minus itself up to a total derivative, the whole group when the average over the group (Reynolds operator) is a total
// derivative, a continuous shift when its first variation is none and no invariant combination of monomials contains it
// (invariantCompletion.ts). A shift by a polynomial does not decay, so it must also leave no extensive constant, the monomial on
// the shift itself: an exact symmetry of the lattice is one of the effective action with its constant.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial, type LaurentTerm } from '../exact/laurentPolynomial.ts';
import { Density, type JetMonomial, type JetSpace, type JetVariable } from '../limit/jets.ts';
import type { LinearForm } from '../model/action.ts';
import { type Field, type Lattice, timeAxis } from '../model/geometry.ts';
import { variationForms } from './brokenShift.ts';
import { transformDensity } from './continuumElement.ts';
import type { ShiftAnalysis, ShiftFamily } from './family.ts';
import { hasInvariantCompletion, polynomialConstant } from './invariantCompletion.ts';
import { elementText, type PointElement, type PointGroupAnalysis } from './pointGroup.ts';
import { testShiftFamily } from './shiftTest.ts';

export interface LatticeSymmetries {
  readonly space: JetSpace;
  readonly lattice: Lattice;
  readonly fields: readonly Field[];
  readonly pointGroup: PointGroupAnalysis;
  readonly shifts: ShiftAnalysis;
  readonly isTotalDerivative: (density: Density) => boolean;
  /** Whether the whole Lagrangian that the monomial comes from has the period 2π of an angle. Left out: judged by the
   *  discrete shifts alone, and not periodic where there are none. */
  readonly isPeriodic?: (field: number) => boolean;
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

function forbiddingShift(density: Density, symmetries: LatticeSymmetries): string | undefined {
  const { space, shifts, fields } = symmetries;
  const conditions = (d: Density): LinearForm[] => [
    ...variationForms(d, space.fields),
    ...windingForms(d, fields),
  ];
  const families = shifts.symmetries
    .filter((s) => s.lattice && s.family.discrete === undefined && s.family.phase.every((p) => p.isZero))
    .map((s) => s.family);
  const forms = conditions(density);
  const broken = families.filter(
    (f) => !testShiftFamily(f, forms, 'continuum') || !polynomialConstant(density, [f]).isZero,
  );
  if (broken.length === 0 && polynomialConstant(density, families).isZero) return undefined;
  const [monomial] = [...density.terms.keys()] as [JetMonomial];
  const isPossible = (chosen: readonly ShiftFamily[]): boolean | undefined =>
    hasInvariantCompletion(monomial, chosen, { space, conditions });
  const single = broken.find((f) => isPossible([f]) === false);
  if (single) return `the shift ${shiftText(single, fields)}`;
  const together = isPossible(families);
  if (together) return undefined;
  if (together === false) {
    const needed = [...families];
    for (const f of families) {
      const others = needed.filter((g) => g !== f);
      if (isPossible(others) === false) needed.splice(0, needed.length, ...others);
    }
    return `the shifts ${needed.map((f) => shiftText(f, fields)).join(' and ')} together`;
  }
  return (
    broken[0] &&
    `the shift ${shiftText(broken[0], fields)} (of the term alone; combinations of terms not searched)`
  );
}

function shiftText({ prefactor, profile }: ShiftFamily, fields: readonly Field[]): string {
  const moved = fields.filter((_, i) => (prefactor[i]?.length ?? 0) > 0).map((f) => f.name);
  return moved.length === 1 ? `${moved[0]} -> ${moved[0]} + ${profile}` : `by ${profile}`;
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

/** A polynomial in an undifferentiated angle is not periodic, whatever the action. It may be the Taylor term of a periodic
 *  function, though: then the shifts that are left decide, and whether the proposal as a whole has them. */
function forbiddingPeriod(density: Density, symmetries: LatticeSymmetries): string | undefined {
  const { space, shifts, fields, isPeriodic } = symmetries;
  const bare = [...density.terms.keys()]
    .flatMap((m) => space.factors(m))
    .find((v) => fields[v.field]!.values.kind === 'angle' && v.derivative.every((n) => n === 0));
  if (!bare) return undefined;
  const discrete = shifts.symmetries.filter(
    ({ lattice, family: f }) =>
      lattice &&
      f.discrete !== undefined &&
      f.free.length === 0 &&
      f.phase.every((p) => p.isZero) &&
      (f.prefactor[bare.field] ?? []).some((t) => t.exponents.every((n) => n === 0)),
  );
  const broken = discrete.find((s) => s.continuum === false);
  if (broken)
    return `the shift ${shiftText(broken.family, fields)}, which allows functions of that period only`;
  if (discrete.some((s) => s.continuum) || isPeriodic?.(bare.field)) return undefined;
  const name = space.fields[bare.field];
  return `the period ${name} -> ${name} + 2 pi, which allows periodic functions only`;
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
