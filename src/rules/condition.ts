// The conditions of rules: boolean expressions over facts, compared exactly. Every fact must exist with a type that fits; a
// condition is read when the rule is loaded and never evaluated as code.

import { Rational } from '../exact/rational.ts';
import { nearest } from '../model/names.ts';
import { NotationError } from '../notation/source.ts';
import { type FactType, type FactValue, factIn, SCOPES } from './vocabulary.ts';

/** A checked condition. */
export type Condition =
  | { readonly kind: 'and' | 'or'; readonly parts: readonly Condition[] }
  | { readonly kind: 'not'; readonly part: Condition }
  | { readonly kind: 'fact'; readonly fact: string }
  | {
      readonly kind: 'compare';
      readonly operator: '==' | '!=' | '<' | '<=' | '>' | '>=';
      readonly left: Operand;
      readonly right: Operand;
    };

export type Operand =
  | { readonly kind: 'fact'; readonly fact: string; readonly type: FactType }
  | { readonly kind: 'value'; readonly value: FactValue; readonly type: FactType | 'none' };

const LONGEST_CONDITION = 500;
const DEEPEST_CONDITION = 20;

/** Reads a condition for a scope. Throws NotationError with the offset of what is wrong. */
export function readCondition(text: string, scopeName: string): Condition {
  if (text.length > LONGEST_CONDITION)
    throw new NotationError(
      `a condition of ${text.length} characters`,
      `keep it below ${LONGEST_CONDITION}`,
      0,
    );
  return new Reader(wordsOf(text), scopeName).whole();
}

interface Word {
  readonly kind: 'name' | 'number' | 'text' | 'sign' | 'end';
  readonly text: string;
  readonly offset: number;
}

const WORD = /\s*(?:([A-Za-z][\w.]*)|(-?\d{1,15})(?![\w.])|"([^"]*)"|(==|!=|<=|>=|<|>|\(|\)))/y;

function wordsOf(text: string): Word[] {
  const words: Word[] = [];
  WORD.lastIndex = 0;
  for (let at = 0; text.slice(at).trim() !== ''; at = WORD.lastIndex) {
    const match = WORD.exec(text);
    if (!match) {
      const offset = at + text.slice(at).search(/\S/);
      throw new NotationError(
        `"${text.slice(offset, offset + 10)}" does not belong in a condition`,
        'write facts, whole numbers, words in double quotes, == != < <= > >=, and, or, not and parentheses',
        offset,
      );
    }
    const [whole, name, number, quoted, sign] = match;
    const value = name ?? number ?? quoted ?? sign!;
    const kind =
      name !== undefined ? 'name' : number !== undefined ? 'number' : quoted !== undefined ? 'text' : 'sign';
    words.push({ kind, text: value, offset: at + whole.search(/\S/) });
  }
  words.push({ kind: 'end', text: '', offset: text.length });
  return words;
}

const COMPARISONS = new Set(['==', '!=', '<', '<=', '>', '>=']);

/** Recursive descent: or, and, not, comparison. */
class Reader {
  private at = 0;

  constructor(
    private readonly words: readonly Word[],
    private readonly scopeName: string,
  ) {}

  whole(): Condition {
    const condition = this.disjunction(0);
    if (this.next.kind !== 'end')
      this.refuse(`"${this.next.text}" is not expected here`, 'join comparisons with and, or');
    return condition;
  }

  private get next(): Word {
    return this.words[this.at]!;
  }

  private take(text: string): boolean {
    if (this.next.text !== text || this.next.kind === 'text') return false;
    this.at++;
    return true;
  }

  private disjunction(depth: number): Condition {
    if (depth > DEEPEST_CONDITION) this.refuse('the condition is nested too deeply', 'split the rule');
    const parts = [this.conjunction(depth)];
    while (this.take('or')) parts.push(this.conjunction(depth));
    return parts.length === 1 ? parts[0]! : { kind: 'or', parts };
  }

  private conjunction(depth: number): Condition {
    const parts = [this.negation(depth)];
    while (this.take('and')) parts.push(this.negation(depth));
    return parts.length === 1 ? parts[0]! : { kind: 'and', parts };
  }

