// `saltus rules`: the rules that would run, one of them explained, or the facts that a rule may use.

import { type Block, heading, prose } from '../report/document.ts';
import { safeJson, visibleLines } from '../report/escape.ts';
import { explainRule, type Rule } from '../rules/load.ts';
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
  if (what === 'explain') {
    const rule = find(all, id);
    const text =
      options.format === 'json' ? safeJson(rule) : `${visibleLines(explainRule(rule)).trimEnd()}\n`;
    deliver(text, options.out);
  } else
    deliver(
      options.format === 'json' ? safeJson(all) : await renderDocument(listDocument(all), options),
      options.out,
    );
  return EXIT.ok;
}
