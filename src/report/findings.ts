// What one check hands to the reports. The reports only arrange and print it: no verdict is made in this room.

import type { Verdict } from '../claims/verdict.ts';
import type { Analyses, Finding } from '../rules/facts.ts';

/** Everything that a report of one case may show. */
export interface CheckReport {
  readonly analyses: Analyses;
  /** What the rules say, in the order of the rules. */
  readonly findings: readonly Finding[];
  /** `fails` when a claim fails, the proposal does not match or a fault was found; `undecided` when only open
   *  questions are left; `holds` otherwise. */
  readonly verdict: Verdict;
}

/** True when the run must not pass: a failed claim, a failed match or a fault. Undecided claims alone do not fail. */
export function isFailure(report: CheckReport): boolean {
  return (
    report.verdict === 'fails' ||
    report.analyses.claims.some((c) => c.verdict === 'fails') ||
    report.findings.some((f) => f.level === 'fault')
  );
}

/** The one sentence every report ends with. */
export const WHAT_IS_NOT_PROVED =
  'A clean report is no proof that the lattice model flows to the proposed theory: it checks the classical ' +
  'limit a → 0, exact symmetries and exact counts, and says nothing about the phase the lattice model is in.';
