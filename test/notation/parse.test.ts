import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { Rational } from '../../src/exact/rational.ts';
import { readOperator, readTree } from '../../src/notation/parse.ts';
import { printTree } from '../../src/notation/print.ts';
import { NotationError } from '../../src/notation/source.ts';
import { rationalValue, type Tree } from '../../src/notation/tree.ts';
import { shape } from './trees.ts';

const [phi, mu0, a, b, x] = ['phi', 'mu0', 'a', 'b', 'x'].map((name) => `symbol ${name}`);
const d = (axis: string) => `operator d along ${axis}`;
const T = (axis: string) => `operator T along ${axis}`;
const Delta = (axis: string) => `operator Delta along ${axis}`;
const read = (text: string): unknown => shape(readTree(text));

/** The NotationError of a text. */
function refusal(text: string, reader: (text: string) => Tree = readTree): NotationError {
  try {
    reader(text);
  } catch (error) {
    if (error instanceof NotationError) return error;
    throw error;
  }
  throw new Error(`"${text.slice(0, 40)}" was read`);
}

describe('products', () => {
  test('juxtaposition has the precedence of * and /, left to right', () => {
    expect(read('mu0/2 (d_tau phi)^2')).toEqual([
      'product',
      ['quotient', mu0, '2'],
      ['power', ['apply', d('tau'), phi], '2'],
    ]);
    expect(read('a b/2 x')).toEqual(['product', ['quotient', ['product', a, b], '2'], x]);
    expect(read('a/b/x')).toEqual(['quotient', ['quotient', a, b], x]);
    expect(read('2(a + b)(a - b)')).toEqual(['product', '2', ['sum', a, b], ['sum', a, ['negate', b]]]);
    expect(read('x^2 phi')).toEqual(['product', ['power', x, '2'], phi]);
  });
  test('parentheses keep a product of products apart', () => {
    expect(read('(a*b)*x')).toEqual(['product', ['product', a, b], x]);
    expect(read('a*(b*x)')).toEqual(['product', a, ['product', b, x]]);
  });
  test('a minus binds weaker than powers and products', () => {
    expect(read('-phi^2')).toEqual(['negate', ['power', phi, '2']]);
    expect(read('-a b')).toEqual(['negate', ['product', a, b]]);
    expect(read('a*-b')).toEqual(['product', a, ['negate', b]]);
    expect(read('a - -b')).toEqual(['sum', a, ['negate', ['negate', b]]]);
    expect(read('+a + +b')).toEqual(['sum', a, b]);
    expect(read('a^-2')).toEqual(['power', a, ['negate', '2']]);
    expect(read('a^{-2}')).toEqual(read('a^-2'));
  });
  test('a name directly before a bracket is a call, with white space it is a factor', () => {
    expect(read('f(x, tau)')).toEqual(['call', 'f', x, 'symbol tau']);
    expect(read('delta_site(x)')).toEqual(['call', 'delta_site', x]);
    expect(read('a^2 (x)')).toEqual(['product', ['power', a, '2'], x]);
    expect(read('(a)^2(x)')).toEqual(read('a^2 (x)'));
    expect(read('2^(b)(x)')).toEqual(['product', ['power', '2', b], x]);
    expect(read('a (x)')).toEqual(['product', a, x]);
    expect(read('cos (x)')).toEqual(['call', 'cos', x]);
    expect(read('cos^2(x)')).toEqual(['power', ['call', 'cos', x], '2']);
    expect(read('(-1)^(x+b) f(x)')).toEqual([
      'product',
      ['power', ['negate', '1'], ['sum', x, b]],
      ['call', 'f', x],
    ]);
  });
});

