// A YAML text with positions: every value can say where it stands, and every character of a string value where it stands in
// the file. Refuses what a case or a rule has no use for: anchors, tags, several documents, keys that are no strings.

import {
  type Document,
  isAlias,
  isMap,
  isPair,
  isScalar,
  isSeq,
  LineCounter,
  type Node,
  type Pair,
  parseAllDocuments,
  type Scalar,
  visit,
} from 'yaml';
import { InputError, type SourcePosition } from '../notation/source.ts';
import { DEEPEST_YAML, LARGEST_FILE } from './limits.ts';

export type Path = readonly (string | number)[];

/** A parsed file whose values know their positions. */
export class YamlSource {
  private constructor(
    readonly file: string,
    readonly text: string,
    private readonly document: Document.Parsed,
    private readonly lines: LineCounter,
  ) {}

  /** Reads a text or bytes. Throws InputError for anything that is not one plain YAML document. */
  static read(input: string | Uint8Array, file: string): YamlSource {
    const text = decode(input, file);
    const lines = new LineCounter();
    refuseDeepNesting(text, file);
    const parsed = parseAllDocuments(text, {
      lineCounter: lines,
      version: '1.2',
      uniqueKeys: true,
      prettyErrors: false,
      strict: true,
      merge: false,
      intAsBigInt: false,
    });
    const at = (offset: number): SourcePosition => {
      const { line, col } = lines.linePos(offset);
      return { file, line: Math.max(1, line), column: Math.max(1, col) };
    };
    if (!Array.isArray(parsed) || parsed.length === 0)
      throw new InputError('the file is empty', 'saltus new NAME prints a case to start from', at(0));
    const [document, second] = parsed as Document.Parsed[];
    const [problem] = [...document!.errors, ...document!.warnings];
    if (problem)
      throw new InputError(yamlProblem(problem.message), yamlMend(problem.code), at(problem.pos[0]));
    if (second)
      throw new InputError(
        'the file holds more than one YAML document',
        'put one case in one file',
        at(second.range[0]),
      );
    const source = new YamlSource(file, text, document!, lines);
    source.refuseUnwanted();
    return source;
  }

  /** The whole document as plain values. */
  toPlain(): unknown {
    return this.document.toJS({ maxAliasCount: 0 });
  }

  position(offset: number): SourcePosition {
    const { line, col } = this.lines.linePos(offset);
    return { file: this.file, line: Math.max(1, line), column: Math.max(1, col) };
  }

  /** Where the value of a path stands, or the closest enclosing one that exists. */
  positionOf(path: Path): SourcePosition {
    const node = this.node(path);
    return this.position(node?.range?.[0] ?? 0);
  }

  /** Where the last key of a path stands. */
  positionOfKey(path: Path): SourcePosition {
    const parent = this.document.getIn(path.slice(0, -1), true);
    const key = path.at(-1);
    if (isMap(parent)) {
      const pair = parent.items.find((p) => isScalar(p.key) && String(p.key.value) === String(key));
      if (pair && isScalar(pair.key)) return this.position(pair.key.range?.[0] ?? 0);
    }
    return this.positionOf(path);
  }

  /** Where a character of the string at a path stands: quotes, escapes, folding and indentation are followed. */
  positionInString(path: Path, offset: number): SourcePosition {
    const node = this.node(path);
    if (!isScalar(node) || !node.range || typeof node.value !== 'string') return this.positionOf(path);
    return this.position(sourceOffset(this.text, node as Scalar<string>, offset));
  }

  /** True when the string at a path is written without quotes and not as a block. */
  isPlain(path: Path): boolean {
    const node = this.node(path);
    return isScalar(node) && node.type === 'PLAIN';
  }

  /** The rest of the line behind the string at a path: what YAML took for a comment. */
  commentBehind(path: Path): string {
    const node = this.node(path);
    return isScalar(node) ? (node.comment ?? '') : '';
  }

  private node(path: Path): Node | undefined {
    for (let length = path.length; length >= 0; length--) {
      const found = length === 0 ? this.document.contents : this.document.getIn(path.slice(0, length), true);
      if (found && typeof found === 'object' && 'range' in found) return found as Node;
    }
    return undefined;
  }

  private refuseUnwanted(): void {
    const refuse = (
      problem: string,
      mend: string,
      node: { range?: readonly number[] | null | undefined },
    ): never => {
      throw new InputError(problem, mend, this.position(node.range?.[0] ?? 0));
    };
    visit(this.document, {
      Node: (_, node) => {
        if (isAlias(node)) refuse('aliases are not read', 'write the value out', node);
        else if (node.anchor)
          refuse('anchors are not read', 'write the value out, or put the string in quotes', node);
        else if (node.tag && (isScalar(node) || isMap(node) || isSeq(node)) && this.hasWrittenTag(node))
          refuse('tags are not read', 'leave the tag out', node);
      },
      Pair: (_, pair) => {
        const { key } = pair as Pair;
        if (isPair(key) || !isScalar(key) || typeof key.value !== 'string')
          refuse('a key must be a name', 'write it as a plain word', (key as Node | null) ?? {});
      },
    });
  }

