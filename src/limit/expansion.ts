// The gradient expansion of the parent. A term F(u) with u = Σ_j D_j φ_j is expanded about the centre of the support of
// its stencils, u = Σ_α m_α a^{|α|} ∂^α φ, composed with the Taylor series of F, cut by the number of derivatives and
// brought to normal form modulo total derivatives. Every derivative along an axis carries that axis's spacing, so the
// order of a monomial is its multi-degree; the sum over cells becomes an integral divided by the cell volume.

import { Coefficient, type CoefficientTerm } from '../exact/coefficient.ts';
import { rational } from '../exact/rational.ts';
import type { ActionTerm } from '../model/action.ts';
import type { Case } from '../model/case.ts';
import type { Lattice } from '../model/geometry.ts';
import { InputError } from '../notation/source.ts';
import {
  keepsConstantInContinuum,
  keepsConstantOnLattice,
  needsFieldCut,
  undividedDensity,
} from './formDensity.ts';
import { Density, type JetMonomial, JetSpace } from './jets.ts';
import { normalForm } from './normalForm.ts';
import { ExpansionPointError } from './taylor.ts';

/** Powers of each spacing beyond the leading order, e.g. {a: 2, b: 0}. */
export type MultiOrder = ReadonlyMap<string, number>;

export interface ExpansionTerm {
  /** Absolute coefficient in the Lagrangian density (parent parameters, spacings; cell volume divided out). */
  readonly coefficient: Coefficient;
  readonly monomial: JetMonomial;
  /** Names of the parent terms it comes from. */
  readonly from: readonly string[];
}

export interface ExpansionOrder {
  readonly order: MultiOrder;
  /** Sum of the entries of `order`; 0 is the leading order. */
  readonly total: number;
  readonly terms: readonly ExpansionTerm[];
}

/** Expansion of one named parent term. */
export interface TermExpansion {
  readonly name: string;
  /** As it comes out of the Taylor series about the centre, absolute coefficients. */
  readonly raw: Density;
  /** Normal form of `raw` modulo total derivatives. */
  readonly normal: Density;
  /** Absolute powers of the spacings at this term's leading order; undefined when the term vanishes. */
  readonly leading: MultiOrder | undefined;
  /** Powers of the spacings from which relative orders of this term are counted. */
  readonly base: MultiOrder;
}

export interface Expansion {
  readonly space: JetSpace;
  /** Sorted: by total order, then lexicographically in the order of the limits. */
  readonly orders: readonly ExpansionOrder[];
  readonly byTerm: readonly TermExpansion[];
  /** Highest total relative order that is complete. */
  readonly through: number;
  /** Largest number of fields kept, when functions of undifferentiated fields made a cut necessary. */
  readonly fieldCut: number | undefined;
}

/** A term whose first this-many orders are all total derivatives is taken to vanish. */
const EMPTY_ORDERS = 8;

/** Π spacings over all axes: the volume of a space-time cell. */
export function cellVolume(lattice: Lattice): Coefficient {
  return lattice.axes.reduce((v, axis) => v.mul(Coefficient.symbol(axis.spacing)), Coefficient.one);
}

/** Powers of the spacings that the derivatives of a monomial carry. */
export function derivativeOrder(
  space: JetSpace,
  lattice: Lattice,
  monomial: JetMonomial,
): Map<string, number> {
  const out = new Map(lattice.limits.map((s) => [s, 0]));
  for (const [k, n] of space.degree(monomial).entries()) {
    const { spacing } = lattice.axes[k]!;
    out.set(spacing, out.get(spacing)! + n);
  }
  return out;
}

const totalOf = (order: MultiOrder): number => [...order.values()].reduce((x, y) => x + y, 0);

/** Powers of the spacings in one term of an absolute coefficient, with the cell volume multiplied back: for a parent whose
 *  parameters carry no spacings this is the number of derivatives along the axes of each spacing. */
export function spacingOrder(term: CoefficientTerm, lattice: Lattice): Map<string, number> {
  const out = new Map(lattice.limits.map((s) => [s, 0]));
  for (const { spacing } of lattice.axes) out.set(spacing, out.get(spacing)! + 1);
  for (const [generator, exponent] of term.powers) {
    const power = out.get(generator);
    if (power !== undefined) out.set(generator, power + exponent.toNumber());
  }
  return out;
}

