// `saltus rules`: the rules that would run, one of them explained, or the facts that a rule may use.

import { type Block, heading, paragraph, prose } from '../report/document.ts';
import { safeJson, visibleLines } from '../report/escape.ts';
import type { Rule } from '../rules/load.ts';
import { factsDocumentation } from '../rules/vocabulary.ts';
import { EXIT, UsageError } from './exitCodes.ts';
import type { CheckOptions } from './options.ts';
import { deliver } from './output.ts';
import { renderDocument } from './render.ts';
import { rulesFor } from './run.ts';

function listDocument(rules: readonly Rule[]): Block[] {
  return [
    heading(1, 'Rules'),
    {
      kind: 'table',
      head: ['rule', 'level', 'for each', 'says'],
      rows: rules.map((r) => [[r.id], [r.level], [r.forEach], prose(r.says)]),
    },
  ];
}

const listed = (ids: readonly string[]): string => ids.join(', ') || 'no shipped case';

/** One rule in full. */
function explanation(rule: Rule): Block[] {
  const { fires, silent } = rule.examples;
  return [
    heading(1, rule.id),
    paragraph(`A ${rule.level}, for each ${rule.forEach}.`),
    paragraph(`When: ${rule.condition}`),
    paragraph(...prose(`Says: ${rule.says}`)),
    paragraph(...prose(`Why: ${rule.why}`)),
    paragraph(...prose(`Mend: ${rule.mend}`)),
    paragraph(`Source: ${rule.source}`),
    paragraph(`Fires on ${listed(fires)}; silent on ${listed(silent)}.`),
  ];
}

/** A rule as plain data, with its condition as written. */
function ruleRecord({ id, level, forEach, condition, says, why, mend, source, examples }: Rule): object {
  return { rule: id, level, 'for-each': forEach, when: condition, says, why, mend, source, examples };
}

function find(rules: readonly Rule[], id: string | undefined): Rule {
  if (id === undefined)
    throw new UsageError('which rule? — write saltus rules explain ID; saltus rules lists the ids');
  const rule = rules.find((r) => r.id === id);
  if (!rule) throw new UsageError(`there is no rule "${id}" — saltus rules lists the ids`);
  return rule;
}

/** Prints the list of rules, the explanation of one (`explain ID`), or the documentation of the facts (`facts`). */
export async function rules(
  what: string | undefined,
  id: string | undefined,
  options: CheckOptions,
): Promise<number> {
  if (what !== undefined && what !== 'explain' && what !== 'facts')
    throw new UsageError(
      `"${what}" is nothing that saltus rules shows — write explain ID, facts, or nothing`,
    );
  if (what === 'facts') {
    const text = factsDocumentation();
    deliver(
      options.format === 'json' ? safeJson({ facts: text }) : `${visibleLines(text).trimEnd()}\n`,
      options.out,
    );
    return EXIT.ok;
  }
  const all = rulesFor(options.rules);
  const chosen = what === 'explain' ? [find(all, id)] : all;
  const document = what === 'explain' ? explanation(chosen[0]!) : listDocument(all);
  const record = chosen.map(ruleRecord);
  deliver(
    options.format === 'json'
      ? safeJson(what === 'explain' ? record[0] : record)
      : await renderDocument(document, options),
    options.out,
  );
  return EXIT.ok;
}
