// Shift symmetries of a case: families on the lattice and in the continuum, which of them correspond, which lattice correction
// breaks the others, and how complete the lists are.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { rank } from '../exact/matrix.ts';
import { Rational } from '../exact/rational.ts';
import type { LinearForm } from '../model/action.ts';
import type { Status } from '../model/claim.ts';
import { type Field, type Lattice, spaceAxes, timeAxis } from '../model/geometry.ts';
import { type CorrectionMonomial, firstBreaking } from './brokenShift.ts';
import { continuumCompleteness, latticeCompleteness } from './completeness.ts';
import { onAllAxes, type ShiftSystem, shiftSystem } from './constantSystem.ts';
import { discreteShifts } from './discreteShifts.ts';
import type { ShiftAnalysis, ShiftFamily, ShiftSymmetry } from './family.ts';
import { freeDirections } from './functionals.ts';
import { polynomialSolutions } from './polynomialSolutions.ts';
import type { FoundFamily } from './restriction.ts';
import { profileText } from './shiftProfile.ts';
import { directionsOf, functionalsOf, searchShifts } from './shiftSearch.ts';
import { testShiftFamily } from './shiftTest.ts';

export type { CorrectionMonomial } from './brokenShift.ts';
export { testShiftFamily } from './shiftTest.ts';

export interface ShiftInput {
  readonly lattice: Lattice;
  readonly fields: readonly Field[];
  /** Linear forms of the parent action in the shift operators. */
  readonly latticeForms: readonly LinearForm[];
  /** Linear forms of the continuum Lagrangian in the derivatives; null without one. */
  readonly continuumForms: readonly LinearForm[] | null;
  /** Whether a discrete shift of angles leaves the continuum Lagrangian as it is: its forms alone do not say which of them stand
   *  in periodic functions. Left out, every form must be annihilated. */
  readonly discreteInContinuum?: (family: ShiftFamily) => boolean;
  /** Monomials of the corrections to the continuum action, for what breaks a continuum-only shift. */
  readonly corrections?: readonly CorrectionMonomial[];
}

/** Finds and compares the shift symmetries of lattice and continuum. Lattice coordinates are counted in steps, continuum ones
 *  in lengths; a polynomial shift of the lattice corresponds to its part of highest degree, which is what is left as a → 0.
 *  Throws LimitError for weights that exact search cannot hold. */
export function analyseShifts(input: ShiftInput): ShiftAnalysis {
  const { lattice, fields, latticeForms, continuumForms } = input;
  const names = fields.map((f) => f.name);
  const angles = fields.map((f) => f.values.kind === 'angle');
  const dimension = lattice.axes.length;
  const oblique = spaceAxes(lattice);
  const system = shiftSystem('lattice', latticeForms, names, dimension);
  const directions = directionsOf(system, oblique);
  const search = searchShifts(system, directions);
  const discrete =
    system.isIntegral && angles.some((a) => a) ? discreteShifts(system, directions, angles) : undefined;
  const certificate = latticeCompleteness(
    system,
    search,
    discrete,
    lattice.axes.map((a) => a.name),
  );
  const found = named(system, [...search.families, ...(discrete?.families ?? [])], input);
  if (!continuumForms)
    return {
      symmetries: found.map((family) => symmetry(family, true, null, input)),
      lattice: certificate,
      continuum: null,
    };
  const smooth = shiftSystem('continuum', continuumForms, names, dimension);
  const smoothSearch = searchShifts(smooth, directionsOf(smooth, oblique));
  const inContinuum = (family: ShiftFamily): boolean =>
    family.discrete !== undefined && input.discreteInContinuum
      ? input.discreteInContinuum(family)
      : holdsIn(smooth, continuumForms, family, lattice);
  const symmetries = found.map((family) => symmetry(family, true, inContinuum(family), input));
  for (const family of named(smooth, smoothSearch.families, input))
    if (!holdsIn(system, latticeForms, family, lattice))
      symmetries.push(symmetry(family, false, true, input));
  return {
    symmetries,
    lattice: certificate,
    continuum: continuumCompleteness(smooth, smoothSearch),
  };
}

/** Families over all axes of the case, with profiles; functions of different arguments get different letters. */
function named(
  system: ShiftSystem,
  families: readonly (FoundFamily & { readonly order?: number })[],
  input: ShiftInput,
): ShiftFamily[] {
  const letters = new Map<string, string>();
  const time = timeAxis(input.lattice);
  const isTime = (row: readonly number[]): boolean => row.every((e, k) => e === 0 || k === time);
  return families.map((f) => {
    const rows = functionalsOf(system, f);
    const free = [...rows.filter((r) => !isTime(r)), ...rows.filter(isTime)];
    const key = JSON.stringify(free);
    const letter = letters.get(key) ?? (['f', 'g', 'h'][letters.size % 3] as string);
    if (free.length > 0) letters.set(key, letter);
    const family = {
      prefactor: f.amplitudes.map((p) =>
        p.terms.map((t) => ({ exponents: onAllAxes(system, t.exponents), weight: t.weight })),
      ),
      fields: system.fields,
      phase: onAllAxes(system, f.phase).map((e) => Rational.of(e, 12)),
      free,
      discrete: f.order,
      profile: '',
    };
    return { ...family, profile: profileText(family, input.lattice, letter) };
  });
}

