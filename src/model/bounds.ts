// Products of coefficients and operators that refuse to grow without bound, so that a short text such as
// ((a + b + c)^24)^24 cannot exhaust memory.

import { Coefficient } from '../exact/coefficient.ts';
import type { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { LONGEST_NUMBER_BITS, MOST_COEFFICIENT_TERMS, MOST_OPERATOR_TERMS } from './limits.ts';

const BOUND = 1n << BigInt(LONGEST_NUMBER_BITS);
/** Most products of single terms in one multiplication of operators. */
const MOST_TERM_PRODUCTS = 250_000;

/** The coefficient itself. Throws RangeError when it has outgrown the limits. */
export function boundedCoefficient(c: Coefficient): Coefficient {
  if (
    c.terms.length > MOST_COEFFICIENT_TERMS ||
    c.terms.some(({ factor: { num, den } }) => num >= BOUND || num <= -BOUND || den >= BOUND)
  )
    throw new RangeError(
      `a constant has more than ${MOST_COEFFICIENT_TERMS} terms or numbers beyond 2^${LONGEST_NUMBER_BITS} when it is multiplied out`,
    );
  return c;
}

/** Product of two bounded coefficients. Throws RangeError. */
export const boundedProduct = (x: Coefficient, y: Coefficient): Coefficient => boundedCoefficient(x.mul(y));

/** Power ≥ 0 of a bounded value by repeated squaring, each step through `multiply`. */
export function boundedPower<T>(one: T, base: T, exponent: bigint, multiply: (x: T, y: T) => T): T {
  let out = one;
  let square = base;
  for (let k = exponent; k > 0n; k >>= 1n) {
    if (k & 1n) out = multiply(out, square);
    if (k > 1n) square = multiply(square, square);
  }
  return out;
}

/** Any integer power of a coefficient. Throws RangeError, also for a negative power of zero or of a sum. */
export function boundedCoefficientPower(base: Coefficient, exponent: number): Coefficient {
  const positive = boundedPower(Coefficient.one, base, BigInt(Math.abs(exponent)), boundedProduct);
  return exponent < 0 ? Coefficient.one.div(positive) : positive;
}

const size = (p: LaurentPolynomial): number => p.terms.reduce((n, t) => n + t.weight.terms.length, 0);

/** Product of two operators. Throws RangeError when it has too many terms. */
export function boundedOperatorProduct(x: LaurentPolynomial, y: LaurentPolynomial): LaurentPolynomial {
  const isTooLarge = size(x) * size(y) > MOST_TERM_PRODUCTS;
  const product = isTooLarge ? undefined : x.mul(y);
  if (!product || product.terms.length > MOST_OPERATOR_TERMS)
    throw new RangeError(`an operator has more than ${MOST_OPERATOR_TERMS} terms when it is multiplied out`);
  for (const t of product.terms) boundedCoefficient(t.weight);
  return product;
}
