// What a family of shifts contains on the points where a smaller set of functionals is constant: its prefactor times powers of
// its own functionals there. Solutions that are such restrictions are not listed again.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { ModularEchelon, PRIMES, PrimeField, reducedEchelon } from '../exact/matrix.ts';
import { Rational } from '../exact/rational.ts';
import type { FreeDirections } from './functionals.ts';
import { type Amplitudes, exponentsUpTo, type Twelfths } from './polynomialSolutions.ts';

/** A family over the axes of a system. */
export interface FoundFamily {
  readonly free: FreeDirections;
  /** Character in twelfths of a turn per axis. */
  readonly phase: Twelfths;
  readonly amplitudes: Amplitudes;
}

/** Highest total degree of a monomial that occurs. */
export const degreeOf = (amplitudes: Amplitudes): number =>
  Math.max(...amplitudes.flatMap((p) => p.terms.map((t) => t.exponents.reduce((s, e) => s + e, 0))));

/** Number of independent restrictions of larger families modulo a prime. A polynomial of degree n is given by its values at
 *  the points with coordinates ≥ 0 and sum ≤ n, so values stand for weights. */
export function restrictedRank(
  families: readonly FoundFamily[],
  free: FreeDirections,
  degree: number,
): number {
  const field = new PrimeField(PRIMES[0]);
  const points = exponentsUpTo(free.complement.length, degree).map((m) =>
    m.reduce<number[]>(
      (r, e, i) => r.map((x, k) => x + e * free.kernel[i]![k]!),
      families[0]!.phase.map(() => 0),
    ),
  );
  const fields = families[0]!.amplitudes.length;
  const echelon = new ModularEchelon(points.length * fields, field);
  const columns = Array.from({ length: points.length * fields }, (_, i) => i);
  for (const { amplitudes, free: own } of families) {
    const prefactor = points.flatMap((r) => amplitudes.map((p) => valueAt(p, r, field)));
    const functionals = own.rows
      .map((row) => points.map((r) => field.fromInteger(row.reduce((s, e, k) => s + e * r[k]!, 0))))
      .filter((values) => values.some((v) => v !== 0));
    for (const powers of exponentsUpTo(functionals.length, degree - degreeOf(amplitudes)))
      echelon.add({
        columns,
        values: prefactor.map((value, i) =>
          functionals.reduce(
            (x, l, n) => field.multiply(x, field.power(l[Math.floor(i / fields)]!, powers[n]!)),
            value,
          ),
        ),
      });
  }
  return echelon.rank;
}

function valueAt(p: LaurentPolynomial, r: readonly number[], field: PrimeField): number {
  let sum = 0;
  for (const { exponents, weight } of p.terms) {
    let product = field.fromRational(weight.asRational!);
    exponents.forEach((e, k) => {
      if (e > 0) product = field.multiply(product, field.power(field.fromInteger(r[k]!), e));
    });
    sum = (sum + product) % field.p;
  }
  return sum;
}

/** What a larger family contains for fixed values of the smaller set of functionals: p times powers of its functionals on
 *  the points with ℓ = 0, up to a degree. */
export function restrictions(family: FoundFamily, free: FreeDirections, degree: number): Amplitudes[] {
  const dimension = family.amplitudes[0]!.dimension;
  const coordinate = (k: number): LaurentPolynomial =>
    LaurentPolynomial.of(
      dimension,
      free.complement.map((axis, i) => ({
        exponents: unit(dimension, axis),
        weight: Coefficient.integer(free.kernel[i]![k]!),
      })),
    );
  const coordinates = Array.from({ length: dimension }, (_, k) => coordinate(k));
  const linear = independent(
    family.free.rows.map((row) =>
      row.reduce(
        (sum, e, k) => (e === 0 ? sum : sum.add(coordinates[k]!.scale(Coefficient.integer(e)))),
        LaurentPolynomial.zero(dimension),
      ),
    ),
  );
  const prefactor = family.amplitudes.map((p) => substitute(p, coordinates));
  if (prefactor.every((p) => p.isZero) || degreeOf(prefactor) > degree) return [];
  let products: Amplitudes[] = [prefactor];
  for (const l of linear)
    products = products.flatMap((a) => {
      const out = [a];
      for (let current = a; degreeOf(current) < degree; ) {
        current = current.map((p) => p.mul(l));
        out.push(current);
      }
      return out;
    });
  return products;
}

const unit = (dimension: number, axis: number): number[] =>
  Array.from({ length: dimension }, (_, k) => (k === axis ? 1 : 0));

/** A maximal independent set of the given linear forms. */
function independent(forms: readonly LaurentPolynomial[]): LaurentPolynomial[] {
  const rows = forms.map((f) =>
    Array.from(
      { length: f.dimension },
      (_, k) => f.terms.find((t) => t.exponents[k] === 1)?.weight.asRational ?? Rational.zero,
    ),
  );
  const kept: number[] = [];
  rows.forEach((_, i) => {
    const trial = [...kept, i].map((k) => rows[k]!);
    if (reducedEchelon(trial, forms[0]!.dimension).pivots.length === trial.length) kept.push(i);
  });
  return kept.map((i) => forms[i]!);
}

/** p with its coordinates replaced by linear forms. */
function substitute(p: LaurentPolynomial, coordinates: readonly LaurentPolynomial[]): LaurentPolynomial {
  return p.terms.reduce(
    (sum, t) =>
      sum.add(
        t.exponents.reduce(
          (product, e, k) => (e === 0 ? product : product.mul(coordinates[k]!.pow(e))),
          LaurentPolynomial.constant(p.dimension, t.weight),
        ),
      ),
    LaurentPolynomial.zero(p.dimension),
  );
}
