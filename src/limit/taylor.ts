// Taylor coefficients of the functions that the notation knows, exactly, about a constant point. The point must be one
// where the coefficients stay in the coefficient ring: 0 for most functions, special angles for cos and sin, a positive
// monomial for sqrt and for negative powers, 1 for log.

import { Coefficient } from '../exact/coefficient.ts';
import { Rational, rational } from '../exact/rational.ts';
import { specialAngle } from '../model/specialAngle.ts';
import type { FunctionName } from '../notation/tree.ts';

/** The function cannot be expanded exactly about the point that the background gives. */
export class ExpansionPointError extends Error {
  override readonly name = 'ExpansionPointError';
}

/** Binomial coefficient (exponent over k) for a rational exponent. */
function binomial(exponent: Rational, k: number): Rational {
  let out = Rational.one;
  for (let i = 0; i < k; i++) out = out.mul(exponent.sub(rational(i))).div(rational(i + 1));
  return out;
}

function factorial(k: number): Rational {
  let out = 1n;
  for (let i = 2n; i <= BigInt(k); i++) out *= i;
  return Rational.of(out);
}

/** cos and sin at a point where both are exact. */
function circleValues(point: Coefficient): { cos: Coefficient; sin: Coefficient } {
  const values = specialAngle(point);
  if (!values)
    throw new ExpansionPointError('cos and sin are expanded about multiples of pi/6 and pi/4 only');
  return values;
}

/** Coefficients F^(k)(point)/k! for k = 0..order of x^exponent. Throws ExpansionPointError for a non-monomial point. */
export function powerSeries(exponent: Rational, point: Coefficient, order: number): Coefficient[] {
  if (point.isZero && !(exponent.isInteger && exponent.sign >= 0))
    throw new ExpansionPointError(`x^(${exponent}) has no Taylor series at 0`);
  return Array.from({ length: order + 1 }, (_, k) => {
    const rest = exponent.sub(rational(k));
    const weight = binomial(exponent, k);
    if (weight.isZero) return Coefficient.zero;
    try {
      return point.pow(rest).scale(weight);
    } catch {
      throw new ExpansionPointError(
        `x^(${exponent}) cannot be expanded exactly about a sum or a negative number`,
      );
    }
  });
}

/** Derivatives of tan by the recursion tan' = 1 + tan², as Taylor coefficients at 0. */
function tanSeries(order: number): Coefficient[] {
  const t: Rational[] = [Rational.zero];
  for (let k = 0; k < order; k++) {
    let square = k === 0 ? Rational.one : Rational.zero;
    for (let i = 0; i <= k; i++) square = square.add(t[i]!.mul(t[k - i]!));
    t.push(square.div(rational(k + 1)));
  }
  return t.map((c) => Coefficient.rational(c));
}

/** Coefficients F^(k)(point)/k! for k = 0..order. Throws ExpansionPointError where they leave the ring. */
export function taylorCoefficients(name: FunctionName, point: Coefficient, order: number): Coefficient[] {
  const atZero = (): void => {
    if (!point.isZero) throw new ExpansionPointError(`${name} is expanded about 0 only`);
  };
  const cyclic = (values: readonly Coefficient[]): Coefficient[] =>
    Array.from({ length: order + 1 }, (_, k) => values[k % values.length]!.scale(factorial(k).inv()));
  const { zero, one } = Coefficient;
  switch (name) {
    case 'cos': {
      const { cos, sin } = circleValues(point);
      return cyclic([cos, sin.neg(), cos.neg(), sin]);
    }
    case 'sin': {
      const { cos, sin } = circleValues(point);
      return cyclic([sin, cos, sin.neg(), cos.neg()]);
    }
    case 'exp':
      atZero();
      return cyclic([one]);
    case 'cosh':
      atZero();
      return cyclic([one, zero]);
    case 'sinh':
      atZero();
      return cyclic([zero, one]);
    case 'tan':
      atZero();
      return tanSeries(order);
    case 'sqrt':
      return powerSeries(rational(1, 2), point, order);
    case 'log':
      if (!point.isOne) throw new ExpansionPointError('log is expanded about 1 only');
      return [zero, ...powerSeries(Rational.minusOne, one, order).slice(0, order)].map((c, k) =>
        k === 0 ? zero : c.scale(rational(k).inv()),
      );
  }
}
