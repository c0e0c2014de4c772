import fc from 'fast-check';
import katex from 'katex';
import { describe, expect, test } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Quotient } from '../../src/exact/quotient.ts';
import { rational } from '../../src/exact/rational.ts';
import { latexCoefficient, latexName, latexQuotient, latexTree } from '../../src/notation/latexWrite.ts';
import { readOperator, readTree } from '../../src/notation/parse.ts';
import { arbitrary, exactValue, floatValue } from './trees.ts';

/** Throws unless KaTeX sets the formula without a complaint. */
const set = (latex: string): string =>
  katex.renderToString(latex, { throwOnError: true, strict: 'error', trust: false });

/** The group in braces that opens at `open`: its text and where it ends. */
function group(latex: string, open: number): [string, number] {
  let depth = 0;
  for (let i = open; i < latex.length; i++) {
    if (latex[i] === '{') depth++;
    if (latex[i] === '}' && --depth === 0) return [latex.slice(open + 1, i), i + 1];
  }
  throw new Error(`unbalanced: ${latex}`);
}

/** A small translator from the LaTeX of this room to plain notation, for reading formulas back. */
function plain(latex: string): string {
  const construct = /\\frac(?=\{)|\\sqrt(?:\[(\d+)\])?(?=\{)|\^(?=\{)/.exec(latex);
  if (!construct) return plainSymbols(latex);
  const before = plainSymbols(latex.slice(0, construct.index));
  const [inside, end] = group(latex, construct.index + construct[0].length);
  if (construct[0] === '\\frac') {
    const [bottom, after] = group(latex, end);
    return `${before} ((${plain(inside)})/(${plain(bottom)}))${plain(latex.slice(after))}`;
  }
  if (construct[0] === '^') {
    const above = /^\d+$/.test(inside) ? inside : `(${plain(inside)})`;
    return `${before}^${above}${plain(latex.slice(end))}`;
  }
  return `${before} ((${plain(inside)})^(1/${construct[1] ?? 2}))${plain(latex.slice(end))}`;
}

function plainSymbols(latex: string): string {
  return latex
    .replaceAll('\\left(', '(')
    .replaceAll('\\right)', ')')
    .replaceAll('\\cdot', '*')
    .replace(/\\partial_\{\\?([a-z]+)\}/g, 'd_$1')
    .replace(/T_\{\\?([a-z]+)\}/g, 'T_$1')
    .replace(/\\Delta_\{\\?([a-z]+)\}/g, 'Delta_$1')
    .replace(/_\{(\d+)\}/g, '$1')
    .replace(/_\{\\phi\}/g, '_phi')
    .replace(/_\{\\mathrm\{(\w+)\}\}/g, '_$1')
    .replace(/\\mathrm\{(\w+)\}/g, '$1')
    .replace(/\\([A-Za-z]+)/g, '$1');
}

const NAMES = ['a', 'b', 'x', 'phi', 'psi', 'mu0', 'beta', 'pi', 'pi_phi', 'J1', 'J_1', 'Lx', 'Gamma'];
const OPERATORS = ['T', 'Delta', 'd'].flatMap((name) => ['x', 'y', 'tau'].map((axis) => `${name}_${axis}`));
const VALUES = new Map(
  [...NAMES, ...OPERATORS].map((name, i) => [name, 1 + ((i * 0.618033) % 1)] as [string, number]),
);
VALUES.set('J_1', VALUES.get('J1')!);

describe('trees', () => {
  test('every formula sets in KaTeX without a complaint', () => {
    fc.assert(
      fc.property(fc.oneof(arbitrary.scalar, arbitrary.operator), (tree) => {
        set(latexTree(tree));
      }),
      { numRuns: 300 },
    );
  });
  test('translated back to plain notation a formula has the same value', () => {
    let compared = 0;
    fc.assert(
      fc.property(arbitrary.scalar, (tree) => {
        const latex = latexTree(tree);
        // the translator above knows powers without a name's own superscript
        fc.pre(!/\\Delta\^/.test(latex));
        const value = floatValue(tree, VALUES);
        fc.pre(Number.isFinite(value) && Math.abs(value) > 1e-6 && Math.abs(value) < 1e6);
        const text = plain(latex);
        const back = floatValue(readTree(text), VALUES);
        expect(Math.abs(back - value), `${latex}\n${text}`).toBeLessThan(1e-6 * Math.abs(value));
        compared++;
      }),
      { numRuns: 500 },
    );
    expect(compared).toBeGreaterThan(300);
  });
  test.each([
    ['mu0/2 (d_tau phi)^2', '\\frac{\\mu_{0}}{2} \\left(\\partial_{\\tau} \\phi\\right)^{2}'],
    [
      'beta*(1 - cos(Delta_x Delta_y phi))',
      '\\beta \\left(1 - \\cos\\left(\\Delta_{x} \\Delta_{y} \\phi\\right)\\right)',
    ],
    ['(Delta_x^2 + Delta_y^2) phi', '\\left(\\Delta_{x}^{2} + \\Delta_{y}^{2}\\right) \\phi'],
    ['Deltab_x Deltac_y phi', '\\Delta^{-}_{x} \\Delta^{c}_{y} \\phi'],
    ['Deltab_x^2 phi', '\\left(\\Delta^{-}_{x}\\right)^{2} \\phi'],
    ['cos(x)^0.1', '\\left(\\cos\\left(x\\right)\\right)^{\\frac{1}{10}}'],
    ['cos(x)^2', '\\cos^{2}\\left(x\\right)'],
    ['theta(x) delta_site(y)', '\\theta\\left(x\\right) \\delta_{\\mathrm{site}}\\left(y\\right)'],
    ['2*3', '2 \\cdot 3'],
    ['2*(1/3)', '2 \\cdot \\frac{1}{3}'],
    ['(-1)^x', '\\left(-1\\right)^{x}'],
    ['0.5', '\\frac{1}{2}'],
    ['sqrt(3)', '\\sqrt{3}'],
  ])('%s', (text, latex) => {
    expect(latexTree(readTree(text))).toBe(latex);
    set(latex);
  });
  test('operators stand alone as well', () => {
    expect(latexTree(readOperator('T_x - 2 + T_x^-1'))).toBe('T_{x} - 2 + T_{x}^{-1}');
  });
});

describe('names', () => {
  test.each([
    ['mu0', '\\mu_{0}'],
    ['beta', '\\beta'],
    ['J_1', 'J_{1}'],
    ['J1', 'J_{1}'],
    ['pi_phi', '\\pi_{\\phi}'],
    ['Lx', '\\mathrm{Lx}'],
    ['phi_a_b', '\\phi_{a,b}'],
    ['phi2_x', '\\phi_{2,x}'],
    ['Gamma', '\\Gamma'],
    ['g', 'g'],
  ])('%s', (name, latex) => {
    expect(latexName(name)).toBe(latex);
    set(latex);
  });
  test('every name that the notation reads sets in KaTeX', () => {
    for (const letter of 'αβγδεζηθικλμνξοπρστυφχψωΑΒΓΔΕΖΗΘΙΚΛΜΝΞΟΠΡΣΤΥΦΧΨΩ') set(latexTree(readTree(letter)));
    fc.assert(
      fc.property(fc.stringMatching(/^[A-Za-z][A-Za-z0-9]{0,5}(_[A-Za-z0-9]{1,4}){0,2}$/), (name) => {
        set(latexName(name));
      }),
      { numRuns: 200 },
    );
  });
  test('characters with a meaning in LaTeX are escaped in any other name', () => {
    for (const name of ['a#b', 'a%b', 'a&b', 'a$b', 'a{b', 'a}b', 'a\\b', 'a^b', 'a~b']) set(latexName(name));
  });
});

describe('exact values', () => {
  const symbol = Coefficient.symbol;
  test.each([
    [Coefficient.zero, '0'],
    [
      symbol('beta').mul(symbol('a')).mul(symbol('a')).div(symbol('b')).scale(rational(1, 2)),
      '\\frac{\\beta a^{2}}{2 b}',
    ],
    [Coefficient.root(rational(3), rational(1, 2)).neg(), '-\\sqrt{3}'],
    [Coefficient.root(rational(2), rational(2, 3)).scale(rational(5)), '5 \\cdot 2^{2/3}'],
    [Coefficient.root(rational(2), rational(1, 3)), '\\sqrt[3]{2}'],
    [symbol('mu0').sub(symbol('pi')), '\\mu_{0} - \\pi'],
  ])('coefficient %#', (c, latex) => {
    expect(latexCoefficient(c)).toBe(latex);
    set(latex);
    expect(exactValue(readTree(plain(latex))).equals(Quotient.of(c))).toBe(true);
  });
  test('quotients', () => {
    const [J1, J2] = [symbol('J1'), symbol('J2')];
    const latex = latexQuotient(Quotient.of(J1.mul(J2), J1.add(J2)));
    expect(latex).toBe('\\frac{J_{1} J_{2}}{J_{1} + J_{2}}');
    set(latex);
  });
});
