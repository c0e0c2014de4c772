// What a library user may import: read a case, load rules, check, render. Nothing here prints or exits.

export { checkCase } from './check.ts';
export type { ClaimVerdict, Verdict } from './claims/verdict.ts';
export { shippedRules } from './cli/shippedRules.ts';
export type { Case } from './model/case.ts';
export { readCase } from './model/caseFile.ts';
export { caseJsonSchema } from './model/schema.ts';
export { starterCase } from './model/starter.ts';
export { InputError, LimitError, type SourcePosition } from './notation/source.ts';
export type { CheckReport } from './report/findings.ts';
export { renderJson } from './report/json.ts';
export { markdownReport, textReport } from './report/reports.ts';
export { version } from './report/version.ts';
export type { Analyses, Finding } from './rules/facts.ts';
export { loadRules, type Rule } from './rules/load.ts';