/** Least order of a density with absolute coefficients, and the monomials that have it. */
function leadingPart(
  density: Density,
  lattice: Lattice,
): { order: MultiOrder; monomials: JetMonomial[] } | undefined {
  let best: { order: MultiOrder; monomials: JetMonomial[] } | undefined;
  for (const [m, c] of density.terms)
    for (const term of c.terms) {
      const order = spacingOrder(term, lattice);
      const comparison = best ? compareOrders(order, best.order) : -1;
      if (comparison < 0) best = { order, monomials: [m] };
      else if (comparison === 0) best!.monomials.push(m);
    }
  return best;
}

function compareOrders(x: MultiOrder, y: MultiOrder): number {
  const byTotal = totalOf(x) - totalOf(y);
  if (byTotal !== 0) return byTotal;
  for (const [spacing, n] of x) if (n !== y.get(spacing)) return n - y.get(spacing)!;
  return 0;
}

interface ExpandedTerm {
  readonly name: string;
  readonly raw: Density;
  readonly normal: Density;
  readonly leading: { readonly order: MultiOrder; readonly monomials: readonly JetMonomial[] } | undefined;
}

/** Expands one term: first at rising order until something survives modulo total derivatives, then through the orders
 *  asked for beyond that. */
function expandTerm(term: ActionTerm, space: JetSpace, theCase: Case, fields: number): ExpandedTerm {
  const { lattice } = theCase;
  const { beyondLeading, background } = theCase.expand;
  const at = (order: number): { undivided: Density; normal: Density } => {
    const undivided = undividedDensity(term.expression, space, { order, fields }, background);
    return { undivided, normal: normalForm(undivided) };
  };
  let lowest: number | undefined;
  for (let order = 0; lowest === undefined && order <= EMPTY_ORDERS; order++)
    lowest = fewestDerivatives(at(order).normal);
  const { undivided, normal } = at((lowest ?? EMPTY_ORDERS) + beyondLeading);
  const absolute = withSpacings(normal, lattice);
  return {
    name: term.name,
    raw: withSpacings(undivided, lattice),
    normal: absolute,
    leading: leadingPart(absolute, lattice),
  };
}

function fewestDerivatives(density: Density): number | undefined {
  let fewest: number | undefined;
  for (const m of density.terms.keys()) {
    const n = density.space.degree(m).reduce((x, y) => x + y, 0);
    fewest = fewest === undefined ? n : Math.min(fewest, n);
  }
  return fewest;
}

/** Order from which a term's corrections are counted. A term that the proposal has counts from its own leading order. A
 *  term that it lacks is a correction to the closest term that it has, if it lies above that one in every spacing;
 *  otherwise it is a leading term in its own right, and missing. */
function baseOrder(
  term: ExpandedTerm,
  all: readonly ExpandedTerm[],
  isAccepted: (t: ExpandedTerm) => boolean,
): MultiOrder | undefined {
  const own = term.leading?.order;
  if (!own || isAccepted(term)) return own;
  const below = all
    .filter((t) => t.leading && isAccepted(t))
    .map((t) => t.leading!.order)
    .filter((base) => [...own].every(([s, n]) => n >= base.get(s)!) && totalOf(own) > totalOf(base));
  return below.sort((x, y) => totalOf(y) - totalOf(x))[0] ?? own;
}

/** Expansion of the parent action as a Lagrangian density (sum over cells → ∫ / cell volume).
 *  @param isLeading says whether a monomial belongs to the proposal; by default every term counts from its own leading
 *  order. Throws LimitError (blocks, terms), and InputError for a term without an expansion. */
export function expandAction(
  theCase: Case,
  isLeading: (space: JetSpace) => (m: JetMonomial) => boolean = () => () => true,
): Expansion {
  const { lattice } = theCase;
  const space = jetSpaceOf(theCase);
  const fieldCut = fieldCutOf(theCase);
  const fields = fieldCut ?? Number.POSITIVE_INFINITY;
  const terms = theCase.parent.terms.map((t) => atTerm(t, () => expandTerm(t, space, theCase, fields)));
  const inProposal = isLeading(space);
  const accepted = (t: ExpandedTerm): boolean => t.leading?.monomials.some(inProposal) ?? false;
  const byTerm = terms.map(
    (t): TermExpansion => ({
      name: t.name,
      raw: t.raw,
      normal: t.normal,
      leading: t.leading?.order,
      base: baseOrder(t, terms, accepted) ?? new Map(lattice.limits.map((s) => [s, 0])),
    }),
  );
  const through = theCase.expand.beyondLeading;
  const normal = byTerm.map((t) => ({ name: t.name, density: t.normal, base: t.base }));
  return { space, orders: collectOrders(normal, space, lattice, through), byTerm, through, fieldCut };
}

