// A YAML text with positions: every value can say where it stands, and every character of a string value where it stands in
// the file. Refuses what a case or a rule has no use for: anchors, tags, directives, several documents, keys that are no
// strings.

import {
  Composer,
  type CST,
  type Document,
  isAlias,
  isMap,
  isScalar,
  LineCounter,
  type Node,
  Parser,
  type Scalar,
  visit,
  type YAMLMap,
} from 'yaml';
import { shortened } from '../notation/part.ts';
import { InputError, type SourcePosition } from '../notation/source.ts';
import { decodeText } from './inputText.ts';
import { DEEPEST_YAML } from './limits.ts';
import { sourceOffset } from './scalarOffset.ts';

export type Path = readonly (string | number)[];

/** A parsed file whose values know their positions. */
export class YamlSource {
  private plain: unknown;

  private constructor(
    readonly file: string,
    readonly text: string,
    private readonly document: Document.Parsed,
    private readonly lines: LineCounter,
  ) {}

  /** Reads a text or bytes. Throws InputError for anything that is not one plain YAML document. */
  static read(input: string | Uint8Array, file: string): YamlSource {
    const text = decodeText(input, file);
    const lines = new LineCounter();
    const at = (offset: number): SourcePosition => positionAt(lines, file, offset);
    const tokens = [...new Parser(lines.addNewLine).parse(text)];
    refuseTokens(tokens, at);
    const composer = new Composer({
      version: '1.2',
      schema: 'core',
      merge: false,
      strict: true,
      uniqueKeys: false,
      prettyErrors: false,
    });
    const [document] = [...composer.compose(tokens, true, text.length)];
    const [problem] = [...document!.errors, ...document!.warnings];
    if (problem) throw new InputError(...yamlProblem(problem.code, problem.message), at(problem.pos[0]));
    const source = new YamlSource(file, text, document!, lines);
    source.refuseUnwanted();
    return source;
  }

  /** The whole document as plain values. */
  toPlain(): unknown {
    this.plain ??= this.document.toJS({ maxAliasCount: 0 });
    return this.plain;
  }

  position(offset: number): SourcePosition {
    return positionAt(this.lines, this.file, offset);
  }

  /** Where the value of a path stands, or the closest enclosing one that exists. */
  positionOf(path: Path): SourcePosition {
    const node = this.closestNode(path);
    return this.position(node?.range?.[0] ?? 0);
  }

  /** Where the last key of a path stands. */
  positionOfKey(path: Path): SourcePosition {
    const parent = this.document.getIn(path.slice(0, -1), true);
    const key = path.at(-1);
    if (isMap(parent)) {
      const pair = parent.items.find((p) => isScalar(p.key) && p.key.value === key);
      if (pair && isScalar(pair.key)) return this.position(pair.key.range?.[0] ?? 0);
    }
    return this.positionOf(path);
  }

  /** Where a character of the string at a path stands: quotes, escapes, folding and indentation are followed. */
  positionInString(path: Path, offset: number): SourcePosition {
    const node = this.scalar(path);
    return node ? this.position(sourceOffset(this.text, node, offset)) : this.positionOf(path);
  }

  /** How the scalar at a path is written, or undefined when there is none. */
  styleOf(path: Path): Scalar.Type | undefined {
    return (this.scalar(path)?.type as Scalar.Type | null | undefined) ?? undefined;
  }

  /** The scalar at a path as it is written in the file, without quotes for a plain one. */
  writtenAt(path: Path): string {
    const range = this.scalar(path)?.range;
    return range ? this.text.slice(range[0], range[1]) : '';
  }

  /** The rest of the line behind the string at a path: what YAML took for a comment. */
  commentBehind(path: Path): string {
    const range = this.scalar(path)?.range;
    if (!range) return '';
    const [rest] = /^[^\n]*/.exec(this.text.slice(range[1]))!;
    return /^[ \t]+#/.test(rest) ? rest.trim() : '';
  }

  private scalar(path: Path): Scalar | undefined {
    const node = path.length === 0 ? this.document.contents : this.document.getIn(path, true);
    return isScalar(node) ? node : undefined;
  }

  private closestNode(path: Path): Node | undefined {
    for (let length = path.length; length >= 0; length--) {
      const found = length === 0 ? this.document.contents : this.document.getIn(path.slice(0, length), true);
      if (found && typeof found === 'object' && 'range' in found) return found as Node;
    }
    return undefined;
  }

