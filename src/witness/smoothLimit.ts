// The smooth limit: the action of a smooth periodic field on finer and finer lattices against the exact integral of the
// leading expansion. The error must vanish with the order of the first correction and with the coefficient that the
// integral of that correction gives. All spacings, that of time too, shrink together at a fixed ratio.

import type { Expansion, ExpansionTerm } from '../limit/expansion.ts';
import type { Matching } from '../limit/matching.ts';
import type { Case } from '../model/case.ts';
import { fitPower } from './fit.ts';
import { LatticeBox, onSites } from './latticeSum.ts';
import { parametersAt } from './parameters.ts';
import type { WitnessRecord } from './witness.ts';

/** Sizes by the number of axes. */
const SIZES: readonly (readonly number[])[] = [[], [16, 32, 64, 128], [16, 32, 64], [8, 16, 32], [6, 9, 12]];
/** Relative size below which an integral or an error is rounding. */
const ROUNDING = 1e-11;
/** Part of the error that the known orders may leave; beyond the second, and no faster than they, it contradicts. */
const CLOSE = 0.05;
const FAR = 0.25;
/** Amplitude of the test field where the expansion was cut in the number of fields, which leaves out high powers. */
const SMALL = 0.1;

interface Mode {
  readonly amplitude: number;
  readonly waves: readonly number[];
  readonly phases: readonly number[];
}

/** Two waves of incompatible phases per field; each axis of length one holds whole periods. */
function testModes(field: number, dimension: number, scale: number): Mode[] {
  const axes = Array.from({ length: dimension }, (_, k) => k);
  return [
    { amplitude: 0.31 * scale, waves: axes.map(() => 1), phases: axes.map((k) => 0.3 + 0.7 * k + field) },
    {
      amplitude: 0.17 * scale,
      waves: axes.map((k) => (k === dimension - 1 ? 2 : 1)),
      phases: axes.map((k) => 1.1 + 0.4 * k + 0.6 * field),
    },
  ];
}

/** ∂^α of the test field on a grid with the given points along every axis. */
function onGrid(modes: readonly Mode[], points: readonly number[], alpha: readonly number[]): Float64Array {
  const tables = modes.map(({ waves, phases }) =>
    points.map((n, k) => {
      const wave = 2 * Math.PI * waves[k]!;
      const order = alpha[k]!;
      return Array.from(
        { length: n },
        (_, x) => wave ** order * Math.sin((wave * x) / n + phases[k]! + (order * Math.PI) / 2),
      );
    }),
  );
  return onSites(points, (site) =>
    modes.reduce(
      (sum, { amplitude }, i) => sum + site.reduce((p, x, k) => p * tables[i]![k]![x]!, amplitude),
      0,
    ),
  );
}

/** Integrals of jet monomials over the unit cell of the test field. The integrands are trigonometric polynomials, so the
 *  sum over an equidistant grid finer than their degree is exact. */
class ExactIntegrals {
  private readonly grids = new Map<string, Float64Array>();
  private readonly points: readonly number[];

  constructor(
    private readonly expansion: Expansion,
    private readonly modes: readonly (readonly Mode[])[],
  ) {
    const longest = Math.max(2, ...expansion.orders.flatMap((o) => o.terms.map((t) => t.monomial.length)));
    const dimension = expansion.space.axes.length;
    this.points = Array.from(
      { length: dimension },
      (_, k) => longest * Math.max(...modes.flat().map((m) => m.waves[k]!)) + 1,
    );
  }

  of(terms: readonly ExpansionTerm[], parameters: ReadonlyMap<string, number>): number {
    let sum = 0;
    for (const { coefficient, monomial } of terms)
      sum += coefficient.toNumber(parameters) * this.integral(monomial);
    return sum;
  }

  private integral(monomial: string): number {
    const factors = this.expansion.space.factors(monomial).map((f) => this.grid(f.field, f.derivative));
    const [first] = factors;
    if (!first) return 1;
    let sum = 0;
    for (let i = 0; i < first.length; i++) {
      let product = 1;
      for (const f of factors) product *= f[i]!;
      sum += product;
    }
    return sum / first.length;
  }

  private grid(field: number, alpha: readonly number[]): Float64Array {
    const key = `${field}:${alpha.join(',')}`;
    const known = this.grids.get(key) ?? onGrid(this.modes[field]!, this.points, alpha);
    this.grids.set(key, known);
    return known;
  }
}

