// Text to tokens. Unicode and ASCII spellings give the same tokens, so that nothing after this file knows which was
// typed. A Greek letter is a name of its own (μφ is μ times φ, as in print); Latin letters run together (Lx).

import { Rational } from '../exact/rational.ts';
import { GREEK_NAMES } from './greek.ts';
import { shortened } from './part.ts';
import { NotationError } from './source.ts';
import type { OperatorName, Span } from './tree.ts';

/** Longest text that is read, in UTF-16 units. */
const LONGEST_TEXT = 20_000;
/** Longest number that is read, in digits. */
const LONGEST_NUMBER = 10_000;

export type Sign = '+' | '-' | '*' | '/' | '^' | '(' | ')' | '{' | '}' | ',';

export type Token = { readonly span: Span } & (
  | { readonly kind: 'number'; readonly value: Rational }
  | { readonly kind: 'name'; readonly name: string }
  | { readonly kind: 'operator'; readonly name: OperatorName; readonly axis: string }
  /** An exponent in superscript digits. */
  | { readonly kind: 'superscript'; readonly value: Rational }
  | { readonly kind: 'sign'; readonly sign: Sign }
  | { readonly kind: 'end' }
);

const SIGNS: ReadonlyMap<string, Sign> = new Map([
  ...(['+', '-', '*', '/', '^', '(', ')', '{', '}', ','] as const).map((s) => [s, s] as const),
  ['\u2212', '-'],
  ['\u00b7', '*'],
  ['\u22c5', '*'],
  ['\u00d7', '*'],
  ['\u2217', '*'],
  ['\u2215', '/'],
]);

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';
const SUBSCRIPTS: ReadonlyMap<string, string> = new Map(
  Array.from('₀₁₂₃₄₅₆₇₈₉ₐₑₕᵢⱼₖₗₘₙₒₚᵣₛₜᵤᵥₓ', (c, i) => [c, '0123456789aehijklmnoprstuvx'.charAt(i)]),
);
const OPERATORS: ReadonlyMap<string, OperatorName> = new Map([
  ...(['T', 'Delta', 'Deltab', 'Deltac', 'd'] as const).map((name) => [name, name] as const),
  ['∂', 'd'],
]);
const SPACE = /[ \t\n\r\u00a0\u2009\u202f]/;
const DIGIT = /[0-9]/;
const LATIN = /[A-Za-z]/;

/** What to write instead of a character that the notation does not know. */
const MENDS: ReadonlyMap<string, string> = new Map([
  ['\u2013', 'write - for minus'],
  ['\u2014', 'write - for minus'],
  ['[', 'write ( and ) for brackets'],
  [']', 'write ( and ) for brackets'],
  ['√', 'write sqrt(…) for a root'],
  ['\\', 'write names without a backslash, e.g. phi'],
  ['=', 'write one side of the equation'],
  ['.', 'write a decimal with digits on both sides of the point, e.g. 0.5'],
  ['_', 'a subscript follows a name without white space, e.g. d_x or mu_0'],
]);

/** The character in words: its code point, and the character itself when it is visible. */
function nameOfCharacter(character: string): string {
  const code = `U+${character.codePointAt(0)!.toString(16).toUpperCase().padStart(4, '0')}`;
  return /[\p{L}\p{N}\p{P}\p{S}]/u.test(character) ? `"${character}" (${code})` : code;
}

class Scanner {
  private at = 0;
  constructor(private readonly text: string) {}

  tokens(): Token[] {
    const out: Token[] = [];
    while (true) {
      while (SPACE.test(this.peek())) this.at++;
      const token = this.next();
      out.push(token);
      if (token.kind === 'end') return out;
    }
  }

  private peek(ahead = 0): string {
    return this.text.charAt(this.at + ahead);
  }
  private span(start: number): Span {
    return { start, end: this.at };
  }

  private next(): Token {
    const start = this.at;
    const c = this.peek();
    if (c === '') return { kind: 'end', span: this.span(start) };
    if (DIGIT.test(c)) return this.number();
    if (LATIN.test(c) || GREEK_NAMES.has(c) || c === '∂') return this.nameOrOperator();
    if (SUPERSCRIPTS.includes(c) || c === '⁻') return this.superscript();
    const sign = SIGNS.get(c);
    if (sign === undefined) throw this.unknown();
    this.at++;
    return { kind: 'sign', sign, span: this.span(start) };
  }

  private unknown(): NotationError {
    const character = String.fromCodePoint(this.text.codePointAt(this.at)!);
    const mend = MENDS.get(character) ?? 'remove it; names are Latin or Greek letters, digits and _';
    return new NotationError(
      `the character ${nameOfCharacter(character)} has no meaning here`,
      mend,
      this.at,
    );
  }

  private digits(): void {
    while (DIGIT.test(this.peek())) this.at++;
  }

