// Where the characters of a YAML string stand in the file. The value and its source are walked side by side: quotes are
// skipped, escapes count as what they stand for, and white space may be folded.

import type { Scalar } from 'yaml';

const isSpace = (c: string | undefined): boolean => c === ' ' || c === '\n' || c === '\t' || c === '\r';

/** Characters in the source of an escape in double quotes, from its backslash. */
function escapeLength(text: string, at: number): number {
  const lengths: Readonly<Record<string, number>> = { x: 4, u: 6, U: 10 };
  return lengths[text.charAt(at + 1)] ?? 2;
}

/** Escapes that stand for white space. */
const isSpaceEscape = (text: string, at: number): boolean => /^\\[ntr \t]/.test(text.slice(at, at + 2));
const isLineContinuation = (text: string, at: number): boolean => /^\\\r?\n/.test(text.slice(at, at + 3));

/** Offset in the source text of the character `offset` of a scalar's string value; its end for an offset beyond it. */
export function sourceOffset(text: string, node: Scalar, offset: number): number {
  const [start, end] = node.range!;
  const value = typeof node.value === 'string' ? node.value : text.slice(start, end);
  const isDouble = node.type === 'QUOTE_DOUBLE';
  const isSingle = node.type === 'QUOTE_SINGLE';
  let at = start;
  if (isDouble || isSingle) at++;
  else if (node.type?.startsWith('BLOCK')) at = text.indexOf('\n', start) + 1;

  const skipFolding = (): void => {
    while (at < end && (isSpace(text[at]) || (isDouble && isLineContinuation(text, at)))) at++;
  };
  for (let i = 0; i < offset && i < value.length; i++) {
    const c = value.charAt(i);
    if (isSpace(c)) {
      if (isDouble && isSpaceEscape(text, at) && !isLineContinuation(text, at)) at += 2;
      else if (isSpace(text[at])) at++;
      continue;
    }
    skipFolding();
    if (isDouble && text[at] === '\\') {
      const escaped = escapeLength(text, at);
      // One escape may stand for two UTF-16 units.
      if (escaped === 10 && /[\ud800-\udbff]/.test(c)) i++;
      at += escaped;
    } else at += isSingle && c === "'" ? 2 : 1;
  }
  if (offset < value.length && !isSpace(value[offset])) skipFolding();
  return Math.min(at, Math.max(start, isDouble || isSingle ? end - 1 : end));
}