function symmetry(
  family: ShiftFamily,
  onLattice: boolean,
  inContinuum: boolean | null,
  { lattice, fields, latticeForms, continuumForms, corrections = [] }: ShiftInput,
): ShiftSymmetry {
  const status: Status = !onLattice ? 'continuum-only' : inContinuum ? 'survives' : 'lattice-only';
  const space = spaceAxes(lattice);
  const spaceRows = family.free.map((row) => space.map((k) => Rational.of(row[k]!)));
  const breaking = (): ShiftSymmetry['brokenBy'] =>
    firstBreaking(
      family,
      corrections,
      fields.map((f) => f.name),
      lattice.axes.map((a) => a.name),
    );
  return {
    family,
    lattice: onLattice,
    continuum: inContinuum,
    status,
    growth: rank(spaceRows, space.length),
    redundancy: onLattice
      ? mayDependOnTime(family, lattice, latticeForms, 'lattice')
      : mayDependOnTime(family, lattice, continuumForms ?? [], 'continuum'),
    brokenBy: status === 'continuum-only' ? breaking() : null,
  };
}

/** True when the family stays a symmetry with the time coordinate among its free arguments. */
function mayDependOnTime(
  family: ShiftFamily,
  lattice: Lattice,
  forms: readonly LinearForm[],
  kind: 'lattice' | 'continuum',
): boolean {
  const time = timeAxis(lattice);
  if (time === undefined) return false;
  const row = lattice.axes.map((_, k) => (k === time ? 1 : 0));
  return testShiftFamily({ ...family, free: [...family.free, row] }, forms, kind);
}

/** True when the other side has the family, or a polynomial shift with the same part of highest degree. */
function holdsIn(
  other: ShiftSystem,
  forms: readonly LinearForm[],
  family: ShiftFamily,
  lattice: Lattice,
): boolean {
  const { kind } = other;
  if (kind === 'continuum' && family.discrete !== undefined)
    return testShiftFamily({ ...family, discrete: undefined }, forms, kind);
  const comparable = mixesSpacings(family, lattice)
    ? forms.map((form) => inLatticeUnits(form, lattice, kind))
    : forms;
  if (testShiftFamily(family, comparable, kind)) return true;
  return family.phase.every((x) => x.isZero) && hasLeadingPart(other, family);
}

/** True when a functional combines axes with different spacings, so that steps and lengths differ. */
const mixesSpacings = (family: ShiftFamily, lattice: Lattice): boolean =>
  family.free.some(
    (row) => new Set(lattice.axes.flatMap((a, k) => (row[k] === 0 ? [] : [a.spacing]))).size > 1,
  );

/** ∂_k → ∂_k / spacing, for coordinates counted in steps. */
function inLatticeUnits(form: LinearForm, lattice: Lattice, kind: 'lattice' | 'continuum'): LinearForm {
  if (kind === 'lattice') return form;
  return new Map(
    [...form].map(([name, d]) => [
      name,
      LaurentPolynomial.of(
        d.dimension,
        d.terms.map((t) => ({
          exponents: t.exponents,
          weight: t.exponents.reduce(
            (w, e, k) => w.mul(Coefficient.symbol(lattice.axes[k]!.spacing, Rational.of(-e))),
            t.weight,
          ),
        })),
      ),
    ]),
  );
}

/** True when the system has a solution with the same free functionals whose part of highest degree is that of the family. */
function hasLeadingPart(system: ShiftSystem, family: ShiftFamily): boolean {
  const dropped = Array.from({ length: system.fullDimension }, (_, k) => k).filter(
    (k) => !system.axes.includes(k),
  );
  const touches = (e: readonly number[]): boolean => dropped.some((k) => e[k] !== 0);
  if (family.free.some(touches) || family.prefactor.some((p) => p.some((t) => touches(t.exponents))))
    return false;
  const kept = (e: readonly number[]): number[] => system.axes.map((k) => e[k]!);
  const free = freeDirections(family.free.map(kept), system.axes.length);
  if (!free) return false;
  const total = (e: readonly number[]): number => e.reduce((s, n) => s + n, 0);
  const degree = Math.max(...family.prefactor.flatMap((p) => p.map((t) => total(t.exponents))));
  if (degree === 0) return false;
  const top = (amplitudes: readonly (readonly { exponents: readonly number[]; weight: Coefficient }[])[]) =>
    new Map(
      amplitudes.flatMap((p, j) =>
        p
          .filter((t) => total(t.exponents) === degree)
          .map((t): [string, Rational] => [`${j}:${t.exponents.join()}`, t.weight.asRational!]),
      ),
    );
  const trivial = system.axes.map(() => 0);
  const solutions = polynomialSolutions(system, free, trivial, degree).map((a) => top(a.map((p) => p.terms)));
  const wanted = top(family.prefactor.map((p) => p.map((t) => ({ ...t, exponents: kept(t.exponents) }))));
  const keys = [...new Set([wanted, ...solutions].flatMap((m) => [...m.keys()]))];
  const vector = (m: ReadonlyMap<string, Rational>): Rational[] => keys.map((k) => m.get(k) ?? Rational.zero);
  const span = solutions.map(vector);
  return rank([...span, vector(wanted)], keys.length) === rank(span, keys.length);
}
