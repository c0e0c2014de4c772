// Derivatives of a family in the continuum, regularised at the scale of the spacing. A derivative of a rough function is a
// new generic value times 1/spacing, by the chain rule along oblique arguments; a differentiated step and every single
// site live on a strip one spacing wide; a derivative along a smooth direction costs 1/extent; along a constant one it is
// zero. A staggered sign jumps at every site, so every derivative along its axes counts 1/spacing.

import { Coefficient } from '../exact/coefficient.ts';
import { Rational } from '../exact/rational.ts';
import type { LinearForm } from '../model/action.ts';
import type { Lattice } from '../model/geometry.ts';
import { axisOf, epsilon, macroscopic } from './latticeValues.ts';
import { type FunctionFactor, isLocal, type LocalFactor, type Profile, type ProfileTerm } from './profile.ts';
import { positionOn, type Region, rowKey } from './regions.ts';

/** weight · Π x^powers · ∂^waves(wave) · Π f_i^(orders_i): what the product rule makes of one term. */
interface JetProduct {
  readonly weight: Coefficient;
  readonly powers: readonly number[];
  readonly waves: readonly number[];
  /** One multi-index per factor, one entry per argument. */
  readonly orders: readonly (readonly number[])[];
}

const raised = (list: readonly number[], k: number, by: number): number[] =>
  list.map((e, i) => (i === k ? e + by : e));

/** Volume of a region: extent along its directions, one spacing across them. In units in which dx is a length. */
export function volumeOf(lattice: Lattice, region: Region): Coefficient {
  const whole = lattice.axes.reduce(
    (v, axis) => v.mul(Coefficient.symbol(axis.role === 'time' ? '@t' : '@l')),
    Coefficient.one,
  );
  return region.near.reduce((v, row) => v.mul(epsilon(lattice, axisOf(row))), whole);
}

/** Product rule of a family: ∂^α of every term, computed once and evaluated on every region. */
export class ContinuumJets {
  private readonly jets = new Map<
    string,
    readonly { term: ProfileTerm; products: readonly JetProduct[] }[]
  >();

  constructor(
    readonly profile: Profile,
    readonly lattice: Lattice,
  ) {}

  derivative(
    field: number,
    alpha: readonly number[],
  ): readonly { term: ProfileTerm; products: readonly JetProduct[] }[] {
    const key = `${field}:${alpha.join(',')}`;
    const known = this.jets.get(key);
    if (known) return known;
    const axis = alpha.findIndex((n) => n > 0);
    const out =
      axis < 0
        ? this.profile.terms.filter((t) => t.field === field).map((term) => ({ term, products: plain(term) }))
        : this.derivative(field, raised(alpha, axis, -1)).map(({ term, products }) => ({
            term,
            products: collect(products.flatMap((p) => this.differentiate(p, term, axis))),
          }));
    this.jets.set(key, out);
    return out;
  }

  private differentiate(p: JetProduct, term: ProfileTerm, axis: number): JetProduct[] {
    const { lattice } = this;
    const perSpacing = Coefficient.symbol(lattice.axes[axis]!.spacing, Rational.minusOne);
    const perExtent = epsilon(lattice, axis).mul(perSpacing);
    const out: JetProduct[] = [];
    const power = p.powers[axis]!;
    if (power > 0)
      out.push({
        ...p,
        weight: p.weight.mul(perExtent).scale(Rational.of(power)),
        powers: raised(p.powers, axis, -1),
      });
    if (!term.phase[axis]!.isZero)
      out.push({ ...p, weight: p.weight.mul(perSpacing), waves: raised(p.waves, axis, 1) });
    for (const [i, factor] of term.factors.entries()) {
      const rows = isLocal(factor) ? [factor.row] : factor.rows;
      for (const [j, row] of rows.entries()) {
        if (row[axis] === 0) continue;
        const chain = Rational.of(row[axis]!);
        // a smooth function varies by one over the extent, counted in steps of its first axis
        const unit = factor.kind === 'smooth' ? perSpacing.mul(epsilon(lattice, axisOf(row))) : perSpacing;
        out.push({
          ...p,
          weight: p.weight.mul(unit).scale(chain),
          orders: p.orders.map((o, k) => (k === i ? raised(o, j, 1) : o)),
        });
      }
    }
    return out;
  }
}

