// Power series in ε = spacing/extent with exact coefficients, and the composition of an action with them. The field values
// of a family enter as independent generators (names that begin with @), so that a result vanishes iff it vanishes for
// every member of the family. A function of a value that is neither small nor a special constant is a generator too.

import { Coefficient, type CoefficientTerm } from '../exact/coefficient.ts';
import { Rational } from '../exact/rational.ts';
import { ExpansionPointError, powerSeries, taylorCoefficients } from '../limit/taylor.ts';
import type { Expression, LinearForm } from '../model/action.ts';
import type { FunctionName } from '../notation/tree.ts';

/** Entry n is the part of order ε^n, the powers of ε included. All series of one computation have the same length. */
export type EpsilonSeries = readonly Coefficient[];

export const isZeroSeries = (s: EpsilonSeries): boolean => s.every((c) => c.isZero);

export const constantSeries = (value: Coefficient, order: number): Coefficient[] => [
  value,
  ...new Array<Coefficient>(order).fill(Coefficient.zero),
];

export const addSeries = (x: EpsilonSeries, y: EpsilonSeries): Coefficient[] => x.map((c, n) => c.add(y[n]!));

export function multiplySeries(x: EpsilonSeries, y: EpsilonSeries): Coefficient[] {
  const out = new Array<Coefficient>(x.length).fill(Coefficient.zero);
  for (const [i, c] of x.entries()) {
    if (c.isZero) continue;
    for (let j = 0; i + j < x.length; j++) if (!y[j]!.isZero) out[i + j] = out[i + j]!.add(c.mul(y[j]!));
  }
  return out;
}

/** The value of an expression through ε^order when its linear forms have the values that `formValue` gives.
 *  Throws ExpansionPointError where a negative power of zero occurs. */
export function composeSeries(
  expression: Expression,
  order: number,
  formValue: (form: LinearForm) => EpsilonSeries,
): EpsilonSeries {
  const recurse = (e: Expression): EpsilonSeries => composeSeries(e, order, formValue);
  switch (expression.kind) {
    case 'constant':
      return constantSeries(expression.value, order);
    case 'linear':
      return formValue(expression.form);
    case 'sum':
      return expression.terms
        .map(recurse)
        .reduce(addSeries, constantSeries(Coefficient.zero, order) as EpsilonSeries);
    case 'product': {
      let out: EpsilonSeries = constantSeries(Coefficient.one, order);
      for (const factor of expression.factors) {
        if (isZeroSeries(out)) return out;
        out = multiplySeries(out, recurse(factor));
      }
      return out;
    }
    case 'power': {
      const base = recurse(expression.base);
      if (expression.exponent < 0)
        return compose(base, (point) => inversePower(expression.exponent, point, order));
      let out: EpsilonSeries = constantSeries(Coefficient.one, order);
      for (let k = 0; k < expression.exponent && !isZeroSeries(out); k++) out = multiplySeries(out, base);
      return out;
    }
    case 'function':
      return compose(recurse(expression.argument), (point) => derivativesAt(expression.name, point, order));
  }
}

/** Σ_k F^(k)(u_0)/k! (u − u_0)^k. */
function compose(u: EpsilonSeries, taylor: (point: Coefficient) => readonly Coefficient[]): EpsilonSeries {
  const order = u.length - 1;
  const weights = taylor(u[0]!);
  const rest = [Coefficient.zero, ...u.slice(1)];
  let power: EpsilonSeries = constantSeries(Coefficient.one, order);
  let out: EpsilonSeries = constantSeries(weights[0]!, order);
  for (let k = 1; k <= order; k++) {
    power = multiplySeries(power, rest);
    if (isZeroSeries(power)) break;
    const weight = weights[k]!;
    out = out.map((c, n) => c.add(power[n]!.mul(weight)));
  }
  return out;
}

const isGeneric = (c: Coefficient): boolean => [...c.generators].some((g) => g.startsWith('@'));

const textOf = (c: Coefficient): string => c.terms.map((t) => `${t.factor}*${t.key}`).join('+');

function inversePower(exponent: number, point: Coefficient, order: number): Coefficient[] {
  if (!isGeneric(point)) return powerSeries(Rational.of(exponent), point, order);
  return Array.from({ length: order + 1 }, (_, k) =>
    Coefficient.symbol(`@power${exponent}'${k}(${textOf(point)})`),
  );
}

const EVEN: ReadonlySet<FunctionName> = new Set(['cos', 'cosh']);
const ODD: ReadonlySet<FunctionName> = new Set(['sin', 'tan', 'sinh']);
const NEXT: Partial<Record<FunctionName, readonly [FunctionName, number]>> = {
  cos: ['sin', -1],
  sin: ['cos', 1],
  cosh: ['sinh', 1],
  sinh: ['cosh', 1],
  exp: ['exp', 1],
};

/** F^(k)(point)/k!, k = 0..order: exact numbers where the point is a special constant, generators otherwise. */
function derivativesAt(name: FunctionName, point: Coefficient, order: number): Coefficient[] {
  const reduced = name === 'cos' || name === 'sin' ? withoutWholeTurns(point) : point;
  if (!isGeneric(reduced))
    try {
      return taylorCoefficients(name, reduced, order);
    } catch (error) {
      if (!(error instanceof ExpansionPointError)) throw error;
    }
  let factorial = Rational.one;
  let [current, sign]: readonly [FunctionName, number] = [name, 1];
  return Array.from({ length: order + 1 }, (_, k) => {
    if (k > 0) factorial = factorial.mul(Rational.of(k));
    const next = NEXT[name];
    const value = next ? valueAt(current, reduced) : Coefficient.symbol(`@${name}'${k}(${textOf(reduced)})`);
    const out = value.scale(Rational.of(sign).div(factorial));
    const step = NEXT[current];
    if (step) [current, sign] = [step[0], sign * step[1]];
    return out;
  });
}

/** f(point) as a generator; even and odd functions of ±point share one. */
function valueAt(name: FunctionName, point: Coefficient): Coefficient {
  const isNegative = (point.terms[0]?.factor.sign ?? 1) < 0 && (EVEN.has(name) || ODD.has(name));
  const value = Coefficient.symbol(`@${name}(${textOf(isNegative ? point.neg() : point)})`);
  return isNegative && ODD.has(name) ? value.neg() : value;
}

/** Free functions that take integer values alone have names that begin with this. */
export const INTEGER = '@integer ';

/** Drops whole multiples of 2π that fixed heights contribute, e.g. of the step 2π θ(x), or 2π f(x) with an integer f. */
function withoutWholeTurns(point: Coefficient): Coefficient {
  const isInteger = ([generator, exponent]: readonly [string, Rational]): boolean =>
    generator.startsWith(INTEGER) && exponent.isInteger && exponent.sign > 0;
  const isWhole = (t: CoefficientTerm): boolean =>
    t.factor.div(Rational.of(2)).isInteger &&
    t.powers.some(([g, e]) => g === 'pi' && e.isOne) &&
    t.powers.every((p) => p[0] === 'pi' || isInteger(p));
  return point.terms
    .filter((t) => !isWhole(t))
    .reduce((sum, t) => sum.add(Coefficient.ofTerm(t)), Coefficient.zero);
}
