// Stencils and operators for the tests of shift symmetries, written as polynomials in shifts and derivatives.

import { Coefficient } from '../../src/exact/coefficient.ts';
import { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import { Rational } from '../../src/exact/rational.ts';
import type { LinearForm } from '../../src/model/action.ts';
import type { Field, Lattice } from '../../src/model/geometry.ts';

/** Axes by name; `tau` is the time axis with spacing b, the others share a. */
export const latticeOf = (...names: string[]): Lattice => ({
  axes: names.map((name) =>
    name === 'tau' ? { name, spacing: 'b', role: 'time' } : { name, spacing: 'a', role: 'space' },
  ),
  limits: names.includes('tau') ? ['b', 'a'] : ['a'],
});

export const fieldsOf = (lattice: Lattice, values: Field['values']['kind'], ...names: string[]): Field[] =>
  names.map((name) => ({
    name,
    values: values === 'residue' ? { kind: 'residue', modulus: 2 } : { kind: values },
    at: lattice.axes.map(() => Rational.zero),
  }));

/** Operators of one lattice. T_k, T_k^-1, differences and derivatives are polynomials in the same variables. */
export class Operators {
  constructor(readonly dimension: number) {}

  T(axis: number, power = 1): LaurentPolynomial {
    return LaurentPolynomial.variable(this.dimension, axis, power);
  }
  get one(): LaurentPolynomial {
    return LaurentPolynomial.constant(this.dimension, Coefficient.one);
  }
  times(c: number, p: LaurentPolynomial): LaurentPolynomial {
    return p.scale(Coefficient.integer(c));
  }
  /** T_k − 1 */
  delta(axis: number): LaurentPolynomial {
    return this.T(axis).sub(this.one);
  }
  /** (T_k − T_k^-1)/2 */
  central(axis: number): LaurentPolynomial {
    return this.T(axis)
      .sub(this.T(axis, -1))
      .scale(Coefficient.rational(Rational.of(1, 2)));
  }
  /** T_k − 2 + T_k^-1 */
  second(axis: number): LaurentPolynomial {
    return this.T(axis).add(this.T(axis, -1)).sub(this.times(2, this.one));
  }
}

/** Forms of a single field phi. */
export const formsOf = (...operators: LaurentPolynomial[]): LinearForm[] =>
  operators.map((d) => new Map([['phi', d]]));
