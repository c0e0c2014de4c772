// From a file name to the report data, for every command that runs a check.

import { checkCase } from '../check.ts';
import { readCase } from '../model/caseFile.ts';
import { visible } from '../report/escape.ts';
import type { CheckReport } from '../report/findings.ts';
import { loadRules, type Rule } from '../rules/load.ts';
import { readInput } from './input.ts';
import type { CheckOptions } from './options.ts';
import { shippedRules } from './shippedRules.ts';

/** The rules that come with the program and those of the folders given with --rules. */
export const rulesFor = (folders: readonly string[]): readonly Rule[] =>
  loadRules([shippedRules(), ...folders]);

/** One line on standard error before long work; only on a terminal, and not with --quiet. */
export function announce(text: string, options: { readonly quiet: boolean }): void {
  if (!options.quiet && process.stderr.isTTY) process.stderr.write(`${visible(text)}\n`);
}

/** Reads and checks one case. Throws InputError and LimitError. */
export function runCase(file: string, rules: readonly Rule[], options: CheckOptions): CheckReport {
  announce(`checking ${file === '-' ? 'standard input' : file}`, options);
  return checkCase(readCase(readInput(file), file), rules);
}
