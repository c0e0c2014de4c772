// `saltus check CASE…`: everything, with a verdict per claim.

import type { Block } from '../report/document.ts';
import { safeJson } from '../report/escape.ts';
import { type CheckReport, isFailure } from '../report/findings.ts';
import { briefDocument, reportDocument, summaryDocument } from '../report/sections.ts';
import { EXIT, explainError, UsageError, worst } from './exitCodes.ts';
import type { CheckOptions } from './options.ts';
import { deliver } from './output.ts';
import { renderDocument } from './render.ts';
import { rulesFor, runCase } from './run.ts';

/** A case that was checked, or why it could not be. */
type Outcome =
  | { readonly file: string; readonly report: CheckReport; readonly code: number }
  | { readonly file: string; readonly report: undefined; readonly code: number; readonly message: string };

function outcomeOf(file: string, check: () => CheckReport): Outcome {
  try {
    const report = check();
    return { file, report, code: isFailure(report) ? EXIT.failed : EXIT.ok };
  } catch (error) {
    const { code, message } = explainError(error);
    process.stderr.write(`${message}\n`);
    return { file, report: undefined, code, message };
  }
}

async function renderAll(outcomes: readonly Outcome[], options: CheckOptions): Promise<string> {
  if (options.format === 'json') {
    const { jsonRecord } = await import('../report/json.ts');
    const records = outcomes.map((o) =>
      o.report ? jsonRecord(o.report) : { file: o.file, error: { code: o.code, message: o.message } },
    );
    return safeJson(outcomes.length === 1 ? records[0] : records);
  }
  const whole = options.quiet && options.format === 'text' ? briefDocument : reportDocument;
  const documents = outcomes.flatMap((o) => (o.report ? [whole(o.report)] : []));
  const summary: Block[] = outcomes.length > 1 ? summaryDocument(outcomes) : [];
  const texts = await Promise.all(
    [...documents, summary].filter((d) => d.length > 0).map((d) => renderDocument(d, options)),
  );
  return texts.join('\n');
}

/** Checks every case, the good ones also when another cannot be read. Returns the exit code: the gravest of all. */
export async function check(files: readonly string[], options: CheckOptions): Promise<number> {
  if (files.filter((file) => file === '-').length > 1)
    throw new UsageError('standard input (-) can be read only once: name it once');
  const rules = rulesFor(options.rules);
  const outcomes = files.map((file) => outcomeOf(file, () => runCase(file, rules, options)));
  const code = worst(outcomes.map((o) => o.code));
  // Known before anything is printed, so that a closed pipe cannot turn a failure into a success.
  process.exitCode = code;
  if (outcomes.length > 1 || outcomes[0]?.report) deliver(await renderAll(outcomes, options), options.out);
  return code;
}
