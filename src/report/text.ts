// A report for a terminal: 80 columns, readable without colour.

import pc from 'picocolors';
import type { Block, Piece, Pieces, Tone } from './document.ts';
import { visible } from './escape.ts';
import { columns, tableLines, wrap } from './table.ts';

/** How a text report looks; `width` in columns. */
export interface TextStyle {
  readonly colour: boolean;
  readonly width?: number;
}

type Paint = (tone: Tone, text: string) => string;

function painter(colour: boolean): Paint {
  const c = pc.createColors(colour);
  const tones: Record<Tone, (text: string) => string> = {
    good: c.green,
    bad: (text) => c.bold(c.red(text)),
    warning: c.yellow,
    faint: c.dim,
    strong: c.bold,
  };
  return (tone, text) => tones[tone](text);
}

const plain = (piece: Piece): string => visible(typeof piece === 'string' ? piece : piece.text);

/** Wrapped lines of some pieces. Words are painted after wrapping, so that colour codes never count as columns. */
function flow(pieces: Pieces, width: number, paint: Paint): string[] {
  const text = pieces.map(plain).join('');
  const lines = wrap(text, width);
  const tones = pieces.flatMap((p) => (typeof p === 'object' && p.kind === 'toned' ? [p] : []));
  let searched = 0;
  return lines.map((line) => {
    let out = line;
    // A toned piece is one or two words at the head of its line; one that was broken over lines stays unpainted.
    while (searched < tones.length) {
      const { tone, text: word } = tones[searched]!;
      const shown = visible(word);
      const at = out.indexOf(shown);
      if (at < 0) break;
      out = out.slice(0, at) + paint(tone, shown) + out.slice(at + shown.length);
      searched++;
    }
    return out;
  });
}

const indented = (lines: readonly string[], by: number): string[] =>
  lines.map((l) => (l === '' ? l : ' '.repeat(by) + l));

function cell(pieces: Pieces, paint: Paint): { text: string; paint: (text: string) => string } {
  const tone =
    pieces.length === 1 && typeof pieces[0] === 'object' && pieces[0].kind === 'toned'
      ? pieces[0].tone
      : undefined;
  return { text: pieces.map(plain).join(''), paint: (text) => (tone && text ? paint(tone, text) : text) };
}

function blockLines(block: Block, width: number, paint: Paint): string[] {
  switch (block.kind) {
    case 'heading': {
      const lines = flow(block.pieces, width, paint);
      if (block.level === 1)
        return [
          ...lines,
          '='.repeat(
            Math.min(width, Math.max(...wrap(block.pieces.map(plain).join(''), width).map(columns))),
          ),
        ];
      return lines.map((line) => paint('strong', block.level === 2 ? line.toUpperCase() : line));
    }
    case 'paragraph':
      return indented(flow(block.pieces, width - 2, paint), 2);
    case 'list':
      return block.items.flatMap(({ first, more }) => [
        ...indented(flow(first, width - 4, paint), 4).map((l, i) => (i === 0 ? `  - ${l.slice(4)}` : l)),
        ...more.flatMap((pieces) => indented(flow(pieces, width - 6, paint), 6)),
      ]);
    case 'table':
      return tableLines(
        block.head.map(visible),
        block.rows.map((row) => row.map((pieces) => cell(pieces, paint))),
        width,
      );
  }
}

/** The document as lines of at most `style.width` (default 80) columns, with a final newline. */
export function renderText(document: readonly Block[], style: TextStyle): string {
  const paint = painter(style.colour);
  return `${document
    .map((block, i) => {
      const underHeading = document[i - 1]?.kind === 'heading' && block.kind !== 'heading';
      const before = i === 0 ? '' : underHeading ? '\n' : '\n\n';
      return before + blockLines(block, style.width ?? 80, paint).join('\n');
    })
    .join('')}\n`;
}
