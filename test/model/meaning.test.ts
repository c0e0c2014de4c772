import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import { readQuotient } from '../../src/model/constants.ts';
import { readContinuumExpression, readLatticeExpression } from '../../src/model/meaning.ts';
import type { Names } from '../../src/model/names.ts';
import { readTree } from '../../src/notation/parse.ts';
import { NotationError } from '../../src/notation/source.ts';
import { AXES, expressionText, expressionValue, type Site, value } from './latticeValue.ts';

const names: Names = {
  axes: AXES,
  fields: ['phi', 'psi'],
  constants: new Set(['J', 'K', 'a', 'b']),
  positive: new Set(['J', 'a', 'b']),
  elsewhere: new Map(),
  declareUnder: 'parameters',
  background: new Map(),
};
const lattice = (text: string, more: Partial<Names> = {}) =>
  readLatticeExpression(readTree(text), { ...names, ...more });
const continuum = (text: string) => readContinuumExpression(readTree(text), names);
const constant = (text: string) => readQuotient(readTree(text), names);

function refusal(read: () => unknown): NotationError {
  try {
    read();
  } catch (error) {
    if (error instanceof NotationError) return error;
    throw error;
  }
  throw new Error('it was accepted');
}

describe('an expression on the lattice', () => {
  const sites: readonly Site[] = [
    [0, 0],
    [3, -2],
    [-5, 4],
  ];
  it('has the value that its operators give when they act on the fields one after the other', () => {
    let read = 0;
    fc.assert(
      fc.property(expressionText, (text) => {
        const tree = readTree(text);
        let expression: ReturnType<typeof lattice>;
        try {
          expression = readLatticeExpression(tree, names);
        } catch (error) {
          // Operators on constants and expressions beyond the limits are refused.
          if (error instanceof NotationError) return;
          throw error;
        }
        read++;
        for (const site of sites)
          expect(expressionValue(expression, site).toString()).toBe(value(tree)(site).toString());
      }),
      { numRuns: 300 },
    );
    expect(read).toBeGreaterThan(150);
  });

  it.each([
    ['phi + psi - phi', 'psi'],
    ['2*(3 phi)', '6 phi'],
    ['Delta_x Deltab_x phi', '(T_x - 2 + T_x^-1) phi'],
    ['Delta_x (phi^2)', '-phi^2 + (T_x phi)^2'],
    ['Delta_x (2 + cos(phi))', '-cos(phi) + cos(T_x phi)'],
    ['T_x (phi psi)', 'T_x phi T_x psi'],
    ['phi phi', 'phi^2'],
    ['(J phi^2)^2', 'J^2 phi^4'],
    ['J cos(phi) - J cos(phi) + phi^2', 'phi^2'],
    ['cos(phi - phi) phi', 'phi'],
    ['sqrt(1 + phi)^2', '1 + phi'],
    ['(1 + phi)^(1/2)', 'sqrt(1 + phi)'],
    ['1/(1 + phi)', '(1 + phi)^-1'],
    ['phi^1', 'phi'],
    ['sqrt(4) phi', '2 phi'],
    ['φ ψ', 'phi psi'],
  ])('%s and %s mean the same', (x, y) => {
    expect(lattice(x)).toEqual(lattice(y));
  });

  it('is expanded about the declared background, where its denominators must not vanish', () => {
    const background = new Map([['phi', Rational.one]]);
    expect(lattice('1/phi', { background })).toMatchObject({ kind: 'power', exponent: -1 });
    expect(lattice('log(phi)', { background })).toMatchObject({ kind: 'function', name: 'log' });
    expect(refusal(() => lattice('1/(Delta_x phi)', { background })).problem).toMatch(/vanishes/);
    expect(refusal(() => lattice('1/(phi - 1)', { background })).problem).toMatch(/vanishes/);
    expect(refusal(() => lattice('cos(phi)', { background })).problem).toMatch(/expanded/);
    expect(lattice('cos(Delta_x phi)', { background })).toMatchObject({ kind: 'function' });
  });

  it('may divide by a root that does not vanish, but not hide a constant whose value is not worked out', () => {
    expect(lattice('J/sqrt(1 + (Delta_x phi)^2)')).toMatchObject({ kind: 'product' });
    expect(lattice('log(sqrt(1 + phi))')).toMatchObject({ name: 'log' });
    expect(refusal(() => lattice('log(cos(pi/3 + phi))')).problem).toMatch(/not worked out/);
  });

  it('may have angles of 30 and 45 degrees as constants under cos and sin', () => {
    for (const angle of ['pi/6', 'pi/4', '2*pi/3', '-5*pi/4', '7*pi'])
      expect(lattice(`cos(${angle} + phi)`)).toMatchObject({ name: 'cos' });
    expect(refusal(() => lattice('cos(pi/5 + phi)')).problem).toMatch(/expanded/);
  });

  it.each([
    ['phy', /did you mean "phi"/],
    ['jphi', /did you mean "phi"/],
    ['coz(phi)', /did you mean cos/],
    ['xyz', /declare it under parameters/],
    ['gamma(phi)', /functions are cos, sin/],
  ])('%s is refused with a word on what is meant', (text, mend) => {
    expect(refusal(() => lattice(text)).mend).toMatch(mend);
  });
});

