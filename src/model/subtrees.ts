// Walking a tree of the notation.

import type { Tree } from '../notation/tree.ts';

function children(tree: Tree): readonly Tree[] {
  switch (tree.kind) {
    case 'number':
    case 'symbol':
    case 'operator':
      return [];
    case 'apply':
      return [tree.operator, tree.operand];
    case 'call':
      return tree.args;
    case 'sum':
      return tree.terms;
    case 'negate':
      return [tree.operand];
    case 'product':
      return tree.factors;
    case 'quotient':
      return [tree.numerator, tree.denominator];
    case 'power':
      return [tree.base, tree.exponent];
  }
}

/** The tree and everything in it, from left to right, each node before its parts. */
export function subtrees(tree: Tree): Tree[] {
  const out: Tree[] = [];
  const waiting = [tree];
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    out.push(next);
    waiting.push(...[...children(next)].reverse());
  }
  return out;
}
