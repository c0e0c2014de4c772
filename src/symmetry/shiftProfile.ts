// Shift families in the notation of claims: f(x), (-1)^(x+y) g(y), x f(y), f(x+y), cos(2*pi*x/3), pi, 2*pi/3 f(x). Free
// functions are written f, g, h; the smooth ones s, u mean the same for a shift, because a symmetry of all smooth functions
// is one of all functions.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { Rational } from '../exact/rational.ts';
import type { Field, Lattice } from '../model/geometry.ts';
import { printCoefficient } from '../notation/print.ts';
import { NotationError } from '../notation/source.ts';
import { rationalValue, type Tree } from '../notation/tree.ts';
import type { CoordinatePolynomial, ShiftFamily } from './family.ts';

const FREE_NAMES = ['f', 'g', 'h', 's', 'u'];

/** What one term of a profile is made of. */
interface Term {
  readonly polynomial: LaurentPolynomial;
  readonly phase: readonly Rational[];
  /** The free function with its arguments, if there is one. */
  readonly free: { readonly name: string; readonly rows: readonly (readonly number[])[] } | undefined;
}

/** Reads a profile as a sum of shift families of one field. Terms with the same sign factor and the same function (or none)
 *  are one family with a common prefactor, so `x^2 - y^2` is one shift and `f(x) + g(y)` are two.
 *  A multiple of pi on an angle field is a discrete shift: `pi` is a shift by π, `pi f(x)` one by π times an integer f.
 *  Throws NotationError with the offset of what cannot be a shift. */
export function readShiftProfile(
  tree: Tree,
  lattice: Lattice,
  fields: readonly Field[],
  field: string,
): ShiftFamily[] {
  const index = fields.findIndex((f) => f.name === field);
  if (index < 0)
    throw new NotationError(
      `"${field}" is not a field`,
      `name one of ${fields.map((f) => f.name).join(', ')}`,
      0,
    );
  const reader = new ProfileReader(lattice);
  const merged = new Map<string, Term>();
  for (const term of reader.terms(tree)) {
    const key = JSON.stringify([term.phase.map(String), term.free?.name, term.free?.rows]);
    const old = merged.get(key);
    merged.set(key, old ? { ...old, polynomial: old.polynomial.add(term.polynomial) } : term);
  }
  return [...merged.values()].map((term) => {
    const { weights, discrete } = discreteShift(term.polynomial, fields[index]!);
    const family = {
      prefactor: fields.map((_, j): CoordinatePolynomial => (j === index ? weights.terms : [])),
      fields: fields.map((f) => f.name),
      phase: term.phase,
      free: term.free?.rows ?? [],
      discrete,
      profile: '',
    };
    return { ...family, profile: profileText(family, lattice, term.free?.name) };
  });
}

/** Splits 2π/N off the prefactor of an angle when every weight is a rational multiple of pi. */
function discreteShift(
  p: LaurentPolynomial,
  field: Field,
): { weights: LaurentPolynomial; discrete: number | undefined } {
  const whole = { weights: p, discrete: undefined };
  if (field.values.kind !== 'angle' || p.isZero) return whole;
  const twoPi = Coefficient.symbol('pi').scale(Rational.of(2));
  const turns = p.scale(Coefficient.one.div(twoPi));
  const values = turns.terms.map((t) => t.weight.asRational);
  if (!values.every((v) => v !== undefined)) return whole;
  const order = values.reduce((n, v) => lcm(n, v.den), 1n);
  return { weights: turns.scale(Coefficient.integer(order)), discrete: Number(order) };
}

function lcm(x: bigint, y: bigint): bigint {
  let [a, b] = [x, y];
  while (b !== 0n) [a, b] = [b, a % b];
  return (x / a) * y;
}

class ProfileReader {
  private readonly dimension: number;

  constructor(private readonly lattice: Lattice) {
    this.dimension = lattice.axes.length;
  }

  private constant(value: Rational): Term {
    return {
      polynomial: LaurentPolynomial.constant(this.dimension, Coefficient.rational(value)),
      phase: this.lattice.axes.map(() => Rational.zero),
      free: undefined,
    };
  }

