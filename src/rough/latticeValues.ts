// Values of linear forms on one region of a family, exactly: independent generators for the values of free functions and
// for the derivatives of smooth ones, whose Taylor series alone is expanded. φ(r + v) for a smooth factor is
// Σ_n (ε ρ·v)^n/n! s^(n); everything else stays on the lattice.

import { Coefficient } from '../exact/coefficient.ts';
import { Rational } from '../exact/rational.ts';
import type { LinearForm } from '../model/action.ts';
import type { Lattice } from '../model/geometry.ts';
import { addSeries, constantSeries, type EpsilonSeries, INTEGER, multiplySeries } from './epsilonSeries.ts';
import { type FunctionFactor, isLocal, type Profile, type ProfileTerm } from './profile.ts';
import { dot, positionOn, type Region } from './regions.ts';
import { waveWeights } from './staggered.ts';

/** Generators for the size of the system in space and in time. */
export const SIZE = '@l';
export const DURATION = '@t';

const sizeAlong = (lattice: Lattice, axis: number): string =>
  lattice.axes[axis]!.role === 'time' ? DURATION : SIZE;

/** spacing/extent along one axis. */
export const epsilon = (lattice: Lattice, axis: number): Coefficient =>
  Coefficient.monomial(Rational.one, [
    [lattice.axes[axis]!.spacing, Rational.one],
    [sizeAlong(lattice, axis), Rational.minusOne],
  ]);

/** First axis that a row touches; it gives the row its spacing. */
export const axisOf = (row: readonly number[]): number => row.findIndex((e) => e !== 0);

/** Π extent/spacing over the directions of a region: its number of sites. */
export const siteCount = (lattice: Lattice, region: Region): Coefficient =>
  region.directions.reduce((product, w) => product.div(epsilon(lattice, axisOf(w))), Coefficient.one);

/** Macroscopic coordinate X_k on a region, in units of the system: Σ_i (w_i)_k τ_i with generic τ_i. */
export const macroscopic = (region: Region, axis: number): Coefficient =>
  region.directions.reduce(
    (sum, w, i) =>
      w[axis] === 0 ? sum : sum.add(Coefficient.symbol(`@tau${i}`).scale(Rational.of(w[axis]!))),
    Coefficient.zero,
  );

/** Highest order in ε at which a form that does not vanish on the family can begin: with m different offsets along an
 *  argument the moments up to order m − 1 decide (Vandermonde). */
export function decisiveOrder(profile: Profile, offsets: readonly (readonly number[])[]): number {
  const span = (row: readonly number[]): number => {
    const along = offsets.map((v) => dot(row, v));
    return Math.max(...along) - Math.min(...along);
  };
  return Math.max(
    0,
    ...profile.terms.map((term) => {
      const degree = Math.max(...term.polynomial.map((t) => t.exponents.reduce((s, e) => s + e, 0)));
      const smooth = term.factors.flatMap((f) => (f.kind === 'smooth' ? f.rows.map(span) : []));
      return degree + smooth.reduce((s, n) => s + n, 0);
    }),
  );
}

/** Evaluates linear forms on one region of a family. */
export class LatticeValues {
  private readonly values = new Map<string, EpsilonSeries>();

  constructor(
    private readonly profile: Profile,
    private readonly lattice: Lattice,
    private readonly fields: readonly string[],
    private readonly region: Region,
    /** Order in ε through which everything is kept. */
    private readonly order: number,
  ) {}

  /** Σ_v c_v φ(r + v) through ε^order, without the background. */
  form(form: LinearForm): EpsilonSeries {
    let out: EpsilonSeries = constantSeries(Coefficient.zero, this.order);
    for (const [name, stencil] of form) {
      const field = this.fields.indexOf(name);
      for (const { exponents, weight } of stencil.terms) {
        const value = this.fieldAt(field, exponents);
        out = addSeries(
          out,
          value.map((c) => c.mul(weight)),
        );
      }
    }
    return out;
  }

  private fieldAt(field: number, offset: readonly number[]): EpsilonSeries {
    const key = `${field}:${offset.join(',')}`;
    const known = this.values.get(key);
    if (known) return known;
    const value = this.profile.terms
      .filter((t) => t.field === field)
      .map((t) => this.termAt(t, offset))
      .reduce(addSeries, constantSeries(Coefficient.zero, this.order) as EpsilonSeries);
    this.values.set(key, value);
    return value;
  }

