// The one function that walks the whole way: case → expansion → matching → symmetries → rough configurations → witnesses
// → claims → findings. It orders the analyses and decides nothing itself.

import { judgeClaim } from './claims/judge.ts';
import type { Verdict } from './claims/verdict.ts';
import { Coefficient } from './exact/coefficient.ts';
import { Rational } from './exact/rational.ts';
import { type Expansion, expandAction } from './limit/expansion.ts';
import { Density, type JetMonomial } from './limit/jets.ts';
import { type Matching, matchProposal, proposalDensity } from './limit/matching.ts';
import { isEquivalent, normalForm } from './limit/normalForm.ts';
import { printDensity } from './limit/printDensity.ts';
import { proposeContinuum } from './limit/proposal.ts';
import { quadraticSign } from './limit/quadraticForm.ts';
import { ExpansionPointError } from './limit/taylor.ts';
import type { Expression } from './model/action.ts';
import type { Case, Proposal } from './model/case.ts';
import { linearForms } from './model/linearForms.ts';
import { InputError, NotationError, type SourcePosition } from './notation/source.ts';
import { type CheckReport, isFailure } from './report/findings.ts';
import { chargeEnergies } from './rough/charges.ts';
import { analyseConfigurations } from './rough/configurations.ts';
import { applyRules } from './rules/evaluate.ts';
import type { Analyses } from './rules/facts.ts';
import type { Rule } from './rules/load.ts';
import { transformDensity } from './symmetry/continuumElement.ts';
import { isDiscreteContinuumShift } from './symmetry/discreteShift.ts';
import type { ShiftFamily } from './symmetry/family.ts';
import { forbiddingSymmetry } from './symmetry/forbidden.ts';
import { analysePointGroup } from './symmetry/pointGroup.ts';
import { analyseShifts, type CorrectionMonomial } from './symmetry/shifts.ts';
import { runWitnesses } from './witness/run.ts';

/** What an expansion is compared with: the author's proposal, or one made from the leading order. */
interface Comparison {
  readonly expansion: Expansion;
  readonly proposal: Proposal;
  readonly matching: Matching;
  /** The proposal in its own parameters, as written. */
  readonly continuum: Density;
}

function expandAndMatch(theCase: Case): Comparison {
  if (theCase.proposal) {
    let continuum: Density | undefined;
    const expansion = expandAction(theCase, (space) => {
      continuum = proposalDensity(theCase, space)!;
      const { terms } = normalForm(continuum);
      return (m) => terms.has(m);
    });
    const matching = matchProposal(theCase, expansion, theCase.proposal);
    return { expansion, proposal: theCase.proposal, matching, continuum: continuum! };
  }
  const expansion = expandAction(theCase);
  const proposal = proposeContinuum(theCase, expansion);
  const proposed = { ...theCase, proposal };
  const matching: Matching = { ...matchProposal(proposed, expansion, proposal), origin: 'proposed' };
  const continuum = proposalDensity(proposed, expansion.space)!;
  return { expansion, proposal, matching, continuum };
}

/** Monomials of all orders beyond the leading one, lowest first. */
function correctionMonomials({ orders, space }: Expansion): CorrectionMonomial[] {
  return orders
    .filter((o) => o.total > 0)
    .flatMap((o) =>
      o.terms.map(({ monomial, coefficient }) => ({
        order: o.total,
        text: printDensity(new Density(space, new Map([[monomial, coefficient]]))),
        derivatives: space.factors(monomial),
        coefficient,
      })),
    );
}

/** True when the density that consists of one monomial is a total derivative. */
const isTotalDerivative = (density: Density): boolean => normalForm(density).isZero;

/** Adds to every term that only the proposal has the exact lattice symmetry that forbids it. */
function explainDifferences(matching: Matching, forbids: (monomial: JetMonomial) => string | null): Matching {
  const differences = matching.differences.map((d) =>
    d.kind === 'only-in-proposal' ? { ...d, forbiddenBy: forbids(d.monomial) } : d,
  );
  return { ...matching, differences };
}