  private refuse(problem: string, mend: string, tree: Tree): never {
    throw new NotationError(problem, mend, tree.span.start);
  }

  terms(tree: Tree): Term[] {
    switch (tree.kind) {
      case 'sum':
        return tree.terms.flatMap((t) => this.terms(t));
      case 'negate':
        return this.terms(tree.operand).map((t) => this.product(t, this.constant(Rational.minusOne), tree));
      case 'product':
        return tree.factors
          .map((f) => this.terms(f))
          .reduce((xs, ys) => xs.flatMap((x) => ys.map((y) => this.product(x, y, tree))));
      case 'quotient': {
        const [divisor, ...more] = this.terms(tree.denominator);
        const value = divisor && more.length === 0 ? this.constantValue(divisor) : undefined;
        if (!value?.asMonomial)
          return this.refuse('the denominator is not a number', 'write a number there', tree.denominator);
        const inverse = LaurentPolynomial.constant(this.dimension, Coefficient.one.div(value));
        return this.terms(tree.numerator).map((t) => ({ ...t, polynomial: t.polynomial.mul(inverse) }));
      }
      case 'power':
        return this.power(tree);
      case 'call':
        return [this.call(tree)];
      case 'number':
        return [this.constant(tree.value)];
      case 'symbol': {
        if (tree.name === 'pi')
          return [
            {
              ...this.constant(Rational.one),
              polynomial: LaurentPolynomial.constant(this.dimension, Coefficient.symbol('pi')),
            },
          ];
        const axis = this.lattice.axes.findIndex((a) => a.name === tree.name);
        if (axis < 0)
          return this.refuse(
            `"${tree.name}" is not a coordinate`,
            `use ${this.coordinates}, numbers, pi and the functions f, g, h`,
            tree,
          );
        return [
          { ...this.constant(Rational.one), polynomial: LaurentPolynomial.variable(this.dimension, axis) },
        ];
      }
      default:
        return this.refuse(
          'an operator cannot stand in a shift',
          'write a function of the coordinates',
          tree,
        );
    }
  }

  private get coordinates(): string {
    return this.lattice.axes.map((a) => a.name).join(', ');
  }

  private constantValue(term: Term): Coefficient | undefined {
    const [t, ...more] = term.polynomial.terms;
    const isConstant = t && more.length === 0 && t.exponents.every((e) => e === 0);
    return isConstant && !term.free && term.phase.every((x) => x.isZero) ? t.weight : undefined;
  }

  private product(x: Term, y: Term, tree: Tree): Term {
    if (x.free && y.free)
      return this.refuse(
        'a product of two free functions',
        'write one function of all its arguments, e.g. f(x, y)',
        tree,
      );
    const isComplex = (t: Term): boolean => t.phase.some((p) => !p.mul(Rational.of(2)).isInteger);
    if (isComplex(x) && isComplex(y))
      return this.refuse('a product of two waves', 'write the sum of the arguments in one cos(…)', tree);
    return {
      polynomial: x.polynomial.mul(y.polynomial),
      phase: x.phase.map((p, k) => fraction(p.add(y.phase[k]!))),
      free: x.free ?? y.free,
    };
  }

  private power(tree: Extract<Tree, { kind: 'power' }>): Term[] {
    if (rationalValue(tree.base)?.equals(Rational.minusOne)) {
      const linear = this.linear(tree.exponent);
      const half = Rational.of(1, 2);
      const sign =
        linear.constant.isInteger && linear.constant.num % 2n !== 0n ? Rational.minusOne : Rational.one;
      if (!linear.constant.isInteger || !linear.weights.every((w) => w.isInteger))
        return this.refuse(
          'the exponent of -1 is not an integer',
          'write (-1)^x, (-1)^(x+y) or an integer',
          tree.exponent,
        );
      return [{ ...this.constant(sign), phase: linear.weights.map((w) => fraction(w.mul(half))) }];
    }
    const exponent = rationalValue(tree.exponent);
    if (!exponent?.isInteger || exponent.sign < 0 || exponent.num > 12n)
      return this.refuse('the exponent is not a small natural number', 'write x^2, x^3, …', tree.exponent);
    let out: Term[] = [this.constant(Rational.one)];
    for (let k = 0n; k < exponent.num; k++)
      out = out.flatMap((x) => this.terms(tree.base).map((y) => this.product(x, y, tree)));
    return out;
  }

