// The direct test of one shift family: insert λ = p ε f(ℓ) into every linear form and look whether what stands in front of each
// independent value (or derivative) of f vanishes. Nothing here knows how families are searched for.

import { Coefficient } from '../exact/coefficient.ts';
import { rootPowers } from '../exact/cyclotomic.ts';
import { compareExponents, type Exponents, LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { gcd, Rational } from '../exact/rational.ts';
import type { LinearForm } from '../model/action.ts';
import type { SystemKind } from './constantSystem.ts';
import type { CoordinatePolynomial, ShiftFamily } from './family.ts';

/** True when φ → φ + λ leaves every linear form unchanged for all λ of the family; on the lattice a discrete family
 *  (λ in (2π/N) Z) may change it by multiples of 2π. A staggered family is no continuum symmetry, except where the sign is
 *  a function of the free arguments. Exact. Throws RangeError when a form has several fields and the family names none. */
export function testShiftFamily(
  family: ShiftFamily,
  forms: readonly LinearForm[],
  kind: SystemKind,
): boolean {
  if (family.prefactor.every((p) => p.length === 0)) return true;
  const amplitudes = amplitudesByField(family, forms);
  if (kind === 'continuum')
    return (
      isFunctionOf(family.phase, family.free) &&
      forms.every((form) => derivativeGroups(form, amplitudes, family.free).every((q) => q.isZero))
    );
  return forms.every((form) => latticeVanishes(form, amplitudes, family));
}

type ByField = ReadonlyMap<string, CoordinatePolynomial>;

function amplitudesByField(family: ShiftFamily, forms: readonly LinearForm[]): ByField {
  const names = family.fields ?? [...new Set(forms.flatMap((f) => [...f.keys()]))];
  if (family.fields === undefined && (names.length > 1 || family.prefactor.length > 1))
    throw new RangeError('a shift family of several fields must name them');
  return new Map(names.map((name, j) => [name, family.prefactor[j] ?? []]));
}

const dot = (x: readonly number[], y: readonly number[]): number =>
  x.reduce((sum, e, k) => sum + e * y[k]!, 0);

/** True when exp(2πi phase·r) depends on the functionals alone: constant on the points where they vanish. */
function isFunctionOf(phase: readonly Rational[], free: readonly (readonly number[])[]): boolean {
  if (phase.every((x) => x.isInteger)) return true;
  // phase = Σ c_i ℓ_i modulo integers for some c: with denominators N, an integer combination of N·ℓ/N
  const order = commonOrder(phase);
  const counters = free.map(() => 0);
  for (;;) {
    const sum = phase.map((x, k) =>
      free.reduce((rest, row, i) => rest.sub(Rational.of(counters[i]! * row[k]!, order)), x),
    );
    if (sum.every((x) => x.isInteger)) return true;
    let i = 0;
    while (i < counters.length && ++counters[i]! === order) counters[i++] = 0;
    if (i === counters.length) return false;
  }
}

const commonOrder = (phase: readonly Rational[]): number =>
  Number(phase.reduce((n, x) => (n / gcd(n, x.den)) * x.den, 1n));

/** The factors in front of independent values of f: Σ c_v ε(v) p(r + v) over the terms with the same ℓ(v), by turn of ε. */
function latticeVanishes(form: LinearForm, amplitudes: ByField, family: ShiftFamily): boolean {
  const order = commonOrder(family.phase);
  const byArgument = new Map<string, Map<number, LaurentPolynomial>>();
  for (const [name, stencil] of form) {
    const amplitude = amplitudes.get(name) ?? [];
    if (amplitude.length === 0) continue;
    for (const { exponents, weight } of stencil.terms) {
      const argument = family.free.map((row) => dot(row, exponents)).join();
      const phase = family.phase.reduce((s, x, k) => s.add(x.mul(Rational.of(exponents[k]!))), Rational.zero);
      const turns = Number(phase.sub(Rational.of(phase.floor())).mul(Rational.of(order)).num);
      const byTurn = byArgument.get(argument) ?? new Map<number, LaurentPolynomial>();
      byArgument.set(argument, byTurn);
      const moved = translated(amplitude, exponents).scale(weight);
      byTurn.set(turns, byTurn.get(turns)?.add(moved) ?? moved);
    }
  }
  return [...byArgument.values()].every((byTurn) =>
    inRootBasis(byTurn, order).every(
      (q) => q.isZero || (family.discrete !== undefined && takesMultiplesOf(q, family.discrete)),
    ),
  );
}

/** p(r + v). */
function translated(p: CoordinatePolynomial, v: Exponents): LaurentPolynomial {
  const dimension = v.length;
  return p.reduce((sum, { exponents, weight }) => {
    let product = LaurentPolynomial.constant(dimension, weight);
    exponents.forEach((e, k) => {
      if (e === 0) return;
      const shift = LaurentPolynomial.constant(dimension, Coefficient.integer(v[k]!));
      product = product.mul(LaurentPolynomial.variable(dimension, k).add(shift).pow(e));
    });
    return sum.add(product);
  }, LaurentPolynomial.zero(dimension));
}

/** Σ_k ζ^k q_k in the basis 1, ζ, … of Z[ζ]. */
function inRootBasis(byTurn: ReadonlyMap<number, LaurentPolynomial>, order: number): LaurentPolynomial[] {
  const powers = rootPowers(order);
  const dimension = [...byTurn.values()][0]!.dimension;
  return powers[0]!.map((_, i) =>
    [...byTurn].reduce((sum, [turn, q]) => {
      const weight = powers[turn]![i]!;
      return weight === 0 ? sum : sum.add(q.scale(Coefficient.integer(weight)));
    }, LaurentPolynomial.zero(dimension)),
  );
}

/** True when all values of a polynomial at integer points are multiples of N. Its Newton coefficients are integer
 *  combinations of the values at the points 0 … degree, so these decide. */
function takesMultiplesOf(q: LaurentPolynomial, n: number): boolean {
  if (!q.terms.every((t) => t.weight.asRational)) return false;
  const degrees = Array.from({ length: q.dimension }, (_, k) =>
    Math.max(0, ...q.terms.map((t) => t.exponents[k]!)),
  );
  let points: number[][] = [[]];
  for (const degree of degrees)
    points = points.flatMap((p) => Array.from({ length: degree + 1 }, (_, i) => [...p, i]));
  return points.every((point) => {
    const value = q.terms.reduce(
      (sum, t) =>
        sum.add(t.exponents.reduce((x, e, k) => x.mul(Rational.of(point[k]!).pow(e)), t.weight.asRational!)),
      Rational.zero,
    );
    return value.div(Rational.of(n)).isInteger;
  });
}

/** D(∂ + Σ ℓ_i s_i) p, by powers of the symbols s_i that stand for derivatives of f. */
function derivativeGroups(
  form: LinearForm,
  amplitudes: ByField,
  free: readonly (readonly number[])[],
): LaurentPolynomial[] {
  const groups = new Map<string, LaurentPolynomial>();
  for (const [name, operator] of form) {
    const amplitude = amplitudes.get(name) ?? [];
    if (amplitude.length === 0) continue;
    const p = LaurentPolynomial.of(operator.dimension, amplitude);
    for (const { exponents, weight } of operator.terms)
      for (const [key, q] of applied(exponents, p, free)) {
        const scaled = q.scale(weight);
        groups.set(key, groups.get(key)?.add(scaled) ?? scaled);
      }
  }
  return [...groups.values()];
}

/** Π_k (∂_k + Σ_i ℓ_ik s_i)^{v_k} p by powers of s. */
function applied(
  v: Exponents,
  p: LaurentPolynomial,
  free: readonly (readonly number[])[],
): Map<string, LaurentPolynomial> {
  let current: { powers: readonly number[]; q: LaurentPolynomial }[] = [{ powers: free.map(() => 0), q: p }];
  v.forEach((power, axis) => {
    for (let n = 0; n < power; n++) {
      const next: { powers: readonly number[]; q: LaurentPolynomial }[] = [];
      const put = (powers: readonly number[], q: LaurentPolynomial): void => {
        const at = next.findIndex((x) => compareExponents(x.powers, powers) === 0);
        if (at < 0) next.push({ powers, q });
        else next[at] = { powers, q: next[at]!.q.add(q) };
      };
      for (const { powers, q } of current) {
        put(powers, derivative(q, axis));
        free.forEach((row, i) => {
          if (row[axis] !== 0)
            put(
              powers.map((e, k) => (k === i ? e + 1 : e)),
              q.scale(Coefficient.integer(row[axis]!)),
            );
        });
      }
      current = next;
    }
  });
  return new Map(current.map(({ powers, q }) => [powers.join(), q]));
}

function derivative(q: LaurentPolynomial, axis: number): LaurentPolynomial {
  return LaurentPolynomial.of(
    q.dimension,
    q.terms
      .filter((t) => t.exponents[axis] !== 0)
      .map((t) => ({
        exponents: t.exponents.map((e, k) => (k === axis ? e - 1 : e)),
        weight: t.weight.mul(Coefficient.integer(t.exponents[axis]!)),
      })),
  );
}
