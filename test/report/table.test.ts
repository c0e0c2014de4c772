import fc from 'fast-check';
import { expect, test } from 'vitest';
import { columns, tableLines, wrap } from '../../src/report/table.ts';

const cell = (text: string) => ({ text, paint: (t: string) => t });

test('a combining accent takes no column and an ideograph takes two', () => {
  expect(columns('abc')).toBe(3);
  expect(columns('e\u0301')).toBe(1);
  expect(columns('環')).toBe(2);
  expect(columns('φ∂²')).toBe(3);
});

test('wrapped lines keep the words and the width', () => {
  const words = fc.array(fc.stringMatching(/^[a-z*()/]{1,30}$/), { minLength: 1 });
  fc.assert(
    fc.property(words, fc.integer({ min: 8, max: 80 }), (list, width) => {
      const lines = wrap(list.join(' '), width);
      expect(lines.every((line) => columns(line) <= width)).toBe(true);
      expect(lines.join('').replaceAll(' ', '')).toBe(list.join(''));
    }),
  );
});

test('a long formula is broken after an operator', () => {
  expect(wrap('alpha*beta*gamma*delta', 12)).toEqual(['alpha*beta*', 'gamma*delta']);
});

test('a table that is too wide is narrowed to the given width', () => {
  const lines = tableLines(['one', 'two'], [[cell('word '.repeat(30).trim()), cell('x')]], 40);
  expect(lines.every((line) => line.length <= 40)).toBe(true);
  expect(lines.join(' ').match(/word/g)).toHaveLength(30);
});

test('columns of a table are aligned', () => {
  expect(
    tableLines(
      ['a', 'bb'],
      [
        [cell('long'), cell('1')],
        [cell('s'), cell('2')],
      ],
      80,
    ),
  ).toEqual(['  a     bb', '  ----  --', '  long  1', '  s     2']);
});

test('a narrow table breaks lines between words before it breaks a word', () => {
  const lines = tableLines(['family', 'state'], [[cell('theta(x) theta(y)'), cell('unsuppressed')]], 24);
  expect(lines).toEqual([
    '  family    state',
    '  --------  ------------',
    '  theta(x)  unsuppressed',
    '  theta(y)',
  ]);
});
