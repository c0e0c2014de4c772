import { expect, test } from 'vitest';
import { loadDisplayCheck } from '../../src/report/displayCheck.ts';
import { type Block, formula, heading, paragraph, prose, toned } from '../../src/report/document.ts';
import { renderMarkdown } from '../../src/report/markdown.ts';
import { renderText } from '../../src/report/text.ts';

const ESC = '\u001b';
const document: Block[] = [
  heading(1, 'sheet: ', toned('bad', 'FAILS')),
  heading(2, 'Claims'),
  {
    kind: 'list',
    items: [{ first: [toned('good', 'holds'), ' momentum'], more: [['found ', formula('f(x)', 'f(x)')]] }],
  },
  { kind: 'table', head: ['family', 'series'], rows: [[[formula('x|y')], [toned('warning', 'open')]]] },
  paragraph('The end.'),
];

test('text without colour holds no escape sequence and all the words', () => {
  const text = renderText(document, { colour: false });
  expect(text).not.toContain(ESC);
  expect(text).toBe(
    [
      'sheet: FAILS',
      '============',
      '',
      'CLAIMS',
      '  - holds momentum',
      '      found f(x)',
      '',
      '  family  series',
      '  ------  ------',
      '  x|y     open',
      '',
      '  The end.',
      '',
    ].join('\n'),
  );
});

test('colour adds escape sequences and changes nothing else', () => {
  const painted = renderText(document, { colour: true });
  expect(painted).toContain(`${ESC}[`);
  // biome-ignore lint/suspicious/noControlCharactersInRegex: escape sequences are what is removed
  expect(painted.replace(/\u001b\[\d+m/g, '')).toBe(renderText(document, { colour: false }));
});

test('no line of text is longer than the width', () => {
  const long: Block[] = [
    heading(1, 'x'.repeat(200)),
    paragraph('word '.repeat(100)),
    { kind: 'table', head: ['a', 'b'], rows: [[['y'.repeat(300)], ['z z '.repeat(40)]]] },
  ];
  for (const line of renderText(long, { colour: false }).split('\n'))
    expect(line.length).toBeLessThanOrEqual(80);
});

test('Markdown shows formulas between dollars and code where there is no LaTeX', async () => {
  const markdown = await renderMarkdown(document);
  expect(markdown).toContain('# sheet: **FAILS**');
  expect(markdown).toContain('found $f(x)$');
  expect(markdown).toContain('| `x\\|y` | **open** |');
});

test('a formula that does not set is shown as code', async () => {
  const markdown = await renderMarkdown([
    paragraph(formula('broken', '\\frac{1'), ' and ', formula('macro', '\\nosuch')),
  ]);
  expect(markdown).toBe('`broken` and `macro`\n');
});

test('hostile text cannot leave its place in any format', async () => {
  const title = `a | b \`c\` <script> ${ESC}[2J \u202e $x$ [l](u)`;
  const blocks: Block[] = [heading(1, title), { kind: 'table', head: ['t'], rows: [[[title]]] }];
  for (const out of [renderText(blocks, { colour: false }), await renderMarkdown(blocks)]) {
    expect(out).not.toContain(ESC);
    expect(out).not.toContain('\u202e');
  }
  const markdown = await renderMarkdown(blocks);
  expect(markdown).not.toContain('<script>');
  expect(markdown.split('\n').at(-2)).toBe(
    '| a \\| b \\`c\\` &lt;script> \\\\u\\{1b\\}\\[2J \\\\u\\{202e\\} \\$x\\$ \\[l\\](u) |',
  );
});

test('the display check refuses what KaTeX would not set, and what is too long or too deep to try', async () => {
  const sets = await loadDisplayCheck();
  expect(sets('\\frac{\\beta a^{2}}{2 b}\\,(\\partial_x \\partial_y \\phi)^{2}')).toBe(true);
  for (const latex of [
    '',
    '\\frac{1',
    '\\href{javascript:x}{y}',
    'x%y',
    'x'.repeat(5000),
    `${'{'.repeat(500)}x${'}'.repeat(500)}`,
  ])
    expect(sets(latex), latex.slice(0, 20)).toBe(false);
});

test('prose between dollars is a formula and an odd dollar stays a dollar', () => {
  expect(prose('energy $a^{-1}$ diverges')).toEqual([
    'energy ',
    { kind: 'formula', text: 'a^{-1}', latex: 'a^{-1}' },
    ' diverges',
  ]);
  expect(prose('costs 3$')).toEqual(['costs 3$']);
});