describe('operators', () => {
  test('a string of operators acts on the one factor that follows it', () => {
    expect(read('d_x d_y phi')).toEqual(['apply', ['product', d('x'), d('y')], phi]);
    expect(read('2 d_x phi b')).toEqual(['product', '2', ['apply', d('x'), phi], b]);
    expect(read('d_x f(x)')).toEqual(['apply', d('x'), ['call', 'f', x]]);
    expect(read('d_x (phi^2)')).toEqual(['apply', d('x'), ['power', phi, '2']]);
    expect(read('(d_x phi)^2')).toEqual(['power', ['apply', d('x'), phi], '2']);
    expect(read('d_x d_x phi (d_y phi)')).toEqual([
      'product',
      ['apply', ['product', d('x'), d('x')], phi],
      ['apply', d('y'), phi],
    ]);
    expect(read('d_x(d_y phi)')).toEqual(['apply', d('x'), ['apply', d('y'), phi]]);
  });
  test('sums, products and multiples of operators act as one operator', () => {
    expect(read('(Delta_x^2 + Delta_y^2) phi')).toEqual([
      'apply',
      ['sum', ['power', Delta('x'), '2'], ['power', Delta('y'), '2']],
      phi,
    ]);
    expect(read('(T_x T_y - 1)(T_x T_y^-1 - 1) phi')).toEqual([
      'apply',
      [
        'product',
        ['sum', ['product', T('x'), T('y')], ['negate', '1']],
        ['sum', ['product', T('x'), ['power', T('y'), ['negate', '1']]], ['negate', '1']],
      ],
      phi,
    ]);
    expect(read('(1 + 1/12 Delta_x Deltab_x) Delta_x phi')).toEqual([
      'apply',
      [
        'product',
        ['sum', '1', ['product', ['quotient', '1', '12'], Delta('x'), 'operator Deltab along x']],
        Delta('x'),
      ],
      phi,
    ]);
    expect(read('Delta_x/a phi')).toEqual(['apply', ['quotient', Delta('x'), a], phi]);
  });
  test('an operator needs something to act on, unless an operator is asked for', () => {
    for (const text of ['d_x', 'T_x - 1', 'phi d_x', 'cos(Delta_x)', 'a^T_x', 'a^(T_x)', '2 + 3 Delta_x^2'])
      expect(() => readTree(text), text).toThrow(NotationError);
    expect(refusal('a + cos(Delta_x)').offset).toBe(8);
    expect(shape(readOperator('T_x - 2 + T_x^-1'))).toEqual([
      'sum',
      T('x'),
      ['negate', '2'],
      ['power', T('x'), ['negate', '1']],
    ]);
    expect(shape(readOperator('3/2'))).toEqual(['quotient', '3', '2']);
    expect(refusal('phi', readOperator).problem).toBe('"phi" is not an operator');
  });
  test('an operator under a slash and a star after an operator are refused', () => {
    expect(refusal('1/d_x phi').offset).toBe(2);
    expect(refusal('a + d_x*phi').mend).toContain('write d_x phi');
    expect(refusal('(T_x*2 + 1) phi').offset).toBe(5);
    expect(read('2*d_x d_y phi')).toEqual(read('2 d_x*d_y phi'));
  });
});

