// Matching: the proposal minus the expansion, in normal form. The proposal's parameters are taken as given or solved from
// the lowest orders; then every monomial is classified.

import { Coefficient } from '../exact/coefficient.ts';
import { Quotient, rationalRatio } from '../exact/quotient.ts';
import { type Rational, rational } from '../exact/rational.ts';
import type { Case, Proposal } from '../model/case.ts';
import { derivativeOrder, type Expansion, fieldCutOf, type MultiOrder } from './expansion.ts';
import { continuumDensity } from './formDensity.ts';
import type { Density, JetMonomial, JetSpace } from './jets.ts';
import { normalForm } from './normalForm.ts';
import { parameterScaling } from './parameterScaling.ts';
import { solveParameters } from './parameterSystem.ts';

export type DifferenceKind = 'agrees' | 'wrong-coefficient' | 'missing-from-proposal' | 'only-in-proposal';

export interface MatchingDifference {
  readonly kind: DifferenceKind;
  readonly monomial: JetMonomial;
  /** Coefficient of the parent's expansion and of the proposal after matching, in parent parameters and spacings. */
  readonly parent: Quotient;
  readonly proposal: Quotient;
  /** proposal/parent when that is a rational number. */
  readonly ratio: Rational | undefined;
  /** Total relative order of the monomial in the expansion; undefined when it is not in the expansion. */
  readonly order: number | undefined;
  /** Only for only-in-proposal: the exact lattice symmetry that forbids it, or null when none does. */
  readonly forbiddenBy: string | null | undefined;
}

export interface Matching {
  /** Matched proposal parameters (given or solved). */
  readonly parameters: ReadonlyMap<string, Quotient>;
  readonly origin: 'given' | 'solved' | 'proposed';
  readonly differences: readonly MatchingDifference[];
  /** Field rescalings φ → Z φ that would make the match work, by field name. */
  readonly rescalings: ReadonlyMap<string, Quotient>;
  /** Proposal parameters that the expansion does not determine. */
  readonly undetermined: readonly string[];
  /** Powers s with which a parent parameter must scale, Π spacing^s, so that the leading couplings stay fixed. */
  readonly scaling: ReadonlyMap<string, ReadonlyMap<string, Rational>>;
  /** Why no such scaling exists, when none does: powers of the spacings cannot be counted then. */
  readonly scalingProblem: string | undefined;
}

/** Orders kept in a proposal beyond those asked for, so that a term of too high an order is still seen. */
const PROPOSAL_ORDERS = 12;

/** The proposal's Lagrangian as a density in its own parameters, not in normal form; undefined without a proposal. */
export function proposalDensity(theCase: Case, space: JetSpace): Density | undefined {
  if (!theCase.proposal) return undefined;
  const cut = {
    order: theCase.expand.beyondLeading + PROPOSAL_ORDERS,
    fields: fieldCutOf(theCase) ?? Number.POSITIVE_INFINITY,
  };
  return continuumDensity(theCase.proposal.lagrangian, space, cut, theCase.expand.background);
}

/** Entry of the expansion at one monomial. */
interface ParentEntry {
  readonly order: number;
  /** The same order by spacing. */
  readonly powers: MultiOrder;
  readonly coefficient: Coefficient;
}

function parentEntries(expansion: Expansion): Map<JetMonomial, ParentEntry[]> {
  const out = new Map<JetMonomial, ParentEntry[]>();
  for (const { total, order, terms } of expansion.orders)
    for (const { monomial, coefficient } of terms) {
      const entry = { order: total, powers: order, coefficient };
      const list = out.get(monomial);
      if (list) list.push(entry);
      else out.set(monomial, [entry]);
    }
  return out;
}

/** Relative order that a monomial would have, counted from the closest parent term. */
function nominalOrder(theCase: Case, expansion: Expansion, monomial: JetMonomial): number {
  const order = derivativeOrder(expansion.space, theCase.lattice, monomial);
  const totals = expansion.byTerm
    .filter((t) => t.leading)
    .map(({ base }) => [...order].reduce((sum, [s, n]) => sum + n - base.get(s)!, 0));
  return totals.length > 0 ? Math.min(...totals) : 0;
}

/** Solves or checks the proposal's parameters and classifies every monomial of leading order and of the orders that the
 *  proposal itself includes. `forbiddenBy` is filled in once the symmetries are known (see explainDifferences). */
