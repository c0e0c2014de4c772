import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Quotient } from '../../src/exact/quotient.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import { readOperator, readTree } from '../../src/notation/parse.ts';
import { printCoefficient, printQuotient, printTree } from '../../src/notation/print.ts';
import { isOperatorValued, type Tree } from '../../src/notation/tree.ts';
import { arbitrary, exactValue, shape } from './trees.ts';

const symbol = (name: string, exponent = Rational.one): Coefficient => Coefficient.symbol(name, exponent);

const exponent = fc.oneof(
  fc.integer({ min: -4, max: 4 }).map((n) => rational(n)),
  fc.tuple(fc.integer({ min: -5, max: 5 }), fc.integer({ min: 2, max: 4 })).map(([n, k]) => rational(n, k)),
);
const generator = fc.constantFrom('a', 'b', 'beta', 'mu0', 'pi', 'J_1', '#2', '#3', '#5', '#999983');
const monomial = fc
  .tuple(
    fc.integer({ min: -40, max: 40 }),
    fc.integer({ min: 1, max: 24 }),
    fc.array(fc.tuple(generator, exponent), { maxLength: 4 }),
  )
  .map(([n, k, powers]) =>
    powers.reduce((c, [g, e]) => c.mul(symbol(g, e)), Coefficient.rational(rational(n, k))),
  );
const coefficient = fc
  .array(monomial, { maxLength: 4 })
  .map((terms) => terms.reduce((x, y) => x.add(y), Coefficient.zero));

describe('trees', () => {
  test('reading what was printed gives the tree back', () => {
    fc.assert(
      fc.property(arbitrary.scalar, (tree) => {
        expect(shape(readTree(printTree(tree)))).toEqual(shape(tree));
      }),
      { numRuns: 1500 },
    );
  });
  test('reading what was printed gives an operator back', () => {
    fc.assert(
      fc.property(arbitrary.operator, (tree) => {
        expect(isOperatorValued(tree)).toBe(true);
        expect(shape(readOperator(printTree(tree)))).toEqual(shape(tree));
      }),
      { numRuns: 1000 },
    );
  });
  test.each([
    'mu0/2 (d_tau phi)^2 + mu/2 (d_x d_y phi)^2',
    'beta*(1 - cos(Delta_x Delta_y phi))',
    '(Delta_x^2 + Delta_y^2) phi',
    '(T_x T_y - 1) (T_x T_y^-1 - 1) phi',
    '(1 + 1/12 Delta_x Deltab_x) Delta_x phi',
    '(T_x - 2 + T_x^-1) phi',
    'f(x) + g(y) + (-1)^(x + y)*theta(x)',
    'beta*a^2/(2*b)',
    '-a^(1/2)*b^-2/0.125',
    '(d_x phi)^2 (d_y phi)^2',
    'Delta_x (phi^2)',
    'Lx + Ly - 1',
    'a^(1)/2',
    '(x d_x phi)/2',
  ])('%s prints as it was written', (text) => {
    expect(printTree(readTree(text))).toBe(text);
  });
  test('Unicode prints in ASCII', () => {
    expect(printTree(readTree('μ₀/2 (∂_τ φ)² − β(1 · cos(Δ⁻_x φ))'))).toBe(
      'mu0/2 (d_tau phi)^2 - beta(1*cos(Deltab_x phi))',
    );
    expect(printTree(readTree('βa²/b'))).toBe('beta*a^2/b');
  });
  test('numbers that no text gives print as signs and quotients of the same value', () => {
    const span = { start: 0, end: 0 };
    const number = (value: Rational): Tree => ({ kind: 'number', value, span });
    const trees: Tree[] = [
      { kind: 'product', factors: [number(rational(-1, 3)), number(rational(2, 7))], span },
      { kind: 'quotient', numerator: number(rational(1, 3)), denominator: number(rational(-2, 3)), span },
      { kind: 'power', base: number(rational(2, 3)), exponent: number(rational(-2)), span },
      { kind: 'sum', terms: [number(rational(-1)), number(rational(-1, 6)), number(rational(1, 8))], span },
      { kind: 'negate', operand: number(rational(-5, 3)), span },
    ];
    for (const tree of trees)
      expect(exactValue(readTree(printTree(tree))).equals(exactValue(tree)), printTree(tree)).toBe(true);
  });
});

