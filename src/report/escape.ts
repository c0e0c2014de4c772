// Text from outside (titles, names, rules of the user) made harmless for a terminal, for JSON and for Markdown.
// Control characters and invisible direction marks are shown as \u{…} instead of being passed on, so that a case file
// can neither drive the terminal nor make a line read differently from what it says (Unicode TR 36, section 2).

/** C0, DEL and C1 controls, line and paragraph separators, direction marks, zero-width characters, tags, lone surrogates. */
const UNSAFE =
  // biome-ignore lint/suspicious/noControlCharactersInRegex: these are the characters to be caught
  /[\u0000-\u001f\u007f-\u009f\u00ad\u061c\u180e\u200b-\u200f\u2028-\u202e\u2060-\u206f\ufeff\ufff9-\ufffb]|[\u{e0000}-\u{e007f}]|\p{Surrogate}/gu;

const codePoint = (c: string): string => `\\u{${c.codePointAt(0)!.toString(16)}}`;

/** One line of text in which every control character and invisible mark is spelled out. */
export function visible(text: string): string {
  return text.replace(UNSAFE, codePoint);
}

/** The same, but keeps line breaks (tabs become a space): for texts of several lines. */
export function visibleLines(text: string): string {
  return text
    .split(/\r\n|\r|\n/)
    .map((line) => visible(line.replaceAll('\t', ' ')))
    .join('\n');
}

/** JSON of a value, two-space indent, a final newline; unsafe characters inside strings as \u escapes. */
export function safeJson(value: unknown): string {
  const units = (c: string): string =>
    Array.from({ length: c.length }, (_, i) => `\\u${c.charCodeAt(i).toString(16).padStart(4, '0')}`).join(
      '',
    );
  // Line breaks of the layout stand outside strings and must stay; inside strings JSON.stringify has escaped them.
  const text = JSON.stringify(value, null, 2).replace(UNSAFE, (c) => (c === '\n' ? c : units(c)));
  return `${text}\n`;
}

/** Plain text inside Markdown: characters with a meaning there are escaped, HTML included; those that mean something
 *  only at the start of a line are escaped there. */
export function markdownText(text: string): string {
  return visible(text)
    .replace(/[\\`*_{}[\]|~$]/g, (c) => `\\${c}`)
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replace(/^(\s*)([-+#=>])/, '$1\\$2')
    .replace(/^(\s*\d+)([.)])/, '$1\\$2');
}

/** Verbatim text inside Markdown, also inside a table cell: a fence longer than any run of backticks in it. */
export function markdownCode(text: string): string {
  const shown = visible(text);
  const longest = Math.max(0, ...[...shown.matchAll(/`+/g)].map((m) => m[0].length));
  const fence = '`'.repeat(longest + 1);
  const pad = shown.startsWith('`') || shown.endsWith('`') ? ' ' : '';
  return `${fence}${pad}${shown.replaceAll('|', '\\|')}${pad}${fence}`;
}
