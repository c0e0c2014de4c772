// From the tree of a string to its meaning: operators, and expressions in linear forms of the fields. On the lattice an
// operator is a stencil, in the continuum a polynomial in the derivatives.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { Quotient } from '../exact/quotient.ts';
import { type Rational, rational } from '../exact/rational.ts';
import { type FunctionName, isOperatorValued, type Tree } from '../notation/tree.ts';
import type { Expression } from './action.ts';
import { Background } from './background.ts';
import { boundedOperatorProduct, boundedPower } from './bounds.ts';
import {
  constantPower,
  exactly,
  exponentOf,
  functionOfConstant,
  isFunctionName,
  onlyArgument,
  readCoefficient,
  refuse,
} from './constants.ts';
import {
  composed,
  constantOf,
  formsOf,
  highestPower,
  partCount,
  powerOf,
  productOf,
  shifted,
  sumOf,
} from './expression.ts';
import { HIGHEST_POWER, LONGEST_REACH, MOST_EXPRESSION_PARTS } from './limits.ts';
import { type Names, unknownFunction } from './names.ts';
import { elementaryOperator } from './stencil.ts';

type Kind = 'lattice' | 'continuum';

/** A term of a lattice action: stencils act on the fields. Throws NotationError with the offset of what is wrong. */
export const readLatticeExpression = (tree: Tree, names: Names): Expression =>
  new Reader(names, 'lattice').whole(tree);

/** A Lagrangian: derivatives act on the fields. Throws NotationError with the offset of what is wrong. */
export const readContinuumExpression = (tree: Tree, names: Names): Expression =>
  new Reader(names, 'continuum').whole(tree);

class Reader {
  private readonly background: Background;

  constructor(
    private readonly names: Names,
    private readonly kind: Kind,
  ) {
    this.background = new Background(names, kind);
  }

  whole(tree: Tree): Expression {
    const expression = this.expression(tree);
    if (partCount(expression) > MOST_EXPRESSION_PARTS) return this.tooLarge(tree);
    for (const form of formsOf(expression)) for (const p of form.values()) this.withinReach(p, tree);
    return expression;
  }

  private tooLarge(tree: Tree): never {
    return refuse(
      `this has more than ${MOST_EXPRESSION_PARTS} parts when it is written out`,
      'split it into several terms',
      tree.span,
    );
  }

  private expression(tree: Tree): Expression {
    if (!this.holdsField(tree)) return constantOf(readCoefficient(tree, this.names));
    const recurse = (t: Tree): Expression => this.expression(t);
    switch (tree.kind) {
      case 'symbol': {
        const identity = LaurentPolynomial.constant(this.names.axes.length, Coefficient.one);
        return { kind: 'linear', form: new Map([[tree.name, identity]]) };
      }
      case 'apply':
        return this.applied(tree);
      case 'sum':
        return exactly(tree.span, () => sumOf(tree.terms.map(recurse)));
      case 'negate':
        return exactly(tree.span, () => productOf([minusOne, recurse(tree.operand)]));
      case 'product':
        return this.withinPowers(
          exactly(tree.span, () => productOf(tree.factors.map(recurse))),
          tree,
        );
      case 'quotient':
        return this.quotient(tree);
      case 'power':
        return this.power(tree);
      case 'call':
        if (!isFunctionName(tree.name)) throw unknownFunction(tree.name, tree.span, this.names);
        return this.call(tree.name, recurse(onlyArgument(tree)), tree);
      case 'number':
      case 'operator':
        return refuse('an operator has nothing to act on', 'write the field after it', tree.span);
    }
  }

  /** True when a field occurs, or an operator acts on something. */
  private holdsField(tree: Tree): boolean {
    const recurse = (t: Tree): boolean => this.holdsField(t);
    switch (tree.kind) {
      case 'number':
        return false;
      case 'symbol':
        return this.names.fields.includes(tree.name);
      case 'operator':
      case 'apply':
        return true;
      case 'call':
        return tree.args.some(recurse) || this.names.fields.includes(tree.name);
      case 'sum':
        return tree.terms.some(recurse);
      case 'product':
        return tree.factors.some(recurse);
      case 'negate':
        return recurse(tree.operand);
      case 'quotient':
        return recurse(tree.numerator) || recurse(tree.denominator);
      case 'power':
        return recurse(tree.base);
    }
  }

  private quotient(tree: Extract<Tree, { kind: 'quotient' }>): Expression {
    const numerator = this.expression(tree.numerator);
    const denominator = this.expression(tree.denominator);
    if (denominator.kind === 'constant' && denominator.value.isZero)
      return refuse('the denominator is zero', 'divide by something else', tree.denominator.span);
    const inverse = this.inverse(denominator, tree.denominator);
    return this.withinPowers(
      exactly(tree.span, () => productOf([numerator, inverse])),
      tree,
    );
  }

  private inverse(e: Expression, tree: Tree): Expression {
    this.background.refuseNegativePower(e, tree);
    return exactly(tree.span, () => powerOf(e, -1));
  }

  private power(tree: Extract<Tree, { kind: 'power' }>): Expression {
    const exponent = exponentOf(tree.exponent);
    const base = this.expression(tree.base);
    if (base.kind === 'constant')
      return this.constant(constantPower(Quotient.of(base.value), exponent, this.names, tree.span), tree);
    if (exponent.sign < 0) this.background.refuseNegativePower(base, tree.base);
    if (exponent.isInteger)
      return this.withinPowers(
        exactly(tree.span, () => powerOf(base, Number(exponent.num))),
        tree,
      );
    if (!exponent.mul(rational(2)).isInteger)
      return refuse(
        `a field expression has no power ${exponent} here`,
        'use whole numbers and square roots',
        tree.exponent.span,
      );
    const root = this.call('sqrt', base, tree);
    return this.withinPowers(
      exactly(tree.span, () => powerOf(root, Number(exponent.num))),
      tree,
    );
  }

