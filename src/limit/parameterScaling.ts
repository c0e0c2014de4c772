// How the parent's parameters must scale with the spacings so that its leading continuum couplings stay fixed: from the
// coupling beta*a^2/b it follows that beta ∝ a^-2 b. Every term of a coupling must then carry no spacing, which is a linear
// system for the exponents; parameters that it leaves free are held fixed. The author's matching plays no part, so that a
// mistake in it does not spoil the powers counted elsewhere.

import type { CoefficientTerm } from '../exact/coefficient.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { Case } from '../model/case.ts';
import { type Expansion, type MultiOrder, spacingOrder } from './expansion.ts';

export interface ParameterScaling {
  /** Exponents by parent parameter and spacing. Parameters missing from the map are held fixed. */
  readonly exponents: ReadonlyMap<string, ReadonlyMap<string, Rational>>;
  /** Why no scaling keeps all couplings fixed, when none does; the exponents then mean nothing. */
  readonly problem: string | undefined;
}

/** Scaling that keeps the leading couplings fixed. The coupling of a term that is a correction to another one keeps its nominal
 *  order instead: the ratio of the two lattice couplings is what stays fixed. */
export function parameterScaling(expansion: Expansion, theCase: Case): ParameterScaling {
  const names = theCase.parameters.map((p) => p.name);
  const { limits } = theCase.lattice;
  const exponentIn = (term: CoefficientTerm, g: string): Rational =>
    term.powers.find(([name]) => name === g)?.[1] ?? Rational.zero;
  const rows = expansion.byTerm.flatMap(({ normal, leading, base }) =>
    [...normal.terms.values()]
      .flatMap((c) => c.terms)
      .filter((t) => leading && sameOrder(spacingOrder(t, theCase.lattice), leading))
      .map((t) => ({
        weights: names.map((g) => exponentIn(t, g)),
        right: new Map(
          limits.map((s) => [s, rational(leading!.get(s)! - base.get(s)!).sub(exponentIn(t, s))]),
        ),
      })),
  );
  const exponents = new Map<string, Map<string, Rational>>();
  for (const spacing of limits) {
    const solution = leastSolution(
      rows.map((r) => [...r.weights, r.right.get(spacing)!]),
      names.length,
    );
    if (!solution)
      return {
        exponents: new Map(),
        problem: `no powers of ${spacing} in the lattice parameters keep all leading couplings fixed; put a parameter in front of every term (or of the gradient terms of a real field) that may scale with it`,
      };
    for (const [i, name] of names.entries())
      if (solution[i] && !solution[i].isZero)
        exponents.set(name, (exponents.get(name) ?? new Map<string, Rational>()).set(spacing, solution[i]));
  }
  return { exponents, problem: undefined };
}

const sameOrder = (x: MultiOrder, y: MultiOrder): boolean => [...x].every(([s, n]) => y.get(s) === n);

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
