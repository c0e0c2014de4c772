// The conditions of rules: boolean expressions over facts, compared exactly. A general-purpose parser splits the text; only the
// node kinds named here are accepted, every fact must exist with a type that fits, and the evaluation is our own.

import type { MathNode } from 'mathjs';
import { Rational } from '../exact/rational.ts';
import { NotationError } from '../notation/source.ts';
import { nearest } from '../model/names.ts';
import { parse } from './mathjs.ts';
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
    throw new NotationError(`a condition of ${text.length} characters`, `keep it below ${LONGEST_CONDITION}`, 0);
  let node: MathNode;
  try {
    node = parse(text);
  } catch (error) {
    const found = /\(char (\d+)\)/.exec(String(error));
    throw new NotationError('this is no condition', 'write comparisons of facts joined by and, or, not', Math.max(0, Number(found?.[1] ?? 1) - 1));
  }
  return new Reader(text, scopeName).condition(node, 0);
}

class Reader {
  constructor(
    private readonly text: string,
    private readonly scopeName: string,
  ) {}

  condition(node: MathNode, depth: number): Condition {
    if (depth > DEEPEST_CONDITION) this.refuse('the condition is nested too deeply', 'split the rule', '');
    const n = node as AnyNode;
    if (n.type === 'ParenthesisNode') return this.condition(n.content!, depth + 1);
    if (n.type === 'OperatorNode' && (n.op === 'and' || n.op === 'or'))
      return { kind: n.op, parts: n.args!.map((a) => this.condition(a, depth + 1)) };
    if (n.type === 'OperatorNode' && n.op === 'not')
      return { kind: 'not', part: this.condition(n.args![0]!, depth + 1) };
    if (n.type === 'OperatorNode' && COMPARISONS.has(n.op!)) {
      const [left, right] = n.args!.map((a) => this.operand(a)) as [Operand, Operand];
      const operator = n.op as '==';
      this.checkComparison(left, right, operator);
      return { kind: 'compare', operator, left, right };
    }
    const operand = this.operand(node);
    if (operand.kind !== 'fact' || operand.type !== 'boolean')
      this.refuse('this part of the condition is neither true nor false', 'compare it with something', this.nameOf(operand));
    return { kind: 'fact', fact: (operand as { fact: string }).fact };
  }

  private operand(node: MathNode): Operand {
    const n = node as AnyNode;
    if (n.type === 'ParenthesisNode') return this.operand(n.content!);
    if (n.type === 'ConstantNode') {
      if (typeof n.value === 'number' && Number.isSafeInteger(n.value))
        return { kind: 'value', value: Rational.of(n.value), type: 'number' };
      if (typeof n.value === 'string') return { kind: 'value', value: n.value, type: 'text' };
      if (typeof n.value === 'boolean') return { kind: 'value', value: n.value, type: 'boolean' };
      return this.refuse('this constant is not a whole number or a word in quotes', 'write e.g. 2 or "survives"', '');
    }
    if (n.type === 'OperatorNode' && n.fn === 'unaryMinus') {
      const inner = this.operand(n.args![0]!);
      if (inner.kind === 'value' && inner.value instanceof Rational)
        return { ...inner, value: inner.value.neg() };
    }
    const name = this.factName(n);
    if (name === 'none') return { kind: 'value', value: null, type: 'none' };
    const fact = name === undefined ? undefined : factIn(this.scopeName, name);
    if (name === undefined || !fact) {
      const known = [...Object.keys(SCOPES[this.scopeName]?.facts ?? {}), ...Object.keys(SCOPES.case!.facts)];
      const close = name === undefined ? undefined : nearest(name, known);
      return this.refuse(
        name === undefined ? 'conditions hold facts, comparisons, and, or, not' : `"${name}" is no fact of ${this.scopeName}`,
        close ? `did you mean ${close}?` : 'saltus rules facts lists them; put words in quotes',
        name ?? '',
      );
    }
    return { kind: 'fact', fact: name, type: fact.type };
  }

  private factName(n: AnyNode): string | undefined {
    if (n.type === 'SymbolNode') return n.name;
    if (n.type !== 'AccessorNode' || !n.object || !n.index) return undefined;
    const object = this.factName(n.object as AnyNode);
    const property = (n.index.dimensions[0] as AnyNode | undefined)?.value;
    return object !== undefined && typeof property === 'string' ? `${object}.${property}` : undefined;
  }

  private checkComparison(left: Operand, right: Operand, operator: string): void {
    const isOrder = operator !== '==' && operator !== '!=';
    if (left.type === 'none' || right.type === 'none') {
      if (isOrder) this.refuse('none has no order', 'use == or !=', 'none');
      return;
    }
    if (left.type !== right.type)
      this.refuse(`a ${left.type} is compared with a ${right.type}`, 'compare facts of one type', this.nameOf(left));
    if (isOrder && left.type !== 'number')
      this.refuse(`a ${left.type} has no order`, 'use == or !=', this.nameOf(left));
  }

  private nameOf(operand: Operand): string {
    return operand.kind === 'fact' ? operand.fact : String(operand.value ?? '');
  }

  private refuse(problem: string, mend: string, near: string): never {
    throw new NotationError(problem, mend, Math.max(0, near === '' ? 0 : this.text.indexOf(near)));
  }
}

const COMPARISONS = new Set(['==', '!=', '<', '<=', '>', '>=']);

interface AnyNode {
  readonly type: string;
  readonly op?: string;
  readonly fn?: unknown;
  readonly args?: readonly MathNode[];
  readonly content?: MathNode;
  readonly value?: unknown;
  readonly name?: string;
  readonly object?: MathNode;
  readonly index?: { readonly dimensions: readonly MathNode[] };
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
  return operator === '<' ? order < 0 : operator === '<=' ? order <= 0 : operator === '>' ? order > 0 : order >= 0;
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
