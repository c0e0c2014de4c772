// Functions and negative powers of fields are Taylor series about a constant background. Where their coefficients there are
// not exact, the expression is refused when it is read, with the place in the string.

import { Coefficient } from '../exact/coefficient.ts';
import { rational } from '../exact/rational.ts';
import type { FunctionName, Tree } from '../notation/tree.ts';
import type { Expression, LinearForm } from './action.ts';
import { exactly, refuse, valueAtConstant } from './constants.ts';
import { valueOnConstants } from './expression.ts';
import type { Names } from './names.ts';

/** The constant background of a case, as an expansion point of its expressions. */
export class Background {
  constructor(
    private readonly names: Names,
    private readonly kind: 'lattice' | 'continuum',
  ) {}

  /** Value of a linear form where every field has its background value. */
  private formValue(form: LinearForm): Coefficient {
    return [...form].reduce((sum, [name, p]) => {
      const background = this.names.background.get(name);
      if (!background) return sum;
      const counted =
        this.kind === 'lattice' ? p.terms : p.terms.filter((t) => t.exponents.every((n) => n === 0));
      return counted.reduce((s, t) => s.add(t.weight.scale(background)), sum);
    }, Coefficient.zero);
  }

  private onBackground(e: Expression): Coefficient | undefined {
    return valueOnConstants(e, (form) => this.formValue(form), valueAtConstant);
  }

  /** A negative power is a series about the background, where the base must be a product of numbers and parameters.
   *  Throws NotationError otherwise. */
  refuseNegativePower(base: Expression, tree: Tree): void {
    const point = exactly(tree.span, () => this.onBackground(base));
    if (point?.asMonomial) return;
    if (!point) this.refuseUnknownValue(tree);
    else
      refuse(
        point.isZero
          ? 'this is divided by, and it vanishes on the constant background'
          : 'this is divided by, and its constant part is a sum',
        'write c (1 + u) with a product c of numbers and parameters, or declare a parameter for the constant',
        tree.span,
      );
  }

  private refuseUnknownValue(tree: Tree): never {
    return refuse(
      'the value of this on the constant background is not worked out exactly',
      'let the functions inside have the argument 0 there, or declare a parameter for the constant',
      tree.span,
    );
  }

  /** Refuses functions whose Taylor series about the background leaves the exact numbers. Throws NotationError. */
  refuseExpansionPoint(name: FunctionName, argument: Expression, tree: Tree): void {
    const point = exactly(tree.span, () => this.onBackground(argument));
    if (!point) this.refuseUnknownValue(tree);
    else if (!this.isExpansionPoint(name, point))
      refuse(
        `${name} cannot be expanded exactly about the value that its argument has on the constant background`,
        EXPANSION_MENDS[name],
        tree.span,
      );
  }

  /** True where the Taylor coefficients of the function are exact: at 0, at multiples of π/6 and π/4 for cos and sin, at 1
   *  for log, at a positive product of numbers and parameters for sqrt. */
  private isExpansionPoint(name: FunctionName, point: Coefficient): boolean {
    switch (name) {
      case 'cos':
      case 'sin': {
        const twelfths = point.div(Coefficient.symbol('pi')).asRational?.mul(rational(12));
        return twelfths?.isInteger === true && (twelfths.num % 2n === 0n || twelfths.num % 3n === 0n);
      }
      case 'log':
        return point.isOne;
      case 'sqrt': {
        const { positive } = this.names;
        const isPositive = (g: string): boolean => g === 'pi' || g.startsWith('#') || positive.has(g);
        const term = point.asMonomial;
        return term !== undefined && term.factor.sign > 0 && term.powers.every(([g]) => isPositive(g));
      }
      default:
        return point.isZero;
    }
  }
}

const EXPANSION_MENDS: Readonly<Record<FunctionName, string>> = {
  cos: 'take a multiple of pi/6 or pi/4, or put a parameter before the function by the addition theorem',
  sin: 'take a multiple of pi/6 or pi/4, or put a parameter before the function by the addition theorem',
  tan: 'let the argument vanish there',
  exp: 'take the constant out as a parameter, exp(c + u) = C exp(u)',
  cosh: 'let the argument vanish there',
  sinh: 'let the argument vanish there',
  log: 'write log(c (1 + u)) as log(1 + u) and leave the constant out',
  sqrt: 'write c (1 + u) with a product c of positive numbers and parameters under the root',
};