  private termAt(term: ProfileTerm, offset: readonly number[]): EpsilonSeries {
    let rough = term.height === undefined ? Coefficient.one : Coefficient.symbol(`@height${term.height}`);
    for (const factor of term.factors) {
      if (isLocal(factor)) {
        if (!this.isOn(factor, offset)) return constantSeries(Coefficient.zero, this.order);
      } else if (factor.kind === 'free') rough = rough.mul(this.freeValue(factor, offset));
    }
    rough = rough.mul(this.wave(term, offset));
    let out: EpsilonSeries = constantSeries(rough, this.order);
    for (const factor of term.factors)
      if (factor.kind === 'smooth') out = multiplySeries(out, this.smoothValue(factor, offset));
    return multiplySeries(out, this.polynomialValue(term, offset));
  }

  private isOn(
    factor: { kind: 'step' | 'site'; row: readonly number[] },
    offset: readonly number[],
  ): boolean {
    const position = positionOn(this.region, factor.row, offset);
    if ('side' in position) return factor.kind === 'step' && position.side === 1;
    return factor.kind === 'step' ? position.value >= 0 : position.value === 0;
  }

  /** Name of a function on the region: functions whose arguments agree along the region are the same function there. */
  private functionName(factor: FunctionFactor): string {
    const along = factor.rows.map((row) => this.region.directions.map((w) => dot(row, w)).join(','));
    return `${factor.name}[${along.join(';')}]`;
  }

  private freeValue(factor: FunctionFactor, offset: readonly number[]): Coefficient {
    const at = factor.rows.map((row) => dot(row, this.region.base) + dot(row, offset));
    return Coefficient.symbol(
      `${factor.isInteger ? INTEGER : '@'}${this.functionName(factor)}(${at.join(',')})`,
    );
  }

  private wave(term: ProfileTerm, offset: readonly number[]): Coefficient {
    if (term.phase.every((p) => p.isZero)) return Coefficient.one;
    const turn = term.phase.reduce((sum, p, k) => sum.add(p.mul(Rational.of(offset[k]!))), Rational.zero);
    const { cosine, sine } = waveWeights(turn);
    const name = term.phase.join();
    return cosine.mul(Coefficient.symbol(`@cos[${name}]`)).add(sine.mul(Coefficient.symbol(`@sin[${name}]`)));
  }

  private smoothValue(factor: FunctionFactor, offset: readonly number[]): EpsilonSeries {
    const name = this.functionName(factor);
    let parts: { powers: readonly number[]; order: number; weight: Coefficient }[] = [
      { powers: [], order: 0, weight: Coefficient.one },
    ];
    for (const row of factor.rows) {
      const step = dot(row, this.region.base) + dot(row, offset);
      const unit = epsilon(this.lattice, axisOf(row)).scale(Rational.of(step));
      parts = parts.flatMap(({ powers, order, weight }) => {
        const out: typeof parts = [];
        let scaled = weight;
        for (let n = 0; order + n <= this.order; n++) {
          if (n > 0) scaled = scaled.mul(unit).scale(Rational.of(1, n));
          if (scaled.isZero) break;
          out.push({ powers: [...powers, n], order: order + n, weight: scaled });
        }
        return out;
      });
    }
    const series = constantSeries(Coefficient.zero, this.order);
    for (const { powers, order, weight } of parts)
      series[order] = series[order]!.add(weight.mul(Coefficient.symbol(`@${name}'${powers.join(',')}`)));
    return series;
  }

  private polynomialValue(term: ProfileTerm, offset: readonly number[]): EpsilonSeries {
    let sum: EpsilonSeries = constantSeries(Coefficient.zero, this.order);
    for (const { exponents, weight } of term.polynomial) {
      let product: EpsilonSeries = constantSeries(weight, this.order);
      for (const [k, power] of exponents.entries())
        for (let n = 0; n < power; n++) product = multiplySeries(product, this.coordinate(k, offset));
      sum = addSeries(sum, product);
    }
    return sum;
  }

  private coordinate(axis: number, offset: readonly number[]): EpsilonSeries {
    const series = constantSeries(macroscopic(this.region, axis), this.order);
    const steps = Rational.of(this.region.base[axis]! + offset[axis]!);
    if (this.order > 0) series[1] = epsilon(this.lattice, axis).scale(steps);
    return series;
  }
}