export function matchProposal(theCase: Case, expansion: Expansion, proposal: Proposal): Matching {
  const density = normalForm(proposalDensity({ ...theCase, proposal }, expansion.space)!);
  const parent = parentEntries(expansion);
  const lowest = (m: JetMonomial): number => parent.get(m)?.[0]?.order ?? nominalOrder(theCase, expansion, m);
  const judged = [...density.terms.keys()].filter((m) => lowest(m) <= expansion.through);
  const common = judged.flatMap((m) => parent.get(m)?.[0] ?? []);
  const highest = Math.max(0, ...common.map((e) => e.order));
  // Corrections in a spacing that the proposal's own corrections do not hold, such as the time spacing that went to zero
  // before, are not asked for.
  const held = new Set(
    common.filter((e) => e.order > 0).flatMap((e) => [...e.powers].flatMap(([s, n]) => (n > 0 ? [s] : []))),
  );
  const isAskedFor = (m: JetMonomial): boolean => {
    const entry = parent.get(m)![0]!;
    return (
      entry.order <= 0 ||
      (entry.order <= highest && [...entry.powers].every(([s, n]) => n === 0 || held.has(s)))
    );
  };
  const parentAt = (m: JetMonomial): Coefficient =>
    (parent.get(m) ?? [])
      .filter((e) => e.order <= highest)
      .reduce((sum, e) => sum.add(e.coefficient), Coefficient.zero);
  const monomials = [...new Set([...judged, ...[...parent.keys()].filter(isAskedFor)])].sort(
    (x, y) => lowest(x) - lowest(y) || x.length - y.length,
  );
  const solve = (rescaling: ReadonlyMap<string, Quotient>): Solution => {
    const rescaled = (m: JetMonomial): Quotient =>
      expansion.space
        .factors(m)
        .map((f) => rescaling.get(expansion.space.fields[f.field]!))
        .reduce<Quotient>((c, z) => (z ? c.mul(z) : c), Quotient.of(parentAt(m)));
    const equations = monomials.map((m) => ({ left: density.get(m), right: rescaled(m) }));
    const parameters = solveParameters(
      equations,
      proposal.parameters.map((p) => p.name),
      proposal.matching ?? new Map(),
    );
    const differences = monomials.flatMap((m) => {
      const d = classify(
        m,
        rescaled(m),
        Quotient.substitute(density.get(m), parameters),
        parent.get(m)?.[0]?.order,
      );
      return d ? [d] : [];
    });
    return { parameters, differences };
  };
  const { parameters, differences } = solve(proposal.rescaling);
  const scaling = parameterScaling(expansion, theCase);
  const given = proposal.parameters.every((p) => proposal.matching?.has(p.name));
  return {
    parameters,
    origin: given ? 'given' : 'solved',
    differences,
    rescalings: suggestRescaling(differences, proposal, expansion.space, solve),
    undetermined: proposal.parameters.map((p) => p.name).filter((p) => !parameters.has(p)),
    scaling: scaling.exponents,
    scalingProblem: scaling.problem,
  };
}

interface Solution {
  readonly parameters: Map<string, Quotient>;
  readonly differences: MatchingDifference[];
}

function classify(
  monomial: JetMonomial,
  parent: Quotient,
  proposal: Quotient,
  order: number | undefined,
): MatchingDifference | undefined {
  if (parent.isZero && proposal.isZero) return undefined;
  const kind = parent.isZero
    ? 'only-in-proposal'
    : proposal.isZero
      ? 'missing-from-proposal'
      : parent.equals(proposal)
        ? 'agrees'
        : 'wrong-coefficient';
  return {
    kind,
    monomial,
    parent,
    proposal,
    ratio: kind === 'wrong-coefficient' ? rationalRatio(proposal, parent) : undefined,
    order: parent.isZero ? undefined : order,
    forbiddenBy: undefined,
  };
}

/** Tries φ → Z φ with Z fixed by the first quadratic monomial that disagrees; kept only when everything then agrees. */
function suggestRescaling(
  differences: readonly MatchingDifference[],
  proposal: Proposal,
  space: JetSpace,
  solve: (rescaling: ReadonlyMap<string, Quotient>) => Solution,
): ReadonlyMap<string, Quotient> {
  const wrong = differences.find((d) => d.kind === 'wrong-coefficient' && d.monomial.length === 2);
  if (!wrong) return new Map();
  const fields = new Set(space.factors(wrong.monomial).map((f) => space.fields[f.field]!));
  const [field] = fields;
  if (fields.size !== 1 || field === undefined) return new Map();
  try {
    const z = wrong.proposal.div(wrong.parent).pow(rational(1, 2));
    const old = proposal.rescaling.get(field);
    const trial = new Map(proposal.rescaling).set(field, old ? old.mul(z) : z);
    return solve(trial).differences.every((d) => d.kind === 'agrees') ? trial : new Map();
  } catch (error) {
    if (error instanceof RangeError) return new Map();
    throw error;
  }
}
