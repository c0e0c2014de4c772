// Shape errors with positions: what the validator found, said about the file, with an example of what belongs there. Keys
// and examples come from the JSON Schema, so that they are written down once.

import type * as z from 'zod';
import { shortened } from '../notation/part.ts';
import { InputError } from '../notation/source.ts';
import { didYouMean } from './names.ts';
import { caseJsonSchema, STATEMENTS } from './schema.ts';
import type { Path, YamlSource } from './yamlSource.ts';

type Issue = z.core.$ZodIssue;

/** The parts of a JSON Schema that messages are made from. */
interface SchemaNode {
  readonly properties?: Readonly<Record<string, SchemaNode>>;
  readonly additionalProperties?: SchemaNode | boolean;
  readonly items?: SchemaNode;
  readonly anyOf?: readonly SchemaNode[];
  readonly description?: string;
  readonly examples?: readonly unknown[];
}

/** The first shape error as an InputError. */
export function shapeError(error: z.ZodError, source: YamlSource): InputError {
  const issues = error.issues.map((i) => resolved(i, source));
  // A misspelt key explains the key that is missing in its place.
  const issue = issues.find((i) => i.code === 'unrecognized_keys') ?? issues[0]!;
  const path = issue.path.filter((p): p is string | number => typeof p !== 'symbol');
  return new ShapeReader(source, path).explain(issue);
}

function valueAt(source: YamlSource, path: Path): unknown {
  let value = source.toPlain();
  for (const key of path) {
    if (value === null || typeof value !== 'object') return undefined;
    value = (value as Record<string | number, unknown>)[key];
  }
  return value;
}

/** Inside a union, the issue of the alternative that was meant. */
function resolved(issue: Issue, source: YamlSource): Issue {
  if (issue.code !== 'invalid_union') return issue;
  const value = valueAt(source, issue.path as Path);
  const isMap = value !== null && typeof value === 'object' && !Array.isArray(value);
  let inner: readonly Issue[] | undefined;
  if (issue.path[0] === 'claims' && issue.path.length === 2) {
    if (!isMap) return issue;
    inner = issue.errors[STATEMENTS.findIndex((s) => Object.hasOwn(value, s))];
  } else
    inner =
      issue.errors.find((list) => list.some((i) => i.path.length > 0)) ??
      issue.errors.find((list) => list.some((i) => i.code === 'unrecognized_keys'));
  const chosen = inner?.find((i) => i.code === 'unrecognized_keys') ?? inner?.[0];
  return chosen ? resolved({ ...chosen, path: [...issue.path, ...chosen.path] } as Issue, source) : issue;
}

class ShapeReader {
  private readonly label: string;
  private readonly schema: SchemaNode | undefined;

  constructor(
    private readonly source: YamlSource,
    private readonly path: Path,
  ) {
    const last = path.at(-1);
    const parent = path.at(-2);
    this.label =
      last === undefined
        ? 'the file'
        : typeof last === 'number'
          ? `entry ${last + 1} of "${parent}"`
          : `"${shortened(last)}"`;
    this.schema = schemaAt(path, source);
  }

  explain(issue: Issue): InputError {
    if (this.path.length > 0 && valueAt(this.source, this.path) === undefined) return this.missing();
    switch (issue.code) {
      case 'unrecognized_keys':
        return this.unknownKey(issue.keys[0]!);
      case 'invalid_type':
        return this.wrongType(issue.expected);
      case 'invalid_value':
        return this.error(
          `${this.label} has a value that is not known`,
          didYouMean(String(valueAt(this.source, this.path)), issue.values.map(String), '') ||
            `write one of ${issue.values.map(String).join(', ')}`,
        );
      case 'too_small':
        return this.outOfRange('least', 'short', issue.minimum, issue.origin);
      case 'too_big':
        return this.outOfRange('most', 'long', issue.maximum, issue.origin);
      case 'invalid_union':
        return this.unknownAlternative();
      default:
        return this.error(
          `${this.label} is not ${this.schema?.description ?? 'as it should be'}`,
          this.example,
        );
    }
  }

  private error(problem: string, mend: string): InputError {
    return new InputError(problem, mend, this.source.positionOf(this.path));
  }

  /** `write e.g. phi: {values: angle}` */
  private get example(): string {
    const [example] = this.schema?.examples ?? [];
    if (example === undefined) return this.schema?.description ?? 'saltus schema describes what fits';
    const last = this.path.at(-1);
    const text = flowText(example);
    return `write e.g. ${typeof last === 'string' ? `${shortened(last)}: ${text}` : text}`;
  }