/** Undefined where the expansion has no leading term or no correction that the field could show. */
export function smoothLimitWitness(
  theCase: Case,
  expansion: Expansion,
  matching: Matching,
): WitnessRecord | undefined {
  const { lattice, fields } = theCase;
  const dimension = lattice.axes.length;
  const sizes = SIZES[dimension];
  if (!sizes || sizes.length === 0) return undefined;
  const scale = expansion.fieldCut === undefined ? 1 : SMALL;
  const modes = fields.map((_, j) => testModes(j, dimension, scale));
  const background = fields.map((f) => theCase.expand.background.get(f.name)?.toNumber() ?? 0);
  const integrals = new ExactIntegrals(expansion, modes);
  const parameters = (size: number): Map<string, number> =>
    parametersAt(theCase, matching.scaling, new Map(lattice.limits.map((s) => [s, 1 / size])));
  const upTo = (total: number): ExpansionTerm[] =>
    expansion.orders.filter((o) => o.total <= total).flatMap((o) => o.terms);
  const leading = integrals.of(upTo(0), parameters(1));
  if (Math.abs(leading) < ROUNDING) return undefined;
  const order = [...new Set(expansion.orders.map((o) => o.total))]
    .filter((n) => n > 0)
    .sort((x, y) => x - y)
    .find((n) => Math.abs(integrals.of(ofOrder(expansion, n), parameters(1))) > ROUNDING * Math.abs(leading));
  if (order === undefined) return undefined;
  const errors = sizes.map((size) => {
    const values = parameters(size);
    return latticeAction(theCase, modes, background, size, values) - integrals.of(upTo(0), values);
  });
  const coefficient = integrals.of(ofOrder(expansion, order), parameters(1));
  const beyond = expansion.orders.filter((o) => o.total > 0).flatMap((o) => o.terms);
  const residuals = sizes.map((size, i) => errors[i]! - integrals.of(beyond, parameters(size)));
  return judge(sizes, errors, residuals, order, coefficient);
}

const ofOrder = (expansion: Expansion, total: number): ExpansionTerm[] =>
  expansion.orders.filter((o) => o.total === total).flatMap((o) => o.terms);

/** Action of the test field above that of the background, in a unit cell of space-time. */
function latticeAction(
  theCase: Case,
  modes: readonly (readonly Mode[])[],
  background: readonly number[],
  size: number,
  parameters: ReadonlyMap<string, number>,
): number {
  const points = theCase.lattice.axes.map(() => size);
  const box = new LatticeBox(points, parameters);
  const none = points.map(() => 0);
  const values = new Map<string, Float64Array>();
  const one = new LatticeBox(
    points.map(() => 1),
    parameters,
  );
  const constant = new Map<string, Float64Array>();
  for (const [j, { name }] of theCase.fields.entries()) {
    values.set(
      name,
      onGrid(modes[j]!, points, none).map((v) => v + background[j]!),
    );
    constant.set(name, Float64Array.of(background[j]!));
  }
  return theCase.parent.terms.reduce(
    (sum, { expression }) => sum + box.sum(expression, values) - box.sites * one.sum(expression, constant),
    0,
  );
}

/** What is left of the error after all known orders must be small, or at least vanish faster than the first of them. */
function residualVerdict(
  spacings: readonly number[],
  errors: readonly number[],
  residuals: readonly number[],
  order: number,
): WitnessRecord['verdict'] {
  const relative = Math.abs(residuals.at(-1)! / errors.at(-1)!);
  const isFaster = fitPower(spacings, residuals).slope > order + 0.5;
  if (relative < CLOSE || (isFaster && relative < FAR)) return 'confirms';
  if (relative > FAR && !isFaster) return 'contradicts';
  return 'inconclusive';
}

function judge(
  sizes: readonly number[],
  errors: readonly number[],
  residuals: readonly number[],
  order: number,
  predicted: number,
): WitnessRecord {
  const spacings = sizes.map((n) => 1 / n);
  const fit = fitPower(spacings, errors);
  const scaled = errors.map((e, i) => e * sizes[i]! ** order);
  // Richardson: on centred stencils the next correction is two orders higher
  const ratio = (sizes.at(-1)! / sizes.at(-2)!) ** 2;
  const coefficient = (ratio * scaled.at(-1)! - scaled.at(-2)!) / (ratio - 1);
  const left = Math.abs(residuals.at(-1)! / errors.at(-1)!);
  return {
    kind: 'smooth-limit',
    subject: 'a smooth periodic field',
    sizes,
    values: errors,
    predicted: { exponent: order, coefficient: predicted },
    fitted: { exponent: fit.exponent, coefficient },
    verdict: residualVerdict(spacings, errors, residuals, order),
    text: `all spacings together, the action of a smooth field approaches its continuum value like a^${fit.exponent.toFixed(2)} with coefficient ${coefficient.toPrecision(4)}; the expansion begins with a^${order} and ${predicted.toPrecision(4)}, and its orders together leave ${left.toPrecision(1)} of the error`,
  };
}
