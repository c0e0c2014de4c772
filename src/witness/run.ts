// Numerical witnesses of exact results: lattice sums of every family at growing size against its exact exponent, and the
// approach of a smooth field's action to its continuum value against the first correction. They confirm or contradict; they
// decide nothing.

import type { Coefficient } from '../exact/coefficient.ts';
import type { JetMonomial } from '../limit/jets.ts';
import { spaceAxes, timeAxis } from '../model/geometry.ts';
import type { RoughInput } from '../rough/configurations.ts';
import type { FamilyProfile } from '../rough/familyProfile.ts';
import type { Configuration } from '../rough/profile.ts';
import { compileExpression, sliceSum, tabulated } from './latticeSum.ts';
import { familySample, SmoothField } from './sampleField.ts';
import type { WitnessRecord } from './witness.ts';

export interface WitnessInput extends RoughInput {
  readonly configurations: readonly Configuration[];
  readonly profiles: ReadonlyMap<string, FamilyProfile>;
}

/** Sizes by number of space dimensions; each doubles the one before. */
const FAMILY_SIZES: readonly (readonly number[])[] = [[], [32, 64, 128], [8, 16, 32], [4, 8, 16]];
const SMOOTH_SIZES: readonly (readonly number[])[] = [[], [16, 32, 64, 128], [8, 16, 32], [8, 16, 32]];
/** Points per direction for the integrals of smooth fields, which are trigonometric polynomials. */
const QUADRATURE: readonly number[] = [1, 64, 24, 18];

/** Fitted exponents closer than this confirm, farther than the second contradict. */
const CONFIRMS = 0.25;
const CONTRADICTS = 0.6;
const NOTHING = 1e-18;

/** All witnesses of a case; none for a lattice without space axes or with more than three. */
export function runWitnesses(input: WitnessInput): WitnessRecord[] {
  const dimension = spaceAxes(input.case.lattice).length;
  if (dimension === 0 || dimension > 3) return [];
  const families = input.configurations.flatMap((c) => {
    const record = familyWitness(c, input, dimension);
    return record ? [record] : [];
  });
  const smooth = smoothWitness(input, dimension);
  return smooth ? [...families, smooth] : families;
}

/** Values of the parent's parameters at spacing a = 1/size, b = 1: one, times the powers that keep the limit fixed. */
function parameterValues(input: RoughInput, size: number): Map<string, number> {
  const { lattice, parameters } = input.case;
  const time = timeAxis(lattice);
  const timeSpacing = time === undefined ? undefined : lattice.axes[time]!.spacing;
  const values = new Map(lattice.limits.map((s) => [s, s === timeSpacing ? 1 : 1 / size]));
  for (const { name } of parameters) {
    let value = 1;
    for (const [spacing, n] of input.matching.scaling.get(name) ?? [])
      value *= values.get(spacing)! ** n.toNumber();
    values.set(name, value);
  }
  return values;
}

const slope = (values: readonly number[]): number => Math.log2(Math.abs(values.at(-2)! / values.at(-1)!));

function verdictOf(distance: number): WitnessRecord['verdict'] {
  return distance < CONFIRMS ? 'confirms' : distance > CONTRADICTS ? 'contradicts' : 'inconclusive';
}

function familyWitness(
  configuration: Configuration,
  input: WitnessInput,
  dimension: number,
): WitnessRecord | undefined {
  const { lattice, parent } = input.case;
  const profile = input.profiles.get(configuration.profile)!;
  const time = timeAxis(lattice);
  const sizes = FAMILY_SIZES[dimension]!;
  const values: number[] = [];
  for (const size of sizes) {
    const sampled = familySample(profile, size, sizes[0]!, time);
    if (!sampled) return undefined;
    const space = spaceAxes(lattice);
    const field = tabulated(sampled, size, space);
    const parameters = parameterValues(input, size);
    const density = parent.terms.map((t) => compileExpression(t.expression, parameters, profile.field));
    const origin = lattice.axes.map(() => 0);
    const vacuum = density.reduce((s, d) => s + d(origin, () => 0), 0) * size ** space.length;
    const sum = sliceSum(
      (site, f) => density.reduce((s, d) => s + d(site, f), 0),
      field,
      size,
      lattice.axes.length,
      space,
    );
    values.push(sum - vacuum);
  }
  const isNothing = values.every((v) => Math.abs(v) < NOTHING);
  const exact = configuration.lattice;
  if (exact === 'zero' || isNothing) {
    const agrees = exact === 'zero' && values.every((v) => Math.abs(v) < 1e-9);
    return {
      kind: 'configuration',
      subject: configuration.profile,
      sizes,
      values,
      predicted: { exponent: exact === 'zero' ? 0 : exact.a.toNumber() },
      fitted: { exponent: 0 },
      verdict: agrees ? 'confirms' : 'contradicts',
      text: agrees
        ? `the lattice sums vanish to rounding, as they must`
        : `the lattice sums ${isNothing ? 'vanish' : 'do not vanish'}, against the exact result`,
    };
  }
  const predicted = exact.a.toNumber();
  const fitted = slope(values);
  return {
    kind: 'configuration',
    subject: configuration.profile,
    sizes,
    values,
    predicted: { exponent: predicted },
    fitted: { exponent: fitted },
    verdict: verdictOf(Math.abs(fitted - predicted)),
    text: `lattice sums scale like a^${fitted.toFixed(2)}, exactly a^${exact.a}`,
  };
}

