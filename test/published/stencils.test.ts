// Published finite-difference, Laplacian and momentum series (entries.json, each with its source) against the moments of
// our stencils. Every derivative through the stated order is compared, those that must vanish included.

import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import { moment } from '../../src/model/stencil.ts';

type Weights = [offset: (number | string)[], weight: string][];

/** O φ = a^prefactor Σ_j w_j φ(x + a v_j) = Σ_(power, polynomial) a^power polynomial(∂) φ, complete through the order. */
interface StencilEntry {
  readonly kind: 'stencil';
  readonly id: string;
  readonly source: string;
  readonly dimension: number;
  readonly prefactor: number;
  readonly through: number;
  readonly stencil: Weights;
  readonly terms: [power: number, polynomial: [exponents: number[], coefficient: string][]][];
}

/** Coefficients of k^0, k^1, … of the symbol (divided by i when it is odd), with T = exp(i k), a = 1. */
interface MomentumEntry {
  readonly kind: 'momentum-series';
  readonly id: string;
  readonly source: string;
  readonly stencil: Weights | null;
  readonly dividedByI: boolean;
  readonly series: string[];
}

const entries: (StencilEntry | MomentumEntry)[] = JSON.parse(
  readFileSync(new URL('entries.json', import.meta.url), 'utf8'),
);
const stencils = entries.filter((e) => e.kind === 'stencil');
const momenta = entries.filter((e) => e.kind === 'momentum-series');

/** The weights on integer sites, moved by half a step where the published offsets are half-integers, and the point that
 *  was the published origin. */
function placed(weights: Weights, dimension: number): { stencil: LaurentPolynomial; centre: Rational[] } {
  const offsets = weights.map(([v]) => v.map((x) => Rational.parse(String(x))));
  const centre = Array.from({ length: dimension }, (_, k) =>
    offsets.every((v) => v[k]!.isInteger) ? Rational.zero : rational(1, 2),
  );
  const terms = offsets.map((v, j) => ({
    exponents: v.map((x, k) => x.add(centre[k]!).toNumber()),
    weight: Coefficient.rational(Rational.parse(weights[j]![1])),
  }));
  return { stencil: LaurentPolynomial.of(dimension, terms), centre };
}

/** All multi-indices of total order up to `through`. */
function multiIndices(dimension: number, through: number): number[][] {
  if (dimension === 0) return [[]];
  return multiIndices(dimension - 1, through).flatMap((alpha) =>
    Array.from({ length: through + 1 - alpha.reduce((x, y) => x + y, 0) }, (_, n) => [...alpha, n]),
  );
}

describe('moments of published stencils', () => {
  for (const entry of stencils)
    it(`${entry.id} has its published expansion: ${entry.source}`, () => {
      const { stencil, centre } = placed(entry.stencil, entry.dimension);
      const published = new Map<string, string>();
      for (const [power, polynomial] of entry.terms)
        for (const [exponents, coefficient] of polynomial) {
          const order = exponents.reduce((x, y) => x + y, 0);
          expect(order + entry.prefactor).toBe(power);
          published.set(exponents.join(','), coefficient);
        }
      const found = multiIndices(entry.dimension, entry.through).flatMap((alpha) => {
        const value = moment(stencil, centre, alpha);
        return value.isZero ? [] : [[alpha.join(','), value.asRational?.toString()] as const];
      });
      expect(new Map(found)).toEqual(published);
    });
});

/** Coefficients of k^0 … k^(length − 1) of the symbol of a one-dimensional stencil: Σ_n m_n (i k)^n, real or divided by i. */
function momentumSeries(weights: Weights, dividedByI: boolean, length: number): Rational[] {
  const { stencil, centre } = placed(weights, 1);
  return Array.from({ length }, (_, n) => {
    const value = moment(stencil, centre, [n]).asRational!;
    const power = dividedByI ? n - 1 : n;
    if (power % 2 !== 0) expect(value.isZero).toBe(true);
    return power % 4 === 0 || value.isZero ? value : value.neg();
  });
}

/** Product of two power series, cut at the length of the first. */
const times = (x: readonly Rational[], y: readonly Rational[]): Rational[] =>
  x.map((_, n) => x.slice(0, n + 1).reduce((sum, c, i) => sum.add(c.mul(y[n - i]!)), Rational.zero));

describe('published momentum series', () => {
  for (const { id, source, stencil, dividedByI, series } of momenta)
    if (stencil)
      it(`${id} is the symbol of its stencil: ${source}`, () => {
        const found = momentumSeries(stencil, dividedByI, series.length);
        expect(found.map(String)).toEqual(series);
      });

  const inverse = momenta.find((e) => e.id === 'k2-in-khat2')!;
  it(`k2-in-khat2 inverts the series of the second difference: ${inverse.source}`, () => {
    const khat2 = momenta.find((e) => e.id === 'khat2')!;
    const u = momentumSeries(khat2.stencil!, false, inverse.series.length);
    let power = u.map((_, n) => (n === 0 ? Rational.one : Rational.zero));
    let sum = u.map(() => Rational.zero);
    for (let n = 0; n < inverse.series.length; n += 2) {
      const weight = Rational.parse(inverse.series[n]!);
      sum = sum.map((c, i) => c.add(power[i]!.mul(weight)));
      power = times(power, u);
    }
    expect(sum.map(String)).toEqual(u.map((_, n) => (n === 2 ? '1' : '0')));
  });
});