  private call(tree: Extract<Tree, { kind: 'call' }>): Term {
    if (FREE_NAMES.includes(tree.name)) {
      const rows = tree.args.map((argument) => {
        const { weights, constant } = this.linear(argument);
        if (!constant.isZero || !weights.every((w) => w.isInteger) || weights.every((w) => w.isZero))
          return this.refuse(
            'the argument of a free function is not an integer combination of coordinates',
            'write f(x), f(x, y), f(x+y), f(x-2*y) …',
            argument,
          );
        return weights.map((w) => Number(w.num));
      });
      return { ...this.constant(Rational.one), free: { name: tree.name, rows } };
    }
    if ((tree.name === 'cos' || tree.name === 'sin') && tree.args.length === 1) {
      const { weights, constant } = this.linear(tree.args[0]!, true);
      if (!constant.isZero)
        return this.refuse(
          'a wave with a phase',
          'leave the constant out: the shift holds for every phase',
          tree.args[0]!,
        );
      return { ...this.constant(Rational.one), phase: weights.map((w) => fraction(w.div(Rational.of(2)))) };
    }
    return this.refuse(
      `${tree.name}(…) is not a shift`,
      'use free functions f, g, h, staggered signs (-1)^x, waves cos(2*pi*x/3) and polynomials',
      tree,
    );
  }

  /** A linear function of the coordinates; `inPi`: weights as multiples of pi. */
  private linear(tree: Tree, inPi = false): { weights: Rational[]; constant: Rational } {
    const scale = inPi ? Coefficient.symbol('pi', Rational.minusOne) : Coefficient.one;
    const sum = this.terms(tree).reduce((total, term) => {
      if (term.free || term.phase.some((p) => !p.isZero))
        return this.refuse(
          'this is not a linear function of the coordinates',
          `combine ${this.coordinates}`,
          tree,
        );
      return total.add(term.polynomial.scale(scale));
    }, LaurentPolynomial.zero(this.dimension));
    const weights = this.lattice.axes.map(() => Rational.zero);
    let constant = Rational.zero;
    for (const { exponents, weight } of sum.terms) {
      const degree = exponents.reduce((s, e) => s + e, 0);
      const value = weight.asRational;
      if (!value || degree > 1)
        return this.refuse(
          `this is not a linear function of the coordinates${inPi ? ' with multiples of pi' : ''}`,
          inPi ? 'write e.g. cos(2*pi*x/3)' : `combine ${this.coordinates} with numbers`,
          tree,
        );
      if (degree === 0) constant = value;
      else weights[exponents.indexOf(1)] = value;
    }
    return { weights, constant };
  }
}

/** The part of a number in [0, 1). */
const fraction = (x: Rational): Rational => x.sub(Rational.of(x.floor()));

/** A family in the notation that `readShiftProfile` reads; with several shifted fields, `name: profile` for each.
 *  `name` is the letter of the free function. */
export function profileText(family: ShiftFamily, lattice: Lattice, name = 'f'): string {
  const shifted = family.prefactor.flatMap((p, j) => (p.length === 0 ? [] : [j]));
  if (shifted.length === 0) return '0';
  const factors = [phaseText(family.phase, lattice), functionText(family.free, lattice, name)].filter(
    (t) => t !== '',
  );
  const texts = shifted.map((j) => {
    const text = amplitudeText(family.prefactor[j]!, family.discrete, lattice, factors);
    return family.prefactor.length === 1 ? text : `${family.fields?.[j] ?? `field ${j + 1}`}: ${text}`;
  });
  return texts.join('; ');
}

