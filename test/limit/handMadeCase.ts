// Small builders for cases without a case file: what the tests of the algebra need and no more.

import { Coefficient } from '../../src/exact/coefficient.ts';
import { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import type { Expression } from '../../src/model/action.ts';
import type { Case, ExpandSettings } from '../../src/model/case.ts';
import type { Axis } from '../../src/model/geometry.ts';

const DIMENSION = 3;

/** Operators over the axes (tau, x, y). */
export const T = (axis: number, power = 1): LaurentPolynomial =>
  LaurentPolynomial.variable(DIMENSION, axis, power);
export const identity = LaurentPolynomial.constant(DIMENSION, Coefficient.one);
export const forward = (axis: number): LaurentPolynomial => T(axis).sub(identity);
export const d = (axis: number, power = 1): LaurentPolynomial =>
  LaurentPolynomial.variable(DIMENSION, axis, power);

export const constant = (value: Coefficient): Expression => ({ kind: 'constant', value });
export const symbol = (name: string): Expression => constant(Coefficient.symbol(name));
export const number = (n: number): Expression => constant(Coefficient.integer(n));
export const on = (operator: LaurentPolynomial, field = 'phi'): Expression => ({
  kind: 'linear',
  form: new Map([[field, operator]]),
});
export const sum = (...terms: Expression[]): Expression => ({ kind: 'sum', terms });
export const product = (...factors: Expression[]): Expression => ({ kind: 'product', factors });
export const power = (base: Expression, exponent: number): Expression => ({ kind: 'power', base, exponent });
export const cos = (argument: Expression): Expression => ({ kind: 'function', name: 'cos', argument });
/** weight·(1 − cos u). */
export const oneMinusCos = (weight: string, u: Expression): Expression =>
  product(symbol(weight), sum(number(1), product(number(-1), cos(u))));

const axes: Axis[] = [
  { name: 'tau', spacing: 'b', role: 'time' },
  { name: 'x', spacing: 'a', role: 'space' },
  { name: 'y', spacing: 'a', role: 'space' },
];

/** A 2+1-dimensional case with one angle phi. */
export function handMadeCase(
  terms: Record<string, Expression>,
  more: {
    readonly expand?: Partial<ExpandSettings>;
    readonly parameters?: readonly string[];
    readonly proposal?: Case['proposal'];
  } = {},
): Case {
  return {
    id: 'hand-made',
    title: '',
    file: 'hand-made.yaml',
    source: '',
    lattice: { axes, limits: ['b', 'a'] },
    fields: [{ name: 'phi', values: { kind: 'angle' }, at: [] }],
    parameters: (more.parameters ?? []).map((name) => ({ name, positive: true })),
    parent: {
      terms: Object.entries(terms).map(([name, expression]) => ({ name, expression, text: '' })),
      compactness: 'cosine',
    },
    proposal: more.proposal,
    expand: { beyondLeading: 4, fields: undefined, background: new Map(), ...more.expand },
    claims: [],
    warnings: [],
  };
}