describe('an expression in the continuum', () => {
  it('has polynomials in the derivatives as operators', () => {
    const e = continuum('(d_x^2 - 2 d_x d_y + 3) phi');
    if (e.kind !== 'linear') throw new Error('it is linear');
    expect(
      e.form.get('phi')!.terms.map((t) => [t.exponents.join(), t.weight.asRational!.toString()]),
    ).toEqual([
      ['0,0', '3'],
      ['1,1', '-2'],
      ['2,0', '1'],
    ]);
  });
  it('lets derivatives commute and not reach beyond what they act on', () => {
    expect(continuum('d_x d_y phi')).toEqual(continuum('d_y (d_x phi)'));
    expect(continuum('psi d_x phi')).not.toEqual(continuum('phi d_x psi'));
  });
});

describe('a constant', () => {
  const J = Coefficient.symbol('J');
  const root = (n: number) => Coefficient.root(rational(n), rational(1, 2));
  it.each([
    ['2/3 + 1/6', Coefficient.rational(rational(5, 6))],
    ['0.125*8', Coefficient.one],
    ['sqrt(12)', root(3).scale(rational(2))],
    ['sqrt(2)*sqrt(2)', Coefficient.integer(2)],
    ['8^(2/3)', Coefficient.integer(4)],
    ['sqrt(J^2)', J],
    ['J^(1/2)*J^(1/2)', J],
    ['(J + K)^2 - J^2 - 2*J*K - K^2', Coefficient.zero],
    ['cos(0) + exp(0) + cosh(0) + sin(0) + sinh(0) + tan(0) + log(1)', Coefficient.integer(3)],
    ['2^100', Coefficient.integer(2n ** 100n)],
    ['pi/pi', Coefficient.one],
    ['-2^2', Coefficient.integer(-4)],
  ])('%s is exact', (text, wanted) => {
    expect(constant(text).asCoefficient!.equals(wanted)).toBe(true);
  });
  it('may divide by a sum', () => {
    const parallel = constant('1/(1/J + 1/K)');
    expect(parallel.equals(constant('J*K/(J + K)'))).toBe(true);
    expect(parallel.asCoefficient).toBeUndefined();
  });
  it('is no root of a parameter whose sign is not known', () => {
    expect(refusal(() => constant('sqrt(K^2)')).mend).toMatch(/K: \{positive: true\}/);
    expect(refusal(() => constant('(J*K)^(1/3)')).problem).toMatch(/"K"/);
    expect(constant('K^2').asCoefficient!.equals(Coefficient.symbol('K', rational(2)))).toBe(true);
  });
  it.each(['1/0', '1/(J - J)', '0^-1', 'sqrt(-1)', '(J + a)^(1/2)', 'cos(1)', 'J^K', '2^1001', '2^(1/1009)'])(
    '%s is refused',
    (text) => {
      expect(refusal(() => constant(text)).mend).not.toBe('');
    },
  );
});
