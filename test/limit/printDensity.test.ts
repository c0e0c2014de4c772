import fc from 'fast-check';
import katex from 'katex';
import { describe, expect, test } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import { Density, type JetMonomial, JetSpace } from '../../src/limit/jets.ts';
import { latexDensity, latexMonomial, printDensity, printMonomial } from '../../src/limit/printDensity.ts';
import { readTree } from '../../src/notation/parse.ts';
import { rationalValue, type Tree } from '../../src/notation/tree.ts';

const FIELDS = ['phi', 'psi_1'];
const AXES = ['tau', 'x', 'y'];

/** A density from its text: a reader for the tests that knows jets and coefficients, and nothing of the printer. */
function densityOf(space: JetSpace, t: Tree): Density {
  const at = (u: Tree): Density => densityOf(space, u);
  const constant = (c: Coefficient): Density => Density.constant(space, c);
  switch (t.kind) {
    case 'number':
      return constant(Coefficient.rational(t.value));
    case 'symbol': {
      const field = space.fields.indexOf(t.name);
      if (field < 0) return constant(Coefficient.symbol(t.name));
      return new Density(
        space,
        new Map([[space.monomial([{ field, derivative: [0, 0, 0] }]), Coefficient.one]]),
      );
    }
    case 'apply': {
      if (t.operand.kind !== 'symbol') throw new Error('an operator acts on a field here');
      const field = space.fields.indexOf(t.operand.name);
      const monomial = space.monomial([{ field, derivative: derivativeOf(t.operator) }]);
      return new Density(space, new Map([[monomial, Coefficient.one]]));
    }
    case 'sum':
      return t.terms.map(at).reduce((x, y) => x.add(y));
    case 'product':
      return t.factors.map(at).reduce((x, y) => x.mul(y));
    case 'negate':
      return at(t.operand).scale(Coefficient.integer(-1));
    case 'quotient':
      return at(t.numerator).scale(Coefficient.one.div(at(t.denominator).get('')));
    case 'power': {
      const exponent = rationalValue(t.exponent)!;
      const base = at(t.base);
      if (exponent.isInteger && exponent.sign > 0)
        return Array.from({ length: Number(exponent.num) }, () => base).reduce((x, y) => x.mul(y));
      const number = base.get('').asRational;
      return constant(number ? Coefficient.root(number, exponent) : base.get('').pow(exponent));
    }
    case 'call':
      return constant(Coefficient.root(at(t.args[0]!).get('').asRational!, Rational.of(1, 2)));
    default:
      throw new Error(`${t.kind} does not occur in a density`);
  }
}

function derivativeOf(t: Tree): number[] {
  if (t.kind === 'operator') return AXES.map((axis) => (axis === t.axis ? 1 : 0));
  if (t.kind === 'power') return derivativeOf(t.base).map((n) => n * Number(rationalValue(t.exponent)!.num));
  if (t.kind === 'product') return t.factors.map(derivativeOf).reduce((x, y) => x.map((n, k) => n + y[k]!));
  throw new Error('not a string of derivatives');
}

const jet = fc.record({
  field: fc.nat({ max: 1 }),
  derivative: fc.tuple(fc.nat({ max: 2 }), fc.nat({ max: 2 }), fc.nat({ max: 3 })),
});
const weight = fc
  .array(
    fc.tuple(
      fc.integer({ min: -9, max: 9 }).filter((n) => n !== 0),
      fc.integer({ min: 1, max: 24 }),
      fc.integer({ min: -3, max: 4 }),
      fc.constantFrom('beta', 'mu0', 'pi', '#3'),
    ),
    { minLength: 1, maxLength: 2 },
  )
  .map((terms) =>
    terms
      .map(([n, k, power, name]) =>
        Coefficient.rational(rational(n, k))
          .mul(Coefficient.symbol(name, name === '#3' ? rational(1, 2) : Rational.one))
          .mul(Coefficient.symbol('a', rational(power))),
      )
      .reduce((x, y) => x.add(y)),
  );
const terms = fc.array(fc.tuple(fc.array(jet, { maxLength: 5 }), weight), { maxLength: 4 });

const monomial = (
  space: JetSpace,
  factors: readonly (readonly [field: number, ...derivative: number[]])[],
): JetMonomial => space.monomial(factors.map(([field, ...derivative]) => ({ field, derivative })));
const set = (latex: string): string => katex.renderToString(latex, { throwOnError: true, strict: 'error' });

