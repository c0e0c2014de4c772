// Tokens to the tree: a Pratt parser. Juxtaposition is a product with the precedence of * and /, left to right, so
// mu0/2 (d_tau phi)^2 is (mu0/2) times the square. While a product is put together, a maximal run of operator-valued
// factors is made to act on the one factor that follows it. Whatever two physicists could read in two ways is refused
// with both readings.

import { Rational } from '../exact/rational.ts';
import { Chain } from './chain.ts';
import { type Part, partOf, shortened, spanOf } from './part.ts';
import { NotationError } from './source.ts';
import { type Sign, type Token, tokens } from './tokens.ts';
import { FUNCTION_NAMES, rationalValue, type Span, type Tree } from './tree.ts';

/** Deepest nesting of parentheses, exponents and signs that is read. */
const DEEPEST_NESTING = 200;

const isFunction = (name: string): boolean => (FUNCTION_NAMES as readonly string[]).includes(name);

class Parser {
  private readonly tokens: readonly Token[];
  private index = 0;
  private nesting = 0;

  constructor(private readonly text: string) {
    this.tokens = tokens(text);
  }

  /** The whole text as one sum. */
  whole(): Part {
    if (this.atEnd) throw new NotationError('nothing is written', 'write an expression', 0);
    const part = this.sum();
    if (!this.atEnd) throw this.unexpected();
    return part;
  }

  excerpt(span: Span): string {
    return shortened(this.text.slice(span.start, span.end));
  }

  private get token(): Token {
    return this.tokens[this.index]!;
  }
  private get atEnd(): boolean {
    return this.token.kind === 'end';
  }
  private get previousEnd(): number {
    return this.index === 0 ? 0 : this.tokens[this.index - 1]!.span.end;
  }
  private get isTight(): boolean {
    return this.token.span.start === this.previousEnd;
  }
  private isSign(...signs: readonly Sign[]): boolean {
    return this.token.kind === 'sign' && signs.includes(this.token.sign);
  }
  private get startsFactor(): boolean {
    return (
      this.token.kind === 'number' ||
      this.token.kind === 'name' ||
      this.token.kind === 'operator' ||
      this.isSign('(')
    );
  }

  private unexpected(): NotationError {
    const { kind, span } = this.token;
    if (kind === 'end')
      return new NotationError(
        'the text ends where a factor is expected',
        'finish the expression',
        span.start,
      );
    const shown = this.excerpt(span);
    const mend = UNEXPECTED_MENDS.get(shown) ?? 'put a factor before it or remove it';
    return new NotationError(`"${shown}" is not expected here`, mend, span.start);
  }

  private nested<T>(read: () => T): T {
    if (++this.nesting > DEEPEST_NESTING)
      throw new NotationError(
        `parentheses, exponents and signs are nested more than ${DEEPEST_NESTING} levels deep`,
        'remove superfluous parentheses or split the expression into several terms',
        this.token.span.start,
      );
    const value = read();
    this.nesting--;
    return value;
  }

  private sum(): Part {
    const terms = [this.signed()];
    while (this.isSign('+', '-')) terms.push(this.signed());
    if (terms.length === 1) return terms[0]!;
    return partOf({ kind: 'sum', terms: terms.map((t) => t.tree), span: spanOf(terms) }, terms);
  }

  /** A product with the signs before it; a minus binds weaker than products and powers. */
  private signed(): Part {
    return this.withSign(() => this.product());
  }

  private withSign(read: () => Part): Part {
    if (this.isSign('+')) {
      this.index++;
      return this.nested(() => this.withSign(read));
    }
    if (!this.isSign('-')) return read();
    const { start } = this.token.span;
    this.index++;
    const operand = this.nested(() => this.withSign(read));
    const span = { start, end: operand.span.end };
    return partOf({ kind: 'negate', operand: operand.tree, span }, [operand]);
  }

  private product(): Part {
    const chain = new Chain((span) => this.excerpt(span), this.power());
    while (true) {
      if (this.isSign('/')) {
        this.index++;
        const numerator = chain.last;
        const denominator = this.withSign(() => this.power());
        if (this.startsFactor && this.isTight) throw this.unclearSlash(numerator, denominator);
        chain.divide(denominator);
      } else if (this.isSign('*')) {
        this.index++;
        chain.multiply(
          this.withSign(() => this.power()),
          '*',
        );
      } else if (this.token.kind === 'number') {
        throw new NotationError(
          `the number ${this.excerpt(this.token.span)} follows a factor without a sign between them`,
          'write * between them, put the number first, or write ^ when a power is meant',
          this.token.span.start,
        );
      } else if (this.startsFactor) chain.multiply(this.power(), 'juxtaposed');
      else return chain.finish();
    }
  }

