import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Quotient } from '../../src/exact/quotient.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import { type ParameterEquation, solveParameters } from '../../src/limit/parameterSystem.ts';
import { printQuotient } from '../../src/notation/print.ts';

const s = (name: string, power = 1): Coefficient => Coefficient.symbol(name, rational(power));
const equation = (left: Coefficient, right: Coefficient): ParameterEquation => ({
  left,
  right: Quotient.of(right),
});

function solve(
  equations: ParameterEquation[],
  unknowns: string[],
  known: Record<string, Coefficient> = {},
): Record<string, string> {
  const given = new Map(Object.entries(known).map(([k, v]) => [k, Quotient.of(v)]));
  return Object.fromEntries(
    [...solveParameters(equations, unknowns, given)].map(([k, v]) => [k, printQuotient(v)]),
  );
}

describe('matching equations', () => {
  it('move what is known to the other side', () => {
    expect(solve([equation(s('K').add(s('M')), s('J'))], ['K', 'M'], { K: s('G') })).toEqual({
      K: 'G',
      M: 'J - G',
    });
  });

  it('are solved by elimination when they are linear, with quotients of sums', () => {
    const equations = [
      equation(s('J').mul(s('p')).add(s('q')), Coefficient.one),
      equation(s('p').sub(s('q')), Coefficient.zero),
    ];
    const { p, q } = solve(equations, ['p', 'q']);
    expect(p).toBe(q);
    expect(['1/(J + 1)', '1/(1 + J)']).toContain(p);
  });

  it('are solved in the exponents when they are power products', () => {
    expect(
      solve([equation(s('x').mul(s('y')), s('J')), equation(s('x').div(s('y')), s('G'))], ['x', 'y']),
    ).toEqual({
      x: 'G^(1/2)*J^(1/2)',
      y: 'J^(1/2)/G^(1/2)',
    });
  });

  it('leave open what they do not determine, and do not divide by zero', () => {
    expect(solve([equation(s('x').mul(s('y')), s('J'))], ['x', 'y'])).toEqual({});
    expect(solve([equation(s('x', 2), Coefficient.zero)], ['x'])).toEqual({});
    expect(solve([equation(s('x', 2), Coefficient.rational(Rational.of(-4)))], ['x'])).toEqual({});
  });

  it('take the earliest equation where they contradict each other', () => {
    expect(solve([equation(s('K'), s('J')), equation(s('K'), s('G'))], ['K'])).toEqual({ K: 'J' });
  });
});
