// Solves matching equations P_i(parameters) = C_i for the proposal's parameters, where P_i is a Laurent polynomial in the
// parameters and C_i a quotient in the parent's. Three exact moves are repeated until none applies: an equation with one
// unknown in one term; Gaussian elimination among equations linear in the unknowns; elimination in the exponents among
// equations that are single power products. What they do not determine stays undetermined and is reported so.

import { Coefficient, type CoefficientTerm } from '../exact/coefficient.ts';
import { Quotient } from '../exact/quotient.ts';
import { Rational } from '../exact/rational.ts';

/** left(parameters) = right. */
export interface ParameterEquation {
  readonly left: Coefficient;
  readonly right: Quotient;
}

/** Values of the unknowns that the equations determine; the earliest equations win where they contradict each other.
 *  @param known parameters with given values. */
export function solveParameters(
  equations: readonly ParameterEquation[],
  unknowns: readonly string[],
  known: ReadonlyMap<string, Quotient>,
): Map<string, Quotient> {
  const values = new Map(known);
  const open = (): Set<string> => new Set(unknowns.filter((u) => !values.has(u)));
  for (;;) {
    if (open().size === 0) return values;
    const reduced = equations.map((e) => reduce(e, values, open())).filter((e) => e.terms.length > 0);
    if (!solveSingle(reduced, values) && !solveLinear(reduced, values) && !solvePowers(reduced, values))
      return values;
  }
}

/** An unknown term: coefficient × Π unknown^exponent. */
interface UnknownTerm {
  readonly coefficient: Quotient;
  readonly powers: ReadonlyMap<string, Rational>;
}

interface ReducedEquation {
  readonly terms: readonly UnknownTerm[];
  readonly right: Quotient;
}

/** Puts in the values found so far and moves what holds no unknown to the right. */
function reduce(
  equation: ParameterEquation,
  values: ReadonlyMap<string, Quotient>,
  open: ReadonlySet<string>,
): ReducedEquation {
  let right = equation.right;
  const byPowers = new Map<string, { coefficient: Quotient; powers: Map<string, Rational> }>();
  for (const term of equation.left.terms) {
    const powers = new Map(term.powers.filter(([g]) => open.has(g)));
    const value = Quotient.substitute(withoutGenerators(term, open), values);
    if (powers.size === 0) right = right.sub(value);
    else {
      const key = [...powers].map(([g, e]) => `${g}^${e}`).join('*');
      const old = byPowers.get(key);
      byPowers.set(key, { coefficient: old ? old.coefficient.add(value) : value, powers });
    }
  }
  return { terms: [...byPowers.values()].filter((t) => !t.coefficient.isZero), right };
}

function withoutGenerators(term: CoefficientTerm, generators: ReadonlySet<string>): Coefficient {
  return Coefficient.monomial(
    term.factor,
    term.powers.filter(([g]) => !generators.has(g)),
  );
}

function solveSingle(equations: readonly ReducedEquation[], values: Map<string, Quotient>): boolean {
  for (const { terms, right } of equations) {
    const term = terms[0]!;
    if (terms.length !== 1 || term.powers.size !== 1 || right.isZero) continue;
    const [[unknown, exponent]] = [...term.powers] as [[string, Rational]];
    const root = rootOf(right.div(term.coefficient), exponent);
    if (!root) continue;
    values.set(unknown, root);
    return true;
  }
  return false;
}

/** value^(1/exponent), or undefined where it leaves the ring. */
function rootOf(value: Quotient, exponent: Rational): Quotient | undefined {
  try {
    return value.pow(exponent.inv());
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}

function solveLinear(equations: readonly ReducedEquation[], values: Map<string, Quotient>): boolean {
  const isLinear = (e: ReducedEquation): boolean =>
    e.terms.every((t) => t.powers.size === 1 && [...t.powers.values()][0]!.isOne);
  const rows = equations.filter(isLinear).map((e) => ({
    weights: new Map(e.terms.map((t) => [[...t.powers.keys()][0]!, t.coefficient])),
    right: e.right,
  }));
  const pivots: { unknown: string; row: (typeof rows)[number] }[] = [];
  for (const row of rows) {
    for (const p of pivots) eliminate(row, p.row, p.unknown);
    const unknown = [...row.weights].find(([, w]) => !w.isZero)?.[0];
    if (unknown === undefined) continue;
    for (const p of pivots) eliminate(p.row, row, unknown);
    pivots.push({ unknown, row });
  }
  let found = false;
  for (const { unknown, row } of pivots) {
    const others = [...row.weights].filter(([u, w]) => u !== unknown && !w.isZero);
    if (others.length > 0 || row.right.isZero) continue;
    values.set(unknown, row.right.div(row.weights.get(unknown)!));
    found = true;
  }
  return found;
}

interface LinearRow {
  weights: Map<string, Quotient>;
  right: Quotient;
}

/** Subtracts the multiple of `by` that removes the unknown from `row`. */
function eliminate(row: LinearRow, by: LinearRow, unknown: string): void {
  const weight = row.weights.get(unknown);
  if (!weight || weight.isZero) return;
  const factor = weight.div(by.weights.get(unknown)!);
  for (const [u, w] of by.weights) {
    const old = row.weights.get(u) ?? Quotient.of(Coefficient.zero);
    row.weights.set(u, old.sub(factor.mul(w)));
  }
  row.right = row.right.sub(factor.mul(by.right));
}

/** Equations Π u^e = right, eliminated in the exponents. */
function solvePowers(equations: readonly ReducedEquation[], values: Map<string, Quotient>): boolean {
  const rows = equations
    .filter((e) => e.terms.length === 1 && !e.right.isZero)
    .map((e) => ({ powers: new Map(e.terms[0]!.powers), right: e.right.div(e.terms[0]!.coefficient) }));
  const pivots: { unknown: string; row: (typeof rows)[number] }[] = [];
  const divide = (row: (typeof rows)[number], by: (typeof rows)[number], unknown: string): boolean => {
    const exponent = row.powers.get(unknown);
    if (!exponent || exponent.isZero) return true;
    const ratio = exponent.div(by.powers.get(unknown)!);
    const scaled = rootOf(by.right, ratio.inv());
    if (!scaled) return false;
    for (const [u, e] of by.powers) row.powers.set(u, (row.powers.get(u) ?? Rational.zero).sub(e.mul(ratio)));
    row.right = row.right.div(scaled);
    return true;
  };
  for (const row of rows) {
    if (!pivots.every((p) => divide(row, p.row, p.unknown))) continue;
    const unknown = [...row.powers].find(([, e]) => !e.isZero)?.[0];
    if (unknown === undefined) continue;
    for (const p of pivots) divide(p.row, row, unknown);
    pivots.push({ unknown, row });
  }
  for (const { unknown, row } of pivots) {
    if ([...row.powers].some(([u, e]) => u !== unknown && !e.isZero)) continue;
    const root = rootOf(row.right, row.powers.get(unknown)!);
    if (!root) continue;
    values.set(unknown, root);
    return true;
  }
  return false;
}
