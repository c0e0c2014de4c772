// The machine-readable record of a check. Outside scripts rely on these keys: add keys freely, never rename one. The
// same case gives the same bytes: nothing here depends on time, machine or the order of a hash.

import type { Quotient } from '../exact/quotient.ts';
import type { Rational } from '../exact/rational.ts';
import type { ExpansionOrder, ExpansionTerm, MultiOrder } from '../limit/expansion.ts';
import type { JetSpace } from '../limit/jets.ts';
import type { MatchingDifference } from '../limit/matching.ts';
import type { ChargeEnergy, Configuration, Scaling } from '../rough/profile.ts';
import type { Analyses } from '../rules/facts.ts';
import type { CompletenessCertificate, ShiftAnalysis, ShiftSymmetry } from '../symmetry/family.ts';
import type { WitnessRecord } from '../witness/witness.ts';
import { plainPiece } from './document.ts';
import { safeJson } from './escape.ts';
import { type CheckReport, WHAT_IS_NOT_PROVED } from './findings.ts';
import { coefficientPiece, monomialPiece, notationPiece, quotientPiece, termPiece } from './formula.ts';
import { pointSymmetries } from './pointElements.ts';
import { version } from './version.ts';

/** An integer as a number, any other rational as `p/q`. */
const exact = (value: Rational): number | string =>
  value.isInteger && Number.isSafeInteger(Number(value.num)) ? Number(value.num) : value.toString();

/** Floats of witnesses: twelve digits, so that the last bit of a cosine does not decide whether two records agree. */
const float = (value: number): number | null =>
  Number.isFinite(value) ? Number(value.toPrecision(12)) : null;

const byName = <T>(map: ReadonlyMap<string, T>): Record<string, T> => Object.fromEntries(map);

const multiOrder = (order: MultiOrder): Record<string, number> => byName(order);

function term(space: JetSpace, t: ExpansionTerm, spacings: readonly string[]): object {
  const whole = termPiece(space, t, spacings);
  return {
    coefficient: plainPiece(coefficientPiece(t.coefficient, spacings)),
    monomial: plainPiece(monomialPiece(space, t.monomial)),
    text: whole.text,
    latex: whole.latex,
    from: t.from,
  };
}

function expansion({ expansion: e, case: theCase }: Analyses): object {
  return {
    through: e.through,
    fieldCut: e.fieldCut ?? null,
    orders: orderRecords(e.orders, e.space, theCase.lattice.limits),
  };
}

/** Orders of an expansion as plain data. */
export function orderRecords(
  orders: readonly ExpansionOrder[],
  space: JetSpace,
  spacings: readonly string[],
): object[] {
  return orders.map((o) => ({
    order: multiOrder(o.order),
    total: o.total,
    terms: o.terms.map((t) => term(space, t, spacings)),
  }));
}

/** Whether the exact lattice symmetries allow a monomial that only the proposal has; null where that was not asked. */
const allowed = (d: MatchingDifference): boolean | null =>
  d.forbiddenBy === undefined ? null : d.forbiddenBy === null;

function matching({ matching: m, expansion: e, proposed, case: theCase }: Analyses): object | null {
  if (!m) return null;
  const quotient = (q: Quotient): string => plainPiece(quotientPiece(q, theCase.lattice.limits));
  const row = (d: MatchingDifference): object => ({
    kind: d.kind,
    monomial: plainPiece(monomialPiece(e.space, d.monomial)),
    parent: quotient(d.parent),
    proposal: quotient(d.proposal),
    ratio: d.ratio ? exact(d.ratio) : null,
    order: d.order ?? null,
    allowed: allowed(d),
    forbiddenBy: d.forbiddenBy ?? null,
  });
  return {
    origin: m.origin,
    proposed,
    parameters: Object.fromEntries([...m.parameters].map(([name, q]) => [name, quotient(q)])),
    differences: m.differences.filter((d) => d.kind !== 'agrees').map(row),
    agreements: m.differences.filter((d) => d.kind === 'agrees').map(row),
    rescalings: Object.fromEntries([...m.rescalings].map(([field, q]) => [field, quotient(q)])),
    scaling: Object.fromEntries(
      [...m.scaling].map(([name, powers]) => [
        name,
        Object.fromEntries([...powers].map(([spacing, power]) => [spacing, exact(power)])),
      ]),
    ),
    undetermined: m.undetermined,
  };
}