/** Checks one case against the rules. Throws LimitError where a stated limit is hit. */
export function checkCase(theCase: Case, rules: readonly Rule[]): CheckReport {
  const { lattice, fields, parent } = theCase;
  const start = { file: theCase.file, line: 1, column: 1 };
  const { expansion, proposal, matching: bare, continuum } = at(start, () => expandAndMatch(theCase));
  const { space } = expansion;
  const latticeForms = parent.terms.flatMap((t) => linearForms(t.expression));
  const continuumForms = linearForms(proposal.lagrangian, 'continuum');
  const discreteInContinuum = (family: ShiftFamily): boolean =>
    isDiscreteContinuumShift(family, proposal.lagrangian, space.fields);
  const shifts = analyseShifts({
    lattice,
    fields,
    latticeForms,
    continuumForms,
    discreteInContinuum,
    corrections: correctionMonomials(expansion),
  });
  const pointGroup = analysePointGroup({
    lattice,
    fields,
    terms: parent.terms,
    continuum: (element) => isEquivalent(transformDensity(continuum, element), continuum),
  });
  // The shift of one field by 2 pi.
  const isPeriodic = (field: number): boolean =>
    discreteInContinuum({
      prefactor: fields.map((_, j) =>
        j === field ? [{ exponents: lattice.axes.map(() => 0), weight: Coefficient.one }] : [],
      ),
      phase: lattice.axes.map(() => Rational.zero),
      free: [],
      discrete: 1,
      profile: '2 pi',
    });
  const matching = explainDifferences(bare, (monomial) =>
    forbiddingSymmetry(monomial, {
      space,
      lattice,
      fields,
      pointGroup,
      shifts,
      isTotalDerivative,
      isPeriodic,
    }),
  );
  const setting = { case: theCase, expansion, matching, proposalDensity: continuum, shifts, pointGroup };
  const { configurations, byClaim, profiles } = analyseConfigurations(setting);
  const evidence = {
    case: theCase,
    latticeForms,
    continuumForms,
    discreteInContinuum,
    expansion,
    pointGroup,
    configurations: byClaim,
  };
  const analyses: Analyses = {
    case: theCase,
    expansion,
    matching,
    proposed: theCase.proposal ? null : proposal.text,
    shifts,
    pointGroup,
    configurations,
    charges: chargeEnergies(setting),
    witness: runWitnesses({ ...setting, configurations, profiles }),
    claims: theCase.claims.map((claim) => at(claim.position, () => judgeClaim(claim, evidence))),
    compactAsReal: isCompactTreatedAsReal(theCase),
    quadraticForm: quadraticSign(normalForm(continuum), positiveNames(theCase, proposal)),
  };
  return withVerdict({ analyses, findings: applyRules(rules, analyses), verdict: 'holds' });
}

/** Runs an analysis of something written in the case and gives what is wrong with it its place in the file. */
function at<T>(position: SourcePosition, analyse: () => T): T {
  try {
    return analyse();
  } catch (error) {
    if (error instanceof NotationError) throw new InputError(error.problem, error.mend, position);
    if (error instanceof ExpansionPointError)
      throw new InputError(
        error.message,
        'choose another background, or write the expression about one',
        position,
      );
    throw error;
  }
}

/** True when an angle occurs in the parent, but in no periodic function: its period then has no effect. */
function isCompactTreatedAsReal({ fields, parent }: Case): boolean {
  const periodic = new Set<string>();
  const visit = (e: Expression, isPeriodic: boolean): void => {
    switch (e.kind) {
      case 'constant':
        return;
      case 'linear':
        if (isPeriodic) for (const name of e.form.keys()) periodic.add(name);
        return;
      case 'sum':
        for (const t of e.terms) visit(t, isPeriodic);
        return;
      case 'product':
        for (const f of e.factors) visit(f, isPeriodic);
        return;
      case 'power':
        visit(e.base, isPeriodic);
        return;
      case 'function':
        visit(e.argument, isPeriodic || e.name === 'cos' || e.name === 'sin' || e.name === 'tan');
    }
  };
  for (const t of parent.terms) visit(t.expression, false);
  return fields.some((f) => f.values.kind === 'angle' && !periodic.has(f.name));
}

/** Generators that the author declared positive; spacings always are. */
function positiveNames(theCase: Case, proposal: Proposal): Set<string> {
  const declared = [...theCase.parameters, ...proposal.parameters].filter((p) => p.positive);
  return new Set([...declared.map((p) => p.name), ...theCase.lattice.limits]);
}

function withVerdict(report: CheckReport): CheckReport {
  const { claims, matching } = report.analyses;
  const mismatch =
    report.analyses.case.proposal !== undefined && matching?.differences.some((d) => d.kind !== 'agrees');
  const isOpen = claims.some((c) => c.verdict === 'undecided') || (matching?.undetermined.length ?? 0) > 0;
  const verdict: Verdict = mismatch || isFailure(report) ? 'fails' : isOpen ? 'undecided' : 'holds';
  return { ...report, verdict };
}