/** Integral over the unit cell of a product of derivatives of the smooth field. */
function integral(factors: readonly (readonly number[])[], field: SmoothField, dimension: number): number {
  const points = QUADRATURE[dimension]!;
  const point = new Array<number>(dimension).fill(0);
  let sum = 0;
  const visit = (k: number): void => {
    if (k === dimension) {
      sum += factors.reduce((p, alpha) => p * field.derivative(point, alpha), 1);
      return;
    }
    for (let i = 0; i < points; i++) {
      point[k] = i / points;
      visit(k + 1);
    }
  };
  visit(0);
  return sum / points ** dimension;
}

/** Static part of the orders of the expansion: total order and the action of the smooth field at spacing 1/size. */
function continuumActions(input: WitnessInput, field: SmoothField, dimension: number) {
  const { lattice, fields } = input.case;
  const space = spaceAxes(lattice);
  const time = timeAxis(lattice);
  const jets = input.expansion.space;
  const cache = new Map<JetMonomial, number>();
  const varied = jets.fields.indexOf(fields[0]!.name);
  const integrated = (m: JetMonomial): number => {
    const known = cache.get(m);
    if (known !== undefined) return known;
    const factors = jets.factors(m);
    const isStatic = factors.every(
      (f) => f.field === varied && (time === undefined || f.derivative[time] === 0),
    );
    const value = isStatic
      ? integral(
          factors.map((f) => space.map((k) => f.derivative[k]!)),
          field,
          dimension,
        )
      : 0;
    cache.set(m, value);
    return value;
  };
  return (terms: readonly { monomial: JetMonomial; coefficient: Coefficient }[], size: number): number => {
    const values = parameterValues(input, size);
    return terms.reduce((sum, t) => sum + t.coefficient.toNumber(values) * integrated(t.monomial), 0);
  };
}

/** Lattice sums of a smooth static field against the leading continuum action: the error must vanish with the first correction
 *  that is not zero on it, and with its coefficient. Left out where the expansion was cut in the number of fields. */
function smoothWitness(input: WitnessInput, dimension: number): WitnessRecord | undefined {
  const { lattice, parent, fields } = input.case;
  if (input.expansion.fieldCut !== undefined) return undefined;
  const space = spaceAxes(lattice);
  const field = new SmoothField(dimension);
  const sizes = SMOOTH_SIZES[dimension]!;
  const actionOf = continuumActions(input, field, dimension);
  const { orders } = input.expansion;
  const leading = orders.filter((o) => o.total <= 0).flatMap((o) => o.terms);
  if (Math.abs(actionOf(leading, 1)) < 1e-9) return undefined;
  const totals = [...new Set(orders.map((o) => o.total))].filter((n) => n > 0).sort((x, y) => x - y);
  const corrections = totals.map((total) => ({
    total,
    terms: orders.filter((o) => o.total === total).flatMap((o) => o.terms),
  }));
  const correction = corrections.find((c) => Math.abs(actionOf(c.terms, 1)) > 1e-9);
  if (!correction) return undefined;
  const errors = sizes.map((size) => {
    const values = parameterValues(input, size);
    const terms = parent.terms.map((t) => compileExpression(t.expression, values, fields[0]!.name));
    const onSites = tabulated(
      (site) =>
        field.derivative(
          space.map((k) => site[k]! / size),
          space.map(() => 0),
        ),
      size,
      space,
    );
    const sum = sliceSum(
      (site, f) => terms.reduce((s, t) => s + t(site, f), 0),
      onSites,
      size,
      lattice.axes.length,
      space,
    );
    return sum - actionOf(leading, size);
  });
  const order = correction.total;
  const coefficients = errors.map((e, i) => e * sizes[i]! ** order);
  const fitted = slope(errors);
  // Richardson: the next correction is two orders higher.
  const limit = (4 * coefficients.at(-1)! - coefficients.at(-2)!) / 3;
  const predicted = actionOf(correction.terms, 1);
  const relative = Math.abs(limit / predicted - 1);
  const byExponent = verdictOf(Math.abs(fitted - order));
  const verdict =
    byExponent !== 'confirms'
      ? byExponent
      : relative > 0.2
        ? 'contradicts'
        : relative > 0.05
          ? 'inconclusive'
          : 'confirms';
  return {
    kind: 'smooth-limit',
    subject: 'a smooth periodic field',
    sizes,
    values: errors,
    predicted: { exponent: order, coefficient: predicted },
    fitted: { exponent: fitted, coefficient: limit },
    verdict,
    text: `the action of a smooth field approaches its continuum value like a^${fitted.toFixed(2)}, with coefficient ${limit.toPrecision(4)}; the expansion says a^${order} with ${predicted.toPrecision(4)}`,
  };
}