  private constant(value: Quotient, tree: Tree): Expression {
    const coefficient = value.asCoefficient;
    if (!coefficient)
      return refuse('this divides by a sum of parameters', 'declare a parameter for the quotient', tree.span);
    return constantOf(coefficient);
  }

  private withinPowers(e: Expression, tree: Tree): Expression {
    if (highestPower(e) <= HIGHEST_POWER) return e;
    return refuse(`a power beyond ${HIGHEST_POWER}`, 'use a smaller exponent', tree.span);
  }

  private call(name: FunctionName, argument: Expression, tree: Tree): Expression {
    if (argument.kind === 'constant')
      return this.constant(
        functionOfConstant(name, Quotient.of(argument.value), this.names, tree.span),
        tree,
      );
    this.background.refuseExpansionPoint(name, argument, tree);
    return { kind: 'function', name, argument };
  }

  private applied(tree: Extract<Tree, { kind: 'apply' }>): Expression {
    const operand = this.expression(tree.operand);
    const operator = this.operator(tree.operator);
    if (operand.kind === 'constant')
      return refuse(
        'an operator acts on a constant',
        'write constants before operators, e.g. 2 Delta_x phi, and let operators act on fields',
        tree.operand.span,
      );
    if (operand.kind === 'linear') return exactly(tree.span, () => composed(operator, operand.form));
    if (this.kind === 'continuum')
      return refuse(
        'a derivative acts on a product or a function of fields',
        'write it out by the product and chain rules',
        tree.span,
      );
    if (partCount(operand) * operator.terms.length > MOST_EXPRESSION_PARTS) return this.tooLarge(tree);
    // A shift moves every field inside, T F(u) = F(T u), so a stencil of an expression is a sum of moved copies.
    const copies = operator.terms.map(({ exponents, weight }) => {
      const shift = LaurentPolynomial.of(exponents.length, [{ exponents, weight: Coefficient.one }]);
      return productOf([constantOf(weight), shifted(operand, shift)]);
    });
    return exactly(tree.span, () => sumOf(copies));
  }

  /** An operator-valued tree; a constant is a multiple of the identity. */
  private operator(tree: Tree): LaurentPolynomial {
    const recurse = (t: Tree): LaurentPolynomial => this.operator(t);
    if (!isOperatorValued(tree))
      return LaurentPolynomial.constant(this.names.axes.length, readCoefficient(tree, this.names));
    switch (tree.kind) {
      case 'operator':
        return this.elementary(tree);
      case 'sum':
        return tree.terms.map(recurse).reduce((x, y) => x.add(y));
      case 'negate':
        return recurse(tree.operand).neg();
      case 'product':
        return this.withinReach(
          exactly(tree.span, () => tree.factors.map(recurse).reduce(boundedOperatorProduct)),
          tree,
        );
      case 'quotient': {
        const divisor = readCoefficient(tree.denominator, this.names);
        if (divisor.isZero)
          return refuse('the denominator is zero', 'divide by something else', tree.denominator.span);
        const numerator = recurse(tree.numerator);
        return exactly(tree.span, () => numerator.scale(Coefficient.one.div(divisor)));
      }
      case 'power':
        return this.operatorPower(recurse(tree.base), exponentOf(tree.exponent), tree);
      default:
        return refuse('this is not an operator', 'write operators and numbers only', tree.span);
    }
  }

  private operatorPower(base: LaurentPolynomial, exponent: Rational, tree: Tree): LaurentPolynomial {
    if (!exponent.isInteger || (exponent.sign < 0 && (this.kind === 'continuum' || base.terms.length !== 1)))
      return refuse(
        `an operator has no power ${exponent} here`,
        'use a natural number; a shift alone has negative powers, e.g. T_x^-1',
        tree.span,
      );
    if (exponent.abs().num > BigInt(HIGHEST_POWER))
      return refuse(`a power beyond ${HIGHEST_POWER}`, 'use a smaller exponent', tree.span);
    const one = LaurentPolynomial.constant(base.dimension, Coefficient.one);
    const positive = exactly(tree.span, () =>
      boundedPower(one, exponent.sign < 0 ? base.pow(-1) : base, exponent.abs().num, boundedOperatorProduct),
    );
    return this.withinReach(positive, tree);
  }

  private withinReach(p: LaurentPolynomial, tree: Tree): LaurentPolynomial {
    if (p.terms.every((t) => t.exponents.every((n) => Math.abs(n) <= LONGEST_REACH))) return p;
    return refuse(`an operator that reaches beyond ${LONGEST_REACH}`, 'use a shorter one', tree.span);
  }

  private elementary(tree: Extract<Tree, { kind: 'operator' }>): LaurentPolynomial {
    const { axes } = this.names;
    const axis = axes.indexOf(tree.axis);
    if (axis < 0)
      return refuse(`"${tree.axis}" is not an axis`, `the axes are ${axes.join(', ')}`, tree.span);
    if (tree.name === 'd' && this.kind === 'lattice')
      return refuse(
        `the derivative d_${tree.axis} stands in a lattice action`,
        `write a difference, e.g. Delta_${tree.axis} (forward), Deltab_${tree.axis} (backward) or Deltac_${tree.axis} (central)`,
        tree.span,
      );
    if (tree.name !== 'd' && this.kind === 'continuum')
      return refuse(
        `the lattice operator ${tree.name}_${tree.axis} stands in a continuum Lagrangian`,
        `write the derivative d_${tree.axis}`,
        tree.span,
      );
    return elementaryOperator(tree.name, axis, axes.length);
  }
}

const minusOne = constantOf(Coefficient.integer(-1));