describe('what can be read in two ways is refused with both readings', () => {
  test.each([
    ['d_x phi^2', '"d_x phi^2" can mean (d_x phi)^2 or d_x (phi^2)', 0],
    ['a + Delta_x phi^3', '"Delta_x phi^3" can mean (Delta_x phi)^3 or Delta_x (phi^3)', 4],
    ['Delta_x cos(phi)^2', '"Delta_x cos(phi)^2" can mean (Delta_x cos(phi))^2 or Delta_x (cos(phi)^2)', 0],
    ['d_x d_y φ²', '"d_x d_y φ²" can mean (d_x d_y φ)² or d_x d_y (φ²)', 0],
    ['1/2a', '"1/2a" can mean (1/2)*a or 1/(2*a)', 0],
    ['b + 1/2(a+b)', '"1/2(a+b)" can mean (1/2)*(a+b) or 1/(2*(a+b))', 4],
    ['x/2y', '"x/2y" can mean (x/2)*y or x/(2*y)', 0],
    ['1/4π²', undefined, 0],
    ['1/2d_x phi', '"1/2d_x" can mean (1/2) d_x … or 1/(2 d_x …)', 0],
    ['a^b^x', 'a power of a power without parentheses can mean (a^b)^… or a^(b^…)', 0],
    ['a²^x', 'a power of a power without parentheses can mean (a²)^… or a^(2^…)', 0],
    ['a^1/2', '"a^1/2" can mean a/2 or a^(1/2)', 0],
    ['2^n(x)', '"2^n(…)" can mean 2^n (…) or 2^(n(…))', 0],
    ['f^2(x)', '"f^2(…)" can mean f^2 (…) or f(…)^2', 0],
    ['a φ²(x)', '"φ²(…)" can mean φ² (…) or φ(…)²', 2],
    ['cos^-1(x)', '"cos^-1(…)" can mean 1/cos(…) or the inverse function', 0],
  ])('%s', (text, problem, offset) => {
    const error = refusal(text);
    if (problem !== undefined) expect(error.problem).toBe(problem);
    expect(error.offset).toBe(offset);
  });
  test('the offered readings are themselves read', () => {
    for (const text of [
      '(d_x phi)^2',
      'd_x (phi^2)',
      '(1/2)*a',
      '1/(2*a)',
      '(a^b)^x',
      'a^(b^x)',
      'a/2',
      'a^(1/2)',
    ])
      expect(() => readTree(text), text).not.toThrow();
  });
  test('white space after the denominator settles the slash', () => {
    expect(read('1/2 a')).toEqual(['product', ['quotient', '1', '2'], a]);
    expect(read('1/2*a')).toEqual(read('1/2 a'));
    expect(read('T_x^-1/2 phi')).toEqual([
      'apply',
      ['quotient', ['power', T('x'), ['negate', '1']], '2'],
      phi,
    ]);
  });
});

describe('Unicode and ASCII give the same tree', () => {
  test.each([
    ['μ₀/2 (∂_τ φ)²', 'mu0/2 (d_tau phi)^2'],
    ['∂_x∂_yφ', 'd_x d_y phi'],
    ['∂_x ∂_yφ', 'd_x d_y phi'],
    ['∂ₓφ', 'd_x phi'],
    ['Δ⁻_x φ + Δᶜ_x φ − Δb_x φ', 'Deltab_x phi + Deltac_x phi - Deltab_x phi'],
    ['βa²/b', 'beta*a^2/b'],
    ['T_x⁻¹ φ', 'T_x^-1 phi'],
    ['2·a × b ⋅ x', '2*a*b*x'],
    ['β₀(1 − cos(Δ_τ φ))', 'beta0(1 - cos(Delta_tau phi))'],
    ['π_φ² + ψ', 'pi_phi^2 + psi'],
    ['\u03d5 + \u03d1 + \u03f5 + \u00b5', 'phi + theta + epsilon + mu'],
    ['\u2206_x φ', 'Delta_x phi'],
    ['μφ', 'mu*phi'],
    ['a\u00a0b', 'a b'],
    ['d_{x} phi', 'd_x phi'],
    ['x¹²', 'x^12'],
    ['L\u2093 + T₀', 'Lx + T0'],
    ['(−1)^x', '(-1)^x'],
  ])('%s is %s', (unicode, ascii) => {
    expect(read(unicode)).toEqual(read(ascii));
  });
  test('every Greek letter has its ASCII name', () => {
    const letters = Array.from('αβγδεζηθικλμνξοπρστυφχψωΑΒΓΔΕΖΗΘΙΚΛΜΝΞΟΠΡΣΤΥΦΧΨΩ');
    const names = letters.map((letter) => (readTree(letter) as Tree & { kind: 'symbol' }).name);
    expect(new Set(names).size).toBe(48);
    for (const name of names) expect(name).toMatch(/^[A-Za-z]+$/);
  });
  test('names with an underscore are symbols unless their head is an operator', () => {
    expect(read('mu_0 + J_1 + delta_x + Deltax_y')).toEqual([
      'sum',
      'symbol mu_0',
      'symbol J_1',
      'symbol delta_x',
      'symbol Deltax_y',
    ]);
  });
});