/** Gives a term that cannot be expanded its place in the case file. */
function atTerm<T>(term: ActionTerm, expand: () => T): T {
  try {
    return expand();
  } catch (error) {
    if (!(error instanceof ExpansionPointError) || !term.position) throw error;
    throw new InputError(
      `the term "${term.name}" has no expansion: ${error.message}`,
      'write the function about a point where it is analytic, or declare a background',
      term.position,
    );
  }
}

/** Jets of the fields of a case over its axes. */
export function jetSpaceOf(theCase: Case): JetSpace {
  return new JetSpace(
    theCase.fields.map((f) => f.name),
    theCase.lattice.axes.map((x) => x.name),
  );
}

/** Number of field factors kept on both sides, when a function of an undifferentiated field makes a cut necessary or the
 *  case asks for one. */
export function fieldCutOf(theCase: Case): number | undefined {
  const { parent, proposal, expand } = theCase;
  const isNeeded =
    parent.terms.some((t) => needsFieldCut(t.expression, keepsConstantOnLattice)) ||
    (proposal !== undefined && needsFieldCut(proposal.lagrangian, keepsConstantInContinuum));
  return expand.fields ?? (isNeeded ? Math.max(4, expand.beyondLeading + 2) : undefined);
}

/** Multiplies every monomial by the spacings of its derivatives and divides by the cell volume. */
function withSpacings(density: Density, lattice: Lattice): Density {
  const perCell = Coefficient.one.div(cellVolume(lattice));
  const byDegree = new Map<string, Coefficient>();
  const out = new Map<JetMonomial, Coefficient>();
  for (const [m, c] of density.terms) {
    const degree = density.space.degree(m);
    const key = degree.join(',');
    const spacings =
      byDegree.get(key) ??
      degree.reduce(
        (product, n, k) => product.mul(Coefficient.symbol(lattice.axes[k]!.spacing, rational(n))),
        perCell,
      );
    byDegree.set(key, spacings);
    out.set(m, c.mul(spacings));
  }
  return new Density(density.space, out);
}

/** The orders of the expansion as they come out of the Taylor series, before total derivatives are dropped: for fields that do not
 *  decay, on which those derivatives may count. */
export function rawOrders(expansion: Expansion, lattice: Lattice): ExpansionOrder[] {
  const raw = expansion.byTerm.map((t) => ({ name: t.name, density: t.raw, base: t.base }));
  return collectOrders(raw, expansion.space, lattice, expansion.through);
}

function collectOrders(
  byTerm: readonly { readonly name: string; readonly density: Density; readonly base: MultiOrder }[],
  space: JetSpace,
  lattice: Lattice,
  through: number,
): ExpansionOrder[] {
  const groups = new Map<string, { order: Map<string, number>; terms: Map<JetMonomial, ExpansionTerm> }>();
  for (const { name, density, base } of byTerm)
    for (const [monomial, coefficient] of density.terms)
      for (const part of coefficient.terms) {
        const order = new Map([...spacingOrder(part, lattice)].map(([s, n]) => [s, n - base.get(s)!]));
        if (totalOf(order) > through) continue;
        const key = [...order.values()].join(',');
        const group = groups.get(key) ?? { order, terms: new Map<JetMonomial, ExpansionTerm>() };
        groups.set(key, group);
        const old = group.terms.get(monomial);
        const value = Coefficient.ofTerm(part);
        const sum = old ? old.coefficient.add(value) : value;
        const from = old ? [...new Set([...old.from, name])] : [name];
        if (sum.isZero) group.terms.delete(monomial);
        else group.terms.set(monomial, { coefficient: sum, monomial, from });
      }
  return [...groups.values()]
    .filter((g) => g.terms.size > 0)
    .map((g) => ({ order: g.order, total: totalOf(g.order), terms: sortTerms([...g.terms.values()], space) }))
    .sort((x, y) => compareOrders(x.order, y.order));
}

/** Fewest fields first, then by the derivatives of the monomial. */
function sortTerms(terms: readonly ExpansionTerm[], space: JetSpace): ExpansionTerm[] {
  const keyed = terms.map((term) => ({
    term,
    key: space
      .factors(term.monomial)
      .map((f) => f.derivative.join(','))
      .join(';'),
  }));
  keyed.sort(
    (x, y) => x.term.monomial.length - y.term.monomial.length || (x.key < y.key ? -1 : x.key > y.key ? 1 : 0),
  );
  return keyed.map((k) => k.term);
}
