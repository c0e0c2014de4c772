// Jet variables ∂^α φ at a point and densities, the polynomials in them. A jet monomial is kept as a string whose
// sorted code units are the numbers of its jet variables: a multiset that a Map can use as a key as it stands.

import { Coefficient } from '../exact/coefficient.ts';

/** ∂^α of one field: α has one entry per axis. */
export interface JetVariable {
  readonly field: number;
  readonly derivative: readonly number[];
}

/** Sorted code units = numbers of jet variables in a JetSpace, with repetition. The empty string is the constant 1. */
export type JetMonomial = string;

/** Numbers the jet variables of some fields over some axes; grows as variables are asked for. */
export class JetSpace {
  private readonly numbers = new Map<string, number>();
  private readonly variables: JetVariable[] = [];

  constructor(
    readonly fields: readonly string[],
    readonly axes: readonly string[],
  ) {}

  /** Number of ∂^α of the field. Throws RangeError beyond 65,000 variables. */
  number(field: number, derivative: readonly number[]): number {
    const key = `${field}:${derivative.join(',')}`;
    const known = this.numbers.get(key);
    if (known !== undefined) return known;
    const fresh = this.variables.length;
    if (fresh > 65000) throw new RangeError('more than 65,000 jet variables');
    this.numbers.set(key, fresh);
    this.variables.push({ field, derivative: [...derivative] });
    return fresh;
  }
  variable(number: number): JetVariable {
    return this.variables[number]!;
  }
  monomial(variables: readonly JetVariable[]): JetMonomial {
    return sortedMonomial(variables.map((v) => this.number(v.field, v.derivative)));
  }
  factors(monomial: JetMonomial): JetVariable[] {
    return Array.from({ length: monomial.length }, (_, i) => this.variables[monomial.charCodeAt(i)]!);
  }
  /** Total number of derivatives along each axis. */
  degree(monomial: JetMonomial): number[] {
    const total = new Array<number>(this.axes.length).fill(0);
    for (let i = 0; i < monomial.length; i++) {
      const derivative = this.variables[monomial.charCodeAt(i)]!.derivative;
      for (let k = 0; k < total.length; k++) total[k]! += derivative[k]!;
    }
    return total;
  }
}

/** The monomial with the given jet numbers, in any order. */
export function sortedMonomial(numbers: number[]): JetMonomial {
  numbers.sort((x, y) => x - y);
  return String.fromCharCode(...numbers);
}

/** Product of two monomials (merge of two sorted multisets). */
export function multiplyMonomials(x: JetMonomial, y: JetMonomial): JetMonomial {
  if (x.length === 0) return y;
  if (y.length === 0) return x;
  let out = '';
  let i = 0;
  let j = 0;
  while (i < x.length && j < y.length)
    out += x.charCodeAt(i) <= y.charCodeAt(j) ? x.charAt(i++) : y.charAt(j++);
  return out + x.slice(i) + y.slice(j);
}

/** A polynomial in jet variables with exact coefficients; no zero terms. Treated as immutable once built. */
export class Density {
  constructor(
    readonly space: JetSpace,
    readonly terms: ReadonlyMap<JetMonomial, Coefficient>,
  ) {}

  static zero(space: JetSpace): Density {
    return new Density(space, new Map());
  }
  static constant(space: JetSpace, value: Coefficient): Density {
    return new Density(space, value.isZero ? new Map() : new Map([['', value]]));
  }
  get isZero(): boolean {
    return this.terms.size === 0;
  }
  get(monomial: JetMonomial): Coefficient {
    return this.terms.get(monomial) ?? Coefficient.zero;
  }
  add(o: Density): Density {
    const out = new Map(this.terms);
    for (const [m, c] of o.terms) addTerm(out, m, c);
    return new Density(this.space, out);
  }
  sub(o: Density): Density {
    return this.add(o.scale(Coefficient.integer(-1)));
  }
  scale(by: Coefficient): Density {
    if (by.isZero) return Density.zero(this.space);
    const out = new Map<JetMonomial, Coefficient>();
    for (const [m, c] of this.terms) out.set(m, c.mul(by));
    return new Density(this.space, out);
  }
  /** Product, dropping monomials that `keep` refuses. */
  mul(o: Density, keep: (monomial: JetMonomial) => boolean = () => true): Density {
    const out = new Map<JetMonomial, Coefficient>();
    for (const [m, c] of this.terms)
      for (const [n, d] of o.terms) {
        const product = multiplyMonomials(m, n);
        if (keep(product)) addTerm(out, product, c.mul(d));
      }
    return new Density(this.space, out);
  }
  equals(o: Density): boolean {
    return this.sub(o).isZero;
  }
}

/** Adds coefficient·monomial into a term map in place, removing a term that cancels. */
export function addTerm(
  terms: Map<JetMonomial, Coefficient>,
  monomial: JetMonomial,
  coefficient: Coefficient,
): void {
  const old = terms.get(monomial);
  const sum = old ? old.add(coefficient) : coefficient;
  if (sum.isZero) terms.delete(monomial);
  else terms.set(monomial, sum);
}