  private refuse(problem: string, mend: string, node: unknown): never {
    const range = (node as Node | null)?.range;
    throw new InputError(problem, mend, this.position(range?.[0] ?? 0));
  }

  private refuseUnwanted(): void {
    const quotes = 'write the value out, or put the string in quotes';
    visit(this.document, {
      Node: (_, node) => {
        if (isAlias(node)) this.refuse('aliases are not read', quotes, node);
        if (node.anchor) this.refuse('anchors are not read', quotes, node);
        if (node.tag) this.refuse('tags are not read', 'leave the tag out, or put the string in quotes', node);
        if (isMap(node)) this.refuseKeys(node);
      },
    });
  }

  private refuseKeys(map: YAMLMap): void {
    const seen = new Set<string>();
    for (const { key } of map.items) {
      if (!isScalar(key) || typeof key.value !== 'string')
        return this.refuse('a key must be a word', 'write it as a plain word, or in quotes', key ?? map);
      if (key.value === '__proto__' || key.value === '<<')
        this.refuse(`"${key.value}" is not a key here`, 'leave it out', key);
      if (seen.has(key.value))
        this.refuse(`the key "${shortened(key.value)}" stands twice in one map`, 'keep one of the two', key);
      seen.add(key.value);
    }
  }
}

function positionAt(lines: LineCounter, file: string, offset: number): SourcePosition {
  const { line, col } = lines.linePos(offset);
  return { file, line: Math.max(1, line), column: Math.max(1, col) };
}

/** Refuses directives, a second document, an empty file and deep nesting before the recursive composer sees them. */
function refuseTokens(tokens: readonly CST.Token[], at: (offset: number) => SourcePosition): void {
  const directive = tokens.find((t) => t.type === 'directive');
  if (directive)
    throw new InputError(
      'directives are not read',
      'remove the line; case files are YAML 1.2',
      at(directive.offset),
    );
  const documents = tokens.filter((t) => t.type === 'document');
  const [first, second] = documents;
  if (second)
    throw new InputError(
      'the file holds more than one YAML document',
      'put one case in one file',
      at(second.offset),
    );
  const problem = tokens.find((t) => t.type === 'error');
  if (problem) throw new InputError('this is no YAML', DEFAULT_MEND, at(problem.offset));
  if (!first?.value)
    throw new InputError('the file is empty', 'saltus new NAME prints a case to start from', at(0));
  refuseDeepNesting(first.value, at);
}

/** Walks the tokens without recursion. */
function refuseDeepNesting(root: CST.Token, at: (offset: number) => SourcePosition): void {
  const waiting: { token: CST.Token; depth: number }[] = [{ token: root, depth: 1 }];
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const { token, depth } = next;
    if (!('items' in token)) continue;
    if (depth > DEEPEST_YAML)
      throw new InputError(
        `the file is nested deeper than ${DEEPEST_YAML} levels`,
        'remove levels; a case needs six',
        at(token.offset),
      );
    for (const { key, value } of token.items) {
      if (key) waiting.push({ token: key, depth: depth + 1 });
      if (value) waiting.push({ token: value, depth: depth + 1 });
    }
  }
}

const DEFAULT_MEND = 'correct the YAML; strings with special characters belong in quotes';

const PROBLEMS: Readonly<Record<string, readonly [problem: string, mend: string]>> = {
  TAB_AS_INDENT: ['a tab indents this line', 'indent with spaces'],
  BAD_INDENT: ['the indentation does not fit', 'align the line with its siblings'],
  MISSING_CHAR: ['a quote, a comma or a bracket is missing', 'close or add it'],
  BAD_DQ_ESCAPE: [
    'a backslash in double quotes starts an escape that YAML does not know',
    'put the string in single quotes',
  ],
  MULTILINE_IMPLICIT_KEY: ['a key runs over several lines', 'put strings with ":" in quotes'],
  BLOCK_AS_IMPLICIT_KEY: ['a second ": " stands on one line', 'put strings with ": " in quotes'],
  BAD_ALIAS: ['this reads as an alias', 'put strings with * in quotes'],
  TAG_RESOLVE_FAILED: ['tags are not read', 'leave the tag out, or put the string in quotes'],
};

function yamlProblem(code: string, message: string): readonly [problem: string, mend: string] {
  const first = message.split('\n')[0]!.replace(/[.:]$/, '');
  return PROBLEMS[code] ?? [`this is no YAML: ${first}`, DEFAULT_MEND];
}