  private number(): Token {
    const start = this.at;
    this.digits();
    if (this.peek() === '.' && DIGIT.test(this.peek(1))) {
      this.at++;
      this.digits();
    }
    const text = this.text.slice(start, this.at);
    if (text.length > LONGEST_NUMBER)
      throw new NotationError(
        `a number of ${text.length} digits is longer than the ${LONGEST_NUMBER} that are read`,
        'write it as a product or a power',
        start,
      );
    if (/[eE]/.test(this.peek()) && /^[+-]?[0-9]/.test(this.text.slice(this.at + 1, this.at + 3)))
      throw new NotationError(
        `"${shortened(text)}${this.peek()}…" is in scientific notation, which is not read as exact`,
        'write a decimal or a power of ten, e.g. 2*10^3 or 1/10^3',
        start,
      );
    return { kind: 'number', value: Rational.parse(text), span: this.span(start) };
  }

  private superscript(): Token {
    const start = this.at;
    const negative = this.peek() === '⁻';
    if (negative) this.at++;
    let digits = '';
    while (this.peek() !== '' && SUPERSCRIPTS.includes(this.peek())) {
      digits += SUPERSCRIPTS.indexOf(this.peek());
      this.at++;
    }
    if (digits === '')
      throw new NotationError(
        'a superscript minus without digits',
        'write the exponent, e.g. ⁻¹, or Δ⁻_x for the backward difference',
        start,
      );
    const value = Rational.parse(digits);
    return { kind: 'superscript', value: negative ? value.neg() : value, span: this.span(start) };
  }

  /** A run of Latin letters and digits, or one Greek letter with digits. */
  private word(): string {
    const greek = GREEK_NAMES.get(this.peek());
    let word = greek ?? '';
    if (greek !== undefined) this.at++;
    const continues = greek === undefined ? /[A-Za-z0-9]/ : DIGIT;
    while (continues.test(this.peek())) {
      word += this.peek();
      this.at++;
    }
    return word;
  }

  /** The superscript or letter that makes Δ backward or central, when an underscore follows it. */
  private differenceMark(): string {
    const mark = { '⁻': 'b', ᵇ: 'b', b: 'b', ᶜ: 'c', c: 'c' }[this.peek()];
    if (mark === undefined || (this.peek(1) !== '_' && !SUBSCRIPTS.has(this.peek(1)))) return '';
    this.at++;
    return mark;
  }

  /** The text of subscripts in small characters, e.g. `0` for ₀. */
  private smallSubscript(): string {
    let out = '';
    while (SUBSCRIPTS.has(this.peek())) {
      out += SUBSCRIPTS.get(this.peek());
      this.at++;
    }
    return out;
  }

  /** The word after an underscore, in braces or not. */
  private subscript(): string {
    this.at++;
    const braced = this.peek() === '{';
    if (braced) this.at++;
    const word = this.word();
    if (word === '' || (braced && this.peek() !== '}'))
      throw new NotationError(
        'a subscript is one word of letters and digits',
        'write it directly after the underscore, e.g. d_x or mu_0',
        this.at,
      );
    if (braced) this.at++;
    return word;
  }

  private nameOrOperator(): Token {
    const start = this.at;
    const isGreek = GREEK_NAMES.has(this.peek());
    let head: string;
    if (this.peek() === '∂') {
      this.at++;
      head = '∂';
    } else head = this.word();
    if (isGreek && head === 'Delta') head += this.differenceMark();
    const small = this.smallSubscript();
    const subscripts: string[] = [];
    while (this.peek() === '_') subscripts.push(this.subscript());
    const operator = OPERATORS.get(head);
    const axes = small !== '' ? [small, ...subscripts] : subscripts;
    if (operator !== undefined && axes.length > 0 && !isNumbered(head, small))
      return this.operator(operator, axes, start);
    if (head === '∂')
      throw new NotationError(
        'a derivative without its axis',
        'write the axis, then the power: d_x or ∂_x, d_x^2 or ∂_x²',
        start,
      );
    return { kind: 'name', name: [head + small, ...subscripts].join('_'), span: this.span(start) };
  }

  private operator(name: OperatorName, axes: readonly string[], start: number): Token {
    if (axes.length > 1)
      throw new NotationError(
        `"${shortened(this.text.slice(start, this.at))}" has more than one axis`,
        `write one operator an axis: ${axes
          .slice(0, 3)
          .map((axis) => `${name}_${shortened(axis)}`)
          .join(' ')}`,
        start,
      );
    return { kind: 'operator', name, axis: axes[0]!, span: this.span(start) };
  }
}

/** T₀ and d₁ are numbered constants, as mu0 is; an axis is a letter. */
const isNumbered = (head: string, small: string): boolean => head !== '∂' && /^[0-9]/.test(small);

/** Tokens of a text, the last of kind `end`. Throws NotationError for a text that is too long, an unknown character or a
 *  number that is not exact. */
export function tokens(text: string): Token[] {
  if (text.length > LONGEST_TEXT)
    throw new NotationError(
      `a text of ${text.length} characters is longer than the ${LONGEST_TEXT} that are read`,
      'split it into several terms',
      LONGEST_TEXT,
    );
  return new Scanner(text).tokens();
}