  private negation(depth: number): Condition {
    if (this.take('not')) return { kind: 'not', part: this.negation(depth + 1) };
    if (this.take('(')) {
      const inner = this.disjunction(depth + 1);
      if (!this.take(')')) this.refuse('a parenthesis is not closed', 'add the missing )');
      return inner;
    }
    return this.comparison();
  }

  private comparison(): Condition {
    const start = this.next;
    const left = this.operand();
    if (!COMPARISONS.has(this.next.text) || this.next.kind !== 'sign') {
      if (left.kind === 'fact' && left.type === 'boolean') return { kind: 'fact', fact: left.fact };
      this.refuse(`"${start.text}" is neither true nor false`, 'compare it with something', start);
    }
    const operator = this.next.text as '==';
    this.at++;
    const right = this.operand();
    const isOrder = operator !== '==' && operator !== '!=';
    const types = new Set([left.type, right.type]);
    types.delete('none');
    if (types.size > 1)
      this.refuse(`a ${left.type} is compared with a ${right.type}`, 'compare facts of one type', start);
    if (
      isOrder &&
      (types.size === 0 || !types.has('number') || left.type === 'none' || right.type === 'none')
    )
      this.refuse('only numbers have an order', 'use == or !=', start);
    return { kind: 'compare', operator, left, right };
  }

  private operand(): Operand {
    const word = this.next;
    this.at++;
    switch (word.kind) {
      case 'number':
        return { kind: 'value', value: Rational.parse(word.text), type: 'number' };
      case 'text':
        return { kind: 'value', value: word.text, type: 'text' };
      case 'name':
        if (word.text === 'none') return { kind: 'value', value: null, type: 'none' };
        if (word.text === 'true' || word.text === 'false')
          return { kind: 'value', value: word.text === 'true', type: 'boolean' };
        return this.fact(word);
      default:
        return this.refuse('a fact or a value is missing here', 'compare two things', word);
    }
  }

  private fact(word: Word): Operand {
    const fact = factIn(this.scopeName, word.text);
    if (fact) return { kind: 'fact', fact: word.text, type: fact.type };
    const known = [...Object.keys(SCOPES[this.scopeName]?.facts ?? {}), ...Object.keys(SCOPES.case!.facts)];
    const close = nearest(word.text, known);
    return this.refuse(
      `"${word.text}" is no fact of ${this.scopeName}`,
      close ? `did you mean ${close}?` : 'saltus rules facts lists them; put words in double quotes',
      word,
    );
  }

  private refuse(problem: string, mend: string, word: Word = this.next): never {
    throw new NotationError(problem, mend, word.offset);
  }
}

/** Evaluates a condition; `read` gives the value of a fact. A comparison with a missing value (none) is only equal to none, and
 *  has no order. */
export function holds(condition: Condition, read: (fact: string) => FactValue): boolean {
  switch (condition.kind) {
    case 'and':
      return condition.parts.every((p) => holds(p, read));
    case 'or':
      return condition.parts.some((p) => holds(p, read));
    case 'not':
      return !holds(condition.part, read);
    case 'fact':
      return read(condition.fact) === true;
    case 'compare': {
      const value = (o: Operand): FactValue => (o.kind === 'fact' ? read(o.fact) : o.value);
      return compare(value(condition.left), value(condition.right), condition.operator);
    }
  }
}

function compare(x: FactValue, y: FactValue, operator: string): boolean {
  const isEqual = x instanceof Rational && y instanceof Rational ? x.equals(y) : x === y;
  if (operator === '==') return isEqual;
  if (operator === '!=') return !isEqual;
  if (!(x instanceof Rational && y instanceof Rational)) return false;
  const order = x.compare(y);
  return operator === '<'
    ? order < 0
    : operator === '<='
      ? order <= 0
      : operator === '>'
        ? order > 0
        : order >= 0;
}

/** Names of the facts in a condition, in order, without repetition. */
export function factsOf(condition: Condition): string[] {
  switch (condition.kind) {
    case 'and':
    case 'or':
      return [...new Set(condition.parts.flatMap(factsOf))];
    case 'not':
      return factsOf(condition.part);
    case 'fact':
      return [condition.fact];
    case 'compare':
      return [condition.left, condition.right].flatMap((o) => (o.kind === 'fact' ? [o.fact] : []));
  }
}
