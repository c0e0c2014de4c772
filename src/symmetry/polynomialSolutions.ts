// Polynomials p_j with Σ_j D_j [p_j ε f(ℓ)] = 0 for an arbitrary function f. Terms of D are grouped by the argument or the
// derivative of f that they touch; each group must annihilate p. On the lattice, T^v acts on the binomial basis
// e_β = Π C(m_k, β_k) by Vandermonde's T^v = Σ_α C(v, α) δ^α, in the continuum ∂^α acts on divided powers
// e_β = Π m_k^β_k / β_k!, and in both δ^α e_β = e_{β−α}: one integer system serves both.

import { Coefficient } from '../exact/coefficient.ts';
import { rootPowers } from '../exact/cyclotomic.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { kernel, PRIMES, rankModulo, type SparseRow } from '../exact/matrix.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { IntegerTerm, ShiftSystem } from './constantSystem.ts';
import type { FreeDirections } from './functionals.ts';

/** A family without its free function: one polynomial per field, over the axes of the system. */
export type Amplitudes = readonly LaurentPolynomial[];

/** Characters are given in twelfths of a turn per axis of the system, zero off the complement. */
export type Twelfths = readonly number[];

/** One group of a condition: terms by the exponents that are left for p, each with a weight and a phase in twelfths. */
interface Group {
  readonly terms: { field: number; exponents: number[]; weight: number; phase: number }[];
}

/** Exponents of at most the given total degree, lowest degree first. */
export const exponentsUpTo = (dimension: number, degree: number): readonly (readonly number[])[] =>
  gradedBasis(dimension, degree).basis;

interface GradedBasis {
  readonly basis: readonly (readonly number[])[];
  /** For each γ the numbers of the basis elements β ≥ γ, with the numbers of β − γ. */
  readonly above: readonly (readonly { readonly beta: number; readonly difference: number }[])[];
}

const gradedBases = new Map<string, GradedBasis>();

function gradedBasis(dimension: number, degree: number): GradedBasis {
  const key = `${dimension},${degree}`;
  const known = gradedBases.get(key);
  if (known) return known;
  const ofDegree = (d: number, n: number): number[][] => {
    if (d === 0) return n === 0 ? [[]] : [];
    const out: number[][] = [];
    for (let e = n; e >= 0; e--) for (const rest of ofDegree(d - 1, n - e)) out.push([e, ...rest]);
    return out;
  };
  const basis = Array.from({ length: degree + 1 }, (_, n) => ofDegree(dimension, n)).flat();
  const index = new Map(basis.map((b, i) => [b.join(), i]));
  const total = (e: readonly number[]): number => e.reduce((sum, n) => sum + n, 0);
  const above = basis.map((gamma) => {
    const pairs: { beta: number; difference: number }[] = [];
    for (let difference = 0; difference < basis.length; difference++) {
      const alpha = basis[difference]!;
      if (total(alpha) + total(gamma) > degree) break;
      pairs.push({ beta: index.get(gamma.map((e, k) => e + alpha[k]!).join())!, difference });
    }
    return pairs;
  });
  const made = { basis, above };
  gradedBases.set(key, made);
  return made;
}

/** The groups of all conditions for given free directions and character. */
export function groups(system: ShiftSystem, free: FreeDirections, phase: Twelfths): Group[] {
  const out: Group[] = [];
  for (const form of system.forms) {
    const byKey = new Map<string, Group>();
    const put = (key: string, term: Group['terms'][number]): void => {
      const group = byKey.get(key);
      if (group) group.terms.push(term);
      else byKey.set(key, { terms: [term] });
    };
    for (const term of form)
      if (system.kind === 'lattice') {
        const key = free.rows.map((row) => dot(row, term.exponents)).join();
        const turn = ((dot(phase, term.exponents) % 12) + 12) % 12;
        const exponents = free.complement.map((k) => term.exponents[k]!);
        put(key, { field: term.field, exponents, weight: term.weight, phase: turn });
      } else expandDerivative(term, free, put);
    out.push(...byKey.values());
  }
  return out;
}

const dot = (x: readonly number[], y: readonly number[]): number => {
  let sum = 0;
  for (let k = 0; k < x.length; k++) sum += x[k]! * y[k]!;
  return sum;
};

/** c Π_k (∂_k + Σ_i ℓ_ik s_i)^{v_k}, where s_i differentiates f and ∂_k acts on p along the complement axes only. */
function expandDerivative(
  term: IntegerTerm,
  free: FreeDirections,
  put: (key: string, term: Group['terms'][number]) => void,
): void {
  const variables = free.rows.length + free.complement.length;
  let sum = new Map<string, { powers: number[]; weight: number }>([
    ['', { powers: new Array<number>(variables).fill(0), weight: term.weight }],
  ]);
  term.exponents.forEach((power, axis) => {
    const linear = [
      ...free.rows.map((row) => row[axis]!),
      ...free.complement.map((k) => (k === axis ? 1 : 0)),
    ];
    for (let n = 0; n < power; n++) {
      const next = new Map<string, { powers: number[]; weight: number }>();
      for (const { powers, weight } of sum.values())
        linear.forEach((c, i) => {
          if (c === 0) return;
          const raised = powers.map((e, k) => (k === i ? e + 1 : e));
          const key = raised.join();
          next.set(key, { powers: raised, weight: (next.get(key)?.weight ?? 0) + c * weight });
        });
      sum = next;
    }
  });
  for (const { powers, weight } of sum.values())
    if (weight !== 0)
      put(powers.slice(0, free.rows.length).join(), {
        field: term.field,
        exponents: powers.slice(free.rows.length),
        weight,
        phase: 0,
      });
}

