// How the parent's parameters must scale with the spacings so that its leading continuum couplings stay fixed: from the
// coupling beta*a^2/b it follows that beta ∝ a^-2 b. Every term of a coupling must then carry no spacing, which is a linear
// system for the exponents; parameters that it leaves free are held fixed. The author's matching plays no part, so that a
// mistake in it does not spoil the powers counted elsewhere.

import type { Coefficient, CoefficientTerm } from '../exact/coefficient.ts';
import { Rational } from '../exact/rational.ts';
import type { Case } from '../model/case.ts';

/** Exponents by parent parameter and spacing. Parameters missing from the map are held fixed. A spacing for which the
 *  system has no solution (a coupling whose terms scale differently) is left out altogether.
 *  @param couplings coefficients of the leading order of the expansion. */
export function parameterScaling(
  couplings: readonly Coefficient[],
  theCase: Case,
): Map<string, Map<string, Rational>> {
  const names = theCase.parameters.map((p) => p.name);
  const exponentIn = (term: CoefficientTerm, g: string): Rational =>
    term.powers.find(([name]) => name === g)?.[1] ?? Rational.zero;
  const terms = couplings.flatMap((c) => c.terms);
  const rows = terms.map((t) => ({
    weights: names.map((g) => exponentIn(t, g)),
    spacings: new Map(theCase.lattice.limits.map((s) => [s, exponentIn(t, s)])),
  }));
  const out = new Map<string, Map<string, Rational>>();
  for (const spacing of theCase.lattice.limits) {
    const solution = leastSolution(
      rows.map((r) => [...r.weights, r.spacings.get(spacing)!.neg()]),
      names.length,
    );
    if (!solution) continue;
    for (const [i, name] of names.entries())
      if (solution[i] && !solution[i].isZero)
        out.set(name, (out.get(name) ?? new Map<string, Rational>()).set(spacing, solution[i]));
  }
  return out;
}

/** Solves rows [weights | right side] over Q with free unknowns set to zero; undefined when inconsistent. */
function leastSolution(rows: Rational[][], unknowns: number): Rational[] | undefined {
  const pivots: { column: number; row: Rational[] }[] = [];
  for (const original of rows) {
    let row = original;
    for (const p of pivots) row = minus(row, p.row, row[p.column]!);
    const column = row.findIndex((w, i) => i < unknowns && !w.isZero);
    if (column < 0) {
      if (!row[unknowns]!.isZero) return undefined;
      continue;
    }
    const scaled = row.map((w) => w.div(row[column]!));
    for (const p of pivots) p.row = minus(p.row, scaled, p.row[column]!);
    pivots.push({ column, row: scaled });
  }
  const out = new Array<Rational>(unknowns).fill(Rational.zero);
  for (const { column, row } of pivots) out[column] = row[unknowns]!;
  return out;
}

function minus(row: Rational[], pivot: Rational[], factor: Rational): Rational[] {
  return factor.isZero ? row : row.map((w, i) => w.sub(pivot[i]!.mul(factor)));
}
