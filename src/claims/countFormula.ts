// Formulas in count claims, such as `Lx + Ly - 1` or `gcd(Lx, Ly)`: exact evaluation at given sizes.

import { gcd, Rational } from '../exact/rational.ts';
import { NotationError } from '../notation/source.ts';
import type { Tree } from '../notation/tree.ts';

/** Value of the formula with L<axis> (or L_<axis>) set to the given sizes. Throws NotationError for anything that is not
 *  a rational formula in sizes, gcd, min and max. */
export function evaluateCount(tree: Tree, sizes: ReadonlyMap<string, number>): Rational {
  const recurse = (t: Tree): Rational => evaluateCount(t, sizes);
  switch (tree.kind) {
    case 'number':
      return tree.value;
    case 'symbol': {
      const size = sizes.get(tree.name.replace(/^L_?/, ''));
      if (size === undefined || !tree.name.startsWith('L'))
        throw new NotationError(
          `"${tree.name}" is not a size`,
          `write ${[...sizes.keys()].map((x) => `L${x}`).join(', ')}`,
          tree.span.start,
        );
      return Rational.of(size);
    }
    case 'sum':
      return tree.terms.map(recurse).reduce((x, y) => x.add(y));
    case 'negate':
      return recurse(tree.operand).neg();
    case 'product':
      return tree.factors.map(recurse).reduce((x, y) => x.mul(y));
    case 'quotient': {
      const denominator = recurse(tree.denominator);
      if (denominator.isZero)
        throw new NotationError('the denominator is zero', 'correct the formula', tree.span.start);
      return recurse(tree.numerator).div(denominator);
    }
    case 'power': {
      const exponent = recurse(tree.exponent);
      if (exponent.isInteger && exponent.abs().num <= 64n)
        return recurse(tree.base).pow(Number(exponent.num));
      break;
    }
    case 'call': {
      const args = tree.args.map(recurse);
      const combine = integerFunctions.get(tree.name);
      if (combine && args.length > 0 && args.every((a) => a.isInteger)) return args.reduce(combine);
      break;
    }
    case 'apply':
    case 'operator':
      break;
  }
  throw new NotationError(
    'this is not a formula in the sizes',
    'use numbers, L<axis>, + - * / and powers, gcd, min and max',
    tree.span.start,
  );
}

const integerFunctions = new Map<string, (x: Rational, y: Rational) => Rational>([
  ['gcd', (x, y) => Rational.of(gcd(x.num, y.num))],
  ['min', (x, y) => (x.compare(y) <= 0 ? x : y)],
  ['max', (x, y) => (x.compare(y) >= 0 ? x : y)],
]);