/** Generalised binomial coefficient for any integer n. */
function binomial(n: number, k: number): number {
  let out = 1;
  for (let i = 0; i < k; i++) out = (out * (n - i)) / (i + 1);
  return out;
}

/** Weight of δ^α in a group, per field, as integers or as vectors in the basis of Z[ζ_12];
 *  α is numbered by `basis`. */
function loweringWeights(
  group: Group,
  basis: readonly (readonly number[])[],
  system: ShiftSystem,
): number[][][] {
  const isReal = group.terms.every((t) => t.phase % 6 === 0);
  const powers = rootPowers(isReal ? 2 : 12);
  const zero = powers[0]!.map(() => 0);
  const out = system.fields.map(() => basis.map(() => [...zero]));
  for (const { field, exponents, weight, phase } of group.terms)
    basis.forEach((alpha, a) => {
      let factor = weight;
      for (let k = 0; k < alpha.length && factor !== 0; k++)
        factor *=
          system.kind === 'lattice' ? binomial(exponents[k]!, alpha[k]!) : alpha[k] === exponents[k] ? 1 : 0;
      if (factor === 0) return;
      const entry = out[field]![a]!;
      powers[isReal ? phase / 6 : phase]!.forEach((c, i) => {
        entry[i]! += factor * c;
      });
    });
  return out;
}

/** The conditions on the weights of p in the basis e_β: column b F + j belongs to basis function b of field j. */
function conditionRows(
  system: ShiftSystem,
  free: FreeDirections,
  phase: Twelfths,
  degree: number,
): SparseRow[] {
  const { basis, above } = gradedBasis(free.complement.length, degree);
  const fields = system.fields.length;
  const rows: SparseRow[] = [];
  for (const group of groups(system, free, phase)) {
    const weights = loweringWeights(group, basis, system);
    for (const pairs of above)
      for (let part = 0; part < weights[0]![0]!.length; part++) {
        const columns: number[] = [];
        const values: number[] = [];
        for (const { beta, difference } of pairs)
          for (let j = 0; j < fields; j++) {
            const weight = weights[j]![difference]![part]!;
            if (weight === 0) continue;
            columns.push(beta * fields + j);
            values.push(weight);
          }
        if (columns.length > 0) rows.push({ columns, values });
      }
  }
  return rows;
}

/** An upper bound on the number of independent polynomial solutions, by a rank modulo a prime. */
export function solutionBound(
  system: ShiftSystem,
  free: FreeDirections,
  phase: Twelfths,
  degree: number,
): number {
  const basis = exponentsUpTo(free.complement.length, degree);
  const columns = basis.length * system.fields.length;
  return columns - rankModulo(conditionRows(system, free, phase, degree), columns, PRIMES[0]);
}

/** All solutions with rational weights and total degree at most `degree` in the complement coordinates: a basis in echelon
 *  form by ascending highest monomial, so that lower degrees come first. */
export function polynomialSolutions(
  system: ShiftSystem,
  free: FreeDirections,
  phase: Twelfths,
  degree: number,
): Amplitudes[] {
  const basis = exponentsUpTo(free.complement.length, degree);
  const fields = system.fields.length;
  const rows = conditionRows(system, free, phase, degree).map(({ columns, values }) => {
    const row = new Array<Rational>(basis.length * fields).fill(Rational.zero);
    columns.forEach((c, i) => {
      row[c] = rational(values[i]!);
    });
    return row;
  });
  return kernel(rows, basis.length * fields).map((vector) =>
    system.fields.map((_, j) =>
      basis.reduce((sum, beta, b) => {
        const weight = vector[b * fields + j]!;
        return weight.isZero
          ? sum
          : sum.add(basisFunction(system, free, beta).scale(Coefficient.rational(weight)));
      }, LaurentPolynomial.zero(system.axes.length)),
    ),
  );
}

/** Π C(m_k, β_k) on the lattice, Π m_k^β_k/β_k! in the continuum. */
function basisFunction(
  system: ShiftSystem,
  free: FreeDirections,
  beta: readonly number[],
): LaurentPolynomial {
  const dimension = system.axes.length;
  let out = LaurentPolynomial.constant(dimension, Coefficient.one);
  free.complement.forEach((axis, i) => {
    const x = LaurentPolynomial.variable(dimension, axis);
    for (let n = 0; n < beta[i]!; n++) {
      const shifted =
        system.kind === 'lattice' ? x.sub(LaurentPolynomial.constant(dimension, Coefficient.integer(n))) : x;
      out = out.mul(shifted).scale(Coefficient.rational(rational(1, n + 1)));
    }
  });
  return out;
}
