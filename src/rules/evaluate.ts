// Applies rules to the analyses of a case. What a rule says about several items it says once, with the items listed.

import { Rational } from '../exact/rational.ts';
import { factsOf, holds } from './condition.ts';
import type { Analyses, Finding } from './facts.ts';
import { fillPlaceholders, type Rule } from './load.ts';
import { type FactValue, readFact, SCOPES } from './vocabulary.ts';

const LEVELS = ['fault', 'caution', 'note'] as const;
/** Statements of one rule that are written out; the rest is counted. */
const MOST_STATEMENTS = 4;

/** All findings: faults first, then cautions, then notes; within a level in the order of the rules. */
export function applyRules(rules: readonly Rule[], analyses: Analyses): Finding[] {
  const findings = rules.flatMap((rule) => applyRule(rule, analyses));
  return findings.sort((x, y) => LEVELS.indexOf(x.level) - LEVELS.indexOf(y.level));
}

function applyRule(rule: Rule, analyses: Analyses): Finding[] {
  const firing = SCOPES[rule.forEach]!.items(analyses).flatMap((item) => {
    const read = (fact: string): FactValue => readFact(rule.forEach, fact, item, analyses);
    return holds(rule.when, read) ? [read] : [];
  });
  if (firing.length === 0) return [];
  const statements = [
    ...new Set(firing.map((read) => fillPlaceholders(rule.says, (f) => factText(read(f))))),
  ];
  const evidence = firing.slice(0, MOST_STATEMENTS).map((read) =>
    factsOf(rule.when)
      .map((f) => `${f} = ${factText(read(f))}`)
      .join(', '),
  );
  const rest = statements.length - MOST_STATEMENTS;
  return [
    {
      rule: rule.id,
      level: rule.level,
      statement: statements.slice(0, MOST_STATEMENTS).join(' ') + (rest > 0 ? ` (and ${rest} more)` : ''),
      why: rule.why,
      evidence: [...new Set(evidence)].join('; '),
      mend: rule.mend,
    },
  ];
}

function factText(value: FactValue): string {
  if (value === null) return 'none';
  if (value instanceof Rational) return value.toString();
  return String(value);
}
