// A tree under construction, with what the text around it was, and the limits on its size.

import { NotationError } from './source.ts';
import { isOperatorValued, type Span, type Tree } from './tree.ts';

/** Tallest tree that is built; a/b/c/… makes a tree as tall as it is long. */
const TALLEST_TREE = 1000;

export interface Part {
  readonly tree: Tree;
  /** Where it stands, with the parentheses around it; the tree's own span is without them. */
  readonly span: Span;
  readonly height: number;
  readonly isOperator: boolean;
  /** Set for base^exponent written without parentheses around it. */
  readonly barePower?: { readonly base: Span; readonly exponent: Span };
}

/** A tree over its parts. Throws NotationError when it grows beyond TALLEST_TREE. */
export function partOf(tree: Tree, parts: readonly Part[]): Part {
  const height = 1 + Math.max(0, ...parts.map((p) => p.height));
  if (height > TALLEST_TREE)
    throw new NotationError(
      `the expression is nested more than ${TALLEST_TREE} levels deep`,
      'multiply its denominators out or split it into several terms',
      tree.span.start,
    );
  return { tree, span: tree.span, height, isOperator: isOperatorValued(tree) };
}

/** From the start of the first part to the end of the last. */
export const spanOf = (parts: readonly Part[]): Span => ({
  start: parts[0]!.span.start,
  end: parts.at(-1)!.span.end,
});

/** At most 40 characters of a text on one line, for messages. */
export function shortened(text: string): string {
  const line = text.replace(/\s+/g, ' ');
  return line.length <= 40 ? line : `${line.slice(0, 30)}…${line.slice(-9)}`;
}
