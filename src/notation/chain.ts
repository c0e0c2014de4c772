// A product while it is read, left to right. This is where juxtaposition, * and / have one precedence, and where a
// maximal run of operator-valued factors is made to act on the one factor that follows it.

import { type Part, partOf, spanOf } from './part.ts';
import { NotationError } from './source.ts';
import type { Span, Tree } from './tree.ts';

/** One product under construction: factors so far, and operators that still wait for what they act on. */
export class Chain {
  private factors: Part[] = [];
  private run: Part[] = [];
  constructor(
    private readonly excerpt: (span: Span) => string,
    first: Part,
  ) {
    this.multiply(first, 'juxtaposed');
  }

  multiply(part: Part, how: '*' | 'juxtaposed'): void {
    if (part.isOperator) this.run.push(part);
    else if (this.run.length === 0) this.factors.push(part);
    else {
      const operator = this.product(this.run);
      this.refuseUnclearOperand(operator, part, how);
      const span = spanOf([operator, part]);
      const tree: Tree = { kind: 'apply', operator: operator.tree, operand: part.tree, span };
      this.factors.push(partOf(tree, [operator, part]));
      this.run = [];
    }
  }

  divide(denominator: Part): void {
    if (denominator.isOperator)
      throw new NotationError(
        `an operator stands under a slash at "${this.excerpt(denominator.span)}"`,
        'put parentheses around the whole denominator, e.g. 1/(d_x phi); an operator itself has no inverse here',
        denominator.span.start,
      );
    const onOperator = this.run.length > 0;
    const numerator = this.product(onOperator ? this.run : this.factors);
    const span = spanOf([numerator, denominator]);
    const tree: Tree = { kind: 'quotient', numerator: numerator.tree, denominator: denominator.tree, span };
    const quotient = partOf(tree, [numerator, denominator]);
    if (onOperator) this.run = [quotient];
    else this.factors = [quotient];
  }

  /** The last factor written, for messages. */
  get last(): Part {
    return (this.run.at(-1) ?? this.factors.at(-1))!;
  }

  finish(): Part {
    return this.product([...this.factors, ...this.run]);
  }

  private product(parts: readonly Part[]): Part {
    const first = parts[0]!;
    if (parts.length === 1) return first;
    return partOf({ kind: 'product', factors: parts.map((p) => p.tree), span: spanOf(parts) }, parts);
  }

  private refuseUnclearOperand(operator: Part, operand: Part, how: '*' | 'juxtaposed'): void {
    const d = this.excerpt(operator.span);
    const whole = this.excerpt(spanOf([operator, operand]));
    if (how === '*')
      throw new NotationError(
        `"${whole}" has a * between an operator and what follows it`,
        `write ${d} ${this.excerpt(operand.span)} when the operator acts on it; factors stand before operators`,
        operand.span.start,
      );
    if (operand.barePower) {
      const base = this.excerpt(operand.barePower.base);
      const power = this.excerpt(operand.barePower.exponent);
      throw new NotationError(
        `"${whole}" can mean (${d} ${base})${power} or ${d} (${base}${power})`,
        'write one of them',
        operator.span.start,
      );
    }
  }
}