  private unclearSlash(numerator: Part, denominator: Part): NotationError {
    const next = this.power();
    const [n, d, f] = [numerator, denominator, next].map((p) => this.excerpt(p.span)) as [
      string,
      string,
      string,
    ];
    const whole = this.excerpt(spanOf([numerator, next]));
    const [joint, rest] = next.isOperator ? [' ', ' …'] : ['*', ''];
    return new NotationError(
      `"${whole}" can mean (${n}/${d})${joint}${f}${rest} or ${n}/(${d}${joint}${f}${rest})`,
      'write one of them, or white space after the denominator for the first',
      numerator.span.start,
    );
  }

  /** A primary with its exponent. */
  private power(): Part {
    const base = this.primary();
    const exponent = this.exponent();
    if (!exponent) return base;
    const span = { start: base.span.start, end: exponent.span.end };
    const tree: Tree = { kind: 'power', base: base.tree, exponent: exponent.tree, span };
    this.refuseUnclearExponent(base, exponent);
    const barePower = { base: base.span, exponent: { start: base.span.end, end: exponent.span.end } };
    return { ...partOf(tree, [base, exponent]), barePower };
  }

  private refuseUnclearExponent(base: Part, exponent: Part): void {
    const { start } = base.span;
    const power = this.excerpt({ start: base.span.end, end: exponent.span.end });
    const b = this.excerpt(base.span);
    const e = power.startsWith('^') ? this.excerpt(exponent.span) : `${rationalValue(exponent.tree)}`;
    const refuse = (problem: string): never => {
      throw new NotationError(problem, 'write one of them', start);
    };
    if (this.isSign('^') || this.token.kind === 'superscript')
      refuse(`a power of a power without parentheses can mean (${b}${power})^… or ${b}^(${e}^…)`);
    const next = this.tokens[this.index + 1];
    if (this.isSign('/') && this.isTight && power === '^1' && next?.kind === 'number') {
      const n = this.excerpt(next.span);
      refuse(`"${b}${power}/${n}" can mean ${b}/${n} or ${b}^(1/${n})`);
    }
    if (!this.isSign('(') || !this.isTight) return;
    // f^2(x) and 2^n(x): as for f(x), white space says that a product is meant
    if (exponent.tree.kind === 'symbol' && exponent.tree.span === exponent.span)
      refuse(`"${b}${power}(…)" can mean ${b}${power} (…) or ${b}^(${e}(…))`);
    if (base.tree.kind === 'symbol' && base.tree.span === base.span)
      refuse(`"${b}${power}(…)" can mean ${b}${power} (…) or ${b}(…)${power}`);
  }

  /** What follows ^, or superscript digits; undefined when neither is there. */
  private exponent(): Part | undefined {
    if (this.token.kind === 'superscript') {
      const { value, span } = this.token;
      this.index++;
      return this.numberPart(value, span);
    }
    if (!this.isSign('^')) return undefined;
    this.index++;
    const exponent = this.nested(() => this.withSign(() => this.exponentAtom()));
    if (exponent.isOperator) throw nothingToActOn(this, exponent);
    return exponent;
  }

  private numberPart(value: Rational, span: Span): Part {
    const size = partOf({ kind: 'number', value: value.abs(), span }, []);
    return value.sign < 0 ? partOf({ kind: 'negate', operand: size.tree, span }, [size]) : size;
  }

  private exponentAtom(): Part {
    const { token } = this;
    if (this.isSign('{')) return this.group('{', '}');
    if (token.kind === 'name' && !isFunction(token.name)) {
      this.index++;
      return partOf({ kind: 'symbol', name: token.name, span: token.span }, []);
    }
    if (token.kind === 'number' || this.isSign('(')) return this.primary();
    if (token.kind === 'name' || token.kind === 'operator')
      throw new NotationError(
        `the exponent "${this.excerpt(token.span)}…" is not a number, a symbol or in parentheses`,
        'put parentheses around the exponent',
        token.span.start,
      );
    throw this.unexpected();
  }

  private primary(): Part {
    const { token } = this;
    switch (token.kind) {
      case 'number':
        this.index++;
        return this.numberPart(token.value, token.span);
      case 'operator':
        this.index++;
        return partOf({ kind: 'operator', name: token.name, axis: token.axis, span: token.span }, []);
      case 'name':
        this.index++;
        if (isFunction(token.name)) return this.namedFunction(token.name, token.span);
        if (this.isSign('(') && this.isTight) return this.call(token.name, token.span.start);
        return partOf({ kind: 'symbol', name: token.name, span: token.span }, []);
      default:
        if (this.isSign('(')) return this.group('(', ')');
        throw this.unexpected();
    }
  }

