// Coefficients of the densities: Laurent polynomials over Q in parameters and lattice spacings, with pi and square
// roots of primes as further generators. Exponents are rational, because a rescaling of a field by a fractional power
// of the spacing must stay exact. A prime generator is written "#p" and its exponent is kept in [0, 1), so that
// sqrt(3)*sqrt(3) is 3 and the representation is unique: two coefficients are equal iff their term lists are.

import { Rational } from './rational.ts';

/** Exponents by generator, sorted by name, no zero exponent. Generators: parameters, spacings, `pi`, `#p` for a prime p. */
export type Powers = readonly (readonly [generator: string, exponent: Rational])[];

/** One term of a coefficient: factor × Π generator^exponent; factor ≠ 0. */
export interface CoefficientTerm {
  readonly factor: Rational;
  readonly powers: Powers;
  /** Canonical name of `powers`, unique per power product. */
  readonly key: string;
}

const keyOf = (powers: Powers): string => powers.map(([g, e]) => `${g}^${e}`).join('*');

/** Splits integral powers of primes off, so that prime exponents lie in [0, 1). */
function normalise(factor: Rational, powers: [string, Rational][]): CoefficientTerm {
  let f = factor;
  const kept: [string, Rational][] = [];
  for (const [g, e] of powers) {
    if (e.isZero) continue;
    if (g.startsWith('#')) {
      const whole = e.floor();
      const rest = e.sub(Rational.of(whole));
      f = f.mul(Rational.of(BigInt(g.slice(1))).pow(Number(whole)));
      if (!rest.isZero) kept.push([g, rest]);
    } else kept.push([g, e]);
  }
  kept.sort((x, y) => (x[0] < y[0] ? -1 : x[0] > y[0] ? 1 : 0));
  return { factor: f, powers: kept, key: keyOf(kept) };
}

/** Products of power products met before, by their keys. Few differ within one case; emptied when it grows. */
const products = new Map<string, Map<string, CoefficientTerm>>();
const MOST_PRODUCTS = 5000;
let productCount = 0;

function multiplyTerms(x: CoefficientTerm, y: CoefficientTerm): CoefficientTerm {
  const factor = x.factor.mul(y.factor);
  if (y.powers.length === 0) return { factor, powers: x.powers, key: x.key };
  if (x.powers.length === 0) return { factor, powers: y.powers, key: y.key };
  const product = products.get(x.key)?.get(y.key) ?? multiplyPowers(x, y);
  return { factor: factor.mul(product.factor), powers: product.powers, key: product.key };
}

/** The product of the generators alone; its factor collects integral powers of primes. */
function multiplyPowers(x: CoefficientTerm, y: CoefficientTerm): CoefficientTerm {
  const merged = new Map<string, Rational>(x.powers);
  for (const [g, e] of y.powers) {
    const old = merged.get(g);
    merged.set(g, old ? old.add(e) : e);
  }
  const product = normalise(Rational.one, [...merged]);
  if (++productCount > MOST_PRODUCTS) {
    products.clear();
    productCount = 0;
  }
  const known = products.get(x.key) ?? new Map<string, CoefficientTerm>();
  products.set(x.key, known.set(y.key, product));
  return product;
}

/** Prime factorisation by trial division. Throws RangeError above 10^12, where it would stall. */
function primeFactors(n: bigint): Map<bigint, number> {
  if (n > 10n ** 12n)
    throw new RangeError(`a root of ${n} would need a factorisation of a number above 10^12`);
  const out = new Map<bigint, number>();
  let rest = n;
  for (let p = 2n; p * p <= rest; p += p === 2n ? 1n : 2n)
    while (rest % p === 0n) {
      out.set(p, (out.get(p) ?? 0) + 1);
      rest /= p;
    }
  if (rest > 1n) out.set(rest, (out.get(rest) ?? 0) + 1);
  return out;
}

/** An exact coefficient. Immutable; terms are sorted by key and none is zero. */
export class Coefficient {
  static readonly zero = new Coefficient([]);
  static readonly one = Coefficient.rational(Rational.one);

  private constructor(readonly terms: readonly CoefficientTerm[]) {}

  static rational(value: Rational): Coefficient {
    return value.isZero ? new Coefficient([]) : new Coefficient([{ factor: value, powers: [], key: '' }]);
  }
  static integer(value: number | bigint): Coefficient {
    return Coefficient.rational(Rational.of(value));
  }
  /** generator^exponent for a parameter, a spacing or `pi`. */
  static symbol(generator: string, exponent: Rational = Rational.one): Coefficient {
    return Coefficient.monomial(Rational.one, [[generator, exponent]]);
  }
  /** factor × Π generator^exponent. */
  static monomial(factor: Rational, powers: readonly (readonly [string, Rational])[]): Coefficient {
    if (factor.isZero) return Coefficient.zero;
    return new Coefficient([
      normalise(
        factor,
        powers.map(([g, e]) => [g, e]),
      ),
    ]);
  }
  /** The coefficient made of one term of another. */
  static ofTerm(term: CoefficientTerm): Coefficient {
    return new Coefficient([term]);
  }
  /** value^exponent for a positive rational. Throws RangeError for a negative value with a fractional exponent. */
  static root(value: Rational, exponent: Rational): Coefficient {
    if (exponent.isInteger) return Coefficient.rational(value.pow(Number(exponent.num)));
    if (value.isZero) return Coefficient.zero;
    if (value.sign < 0) throw new RangeError(`${value} has no real root`);
    const powers: [string, Rational][] = [];
    for (const [p, k] of primeFactors(value.num)) powers.push([`#${p}`, exponent.mul(Rational.of(k))]);
    for (const [p, k] of primeFactors(value.den)) powers.push([`#${p}`, exponent.mul(Rational.of(-k))]);
    return new Coefficient([normalise(Rational.one, powers)]);
  }
  private static collect(terms: Iterable<CoefficientTerm>): Coefficient {
    const byKey = new Map<string, CoefficientTerm>();
    for (const t of terms) {
      const old = byKey.get(t.key);
      if (!old) byKey.set(t.key, t);
      else {
        const factor = old.factor.add(t.factor);
        if (factor.isZero) byKey.delete(t.key);
        else byKey.set(t.key, { factor, powers: old.powers, key: old.key });
      }
    }
    return new Coefficient([...byKey.values()].sort((x, y) => (x.key < y.key ? -1 : x.key > y.key ? 1 : 0)));
  }

