// Laurent polynomials in d commuting variables with exact coefficients. A stencil is one in the shift operators
// T_1..T_d (lattice units); a constant-coefficient differential operator is one in ∂_1..∂_d with exponents ≥ 0.

import { Coefficient } from './coefficient.ts';

/** Integer exponents, one per axis in the order of the case. */
export type Exponents = readonly number[];

export interface LaurentTerm {
  readonly exponents: Exponents;
  readonly weight: Coefficient;
}

const keyOf = (e: Exponents): string => e.join(',');

/** Immutable; no zero weights; terms in lexicographic order of their exponents. */
export class LaurentPolynomial {
  private constructor(
    readonly dimension: number,
    readonly terms: readonly LaurentTerm[],
  ) {}

  /** Sum of the given terms; equal exponents are collected. Throws RangeError when a length differs from `dimension`. */
  static of(dimension: number, terms: Iterable<LaurentTerm>): LaurentPolynomial {
    const byKey = new Map<string, LaurentTerm>();
    for (const t of terms) {
      if (t.exponents.length !== dimension) throw new RangeError('exponents of the wrong length');
      const key = keyOf(t.exponents);
      const old = byKey.get(key);
      const weight = old ? old.weight.add(t.weight) : t.weight;
      if (weight.isZero) byKey.delete(key);
      else byKey.set(key, { exponents: t.exponents, weight });
    }
    const sorted = [...byKey.values()].sort((x, y) => compareExponents(x.exponents, y.exponents));
    return new LaurentPolynomial(dimension, sorted);
  }
  static zero(dimension: number): LaurentPolynomial {
    return new LaurentPolynomial(dimension, []);
  }
  static constant(dimension: number, value: Coefficient): LaurentPolynomial {
    return LaurentPolynomial.of(dimension, [{ exponents: new Array(dimension).fill(0), weight: value }]);
  }
  /** The variable of one axis to an integer power: T_axis^power or ∂_axis^power. */
  static variable(dimension: number, axis: number, power = 1): LaurentPolynomial {
    const exponents = new Array<number>(dimension).fill(0);
    exponents[axis] = power;
    return LaurentPolynomial.of(dimension, [{ exponents, weight: Coefficient.one }]);
  }

  get isZero(): boolean {
    return this.terms.length === 0;
  }
  add(o: LaurentPolynomial): LaurentPolynomial {
    return LaurentPolynomial.of(this.dimension, [...this.terms, ...o.terms]);
  }
  scale(by: Coefficient): LaurentPolynomial {
    return LaurentPolynomial.of(
      this.dimension,
      this.terms.map((t) => ({ exponents: t.exponents, weight: t.weight.mul(by) })),
    );
  }
  neg(): LaurentPolynomial {
    return this.scale(Coefficient.integer(-1));
  }
  sub(o: LaurentPolynomial): LaurentPolynomial {
    return this.add(o.neg());
  }
  mul(o: LaurentPolynomial): LaurentPolynomial {
    const products: LaurentTerm[] = [];
    for (const x of this.terms)
      for (const y of o.terms)
        products.push({
          exponents: x.exponents.map((e, i) => e + y.exponents[i]!),
          weight: x.weight.mul(y.weight),
        });
    return LaurentPolynomial.of(this.dimension, products);
  }
  /** Integer power ≥ 0; negative powers only of a single term. Throws RangeError otherwise. */
  pow(k: number): LaurentPolynomial {
    if (k < 0) {
      const t = this.terms[0];
      if (this.terms.length !== 1 || !t) throw new RangeError('only a single term has an inverse');
      const inverse = { exponents: t.exponents.map((e) => -e), weight: Coefficient.one.div(t.weight) };
      return LaurentPolynomial.of(this.dimension, [inverse]).pow(-k);
    }
    let out = LaurentPolynomial.constant(this.dimension, Coefficient.one);
    for (let i = 0; i < k; i++) out = out.mul(this);
    return out;
  }
  equals(o: LaurentPolynomial): boolean {
    return (
      this.terms.length === o.terms.length &&
      this.terms.every((t, i) => {
        const u = o.terms[i]!;
        return compareExponents(t.exponents, u.exponents) === 0 && t.weight.equals(u.weight);
      })
    );
  }
}

/** Lexicographic order. */
export function compareExponents(x: Exponents, y: Exponents): number {
  for (let i = 0; i < x.length; i++) if (x[i] !== y[i]) return x[i]! - y[i]!;
  return 0;
}