function build(
  space: JetSpace,
  from: readonly (readonly [readonly { field: number; derivative: readonly number[] }[], Coefficient])[],
): Density {
  return from
    .map(([factors, c]) => new Density(space, c.isZero ? new Map() : new Map([[space.monomial(factors), c]])))
    .reduce((x, y) => x.add(y), Density.zero(space));
}

describe('monomials', () => {
  const space = new JetSpace(FIELDS, AXES);
  test.each([
    [[], '1', '1'],
    [[[0, 0, 0, 0]], 'phi', '\\phi'],
    [[[0, 0, 2, 0]], 'd_x^2 phi', '\\partial_{x}^{2} \\phi'],
    [
      [
        [0, 0, 1, 1],
        [0, 0, 1, 1],
      ],
      '(d_x d_y phi)^2',
      '\\left(\\partial_{x} \\partial_{y} \\phi\\right)^{2}',
    ],
    [
      [
        [0, 0, 1, 0],
        [0, 0, 0, 0],
        [0, 0, 1, 0],
        [0, 0, 0, 0],
      ],
      'phi^2 (d_x phi)^2',
      '\\phi^{2} \\left(\\partial_{x} \\phi\\right)^{2}',
    ],
    [
      [
        [0, 0, 2, 0],
        [0, 0, 0, 0],
      ],
      'phi d_x^2 phi',
      '\\phi \\partial_{x}^{2} \\phi',
    ],
    [
      [
        [1, 0, 0, 1],
        [0, 1, 0, 0],
      ],
      '(d_tau phi) (d_y psi_1)',
      '\\left(\\partial_{\\tau} \\phi\\right) \\left(\\partial_{y} \\psi_{1}\\right)',
    ],
    [
      [
        [0, 0, 0, 1],
        [0, 0, 1, 0],
      ],
      '(d_x phi) (d_y phi)',
      '\\left(\\partial_{x} \\phi\\right) \\left(\\partial_{y} \\phi\\right)',
    ],
  ] as const)('%j is %s', (factors, text, latex) => {
    const m = monomial(space, factors as readonly (readonly [number, ...number[]])[]);
    expect(printMonomial(space, m)).toBe(text);
    expect(latexMonomial(space, m)).toBe(latex);
    set(latex);
  });
  test('the text does not depend on the order in which jets were numbered', () => {
    const reversed = new JetSpace(FIELDS, AXES);
    reversed.number(0, [0, 2, 0]);
    reversed.number(0, [0, 1, 0]);
    const factors = [
      [0, 0, 0, 0],
      [0, 0, 1, 0],
      [0, 0, 2, 0],
    ] as const;
    expect(printMonomial(reversed, monomial(reversed, factors))).toBe(
      printMonomial(space, monomial(space, factors)),
    );
  });
});

describe('densities', () => {
  test('the text reads back to the same density', () => {
    fc.assert(
      fc.property(terms, fc.constantFrom(undefined, ['a']), (from, last) => {
        const space = new JetSpace(FIELDS, AXES);
        const density = build(space, from);
        const text = printDensity(density, last);
        expect(densityOf(space, readTree(text)).equals(density), text).toBe(true);
      }),
      { numRuns: 400 },
    );
  });
  test('the LaTeX sets in KaTeX without a complaint', () => {
    fc.assert(
      fc.property(terms, (from) => {
        set(latexDensity(build(new JetSpace(FIELDS, AXES), from)));
      }),
      { numRuns: 150 },
    );
  });
  test('terms come with few derivatives first, signs outside', () => {
    const space = new JetSpace(FIELDS, AXES);
    const mu0 = Coefficient.symbol('mu0');
    const density = build(space, [
      [
        [
          { field: 0, derivative: [0, 2, 0] },
          { field: 0, derivative: [0, 2, 0] },
        ],
        mu0.sub(Coefficient.one),
      ],
      [
        [
          { field: 0, derivative: [0, 1, 0] },
          { field: 0, derivative: [0, 1, 0] },
        ],
        mu0.scale(rational(-1, 2)),
      ],
      [
        [
          { field: 0, derivative: [0, 0, 0] },
          { field: 0, derivative: [0, 0, 0] },
        ],
        Coefficient.one,
      ],
    ]);
    expect(printDensity(density)).toBe('phi^2 - mu0/2 (d_x phi)^2 + (mu0 - 1) (d_x^2 phi)^2');
    expect(latexDensity(density)).toBe(
      '\\phi^{2} - \\frac{\\mu_{0}}{2} \\left(\\partial_{x} \\phi\\right)^{2} + \\left(\\mu_{0} - 1\\right) \\left(\\partial_{x}^{2} \\phi\\right)^{2}',
    );
    expect(printDensity(Density.zero(space))).toBe('0');
  });
});
