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
  type Node,
  Parser,
  type Scalar,
  visit,
  type YAMLError,
  type YAMLMap,
} from 'yaml';
import { shortened } from '../notation/part.ts';
import { InputError, type SourcePosition } from '../notation/source.ts';
import { decodeText, Lines } from './inputText.ts';
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
    private readonly lines: Lines,
  ) {}

  /** Reads a text or bytes. Throws InputError for anything that is not one plain YAML document. */
  static read(input: string | Uint8Array, file: string): YamlSource {
    const text = decodeText(input, file);
    const lines = new Lines(text, file);
    const at = (offset: number): SourcePosition => lines.position(offset);
    const tokens = [...new Parser().parse(text)];
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
    if (problem) throw yamlError(problem, tokens, at);
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
    return this.lines.position(offset);
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
        if (node.tag)
          this.refuse('tags are not read', 'leave the tag out, or put the string in quotes', node);
        if (isMap(node)) this.refuseKeys(node);
      },
    });
  }

  private refuseKeys(map: YAMLMap): void {
    const seen = new Set<string>();
    for (const { key } of map.items) {
      const word = isScalar(key) && typeof key.value === 'string' ? key.value : undefined;
      if (word === undefined)
        this.refuse('a key must be a word', 'write it as a plain word, or in quotes', key ?? map);
      else if (word === '__proto__' || word === '<<')
        this.refuse(`"${word}" is not a key here`, 'leave it out', key);
      else if (seen.has(word))
        this.refuse(`the key "${shortened(word)}" stands twice in one map`, 'keep one of the two', key);
      else seen.add(word);
    }
  }
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

/** The token and all within it, with their depths, without recursion. */
function* within(root: CST.Token): Generator<{ readonly token: CST.Token; readonly depth: number }> {
  const waiting = [{ token: root, depth: 1 }];
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    yield next;
    if (!('items' in next.token)) continue;
    const depth = next.depth + 1;
    for (const { key, value } of next.token.items) {
      if (key) waiting.push({ token: key, depth });
      if (value) waiting.push({ token: value, depth });
    }
  }
}

function refuseDeepNesting(root: CST.Token, at: (offset: number) => SourcePosition): void {
  for (const { token, depth } of within(root))
    if ('items' in token && depth > DEEPEST_YAML)
      throw new InputError(
        `the file is nested deeper than ${DEEPEST_YAML} levels`,
        'remove levels; a case needs six',
        at(token.offset),
      );
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
  BLOCK_AS_IMPLICIT_KEY: [
    'a second ": " stands on one line, or a key is not aligned with its siblings',
    'put strings with ": " in quotes, and align keys with their siblings',
  ],
  BAD_ALIAS: ['this reads as an alias', 'put strings with * in quotes'],
  TAG_RESOLVE_FAILED: ['tags are not read', 'leave the tag out, or put the string in quotes'],
};

/** What the parser complains about, in our words and at the place where the author can mend it. */
function yamlError(
  { code, message, pos }: YAMLError,
  tokens: readonly CST.Token[],
  at: (offset: number) => SourcePosition,
): InputError {
  const unclosed = /^Missing closing/.test(message) && openingQuote(tokens, pos[0]);
  if (unclosed !== false && unclosed !== undefined)
    return new InputError(
      'a quote is opened and never closed',
      'close it where the string ends',
      at(unclosed),
    );
  if (/^Flow .* must be sufficiently indented/.test(message))
    return new InputError(
      'a bracket is never closed, or the lines inside it are not indented',
      'close the bracket, or indent the lines inside it',
      at(pos[0]),
    );
  const said = message.split('\n')[0]!.replace(/[.:]$/, '');
  const [problem, mend] = PROBLEMS[code] ?? [`this is no YAML: ${said}`, DEFAULT_MEND];
  return new InputError(problem, mend, at(pos[0]));
}

/** Where the quoted string that ends at an offset begins. */
function openingQuote(tokens: readonly CST.Token[], end: number): number | undefined {
  for (const document of tokens) {
    if (document.type !== 'document' || !document.value) continue;
    for (const { token } of within(document.value))
      if (
        /quoted-scalar$/.test(token.type) &&
        'source' in token &&
        token.offset + token.source.length === end
      )
        return token.offset;
  }
  return undefined;
}
