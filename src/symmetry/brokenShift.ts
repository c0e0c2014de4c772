// Which correction breaks a shift symmetry of the continuum action. The variation of a density L under φ → φ + ελ is a total
// derivative for every φ iff the Euler operator annihilates it, and the Euler operator commutes with the variation: the test is
// that δ_λ E_φ(L) = 0 (P. J. Olver, Applications of Lie Groups to Differential Equations, section 5.3). δ_λ E_φ(L) is linear
// in λ, with one linear form in front of each product of jets of φ; all of them must annihilate the family.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial, type LaurentTerm } from '../exact/laurentPolynomial.ts';
import { eulerOperator } from '../limit/eulerOperator.ts';
import { addTerm, Density, type JetMonomial, JetSpace } from '../limit/jets.ts';
import type { LinearForm } from '../model/action.ts';
import type { ShiftFamily } from './family.ts';
import { testShiftFamily } from './shiftTest.ts';

/** One monomial of a correction: Π ∂^α φ_j over its jet factors, times a coefficient. */
export interface CorrectionMonomial {
  /** Total relative order in the spacings. */
  readonly order: number;
  readonly text: string;
  readonly derivatives: readonly { readonly field: number; readonly derivative: readonly number[] }[];
  /** Left out: any non-zero number, independent of those of the other monomials. */
  readonly coefficient?: Coefficient;
}

/** The linear forms in λ that must vanish for φ → φ + λ to change the densities by a total derivative. */
export function variationForms(density: Density, fields: readonly string[]): LinearForm[] {
  const { space } = density;
  const dimension = space.axes.length;
  const forms: LinearForm[] = [];
  for (let j = 0; j < fields.length; j++) {
    const byJets = new Map<JetMonomial, Map<string, LaurentTerm[]>>();
    for (const [monomial, coefficient] of eulerOperator(density, j).terms)
      for (let i = 0; i < monomial.length; i++) {
        const { field, derivative } = space.variable(monomial.charCodeAt(i));
        const rest = monomial.slice(0, i) + monomial.slice(i + 1);
        const byField = byJets.get(rest) ?? new Map<string, LaurentTerm[]>();
        byJets.set(rest, byField);
        const terms = byField.get(fields[field]!) ?? [];
        byField.set(fields[field]!, terms);
        terms.push({ exponents: derivative, weight: coefficient });
      }
    for (const byField of byJets.values())
      forms.push(
        new Map([...byField].map(([name, terms]) => [name, LaurentPolynomial.of(dimension, terms)])),
      );
  }
  return forms;
}

/** The lowest order whose corrections break a family, with the monomials that take part; null when none of those given does.
 *  Monomials of one order are added up when their coefficients are given and judged one by one otherwise. */
export function firstBreaking(
  family: ShiftFamily,
  corrections: readonly CorrectionMonomial[],
  fields: readonly string[],
  axes: readonly string[],
): { text: string; order: number } | null {
  const space = new JetSpace(fields, axes);
  const densityOf = (monomials: readonly CorrectionMonomial[]): Density => {
    const terms = new Map<JetMonomial, Coefficient>();
    for (const c of monomials)
      addTerm(terms, space.monomial(c.derivatives), c.coefficient ?? Coefficient.one);
    return new Density(space, terms);
  };
  const isBroken = (monomials: readonly CorrectionMonomial[]): boolean =>
    !testShiftFamily(family, variationForms(densityOf(monomials), fields), 'continuum');
  const orders = [...new Set(corrections.map((c) => c.order))].sort((x, y) => x - y);
  for (const order of orders) {
    const here = corrections.filter((c) => c.order === order);
    const known = here.filter((c) => c.coefficient !== undefined);
    const single = here.filter((c) => isBroken([c]));
    const culprits = isBroken(known) ? single : single.filter((c) => c.coefficient === undefined);
    const first = culprits[0];
    if (first) return { text: first.text, order };
  }
  return null;
}
