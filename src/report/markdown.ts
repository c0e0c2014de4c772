// A report in Markdown, formulas between dollars. A formula that KaTeX refuses is shown as code in the plain notation.

import { loadDisplayCheck } from './displayCheck.ts';
import type { Block, Piece, Pieces } from './document.ts';
import { markdownCode, markdownText, visible } from './escape.ts';

type DisplayCheck = (latex: string) => boolean;

function piece(p: Piece, sets: DisplayCheck): string {
  if (typeof p === 'string') return markdownText(p);
  if (p.kind === 'toned') return p.tone === 'faint' ? markdownText(p.text) : `**${markdownText(p.text)}**`;
  // A bar or a dollar inside would end the table cell or the formula.
  const latex = p.latex;
  const showable = latex !== undefined && !/[|$\n]/.test(latex) && visible(latex) === latex && sets(latex);
  return showable ? `$${latex}$` : markdownCode(p.text);
}

function block(b: Block, sets: DisplayCheck): string {
  const inline = (pieces: Pieces): string => pieces.map((p) => piece(p, sets)).join('');
  switch (b.kind) {
    case 'heading':
      return `${'#'.repeat(b.level)} ${inline(b.pieces)}`;
    case 'paragraph':
      return inline(b.pieces);
    case 'list':
      return b.items
        .map(({ first, more }) =>
          [`- ${inline(first)}`, ...more.map((pieces) => `  ${inline(pieces)}`)].join('  \n'),
        )
        .join('\n');
    case 'table': {
      const row = (cells: readonly string[]): string => `| ${cells.join(' | ')} |`;
      return [
        row(b.head.map(markdownText)),
        row(b.head.map(() => '---')),
        ...b.rows.map((cells) => row(cells.map(inline))),
      ].join('\n');
    }
  }
}

/** The document in Markdown with a final newline. Loads KaTeX on first use. */
export async function renderMarkdown(document: readonly Block[]): Promise<string> {
  const sets = await loadDisplayCheck();
  return `${document.map((b) => block(b, sets)).join('\n\n')}\n`;
}
