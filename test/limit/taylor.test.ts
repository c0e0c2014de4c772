import nerdamer from 'nerdamer';
import { describe, expect, it } from 'vitest';
import 'nerdamer/Algebra.js';
import 'nerdamer/Calculus.js';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import { continuumDensity } from '../../src/limit/formDensity.ts';
import { JetSpace } from '../../src/limit/jets.ts';
import { ExpansionPointError, taylorCoefficients } from '../../src/limit/taylor.ts';
import type { Expression } from '../../src/model/action.ts';
import { FUNCTION_NAMES, type FunctionName } from '../../src/notation/tree.ts';
import { remainderOpinion, secondOpinion } from '../../src/witness/secondOpinion.ts';

const text = (cs: readonly Coefficient[]): string[] =>
  cs.map((c) => c.terms.map((t) => `${t.factor}${t.key && `*${t.key}`}`).join(' + ') || '0');

describe('the Taylor coefficients', () => {
  it('agree through order 9 with the derivatives that nerdamer, a general-purpose library, computes', () => {
    const opinions = secondOpinion(FUNCTION_NAMES, 9);
    expect(opinions.length).toBe(80);
    expect(opinions.filter((o) => !o.agrees)).toEqual([]);
  });

  it('leave the remainder that a multi-precision library (mathjs) finds with 160 digits', () => {
    const opinions = remainderOpinion(FUNCTION_NAMES, 7);
    expect(opinions.length).toBe(8);
    expect(opinions.filter((o) => !o.agrees)).toEqual([]);
  });

  it('of tan are the tangent numbers over factorials: 1, 1/3, 2/15, 17/315 (Abramowitz and Stegun 4.3.67, number from memory)', () => {
    const tan = taylorCoefficients('tan', Coefficient.zero, 7);
    expect(text([tan[1]!, tan[3]!, tan[5]!, tan[7]!])).toEqual(['1', '1/3', '2/15', '17/315']);
  });

  it('of cos about pi/3 are exact with a symbolic root', () => {
    const point = Coefficient.symbol('pi').scale(rational(1, 3));
    expect(text(taylorCoefficients('cos', point, 2))).toEqual(['1/2', '-1/2*#3^1/2', '-1/4']);
    expect(text(taylorCoefficients('cos', Coefficient.symbol('pi'), 2))).toEqual(['-1', '0', '1/2']);
  });

  it('are refused where they would leave exact arithmetic', () => {
    expect(() => taylorCoefficients('cos', Coefficient.one, 2)).toThrow(ExpansionPointError);
    expect(() => taylorCoefficients('exp', Coefficient.one, 2)).toThrow(ExpansionPointError);
    expect(() => taylorCoefficients('log', Coefficient.zero, 2)).toThrow(ExpansionPointError);
    expect(() => taylorCoefficients('sqrt', Coefficient.zero, 2)).toThrow(ExpansionPointError);
  });
});

describe('a composed function', () => {
  const space = new JetSpace(['phi'], ['x']);
  const derivative = (n: number, weight: Rational): Expression => ({
    kind: 'linear',
    form: new Map([
      ['phi', LaurentPolynomial.of(1, [{ exponents: [n], weight: Coefficient.rational(weight) }])],
    ]),
  });
  // u = p/2 + 3 q with p = ∂φ and q = ∂³φ, plus 1 for log and sqrt.
  const compose = (name: FunctionName): Expression => {
    const u: Expression = { kind: 'sum', terms: [derivative(1, rational(1, 2)), derivative(3, rational(3))] };
    const shift =
      name === 'log' || name === 'sqrt' ? [{ kind: 'constant' as const, value: Coefficient.one }] : [];
    return { kind: 'function', name, argument: { kind: 'sum', terms: [...shift, u] } };
  };

  it.each(FUNCTION_NAMES)('%s(p/2 + 3q) has the graded parts that nerdamer differentiates', (name) => {
    const order = 7;
    const density = continuumDensity(compose(name), space, { order, fields: Number.POSITIVE_INFINITY });
    const shift = name === 'log' || name === 'sqrt' ? '1+' : '';
    const [p, q] = [rational(2, 3), rational(-1, 5)];
    for (let n = 1; n <= order; n++) {
      let ours = Rational.zero;
      for (const [m, c] of density.terms) {
        const degree = space.degree(m)[0]!;
        if (degree !== n) continue;
        const value = space.factors(m).reduce((v, f) => v.mul(f.derivative[0] === 1 ? p : q), Rational.one);
        ours = ours.add(c.asRational!.mul(value));
      }
      const expression = `${name}(${shift}a*(${p})/2+3*a^3*(${q}))`;
      const theirs = nerdamer(nerdamer(`diff(${expression}, a, ${n})`).toString(), { a: '0' })
        .evaluate()
        .text('fractions');
      let factorial = Rational.one;
      for (let k = 2; k <= n; k++) factorial = factorial.mul(rational(k));
      expect(`${ours}`).toBe(`${Rational.parse(theirs).div(factorial)}`);
    }
  });
});
