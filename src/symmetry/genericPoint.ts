// Coefficients modulo a prime at one fixed generic point of the parameters: a rank found there is a lower bound on the rank
// for generic parameters and equals it except for accidents of the point and the prime.

import type { Coefficient } from '../exact/coefficient.ts';
import type { PrimeField } from '../exact/matrix.ts';
import { LimitError } from '../notation/source.ts';

/** Roots of parameters up to this order exist at the point. */
const ROOTS = 12;

/** A residue that depends on the name alone (multiplicative hash of its characters). */
function residueOf(name: string, field: PrimeField): number {
  let x = 7919;
  for (const character of name)
    x = (field.multiply(x, 48271 % field.p) + character.codePointAt(0)! * 104729) % field.p;
  return x < 2 ? x + 2 : x;
}

/** The residue of a coefficient. Square roots of primes are square roots, other generators fixed pseudo-random residues.
 *  Throws LimitError for a root that the prime or the point does not have. */
export function residue(c: Coefficient, field: PrimeField): number {
  let sum = 0;
  for (const term of c.terms) {
    let product = field.fromRational(term.factor);
    for (const [generator, exponent] of term.powers) {
      const order = generator.startsWith('#') ? 2 : ROOTS;
      const root = generator.startsWith('#')
        ? field.squareRoot(field.fromInteger(BigInt(generator.slice(1))))
        : residueOf(generator, field);
      const power = Number(exponent.num) * (order / Number(exponent.den));
      if (root === undefined || !Number.isInteger(power))
        throw new LimitError(
          `the completeness of the shifts cannot be tested with a weight that holds ${generator}^(${exponent})`,
        );
      product = field.multiply(product, field.power(root, power));
    }
    sum = (sum + product) % field.p;
  }
  return sum;
}