function shift(s: ShiftSymmetry, shifts: ShiftAnalysis): object {
  const kind = s.redundancy ? 'gauge' : 'shift';
  const piece = notationPiece(s.family.profile);
  return {
    id: `${kind}: ${s.family.profile}`,
    kind,
    statement: s.family.profile,
    latex: typeof piece === 'object' && piece.kind === 'formula' ? (piece.latex ?? null) : null,
    lattice: s.lattice,
    continuum: s.continuum,
    status: s.status,
    growth: s.growth,
    brokenBy: s.brokenBy,
    certificate: s.lattice ? shifts.lattice.text : (shifts.continuum?.text ?? null),
  };
}

function certificate(c: CompletenessCertificate | null): object | null {
  return (
    c && { complete: c.complete, growth: c.growth ?? null, primes: c.primes, rows: c.rows, text: c.text }
  );
}

const scaling = (s: Scaling | null): object | null =>
  s && { exponent: s === 'zero' ? 'zero' : { a: exact(s.a), l: exact(s.l), t: exact(s.t) } };

function configuration(c: Configuration): object {
  return {
    profile: c.profile,
    claimed: c.claimed,
    lattice: scaling(c.lattice),
    continuum: scaling(c.continuum),
    suppressed: c.suppressed,
    truncates: c.truncates,
    corrections: c.corrections.map((k) => ({
      order: k.order,
      ...scaling(k.scaling),
      sameAsLeading: k.sameAsLeading,
    })),
    byTerm: Object.fromEntries([...c.byTerm].map(([name, s]) => [name, scaling(s)])),
    mixedAction: c.mixedAction,
    undecided: c.undecided ?? null,
  };
}

function charge(c: ChargeEnergy): object {
  return {
    family: c.family,
    p: exact(c.p),
    q: exact(c.q),
    limitsCommute: c.limitsCommute,
    text: c.text,
    undecided: c.undecided ?? null,
  };
}

function witness(w: WitnessRecord): object {
  const numbers = (r: { exponent: number; coefficient?: number }): object => ({
    exponent: float(r.exponent),
    ...(r.coefficient === undefined ? {} : { coefficient: float(r.coefficient) }),
  });
  return {
    kind: w.kind,
    subject: w.subject,
    verdict: w.verdict,
    text: w.text,
    sizes: w.sizes,
    values: w.values.map(float),
    predicted: numbers(w.predicted),
    fitted: numbers(w.fitted),
  };
}

/** Sections of the record by their key, for the commands that print one of them. */
export type Section = 'expansion' | 'symmetries' | 'configurations';

function sections(report: CheckReport): Record<string, unknown> {
  const { analyses } = report;
  const { pointGroup: g, shifts } = analyses;
  return {
    expansion: expansion(analyses),
    matching: matching(analyses),
    symmetries: [...shifts.symmetries.map((s) => shift(s, shifts)), ...pointSymmetries(analyses)],
    completeness: { lattice: certificate(shifts.lattice), continuum: certificate(shifts.continuum) },
    pointGroup: {
      order: g.order,
      name: g.name ?? null,
      holohedry: g.holohedry,
      continuumOrder: g.continuumOrder,
      generators: g.generators,
      timeReflection: g.timeReflection,
      fieldReflection: g.fieldReflection,
    },
    quadraticForm: analyses.quadraticForm,
    configurations: analyses.configurations.map(configuration),
    charges: analyses.charges.map(charge),
    // This version does not enumerate missing operators and counts no finite lattices: empty and said to be so.
    operators: { missing: [], examined: false },
    census: [],
    formula: null,
    claims: analyses.claims.map((c) => ({
      id: c.claim.id,
      kind: c.claim.kind,
      verdict: c.verdict,
      found: c.found,
    })),
    findings: report.findings,
    warnings: analyses.case.warnings,
    witness: analyses.witness.map(witness),
    limits: WHAT_IS_NOT_PROVED,
  };
}

const SECTION_KEYS: Record<Section, readonly string[]> = {
  expansion: ['expansion', 'matching'],
  symmetries: ['symmetries', 'completeness', 'pointGroup'],
  configurations: ['configurations', 'charges'],
};

/** The record of one case as a JavaScript value; `section` keeps the keys of one section only. */
export function jsonRecord(report: CheckReport, section?: Section): Record<string, unknown> {
  const all = sections(report);
  const head = { saltus: { version }, case: report.analyses.case.id };
  if (section) return { ...head, ...Object.fromEntries(SECTION_KEYS[section].map((key) => [key, all[key]])) };
  return { ...head, title: report.analyses.case.title, verdict: report.verdict, ...all };
}

/** The record of one case as JSON text with a final newline. */
export function renderJson(report: CheckReport): string {
  return safeJson(jsonRecord(report));
}