  private unknownKey(key: string): InputError {
    const keys = Object.keys(this.schema?.properties ?? {});
    const where = this.source.positionOfKey([...this.path, key]);
    const shown = shortened(key);
    // An expression without quotes in {…} ends at its first comma, and the rest looks like a key.
    const mend = /[()*^+/]/.test(key)
      ? 'put the expression before it in quotes: without them a comma ends it'
      : didYouMean(key, keys, `the keys here are ${keys.join(', ')}`);
    return new InputError(`"${shown}" is not a key here`, mend, where);
  }

  private missing(): InputError {
    const parent = this.source.positionOf(this.path.slice(0, -1));
    return new InputError(`${this.label} is missing`, this.example.replace(/^write/, 'add it,'), parent);
  }

  private wrongType(expected: string): InputError {
    const value = valueAt(this.source, this.path);
    if (value === null)
      return this.error(
        this.path.length === 0 ? 'the file holds no case' : `${this.label} is empty`,
        this.path.length === 0 ? 'saltus new NAME prints a case to start from' : this.example,
      );
    if (expected === 'string' && (typeof value === 'number' || typeof value === 'boolean'))
      return this.error(
        `${this.label} reads as a ${typeof value}, and a string belongs here`,
        `put it in quotes: "${shortened(this.source.writtenAt(this.path))}"`,
      );
    const wanted = TYPE_WORDS.get(expected) ?? `a ${expected}`;
    return this.error(
      `${this.label} must be ${wanted}`,
      this.path.length === 0 ? 'saltus new NAME prints a case to start from' : this.example,
    );
  }

  private outOfRange(
    side: 'least' | 'most',
    size: string,
    bound: number | bigint,
    origin: string,
  ): InputError {
    if (origin === 'string')
      return this.error(
        bound === 1 ? `${this.label} is empty` : `${this.label} is too ${size}`,
        bound === 1 ? this.example : `use at ${side} ${bound} characters`,
      );
    if (origin === 'array' || origin === 'set')
      return this.error(
        `${this.label} has too ${side === 'most' ? 'many' : 'few'} entries`,
        `at ${side} ${bound} are read`,
      );
    return this.error(`${this.label} is out of range`, `it is at ${side} ${Number(bound)}`);
  }

  private unknownAlternative(): InputError {
    const value = valueAt(this.source, this.path);
    const isClaim = this.path[0] === 'claims' && this.path.length === 2;
    if (isClaim && value !== null && typeof value === 'object' && !Array.isArray(value)) {
      const keys = Object.keys(value).filter((k) => k !== 'id');
      const close = keys
        .map((k) => [k, didYouMean(k, STATEMENTS, '')] as const)
        .find(([, mend]) => mend !== '');
      if (close)
        return new InputError(
          `"${shortened(close[0])}" is not a key here`,
          close[1],
          this.source.positionOfKey([...this.path, close[0]]),
        );
      return this.error('this claim states nothing', `write one of ${STATEMENTS.join(', ')}`);
    }
    if (value === null || value === undefined) return this.error(`${this.label} is empty`, this.example);
    return this.error(`${this.label} does not fit`, this.example);
  }
}

const TYPE_WORDS: ReadonlyMap<string, string> = new Map([
  ['object', 'a map of keys and values'],
  ['record', 'a map of keys and values'],
  ['array', 'a list'],
  ['int', 'an integer'],
  ['string', 'a string'],
]);

/** The schema of what stands at a path; among the kinds of claims, of the one whose statement is there. */
function schemaAt(path: Path, source: YamlSource): SchemaNode | undefined {
  let node: SchemaNode | undefined = caseJsonSchema() as SchemaNode;
  for (const [i, key] of path.entries()) {
    if (typeof key === 'number') node = node?.items;
    else node = stepInto(node, key);
    if (path[0] === 'claims' && i === 1) {
      const value = valueAt(source, path.slice(0, 2));
      const statement = STATEMENTS.findIndex(
        (s) => value !== null && typeof value === 'object' && Object.hasOwn(value, s),
      );
      node = node?.anyOf?.[statement] ?? node;
    }
  }
  const maps = node?.anyOf?.filter((n) => n.properties);
  return maps?.length === 1 && !node?.examples ? maps[0] : node;
}

function stepInto(node: SchemaNode | undefined, key: string): SchemaNode | undefined {
  for (const option of node?.anyOf ?? (node ? [node] : [])) {
    const own = option.properties?.[key];
    if (own) return own;
    const { additionalProperties: other } = option;
    if (other !== undefined && typeof other !== 'boolean') return other;
  }
  return undefined;
}

/** A value as YAML on one line. */
function flowText(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(flowText).join(', ')}]`;
  if (value !== null && typeof value === 'object')
    return `{${Object.entries(value)
      .map(([k, v]) => `${k}: ${flowText(v)}`)
      .join(', ')}}`;
  const text = String(value);
  return typeof value === 'string' && !/^[a-z][\w-]*$/i.test(text) ? `"${text}"` : text;
}
