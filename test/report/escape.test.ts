import fc from 'fast-check';
import { expect, test } from 'vitest';
import { markdownCode, markdownText, safeJson, visible, visibleLines } from '../../src/report/escape.ts';

const ESC = '\u001b';
const hostile = [
  `${ESC}[31mred`,
  '\u009b2J',
  'a\u202eb',
  'bell\u0007',
  'line\nbreak',
  'zero\u200bwidth',
  '\ud800',
  'tag\u{e0041}',
];

/** Written out as code points, independently of the pattern under test. */
function isHarmless(text: string): boolean {
  return [...text].every((c) => {
    const p = c.codePointAt(0)!;
    const control = p < 0x20 || (p >= 0x7f && p < 0xa0);
    const direction =
      (p >= 0x200b && p <= 0x200f) || (p >= 0x2028 && p <= 0x202e) || (p >= 0x2060 && p <= 0x206f);
    const surrogate = p >= 0xd800 && p < 0xe000;
    return (
      !control && !direction && !surrogate && p !== 0xfeff && p !== 0x61c && !(p >= 0xe0000 && p <= 0xe007f)
    );
  });
}

test('a control character or an invisible mark is spelled out', () => {
  expect(visible(`${ESC}[31m`)).toBe('\\u{1b}[31m');
  expect(visible('a\u202eb')).toBe('a\\u{202e}b');
  for (const text of hostile) expect(isHarmless(visible(text)), JSON.stringify(text)).toBe(true);
});

test('letters, Greek, mathematics and emoji pass unchanged', () => {
  for (const text of ['φ → φ + λ', '∂_x ∂_y φ', '環交換', 'é', '🙂']) expect(visible(text)).toBe(text);
});

test('any text is harmless once it is made visible', () => {
  fc.assert(fc.property(fc.string({ unit: 'binary' }), (text) => isHarmless(visible(text))));
});

test('lines stay lines where several are meant', () => {
  expect(visibleLines('a\r\nb\tc\n\u0007')).toBe('a\nb c\n\\u{7}');
});

test('JSON reads back to the same value and holds no raw control character', () => {
  for (const text of hostile) {
    const json = safeJson({ text });
    expect(isHarmless(json.replaceAll('\n', '')), JSON.stringify(text)).toBe(true);
    expect(JSON.parse(json)).toEqual({ text });
  }
  fc.assert(fc.property(fc.string({ unit: 'binary' }), (text) => JSON.parse(safeJson([text]))[0] === text));
});

test('Markdown text cannot open HTML, code, a formula or a table cell', () => {
  expect(markdownText('<img src=x> & `a` | $x$ *b*')).toBe(
    '&lt;img src=x> &amp; \\`a\\` \\| \\$x\\$ \\*b\\*',
  );
  expect(markdownText('# heading')).toBe('\\# heading');
  expect(markdownText('1. item')).toBe('1\\. item');
  expect(markdownText('a - b. c')).toBe('a - b. c');
});

test('verbatim text in Markdown is fenced by more backticks than it holds', () => {
  expect(markdownCode('f(x)')).toBe('`f(x)`');
  expect(markdownCode('a``b')).toBe('```a``b```');
  expect(markdownCode('`a')).toBe('`` `a ``');
  expect(markdownCode('a|b')).toBe('`a\\|b`');
});