describe('numbers', () => {
  test('integers of any length and decimals are exact', () => {
    const long = '9'.repeat(5000);
    expect(rationalValue(readTree(long))?.num).toBe(BigInt(long));
    expect(rationalValue(readTree('-0.1'))?.equals(Rational.of(-1, 10))).toBe(true);
    expect(rationalValue(readTree('9007199254740993/3'))?.toString()).toBe('3002399751580331');
    expect(rationalValue(readTree('0.30000000000000000000000001'))?.den).toBe(10n ** 26n);
    expect(rationalValue(readTree('1/0'))).toBeUndefined();
  });
  test('scientific notation, bare points and over-long numbers are refused with a mend', () => {
    expect(refusal('a + 1e5').problem).toContain('scientific notation');
    expect(refusal('a + 1e5').offset).toBe(4);
    expect(refusal('2.5E-3').mend).toContain('10^3');
    expect(refusal('.5').mend).toContain('0.5');
    expect(refusal('5.').offset).toBe(1);
    expect(refusal('9'.repeat(10_001)).problem).toContain('10001 digits');
    expect(read('2e')).toEqual(['product', '2', 'symbol e']);
  });
  test('a number after a factor is refused', () => {
    expect(refusal('x 2').offset).toBe(2);
    expect(refusal('(a + b)2').offset).toBe(7);
    expect(refusal('2 3').offset).toBe(2);
    expect(refusal('d_x 2 phi').offset).toBe(4);
  });
});

describe('wrong text gives a NotationError at the place', () => {
  test.each([
    ['', 0],
    ['   ', 0],
    ['a +', 3],
    ['(a', 0],
    ['a + ((b)', 4],
    ['a)', 1],
    ['f(x', 1],
    ['f(x))', 4],
    ['f()', 1],
    ['f(x,)', 4],
    ['cos(x, y)', 0],
    ['cos x', 0],
    ['a + cos', 4],
    ['cos^2 x', 0],
    ['cos^n(x)', 0],
    ['cos^1(x)', 0],
    ['a**2', 2],
    ['^2', 0],
    ['a^', 2],
    ['a^cos(x)', 2],
    ['a^f(x)', 0],
    ['{a}', 0],
    ['a^{2', 2],
    ['1,5', 1],
    ['∂φ', 0],
    ['d_x_y phi', 0],
    ['d_{x phi', 4],
    ['d_ x', 2],
    ['a _0', 2],
    ['φ⁻', 1],
    ['*a', 0],
    ['/a', 0],
    ['a/', 2],
    ['a = b', 2],
    ['\\phi', 0],
    ['[a]', 0],
  ])('%s', (text, offset) => {
    const error = refusal(text);
    expect(error.offset).toBe(offset);
    expect(error.problem).not.toBe('');
    expect(error.mend).not.toBe('');
  });
  test('an unknown character is named by its code point, and shown only when visible', () => {
    expect(refusal('a\u202eb').problem).toBe('the character U+202E has no meaning here');
    expect(refusal('a\u0000').problem).toContain('U+0000');
    expect(refusal('a\u0007').message).not.toContain('\u0007');
    expect(refusal('\ud800').problem).toContain('U+D800');
    expect(refusal('a + 😀').problem).toContain('"😀" (U+1F600)');
    expect(refusal('a + 😀').offset).toBe(4);
    expect(refusal('ﬁ').problem).toContain('U+FB01');
    expect(refusal('e\u0301').problem).toContain('U+0301');
    expect(refusal('a\u200bb').problem).toContain('U+200B');
    expect(refusal('𝜙').problem).toContain('U+1D719');
  });
  test('depth and length are limited with an error of their own', () => {
    expect(refusal('('.repeat(100_000)).offset).toBe(20_000);
    expect(refusal(`${'('.repeat(10_000)}a`).offset).toBe(200);
    expect(refusal(`${'('.repeat(5000)}a${')'.repeat(5000)}`).offset).toBe(200);
    expect(refusal(`${'-'.repeat(15_000)}a`).problem).toContain('200 levels');
    expect(refusal('a^('.repeat(5000)).problem).toContain('200 levels');
    expect(refusal('cos('.repeat(5000)).problem).toContain('200 levels');
    expect(refusal(`a${'/b'.repeat(5000)}`).problem).toContain('1000 levels');
    expect(refusal(`${'('.repeat(150)}a${'/b/b/b/b/b/b/b/b)'.repeat(150)}`).problem).toContain('1000 levels');
    expect(() => readTree(`${'('.repeat(190)}a${')'.repeat(190)}`)).not.toThrow();
    expect(() => readTree(`a${'+a*b'.repeat(4900)}`)).not.toThrow();
  });
  test('messages stay short when the text is long', () => {
    expect(refusal(`d_x ${'p'.repeat(5000)}^2`).message.length).toBeLessThan(400);
    expect(refusal(`d_${'x'.repeat(5000)}_y phi`).message.length).toBeLessThan(400);
    expect(refusal(`cos ${'p'.repeat(5000)}`).message.length).toBeLessThan(400);
  });
});