  get isZero(): boolean {
    return this.terms.length === 0;
  }
  get isOne(): boolean {
    return this.terms.length === 1 && this.terms[0]!.key === '' && this.terms[0]!.factor.isOne;
  }
  /** The value when the coefficient holds no generator, else undefined. */
  get asRational(): Rational | undefined {
    if (this.terms.length === 0) return Rational.zero;
    const t = this.terms[0]!;
    return this.terms.length === 1 && t.key === '' ? t.factor : undefined;
  }
  /** The single term of a monomial, or undefined for zero and for sums. */
  get asMonomial(): CoefficientTerm | undefined {
    return this.terms.length === 1 ? this.terms[0] : undefined;
  }
  /** Names of all generators that occur. */
  get generators(): Set<string> {
    return new Set(this.terms.flatMap((t) => t.powers.map(([g]) => g)));
  }

  add(o: Coefficient): Coefficient {
    if (o.terms.length === 0) return this;
    if (this.terms.length === 0) return o;
    if (this.terms.length === 1 && o.terms.length === 1) {
      const x = this.terms[0]!;
      const y = o.terms[0]!;
      if (x.key === y.key) {
        const factor = x.factor.add(y.factor);
        return factor.isZero ? Coefficient.zero : new Coefficient([{ factor, powers: x.powers, key: x.key }]);
      }
    }
    return Coefficient.collect([...this.terms, ...o.terms]);
  }
  neg(): Coefficient {
    return new Coefficient(this.terms.map((t) => ({ ...t, factor: t.factor.neg() })));
  }
  sub(o: Coefficient): Coefficient {
    return this.add(o.neg());
  }
  mul(o: Coefficient): Coefficient {
    if (this.terms.length === 0 || o.terms.length === 0) return Coefficient.zero;
    if (this.terms.length === 1 && o.terms.length === 1)
      return new Coefficient([multiplyTerms(this.terms[0]!, o.terms[0]!)]);
    return Coefficient.collect(this.terms.flatMap((x) => o.terms.map((y) => multiplyTerms(x, y))));
  }
  scale(by: Rational): Coefficient {
    if (by.isZero) return Coefficient.zero;
    return new Coefficient(this.terms.map((t) => ({ ...t, factor: t.factor.mul(by) })));
  }
  /** Integer power ≥ 0 of any coefficient, or any rational power of a positive monomial.
   *  Throws RangeError where the result is not a coefficient of this ring. */
  pow(exponent: Rational): Coefficient {
    if (exponent.isInteger && exponent.num >= 0n) {
      let out = Coefficient.one;
      let base: Coefficient = this;
      for (let k = exponent.num; k > 0n; k >>= 1n) {
        if (k & 1n) out = out.mul(base);
        if (k > 1n) base = base.mul(base);
      }
      return out;
    }
    const t = this.asMonomial;
    if (!t) throw new RangeError(`a sum of ${this.terms.length} terms has no power ${exponent} in this ring`);
    return Coefficient.root(t.factor, exponent).mul(
      Coefficient.monomial(
        Rational.one,
        t.powers.map(([g, e]) => [g, e.mul(exponent)]),
      ),
    );
  }
  /** Quotient by a monomial. Throws RangeError when o is zero or a sum. */
  div(o: Coefficient): Coefficient {
    return this.mul(o.pow(Rational.minusOne));
  }
  equals(o: Coefficient): boolean {
    return (
      this.terms.length === o.terms.length &&
      this.terms.every((t, i) => t.key === o.terms[i]!.key && t.factor.equals(o.terms[i]!.factor))
    );
  }
  /** Replaces generators by coefficients. Throws RangeError when a power of a replacement leaves the ring. */
  substitute(values: ReadonlyMap<string, Coefficient>): Coefficient {
    let out = Coefficient.zero;
    for (const t of this.terms) {
      let product = Coefficient.rational(t.factor);
      for (const [g, e] of t.powers) {
        const value = values.get(g);
        product = product.mul(value ? value.pow(e) : Coefficient.symbol(g, e));
      }
      out = out.add(product);
    }
    return out;
  }
  /** Float value at float values of the generators; for witnesses only. `pi` and primes are known. */
  toNumber(values: ReadonlyMap<string, number>): number {
    let sum = 0;
    for (const t of this.terms) {
      let product = t.factor.toNumber();
      for (const [g, e] of t.powers) {
        const base = g === 'pi' ? Math.PI : g.startsWith('#') ? Number(g.slice(1)) : values.get(g);
        if (base === undefined) throw new RangeError(`no value for ${g}`);
        product *= base ** e.toNumber();
      }
      sum += product;
    }
    return sum;
  }
}
