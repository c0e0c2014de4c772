// The content of a report before it has a format: headings, paragraphs, lists and tables, made of pieces of text and
// formulas. sections.ts writes it once; text.ts and markdown.ts each turn it into one format.

/** What a coloured word says. Colour is never the only carrier: the word itself is always there. */
export type Tone = 'good' | 'bad' | 'warning' | 'faint' | 'strong';

export type Piece =
  | string
  /** A formula in the notation of a case, with its LaTeX where there is one. */
  | { readonly kind: 'formula'; readonly text: string; readonly latex?: string | undefined }
  | { readonly kind: 'toned'; readonly tone: Tone; readonly text: string };

export type Pieces = readonly Piece[];

export type Block =
  | { readonly kind: 'heading'; readonly level: 1 | 2 | 3; readonly pieces: Pieces }
  | { readonly kind: 'paragraph'; readonly pieces: Pieces }
  /** Every item is a first line and lines that belong to it. */
  | {
      readonly kind: 'list';
      readonly items: readonly { readonly first: Pieces; readonly more: readonly Pieces[] }[];
    }
  | {
      readonly kind: 'table';
      readonly head: readonly string[];
      readonly rows: readonly (readonly Pieces[])[];
    };

export const heading = (level: 1 | 2 | 3, ...pieces: Piece[]): Block => ({ kind: 'heading', level, pieces });
export const paragraph = (...pieces: Piece[]): Block => ({ kind: 'paragraph', pieces });
export const toned = (tone: Tone, text: string): Piece => ({ kind: 'toned', tone, text });
export const formula = (text: string, latex?: string): Piece => ({ kind: 'formula', text, latex });

/** The words of a piece without any format. */
export const plainPiece = (piece: Piece): string => (typeof piece === 'string' ? piece : piece.text);

/** Text with `$…$` in it, as rules write it: the parts between dollars are LaTeX. An odd dollar stays a dollar. */
export function prose(text: string): Piece[] {
  const parts = text.replace(/\s+/g, ' ').trim().split('$');
  if (parts.length % 2 === 0) return [parts.join('$')];
  return parts
    .map((part, i): Piece => (i % 2 === 0 ? part : { kind: 'formula', text: part, latex: part }))
    .filter((piece) => plainPiece(piece) !== '');
}
