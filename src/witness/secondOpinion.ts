// A second opinion on Taylor coefficients, twice: a general-purpose computer algebra library differentiates the functions that the
// action uses, and a multi-precision library evaluates the functions themselves and looks at the remainder of our series. Both
// see only strings printed here, from a fixed list of function names, and decide nothing: a disagreement is shown.

import { all, create, type FactoryFunctionMap } from 'mathjs';
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

/** Relative size of the remainder of our series at a small argument, in units of the next term. */
export interface RemainderOpinion {
  readonly name: FunctionName;
  readonly order: number;
  /** log10 |F(h) − series(h)| at the argument h = 10^-6, and of the first omitted term there. */
  readonly remainder: number;
  readonly nextTerm: number;
  readonly agrees: boolean;
}

const ARGUMENT = '1e-6';

/** Evaluates each function with 160 digits at a small distance from its point and compares the remainder of our series, cut at the
 *  given order, with the first term that was cut. */
export function remainderOpinion(functions: Iterable<FunctionName>, order: number): RemainderOpinion[] {
  const math = create(all as FactoryFunctionMap, { number: 'BigNumber', precision: 160 });
  const h = math.bignumber(ARGUMENT);
  return [...functions].map((name) => {
    const aboutOne = name === 'log' || name === 'sqrt';
    const value = math.bignumber(String(math.evaluate(`${name}(${aboutOne ? '1 + ' : ''}h)`, { h })));
    const coefficients = taylorCoefficients(name, aboutOne ? Coefficient.one : Coefficient.zero, order + 2);
    const term = (k: number) => {
      const c = coefficients[k]!.asRational!;
      const ratio = math.divide(math.bignumber(String(c.num)), math.bignumber(String(c.den)));
      return math.bignumber(String(math.multiply(ratio, math.pow(h, k))));
    };
    let series = math.bignumber(0);
    for (let k = 0; k <= order; k++) series = series.plus(term(k));
    const next = term(order + 1).isZero() ? term(order + 2) : term(order + 1);
    const remainder = value.minus(series);
    const size = (x: typeof remainder): number =>
      x.isZero() ? Number.NEGATIVE_INFINITY : x.abs().log(10).toNumber();
    return {
      name,
      order,
      remainder: size(remainder),
      nextTerm: size(next),
      agrees: remainder.minus(next).abs().lessThan(next.abs().times('1e-5')),
    };
  });
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