  /** A sum in brackets; the part keeps the span with the brackets, the tree the one without. */
  private group(open: Sign, close: Sign): Part {
    const { start } = this.token.span;
    const inner = this.nested(() => {
      this.index++;
      return this.sum();
    });
    if (!this.isSign(close)) throw this.unclosed(open, close, start);
    this.index++;
    const { barePower: _, ...part } = inner;
    return { ...part, span: { start, end: this.previousEnd } };
  }

  private unclosed(open: Sign, close: Sign, start: number): NotationError {
    if (this.token.kind === 'end')
      return new NotationError(`the bracket ${open} is never closed`, `add the missing ${close}`, start);
    return this.unexpected();
  }

  /** cos(u), or cos^2(u) for cos(u)^2. */
  private namedFunction(name: string, span: Span): Part {
    const exponent = this.exponent();
    if (!this.isSign('('))
      throw new NotationError(
        `the function ${name} stands without parentheses around its argument`,
        `write ${name}(…)`,
        span.start,
      );
    if (!exponent) return this.call(name, span.start);
    this.refuseUnclearFunctionPower(name, { start: span.start, end: exponent.span.end }, exponent);
    const call = this.call(name, span.start);
    const tree: Tree = { kind: 'power', base: call.tree, exponent: exponent.tree, span: call.span };
    return partOf(tree, [call, exponent]);
  }

  private refuseUnclearFunctionPower(name: string, span: Span, exponent: Part): void {
    const value = rationalValue(exponent.tree);
    if (value?.isInteger && value.compare(Rational.one) > 0) return;
    const head = this.excerpt(span);
    if (value?.equals(Rational.minusOne))
      throw new NotationError(
        `"${head}(…)" can mean 1/${name}(…) or the inverse function`,
        `write 1/${name}(…) when the first is meant`,
        span.start,
      );
    throw new NotationError(
      `"${head}(…)" has an exponent that is not an integer above 1`,
      `write the power after the argument: ${name}(…)^n`,
      span.start,
    );
  }

  private call(name: string, start: number): Part {
    const open = this.token.span.start;
    const args = this.nested(() => {
      const list: Part[] = [];
      do {
        this.index++;
        if (list.length === 0 && this.isSign(')'))
          throw new NotationError(`${shortened(name)}() has no argument`, 'write its argument', open);
        list.push(this.sum());
      } while (this.isSign(','));
      return list;
    });
    if (!this.isSign(')')) throw this.unclosed('(', ')', open);
    this.index++;
    for (const argument of args) if (argument.isOperator) throw nothingToActOn(this, argument);
    if (isFunction(name) && args.length !== 1)
      throw new NotationError(`${name} takes one argument, not ${args.length}`, `write ${name}(…)`, start);
    const span = { start, end: this.previousEnd };
    return partOf({ kind: 'call', name, args: args.map((a) => a.tree), span }, args);
  }
}

const UNEXPECTED_MENDS: ReadonlyMap<string, string> = new Map([
  [')', 'remove it, or add the ( that it closes'],
  ['}', 'remove it, or add the { that it closes'],
  ['{', 'write ( and ) for brackets; braces enclose exponents and subscripts'],
  [',', 'write a point in decimals; commas separate the arguments of a function'],
  ['*', 'write one * for a product and ^ for a power'],
  ['^', 'write the base before it'],
]);

function nothingToActOn(parser: Parser, part: Part): NotationError {
  return new NotationError(
    `the operator in "${parser.excerpt(part.span)}" has nothing to act on`,
    'write a field or a parenthesised group after it, e.g. Delta_x phi',
    part.span.start,
  );
}

/** Reads a scalar expression. Throws NotationError with the offset of what is wrong. */
export function readTree(text: string): Tree {
  const parser = new Parser(text);
  const part = parser.whole();
  if (part.isOperator) throw nothingToActOn(parser, part);
  return part.tree;
}

/** Reads an operator: one with operators that act on nothing yet, such as `T_x - 2 + T_x^-1`, or a number that stands
 *  for a multiple of the identity. Throws NotationError. */
export function readOperator(text: string): Tree {
  const part = new Parser(text).whole();
  if (!part.isOperator && rationalValue(part.tree) === undefined)
    throw new NotationError(
      `"${shortened(text)}" is not an operator`,
      'write shifts, differences or derivatives with nothing after them, e.g. Delta_x^2',
      part.span.start,
    );
  return part.tree;
}
