// Quotients of coefficients, for matchings such as mu = J1*J2/(J1 + J2). Equality is decided by cross-multiplication,
// so no multivariate gcd is needed; a quotient by a monomial is carried out at once.

import { Coefficient } from './coefficient.ts';
import { gcd, Rational } from './rational.ts';

/** numerator/denominator with a non-zero denominator. Immutable. */
export class Quotient {
  private constructor(
    readonly numerator: Coefficient,
    readonly denominator: Coefficient,
  ) {}

  /** Throws RangeError when the denominator is zero. */
  static of(numerator: Coefficient, denominator: Coefficient = Coefficient.one): Quotient {
    if (denominator.isZero) throw new RangeError('denominator is zero');
    if (numerator.isZero) return new Quotient(numerator, Coefficient.one);
    const monomial = denominator.asMonomial;
    if (monomial) return new Quotient(numerator.div(denominator), Coefficient.one);
    const content = contentOf(denominator);
    if (!content.isOne) return Quotient.of(numerator.scale(content.inv()), denominator.scale(content.inv()));
    const ratio = numerator.terms[0]!.factor.div(denominator.terms[0]!.factor);
    const sameShape = denominator.scale(ratio).equals(numerator);
    return sameShape
      ? new Quotient(Coefficient.rational(ratio), Coefficient.one)
      : new Quotient(numerator, denominator);
  }

  get isZero(): boolean {
    return this.numerator.isZero;
  }
  /** The coefficient when the denominator is one, else undefined. */
  get asCoefficient(): Coefficient | undefined {
    return this.denominator.isOne ? this.numerator : undefined;
  }
  add(o: Quotient): Quotient {
    if (this.denominator.equals(o.denominator))
      return Quotient.of(this.numerator.add(o.numerator), this.denominator);
    return Quotient.of(
      this.numerator.mul(o.denominator).add(o.numerator.mul(this.denominator)),
      this.denominator.mul(o.denominator),
    );
  }
  neg(): Quotient {
    return new Quotient(this.numerator.neg(), this.denominator);
  }
  sub(o: Quotient): Quotient {
    return this.add(o.neg());
  }
  mul(o: Quotient): Quotient {
    return Quotient.of(this.numerator.mul(o.numerator), this.denominator.mul(o.denominator));
  }
  /** Throws RangeError when o is zero. */
  div(o: Quotient): Quotient {
    return Quotient.of(this.numerator.mul(o.denominator), this.denominator.mul(o.numerator));
  }
  /** Integer powers, and rational powers of a quotient of monomials. Throws RangeError otherwise. */
  pow(exponent: Rational): Quotient {
    if (exponent.sign < 0) return Quotient.of(Coefficient.one).div(this).pow(exponent.neg());
    return Quotient.of(this.numerator.pow(exponent), this.denominator.pow(exponent));
  }
  equals(o: Quotient): boolean {
    return this.numerator.mul(o.denominator).equals(o.numerator.mul(this.denominator));
  }
  /** c with generators replaced by quotients. Throws RangeError where a fractional power leaves the ring. */
  static substitute(c: Coefficient, values: ReadonlyMap<string, Quotient>): Quotient {
    let sum = Quotient.of(Coefficient.zero);
    for (const t of c.terms) {
      let product = Quotient.of(Coefficient.rational(t.factor));
      for (const [generator, exponent] of t.powers) {
        const value = values.get(generator) ?? Quotient.of(Coefficient.symbol(generator));
        product = product.mul(value.pow(exponent));
      }
      sum = sum.add(product);
    }
    return sum;
  }
  /** -1, 0 or 1 when all generators are positive and the terms agree in sign; undefined when not evident. */
  get evidentSign(): number | undefined {
    if (this.numerator.isZero) return 0;
    const top = new Set(this.numerator.terms.map((t) => t.factor.sign));
    const bottom = new Set(this.denominator.terms.map((t) => t.factor.sign));
    return top.size === 1 && bottom.size === 1 ? [...top][0]! * [...bottom][0]! : undefined;
  }
}

/** The rational c for which value/c has coprime integer factors, the first of them positive. */
function contentOf(value: Coefficient): Rational {
  let num = 0n;
  let den = 1n;
  for (const { factor } of value.terms) {
    num = gcd(num, factor.num);
    den = (den / gcd(den, factor.den)) * factor.den;
  }
  const content = Rational.of(num, den);
  return value.terms[0]!.factor.sign < 0 ? content.neg() : content;
}

/** x/y when that is a rational number, else undefined. */
export function rationalRatio(x: Quotient, y: Quotient): Rational | undefined {
  if (y.isZero) return undefined;
  return x.div(y).asCoefficient?.asRational;
}