function plain(term: ProfileTerm): JetProduct[] {
  const orders = term.factors.map((f) => (isLocal(f) ? [0] : f.rows.map(() => 0)));
  return term.polynomial.map(({ exponents, weight }) => ({
    weight,
    powers: exponents,
    waves: exponents.map(() => 0),
    orders,
  }));
}

function collect(products: readonly JetProduct[]): JetProduct[] {
  const out = new Map<string, JetProduct>();
  for (const p of products) {
    const key = JSON.stringify([p.powers, p.waves, p.orders]);
    const old = out.get(key);
    out.set(key, old ? { ...old, weight: old.weight.add(p.weight) } : p);
  }
  return [...out.values()].filter((p) => !p.weight.isZero);
}

/** Values of derivatives and forms on one region. */
export class ContinuumValues {
  private readonly values = new Map<string, Coefficient>();

  constructor(
    private readonly jets: ContinuumJets,
    private readonly fields: readonly string[],
    private readonly region: Region,
  ) {}

  /** Σ over the operator's terms, without the background. */
  form(form: LinearForm): Coefficient {
    let sum = Coefficient.zero;
    for (const [name, operator] of form) {
      const field = this.fields.indexOf(name);
      for (const { exponents, weight } of operator.terms)
        sum = sum.add(this.derivative(field, exponents).mul(weight));
    }
    return sum;
  }

  derivative(field: number, alpha: readonly number[]): Coefficient {
    const key = `${field}:${alpha.join(',')}`;
    const known = this.values.get(key);
    if (known) return known;
    let sum = Coefficient.zero;
    for (const { term, products } of this.jets.derivative(field, alpha))
      for (const p of products) sum = sum.add(this.product(term, p));
    this.values.set(key, sum);
    return sum;
  }

  private product(term: ProfileTerm, p: JetProduct): Coefficient {
    let out = p.weight;
    if (term.height !== undefined) out = out.mul(Coefficient.symbol(`@height${term.height}`));
    for (const [i, factor] of term.factors.entries()) {
      const orders = p.orders[i]!;
      const value = isLocal(factor) ? this.local(factor, orders[0]!) : this.functionValue(factor, orders);
      if (!value) return Coefficient.zero;
      out = out.mul(value);
    }
    if (term.phase.some((x) => !x.isZero)) out = out.mul(waveValue(term.phase, p.waves));
    for (const [k, power] of p.powers.entries())
      if (power > 0) out = out.mul(this.coordinate(k).pow(Rational.of(power)));
    return out;
  }

  private functionValue(factor: FunctionFactor, orders: readonly number[]): Coefficient {
    const rows = factor.rows.map(rowKey).join(';');
    return Coefficient.symbol(`@${factor.name}[${rows}]'${orders.join(',')}`);
  }

  /** A step or site and its derivatives: generic on its strip; beside it the step is 0 or 1 and all else vanishes. */
  private local(factor: LocalFactor, order: number): Coefficient | undefined {
    const position = positionOn(this.region, factor.row, this.region.base);
    if (!('side' in position)) return Coefficient.symbol(`@${factor.kind}[${rowKey(factor.row)}]'${order}`);
    return order === 0 && factor.kind === 'step' && position.side === 1 ? Coefficient.one : undefined;
  }

  /** A coordinate in units of the system; across a strip it varies by a generic amount of one spacing. */
  private coordinate(axis: number): Coefficient {
    const far = macroscopic(this.region, axis);
    const isAcross = this.region.near.some((row) => row[axis] !== 0);
    return isAcross
      ? far.add(epsilon(this.jets.lattice, axis).mul(Coefficient.symbol(`@across${axis}`)))
      : far;
  }
}

/** A wave as a product over its axes. ∂^n cos(kx + α) cycles through cos and sin, so that even derivatives are multiples of
 *  the wave itself and cancellations such as (∂_x² − ∂_y²)(-1)^(x+y) = 0 are seen. The spacings are in the weight. */
const waveValue = (phase: readonly Rational[], orders: readonly number[]): Coefficient =>
  phase.reduce((product, p, k) => {
    if (p.isZero) return product;
    const n = orders[k]!;
    const wavenumber = Coefficient.symbol('pi').scale(p.mul(Rational.of(2)));
    const value = Coefficient.symbol(`@${n % 2 === 0 ? 'cos' : 'sin'}${k}[${p}]`);
    const sign = Coefficient.integer(n % 4 === 1 || n % 4 === 2 ? -1 : 1);
    return product
      .mul(wavenumber.pow(Rational.of(n)))
      .mul(value)
      .mul(sign);
  }, Coefficient.one);
