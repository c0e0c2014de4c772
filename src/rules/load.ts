// Rules from folders of YAML files, one rule a file. A rule is checked when it is loaded: its shape, its facts in `when` and in the
// placeholders of `says`, and that no other rule has its name.

import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { shapeError } from '../model/validate.ts';
import { YamlSource } from '../model/yamlSource.ts';
import { InputError, NotationError } from '../notation/source.ts';
import { type Condition, readCondition } from './condition.ts';
import { ruleSchema } from './ruleSchema.ts';
import { factIn, SCOPES } from './vocabulary.ts';

export interface Rule {
  readonly id: string;
  readonly level: 'fault' | 'caution' | 'note';
  /** The scope whose items the rule goes through. */
  readonly forEach: string;
  readonly when: Condition;
  /** The condition as written. */
  readonly condition: string;
  /** With {facts} to be filled in. */
  readonly says: string;
  readonly why: string;
  readonly mend: string;
  readonly source: string;
  readonly examples: { readonly fires: readonly string[]; readonly silent: readonly string[] };
  readonly file: string;
}

/** Most rule files in one folder. */
const MOST_RULES = 500;

/** All rules of some folders, in the order of the folders and then of the file names. Throws InputError. */
export function loadRules(folders: readonly string[]): Rule[] {
  const rules = new Map<string, Rule>();
  for (const folder of folders)
    for (const file of ruleFiles(folder)) {
      const rule = readRule(readBytes(file), file);
      const other = rules.get(rule.id);
      if (other)
        throw new InputError(
          `the rule "${rule.id}" is already defined in ${other.file}`,
          'give this one another name',
          { file, line: 1, column: 1 },
        );
      rules.set(rule.id, rule);
    }
  return [...rules.values()];
}

function ruleFiles(folder: string): string[] {
  let names: string[];
  try {
    names = readdirSync(folder)
      .filter((n) => n.endsWith('.yaml'))
      .sort();
  } catch {
    throw new InputError('this folder of rules cannot be read', 'name a folder with rule files', {
      file: folder,
      line: 1,
      column: 1,
    });
  }
  if (names.length > MOST_RULES)
    throw new InputError(`the folder holds ${names.length} rules`, `at most ${MOST_RULES} are read`, {
      file: folder,
      line: 1,
      column: 1,
    });
  return names.map((n) => join(folder, n));
}

function readBytes(file: string): Uint8Array {
  try {
    return readFileSync(file);
  } catch {
    throw new InputError('this rule cannot be read', 'make it a readable file', { file, line: 1, column: 1 });
  }
}

/** Reads one rule. Throws InputError with file, line and column. */
export function readRule(input: string | Uint8Array, file: string): Rule {
  const source = YamlSource.read(input, file);
  const parsed = ruleSchema.safeParse(source.toPlain());
  if (!parsed.success) throw shapeError(parsed.error, source);
  const data = parsed.data;
  const forEach = data['for-each'];
  if (!SCOPES[forEach])
    throw new InputError(
      `"${forEach}" is nothing that rules go through`,
      `write one of ${Object.keys(SCOPES).join(', ')}`,
      source.positionOf(['for-each']),
    );
  return {
    id: data.rule,
    level: data.level,
    forEach,
    when: inString(source, 'when', () => readCondition(data.when, forEach)),
    condition: data.when,
    says: inString(source, 'says', () => checkPlaceholders(data.says, forEach)),
    why: oneLine(data.why),
    mend: oneLine(data.mend),
    source: data.source,
    examples: data.examples,
    file,
  };
}

const oneLine = (text: string): string => text.trim().replace(/\s+/g, ' ');

function inString<T>(source: YamlSource, key: string, read: () => T): T {
  try {
    return read();
  } catch (error) {
    if (!(error instanceof NotationError)) throw error;
    throw new InputError(error.problem, error.mend, source.positionInString([key], error.offset));
  }
}

const PLACEHOLDER = /\{([^{}]*)\}/g;

function checkPlaceholders(says: string, scope: string): string {
  for (const match of says.matchAll(PLACEHOLDER))
    if (!factIn(scope, match[1]!))
      throw new NotationError(
        `"{${match[1]}}" is no fact of ${scope}`,
        'saltus rules facts lists them',
        match.index,
      );
  return oneLine(says);
}

/** The statement of a rule with its placeholders filled in. */
export function fillPlaceholders(says: string, text: (fact: string) => string): string {
  return says.replace(PLACEHOLDER, (_, fact: string) => text(fact));
}