describe('coefficients', () => {
  test('the text reads back to the same value', () => {
    fc.assert(
      fc.property(coefficient, fc.constantFrom(undefined, ['b', 'a'], ['beta']), (c, last) => {
        const value = exactValue(readTree(printCoefficient(c, last)));
        expect(value.asCoefficient?.equals(c), printCoefficient(c, last)).toBe(true);
      }),
      { numRuns: 500 },
    );
  });
  test('are written with one fraction a term, parameters before spacings', () => {
    const beta = symbol('beta');
    const [a, b] = [symbol('a'), symbol('b')];
    const a2 = a.mul(a);
    expect(printCoefficient(Coefficient.zero)).toBe('0');
    expect(printCoefficient(Coefficient.one.neg())).toBe('-1');
    expect(printCoefficient(beta.mul(a2).div(b).scale(rational(1, 2)))).toBe('beta*a^2/(2*b)');
    expect(printCoefficient(beta.mul(a2).mul(a2).scale(rational(-1, 24)))).toBe('-beta*a^4/24');
    expect(printCoefficient(symbol('beta0').mul(b).div(a2))).toBe('beta0*b/a^2');
    expect(
      printCoefficient(
        Coefficient.integer(1)
          .div(symbol('pi').pow(rational(2)).mul(symbol('mu')))
          .scale(rational(1, 4)),
      ),
    ).toBe('1/(4*pi^2*mu)');
    expect(printCoefficient(Coefficient.root(rational(3), rational(1, 2)))).toBe('sqrt(3)');
    expect(printCoefficient(Coefficient.root(rational(3, 2), rational(1, 2)))).toBe('sqrt(6)/2');
    expect(
      printCoefficient(Coefficient.root(rational(3), rational(1, 3)).mul(symbol('a', rational(1, 2)))),
    ).toBe('3^(1/3)*a^(1/2)');
    expect(printCoefficient(symbol('a', rational(-1, 2)))).toBe('1/a^(1/2)');
    expect(printCoefficient(a.sub(b).neg())).toBe('b - a');
  });
  test('the names that go last are the caller’s choice', () => {
    const c = symbol('a').mul(symbol('zeta')).mul(symbol('at'));
    expect(printCoefficient(c)).toBe('at*zeta*a');
    expect(printCoefficient(c, ['at', 'a'])).toBe('zeta*at*a');
  });
});

describe('quotients', () => {
  test('the text reads back to the same value', () => {
    fc.assert(
      fc.property(coefficient, coefficient, (top, bottom) => {
        fc.pre(!bottom.isZero);
        const q = Quotient.of(top, bottom);
        expect(exactValue(readTree(printQuotient(q))).equals(q), printQuotient(q)).toBe(true);
      }),
      { numRuns: 300 },
    );
  });
  test('are written without fractions inside', () => {
    const [J1, J2] = [symbol('J1'), symbol('J2')];
    const half = rational(1, 2);
    expect(printQuotient(Quotient.of(J1.mul(J2), J1.add(J2)))).toBe('J1*J2/(J1 + J2)');
    expect(printQuotient(Quotient.of(J1.scale(half), J1.add(J2)))).toBe('J1/(2*J1 + 2*J2)');
    expect(printQuotient(Quotient.of(J1.neg(), J1.add(J2)))).toBe('-J1/(J1 + J2)');
    expect(printQuotient(Quotient.of(J1.sub(J2), J1.add(J2)))).toBe('(J1 - J2)/(J1 + J2)');
    expect(printQuotient(Quotient.of(Coefficient.one, Coefficient.one.add(J1.pow(rational(-1)))))).toBe(
      'J1/(1 + J1)',
    );
    expect(printQuotient(Quotient.of(J1))).toBe('J1');
  });
});