test('spans point at what was written', () => {
  const text = 'mu/2 (d_x d_y φ)^2 + a';
  const sum = readTree(text) as Tree & { kind: 'sum' };
  const at = (t: Tree): string => text.slice(t.span.start, t.span.end);
  expect(at(sum)).toBe(text);
  const product = sum.terms[0] as Tree & { kind: 'product' };
  expect(at(product)).toBe('mu/2 (d_x d_y φ)^2');
  const power = product.factors[1] as Tree & { kind: 'power' };
  expect(at(power)).toBe('(d_x d_y φ)^2');
  const apply = power.base as Tree & { kind: 'apply' };
  expect(at(apply)).toBe('d_x d_y φ');
  expect(at(apply.operator)).toBe('d_x d_y');
  expect(at(apply.operand)).toBe('φ');
});

describe('any text at all', () => {
  /** The tree, or undefined for a text that is refused with an offset inside it. */
  const attempt = (text: string): Tree | undefined => {
    try {
      return readTree(text);
    } catch (error) {
      if (!(error instanceof NotationError)) throw error;
      expect(error.offset).toBeGreaterThanOrEqual(0);
      expect(error.offset).toBeLessThanOrEqual(text.length);
      return undefined;
    }
  };
  test('is read or refused with a NotationError', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 40 }), (text) => {
        attempt(text);
      }),
      { numRuns: 1000 },
    );
  });
  test('that is read prints to a text with the same tree', () => {
    const pieces = ['a', 'x', 'φ', 'μ₀', 'f', 'cos', 'd_x', 'Δ⁻_y', 'T_x', '2', '0.5', '²', '⁻¹'];
    const signs = ['+', '-', '*', '/', '^', '(', '(', ')', ')', ' ', ' ', ',', '^2', '^-1', '{', '}'];
    let trees = 0;
    fc.assert(
      fc.property(fc.array(fc.constantFrom(...pieces, ...signs), { maxLength: 14 }), (words) => {
        const tree = attempt(words.join(''));
        if (!tree) return;
        trees++;
        expect(shape(readTree(printTree(tree))), words.join('')).toEqual(shape(tree));
      }),
      { numRuns: 5000 },
    );
    expect(trees).toBeGreaterThan(200);
  });
});
