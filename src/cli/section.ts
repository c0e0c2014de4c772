// `saltus expand`, `saltus symmetries`, `saltus configurations`: one section of the report of one case, no judgement.

import { rawOrders } from '../limit/expansion.ts';
import type { Expression } from '../model/action.ts';
import type { Case } from '../model/case.ts';
import type { FunctionName } from '../notation/tree.ts';
import { type Block, heading, paragraph, toned } from '../report/document.ts';
import { safeJson } from '../report/escape.ts';
import {
  configurationBlocks,
  expansionBlocks,
  matchingBlocks,
  rawExpansionBlocks,
  symmetryBlocks,
} from '../report/evidence.ts';
import type { CheckReport } from '../report/findings.ts';
import type { Section } from '../report/json.ts';
import type { Analyses } from '../rules/facts.ts';
import type { RemainderOpinion, SecondOpinion } from '../witness/secondOpinion.ts';
import { EXIT } from './exitCodes.ts';
import type { CheckOptions } from './options.ts';
import { deliver } from './output.ts';
import { renderDocument } from './render.ts';
import { rulesFor, runCase } from './run.ts';

const SECTIONS: Record<Section, (analyses: Analyses) => Block[]> = {
  expansion: (a) => [...expansionBlocks(a), ...matchingBlocks(a)],
  symmetries: symmetryBlocks,
  configurations: configurationBlocks,
};

/** Options of `expand`: the others have no second opinion. */
export interface SectionOptions extends CheckOptions {
  readonly secondOpinion?: boolean;
  /** Also show the series before total derivatives are dropped. */
  readonly raw?: boolean;
}

/** Functions that occur in the parent action, each once, sorted. */
function functionsOf(theCase: Case): FunctionName[] {
  const found = new Set<FunctionName>();
  const visit = (e: Expression): void => {
    if (e.kind === 'function') {
      found.add(e.name);
      visit(e.argument);
    } else if (e.kind === 'sum') e.terms.forEach(visit);
    else if (e.kind === 'product') e.factors.forEach(visit);
    else if (e.kind === 'power') visit(e.base);
  };
  for (const term of theCase.parent.terms) visit(term.expression);
  return [...found].sort();
}

/** Highest Taylor order that is compared; the actions in use rarely need more. */
const OPINION_ORDER = 8;

function opinionBlocks({ coefficients, remainders }: Opinions): Block[] {
  if (coefficients.length === 0)
    return [
      heading(2, 'Second opinion'),
      paragraph('The parent action uses no function, so there is nothing to compare.'),
    ];
  return [
    heading(2, 'Second opinion'),
    paragraph(
      'Taylor coefficients of the functions in use (about 0; log and sqrt about 1), ours and those of an independent algebra system.',
    ),
    {
      kind: 'table',
      head: ['function', 'order', 'ours', 'theirs', ''],
      rows: coefficients.map((o) => [
        [o.name],
        [String(o.order)],
        [o.ours],
        [o.theirs],
        [o.agrees ? toned('good', 'agrees') : toned('bad', 'DIFFERS')],
      ]),
    },
    paragraph(
      'Remainder of the series at the argument 10^-6, evaluated with 160 digits, against the first term that was cut (both as powers of ten).',
    ),
    {
      kind: 'table',
      head: ['function', 'cut after', 'remainder', 'next term', ''],
      rows: remainders.map((o) => [
        [o.name],
        [String(o.order)],
        [`10^${o.remainder.toFixed(3)}`],
        [`10^${o.nextTerm.toFixed(3)}`],
        [o.agrees ? toned('good', 'agrees') : toned('bad', 'DIFFERS')],
      ]),
    },
  ];
}

interface Opinions {
  readonly coefficients: readonly SecondOpinion[];
  readonly remainders: readonly RemainderOpinion[];
}

async function opinionsFor(report: CheckReport): Promise<Opinions> {
  const { remainderOpinion, secondOpinion } = await import('../witness/secondOpinion.ts');
  const functions = functionsOf(report.analyses.case);
  return {
    coefficients: secondOpinion(functions, OPINION_ORDER),
    remainders: remainderOpinion(functions, OPINION_ORDER),
  };
}

/** Prints one section of the report. Returns 0: nothing is judged here. */
export async function printSection(section: Section, file: string, options: SectionOptions): Promise<number> {
  const report = runCase(file, rulesFor(options.rules), options);
  const opinions = options.secondOpinion ? await opinionsFor(report) : undefined;
  if (options.format === 'json') {
    const { jsonRecord, orderRecords } = await import('../report/json.ts');
    const { expansion, case: theCase } = report.analyses;
    const { limits } = theCase.lattice;
    const raw = options.raw
      ? { raw: orderRecords(rawOrders(expansion, theCase.lattice), expansion.space, limits) }
      : {};
    const extra = opinions ? { secondOpinion: opinions } : {};
    deliver(safeJson({ ...jsonRecord(report, section), ...raw, ...extra }), options.out);
    return EXIT.ok;
  }
  const blocks: Block[] = [heading(1, report.analyses.case.id), ...SECTIONS[section](report.analyses)];
  if (options.raw) blocks.push(...rawExpansionBlocks(report.analyses));
  if (opinions) blocks.push(...opinionBlocks(opinions));
  deliver(await renderDocument(blocks, options), options.out);
  return EXIT.ok;
}
