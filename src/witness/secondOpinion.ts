// A second opinion on Taylor coefficients: a general-purpose computer algebra library differentiates the functions that
// the action uses, and its values at 0 are compared with ours. It sees only strings printed here, from a fixed list of
// function names, and it decides nothing: a disagreement is shown, not resolved.

import nerdamer from 'nerdamer';
import 'nerdamer/Algebra.js';
import 'nerdamer/Calculus.js';
import { Coefficient } from '../exact/coefficient.ts';
import { Rational } from '../exact/rational.ts';
import { taylorCoefficients } from '../limit/taylor.ts';
import type { FunctionName } from '../notation/tree.ts';

export interface SecondOpinion {
  readonly name: FunctionName;
  readonly order: number;
  readonly ours: string;
  readonly theirs: string;
  readonly agrees: boolean;
}

/** Taylor coefficient of f(point + u) at u = 0 by repeated differentiation outside our own algebra. */
function derivativeAtZero(expression: string, order: number): Rational {
  const derivative = order === 0 ? nerdamer(expression) : nerdamer(`diff(${expression}, u, ${order})`);
  const value = nerdamer(derivative.toString(), { u: '0' }).evaluate().text('fractions');
  let factorial = Rational.one;
  for (let k = 2; k <= order; k++) factorial = factorial.mul(Rational.of(k));
  return Rational.parse(value).div(factorial);
}

/** Compares the Taylor coefficients of each function about 0 (log and sqrt about 1) through the given order. */
export function secondOpinion(functions: Iterable<FunctionName>, order: number): SecondOpinion[] {
  const out: SecondOpinion[] = [];
  for (const name of functions) {
    const aboutOne = name === 'log' || name === 'sqrt';
    const point = aboutOne ? Coefficient.one : Coefficient.zero;
    const expression = `${name}(${aboutOne ? '1+u' : 'u'})`;
    const ours = taylorCoefficients(name, point, order);
    for (let k = 0; k <= order; k++) {
      const mine = ours[k]!.asRational!;
      const theirs = derivativeAtZero(expression, k);
      out.push({ name, order: k, ours: `${mine}`, theirs: `${theirs}`, agrees: mine.equals(theirs) });
    }
  }
  return out;
}