function amplitudeText(
  p: CoordinatePolynomial,
  discrete: number | undefined,
  lattice: Lattice,
  factors: readonly string[],
): string {
  const unit =
    discrete === undefined ? Coefficient.one : Coefficient.symbol('pi').scale(Rational.of(2, discrete));
  const terms = [...p].sort(
    (x, y) => degree(y.exponents) - degree(x.exponents) || compareLate(y.exponents, x.exponents),
  );
  const texts = terms.map(({ exponents, weight }) => {
    const coordinates = exponents.flatMap((e, k) =>
      e === 0 ? [] : [e === 1 ? lattice.axes[k]!.name : `${lattice.axes[k]!.name}^${e}`],
    );
    const scaled = weight.mul(unit);
    const isBare = coordinates.length === 0 && (factors.length === 0 || terms.length > 1);
    if (scaled.isOne && !isBare) return coordinates.join(' ');
    if (scaled.neg().isOne && !isBare) return `-${coordinates.join(' ')}`;
    const number = printCoefficient(scaled);
    const head = scaled.terms.length > 1 && coordinates.length > 0 ? `(${number})` : number;
    return coordinates.length === 0 ? head : `${head}*${coordinates.join('*')}`;
  });
  const sum = texts.reduce(
    (x, t) => (x === '' ? t : t.startsWith('-') ? `${x} - ${t.slice(1)}` : `${x} + ${t}`),
    '',
  );
  if (factors.length === 0) return sum;
  if (sum === '' || sum === '-') return `${sum}${factors.join(' ')}`;
  const isSum = terms.length > 1 || terms[0]!.weight.terms.length > 1;
  const isWritten = discrete !== undefined || /[*/]/.test(sum);
  return `${isSum ? `(${sum})` : sum}${isSum || !isWritten ? ' ' : '*'}${factors.join(isWritten && !isSum ? '*' : ' ')}`;
}

const degree = (e: readonly number[]): number => e.reduce((s, n) => s + n, 0);

const compareLate = (x: readonly number[], y: readonly number[]): number => {
  const at = x.findIndex((e, k) => e !== y[k]);
  return at < 0 ? 0 : x[at]! - y[at]!;
};

/** x + y - 2*z. */
function linearText(weights: readonly Rational[], lattice: Lattice): string {
  return weights.reduce((text, w, k) => {
    if (w.isZero) return text;
    const size = w.abs();
    const name = lattice.axes[k]!.name;
    const part = size.isOne
      ? name
      : `${size.num === 1n ? '' : `${size.num}*`}${name}${size.isInteger ? '' : `/${size.den}`}`;
    if (text === '') return w.sign < 0 ? `-${part}` : part;
    return `${text} ${w.sign < 0 ? '-' : '+'} ${part}`;
  }, '');
}

function phaseText(phase: readonly Rational[], lattice: Lattice): string {
  if (phase.every((x) => x.isZero)) return '';
  const doubled = phase.map((x) => x.mul(Rational.of(2)));
  if (doubled.every((x) => x.isInteger)) {
    const text = linearText(doubled, lattice).replaceAll(' ', '');
    return text.includes('+') ? `(-1)^(${text})` : `(-1)^${text}`;
  }
  const half = Rational.of(1, 2);
  const short = phase.map((x) => (x.compare(half) > 0 ? x.sub(Rational.one) : x));
  const order = short.reduce((n, x) => lcm(n, x.den), 1n);
  const whole = short.map((x) => x.mul(Rational.of(order)));
  const text = linearText(whole, lattice);
  const isSingle = whole.filter((x) => !x.isZero).length === 1;
  const turn = order % 2n === 0n ? 'pi' : '2*pi';
  const divisor = order % 2n === 0n ? order / 2n : order;
  return `cos(${turn}*${isSingle && !text.startsWith('-') ? text : `(${text})`}/${divisor})`;
}

function functionText(rows: readonly (readonly number[])[], lattice: Lattice, name: string): string {
  if (rows.length === 0) return '';
  const args = rows.map((row) =>
    linearText(
      row.map((e) => Rational.of(e)),
      lattice,
    ),
  );
  return `${name}(${args.map((a) => a.replaceAll(' ', '')).join(', ')})`;
}
