// Angles are defined modulo 2π, so an argument of cos, sin or tan must be invariant under φ → φ + 2π on any one site: linear
// in the angles with integer weights.

import type { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import type { Span, Tree } from '../notation/tree.ts';
import type { Expression } from './action.ts';
import { subtrees } from './subtrees.ts';

const PERIODIC: ReadonlySet<string> = new Set(['cos', 'sin', 'tan']);

/** Arguments of periodic functions in a tree that a turn of an angle by 2π on one site does not leave as they are.
 *  @param read meaning of an argument
 *  @param kind in the continuum the weights of the undifferentiated angles count alone */
export function aperiodicArguments(
  tree: Tree,
  read: (tree: Tree) => Expression,
  angles: ReadonlySet<string>,
  kind: 'lattice' | 'continuum',
): { readonly field: string; readonly name: string; readonly span: Span }[] {
  return subtrees(tree).flatMap((t) => {
    const [argument] = t.kind === 'call' && PERIODIC.has(t.name) ? t.args : [];
    if (!argument) return [];
    const fields = bareAngles(read(argument), angles, kind, true);
    return [...fields].map((field) => ({ field, name: (t as { name: string }).name, span: argument.span }));
  });
}

/** Angles on which an expression depends in another way than through periodic functions and, at the top, integer weights. */
function bareAngles(
  e: Expression,
  angles: ReadonlySet<string>,
  kind: 'lattice' | 'continuum',
  integersAllowed: boolean,
): Set<string> {
  const within = (parts: readonly Expression[], allowed: boolean): Set<string> =>
    new Set(parts.flatMap((p) => [...bareAngles(p, angles, kind, allowed)]));
  switch (e.kind) {
    case 'constant':
      return new Set();
    case 'linear': {
      const isBare = ([name, p]: readonly [string, LaurentPolynomial]): boolean => {
        if (!angles.has(name)) return false;
        const counted =
          kind === 'lattice' ? p.terms : p.terms.filter((t) => t.exponents.every((n) => n === 0));
        return !integersAllowed || !counted.every((t) => t.weight.asRational?.isInteger);
      };
      return new Set([...e.form].filter(isBare).map(([name]) => name));
    }
    case 'sum':
      return within(e.terms, integersAllowed);
    case 'product':
      return within(e.factors, false);
    case 'power':
      return within([e.base], false);
    case 'function':
      return PERIODIC.has(e.name) ? new Set() : within([e.argument], false);
  }
}