  private hasWrittenTag(node: Node): boolean {
    const start = node.range?.[0] ?? 0;
    return (
      /(^|[\s[{,:-])![^\s]*\s*$/.test(this.text.slice(Math.max(0, start - 200), start)) ||
      this.text[start] === '!'
    );
  }
}

function decode(input: string | Uint8Array, file: string): string {
  const start = { file, line: 1, column: 1 };
  const size = typeof input === 'string' ? Buffer.byteLength(input) : input.byteLength;
  if (size > LARGEST_FILE)
    throw new InputError(
      `the file has ${size} bytes, more than the ${LARGEST_FILE} that are read`,
      'split it into several cases',
      start,
    );
  let text: string;
  try {
    text = typeof input === 'string' ? input : new TextDecoder('utf-8', { fatal: true }).decode(input);
  } catch {
    throw new InputError('the file is not UTF-8 text', 'save it as plain UTF-8 text', start);
  }
  // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is looked for
  const control = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/.exec(text);
  if (control) {
    const before = text.slice(0, control.index).split('\n');
    const code = control[0].charCodeAt(0).toString(16).padStart(4, '0');
    throw new InputError(
      `the file holds the control character U+${code}`,
      'a case is plain text; remove it',
      {
        file,
        line: before.length,
        column: before.at(-1)!.length + 1,
      },
    );
  }
  return text;
}

/** Counts brackets and indentation before parsing, so that absurd nesting never reaches the recursive parser. */
function refuseDeepNesting(text: string, file: string): void {
  let depth = 0;
  let line = 1;
  let lineStart = 0;
  for (let i = 0; i < text.length; i++) {
    const c = text[i];
    if (c === '\n') {
      line++;
      lineStart = i + 1;
    } else if (c === '[' || c === '{') depth++;
    else if ((c === ']' || c === '}') && depth > 0) depth--;
    else if (c === '"' || c === "'") {
      // Brackets inside a quoted string on one line do not nest.
      const end = text.indexOf(c, i + 1);
      const newline = text.indexOf('\n', i + 1);
      if (end > 0 && (newline < 0 || end < newline)) i = end;
    }
    const dashes =
      c === '-' && i === lineStart ? /^(?:- ?)+/.exec(text.slice(i, i + 4 * DEEPEST_YAML)) : null;
    const run = dashes ? dashes[0].split('-').length - 1 : 0;
    if (depth > DEEPEST_YAML || run > DEEPEST_YAML)
      throw new InputError(
        `the file is nested deeper than ${DEEPEST_YAML} levels`,
        'a case needs no more than six',
        {
          file,
          line,
          column: i - lineStart + 1,
        },
      );
  }
}

const yamlProblem = (message: string): string => message.split('\n')[0]!.replace(/\.$/, '').replace(/:$/, '');

function yamlMend(code: string): string {
  switch (code) {
    case 'DUPLICATE_KEY':
      return 'keep one of the two';
    case 'TAB_AS_INDENT':
      return 'indent with spaces';
    case 'MISSING_CHAR':
      return 'close the quote or bracket';
    case 'BAD_INDENT':
      return 'align it with its siblings';
    case 'MULTILINE_IMPLICIT_KEY':
    case 'BLOCK_AS_IMPLICIT_KEY':
      return 'put strings with ":" in quotes';
    default:
      return 'correct the YAML; strings with special characters belong in quotes';
  }
}

/** Offset in the source text of a character of a scalar's value. */
function sourceOffset(text: string, node: Scalar<string>, offset: number): number {
  const { value } = node;
  let j = node.range![0];
  const end = node.range![1];
  const isDouble = node.type === 'QUOTE_DOUBLE';
  const isSingle = node.type === 'QUOTE_SINGLE';
  if (isDouble || isSingle) j++;
  else if (node.type?.startsWith('BLOCK')) j = text.indexOf('\n', j) + 1;
  const isSpace = (c: string | undefined): boolean => c === ' ' || c === '\n' || c === '\t' || c === '\r';
  for (let i = 0; i < Math.min(offset, value.length); i++) {
    if (isSpace(value[i])) {
      if (isSpace(text[j])) j++;
      // Folded white space: one blank in the value may be a line break and its indentation in the file.
      if (i + 1 < value.length && !isSpace(value[i + 1])) while (isSpace(text[j]) && j < end) j++;
      continue;
    }
    while (isSpace(text[j]) && j < end) j++;
    if (isDouble && text[j] === '\\') j += escapeLength(text, j);
    else j += isSingle && text.startsWith("''", j) ? 2 : 1;
  }
  if (!isSpace(value[offset])) while (isSpace(text[j]) && j < end) j++;
  return Math.min(j, Math.max(node.range![0], end - 1));
}

function escapeLength(text: string, at: number): number {
  const lengths: Record<string, number> = { x: 4, u: 6, U: 10 };
  return lengths[text[at + 1] ?? ''] ?? 2;
}
