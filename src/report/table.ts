// Layout of monospaced text: widths, wrapping and tables that stay within a given number of columns.

const WIDE =
  /\p{Script=Han}|\p{Script=Hiragana}|\p{Script=Katakana}|\p{Script=Hangul}|\p{Emoji_Presentation}|[\uff01-\uff60]/u;
const graphemes = new Intl.Segmenter('en', { granularity: 'grapheme' });

/** Number of terminal columns that a line of printable text takes. */
export function columns(text: string): number {
  if (/^[\x20-\x7e]*$/.test(text)) return text.length;
  let width = 0;
  for (const { segment } of graphemes.segment(text)) width += WIDE.test(segment) ? 2 : 1;
  return width;
}

/** Pieces of at most `width` columns of a word that fits nowhere; formulas break before an operator where they can. */
function breakWord(word: string, width: number): string[] {
  const pieces: string[] = [];
  let piece = '';
  for (const { segment } of graphemes.segment(word)) {
    if (columns(piece) + columns(segment) > width && piece !== '') {
      const at = Math.max(...['*', '/', ')', ','].map((c) => piece.lastIndexOf(c))) + 1;
      const cut = at > width / 2 ? at : piece.length;
      pieces.push(piece.slice(0, cut));
      piece = piece.slice(cut);
    }
    piece += segment;
  }
  return piece === '' ? pieces : [...pieces, piece];
}

/** Lines of at most `width` columns, broken at spaces where possible. An empty text is one empty line. */
export function wrap(text: string, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ').filter((w) => w !== '')) {
    const joined = line === '' ? word : `${line} ${word}`;
    if (columns(joined) <= width) {
      line = joined;
      continue;
    }
    if (line !== '') lines.push(line);
    const pieces = breakWord(word, width);
    lines.push(...pieces.slice(0, -1));
    line = pieces.at(-1) ?? '';
  }
  return line === '' && lines.length > 0 ? lines : [...lines, line];
}

/** A cell: its text and how to paint it once its width is settled (colours take no columns). */
export interface Cell {
  readonly text: string;
  readonly paint: (text: string) => string;
}

/** Narrowest column that a table is squeezed to. */
const NARROWEST = 6;

const longestWord = (text: string): number => Math.max(...text.split(' ').map(columns));

/** Takes columns away from the widest one, never below `least`, until the sum is `available` or nothing is left to take. */
function shrink(widths: readonly number[], least: readonly number[], available: number): number[] {
  const out = [...widths];
  for (let excess = out.reduce((x, y) => x + y, 0) - available; excess > 0; excess--) {
    const widest = out.reduce((best, w, i) => (w > least[i]! && (best < 0 || w > out[best]!) ? i : best), -1);
    if (widest < 0) break;
    out[widest]!--;
  }
  return out;
}

/** Lines of a table with a header and a rule below it, `indent` columns from the left, at most `width` columns wide
 *  as long as no column has to become narrower than six. */
export function tableLines(
  head: readonly string[],
  rows: readonly (readonly Cell[])[],
  width: number,
  indent = 2,
): string[] {
  const gap = 2;
  const texts = head.map((h, i) => [h, ...rows.map((row) => row[i]?.text ?? '')]);
  const available = width - indent - gap * (head.length - 1);
  const natural = texts.map((column) => Math.max(...column.map(columns)));
  // Words are broken only where breaking lines between words is not enough.
  const whole = texts.map((column) => Math.max(...column.map(longestWord)));
  const narrowest = texts.map(() => NARROWEST);
  const widths = shrink(shrink(natural, whole, available), narrowest, available);
  const plain = (text: string): Cell => ({ text, paint: (t) => t });
  const draw = (row: readonly Cell[]): string[] => {
    const wrapped = widths.map((w, i) => wrap(row[i]?.text ?? '', w));
    const height = Math.max(...wrapped.map((lines) => lines.length));
    return Array.from({ length: height }, (_, k) => {
      const cells = widths.map((w, i) => {
        const text = wrapped[i]![k] ?? '';
        return (row[i] ?? plain('')).paint(text) + ' '.repeat(Math.max(0, w - columns(text)));
      });
      return (' '.repeat(indent) + cells.join(' '.repeat(gap))).trimEnd();
    });
  };
  const rule = ' '.repeat(indent) + widths.map((w) => '-'.repeat(w)).join(' '.repeat(gap));
  return [...draw(head.map(plain)), rule, ...rows.flatMap(draw)];
}
