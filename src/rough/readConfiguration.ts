// Configuration families in the notation of claims: sums of products of f, g, h (free), s, u (smooth), theta (step),
// delta_site (one site), staggered signs and coordinates, with oblique arguments such as f(x+y).

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { gcd, Rational } from '../exact/rational.ts';
import type { Field, Lattice } from '../model/geometry.ts';
import { NotationError } from '../notation/source.ts';
import { rationalValue, type Tree } from '../notation/tree.ts';
import type { ShiftFamily } from '../symmetry/family.ts';
import type { Profile, ProfileFactor, ProfileTerm } from './profile.ts';
import { absorbPhase } from './staggered.ts';

const FREE_NAMES = ['f', 'g', 'h'];
const SMOOTH_NAMES = ['s', 'u'];
const HIGHEST_COORDINATE_POWER = 12n;

/** What one term is made of before heights are given out. */
interface Part {
  readonly polynomial: LaurentPolynomial;
  readonly phase: readonly Rational[];
  readonly factors: readonly ProfileFactor[];
}

/** Reads a family for one field. Terms that differ in their polynomial alone share one height or function, so `x^2 - y^2`
 *  is one profile; all other terms get independent heights. A multiple of pi is a height of its own: `2*pi theta(x)` jumps
 *  by exactly 2π, and in `2*pi f(x)` the free function is an integer. Throws NotationError with the offset of what is no profile. */
export function readConfiguration(
  tree: Tree,
  lattice: Lattice,
  fields: readonly Field[],
  field: string,
  text: string,
): Profile {
  const index = fields.findIndex((f) => f.name === field);
  if (index < 0)
    throw new NotationError(
      `"${field}" is not a field`,
      `name one of ${fields.map((f) => f.name).join(', ')}`,
      0,
    );
  const merged = new Map<string, Part>();
  for (const part of new ConfigurationReader(lattice).parts(tree)) {
    const key = JSON.stringify([part.phase.map(String), part.factors]);
    const old = merged.get(key);
    merged.set(key, old ? { ...old, polynomial: old.polynomial.add(part.polynomial) } : part);
  }
  const terms = [...merged.values()].filter((p) => !p.polynomial.isZero);
  return { text, terms: terms.map((part, i) => withHeight(part, index, `${i + 1}`)) };
}

/** The family of a shift symmetry as a configuration. Its letters are independent functions, one per family. */
export function shiftConfiguration(family: ShiftFamily): Profile {
  const parts = family.prefactor.flatMap((prefactor, field) => {
    if (prefactor.length === 0) return [];
    const dimension = family.phase.length;
    const factors: ProfileFactor[] =
      family.free.length === 0 ? [] : [{ kind: 'free', name: 'f', rows: family.free }];
    const polynomial = LaurentPolynomial.of(dimension, prefactor);
    return [withHeight({ polynomial, phase: family.phase, factors }, field, '1')];
  });
  return { text: family.profile, terms: parts };
}

function withHeight(part: Part, field: number, name: string): ProfileTerm {
  const isFixed = part.polynomial.terms.some((t) => t.weight.generators.has('pi'));
  const { phase, factors: absorbed } = absorbPhase(part.phase, part.factors);
  const factors = isFixed
    ? absorbed.map((f) => (f.kind === 'free' ? { ...f, isInteger: true } : f))
    : absorbed;
  const isGeneric = factors.some((f) => f.kind === 'free' || f.kind === 'smooth');
  return {
    field,
    height: isGeneric || isFixed ? undefined : name,
    polynomial: part.polynomial.terms,
    phase,
    factors,
  };
}

class ConfigurationReader {
  private readonly dimension: number;

  constructor(private readonly lattice: Lattice) {
    this.dimension = lattice.axes.length;
  }

  private refuse(problem: string, mend: string, tree: Tree): never {
    throw new NotationError(problem, mend, tree.span.start);
  }

  private of(polynomial: LaurentPolynomial, factors: readonly ProfileFactor[] = []): Part {
    return { polynomial, phase: this.lattice.axes.map(() => Rational.zero), factors };
  }

  private constant(value: Coefficient): Part {
    return this.of(LaurentPolynomial.constant(this.dimension, value));
  }

  parts(tree: Tree): Part[] {
    switch (tree.kind) {
      case 'sum':
        return tree.terms.flatMap((t) => this.parts(t));
      case 'negate':
        return this.parts(tree.operand).map((p) => ({ ...p, polynomial: p.polynomial.neg() }));
      case 'product':
        return tree.factors
          .map((f) => this.parts(f))
          .reduce((xs, ys) => xs.flatMap((x) => ys.map((y) => product(x, y))));
      case 'quotient': {
        const divisor = this.number(tree.denominator);
        const inverse = Coefficient.one.div(divisor);
        return this.parts(tree.numerator).map((p) => ({ ...p, polynomial: p.polynomial.scale(inverse) }));
      }
      case 'power':
        return this.power(tree);
      case 'call':
        return [this.call(tree)];
      case 'number':
        return [this.constant(Coefficient.rational(tree.value))];
      case 'symbol':
        return [this.symbol(tree)];
      default:
        return this.refuse(
          'an operator cannot stand in a configuration',
          'write functions of the coordinates',
          tree,
        );
    }
  }

  private symbol(tree: Extract<Tree, { kind: 'symbol' }>): Part {
    if (tree.name === 'pi') return this.constant(Coefficient.symbol('pi'));
    const axis = this.lattice.axes.findIndex((a) => a.name === tree.name);
    if (axis < 0)
      return this.refuse(
        `"${tree.name}" is not a coordinate`,
        `use ${this.coordinates}, numbers and the functions f, g, h, s, u, theta, delta_site`,
        tree,
      );
    return this.of(LaurentPolynomial.variable(this.dimension, axis));
  }

  private get coordinates(): string {
    return this.lattice.axes.map((a) => a.name).join(', ');
  }

  /** A non-zero number without coordinates. */
  private number(tree: Tree): Coefficient {
    const [part, ...more] = this.parts(tree);
    const [term, ...others] = part?.polynomial.terms ?? [];
    const isNumber = part && more.length + others.length + part.factors.length === 0;
    const value = isNumber && term?.exponents.every((e) => e === 0) ? term.weight : undefined;
    if (!value?.asMonomial || part!.phase.some((p) => !p.isZero))
      return this.refuse('the denominator is not a number', 'write a number there', tree);
    return value;
  }

  private power(tree: Extract<Tree, { kind: 'power' }>): Part[] {
    if (rationalValue(tree.base)?.equals(Rational.minusOne)) return [this.staggered(tree.exponent)];
    const exponent = rationalValue(tree.exponent);
    if (!exponent?.isInteger || exponent.sign < 0 || exponent.num > HIGHEST_COORDINATE_POWER)
      return this.refuse('the exponent is not a small natural number', 'write x^2, x^3, …', tree.exponent);
    let out: Part[] = [this.constant(Coefficient.one)];
    for (let k = 0n; k < exponent.num; k++)
      out = out.flatMap((x) => this.parts(tree.base).map((y) => product(x, y)));
    return out;
  }

  private staggered(exponent: Tree): Part {
    const { weights, constant } = this.linear(exponent);
    const one = this.constant(Coefficient.integer(constant % 2 === 0 ? 1 : -1));
    const half = Rational.of(1, 2);
    return { ...one, phase: weights.map((w) => (w % 2 === 0 ? Rational.zero : half)) };
  }

  private call(tree: Extract<Tree, { kind: 'call' }>): Part {
    const one = LaurentPolynomial.constant(this.dimension, Coefficient.one);
    const kind = FREE_NAMES.includes(tree.name)
      ? 'free'
      : SMOOTH_NAMES.includes(tree.name)
        ? 'smooth'
        : undefined;
    if (kind) {
      const rows = tree.args.map((argument) => this.argument(argument));
      return this.of(one, [{ kind, name: tree.name, rows }]);
    }
    if (tree.name !== 'theta' && tree.name !== 'delta_site')
      return this.refuse(
        `${tree.name}(…) is not a profile`,
        'use f, g, h (free), s, u (smooth), theta (step), delta_site (one site), (-1)^x and coordinates',
        tree,
      );
    const [argument, ...more] = tree.args;
    if (!argument || more.length > 0)
      return this.refuse(
        `${tree.name} takes one argument`,
        `write a product such as ${tree.name}(x) ${tree.name}(y)`,
        tree,
      );
    const row = this.argument(argument);
    const divisor = row.reduce((d, w) => Number(gcd(BigInt(d), BigInt(w))), 0);
    const primitive = row.map((w) => w / divisor);
    return this.of(one, [{ kind: tree.name === 'theta' ? 'step' : 'site', row: primitive }]);
  }

  /** A function argument: an integer combination of coordinates of space alone or of time alone, or of both for a smooth
   *  function. */
  private argument(tree: Tree): number[] {
    const { weights, constant } = this.linear(tree);
    if (constant !== 0 || weights.every((w) => w === 0))
      return this.refuse(
        'the argument is not an integer combination of coordinates',
        'write f(x), f(x, y), f(x+y), theta(x-y) …',
        tree,
      );
    return weights;
  }

  private linear(tree: Tree): { weights: number[]; constant: number } {
    const weights = this.lattice.axes.map(() => 0);
    let constant = 0;
    for (const part of this.parts(tree))
      for (const { exponents, weight } of part.polynomial.terms) {
        const degree = exponents.reduce((s, e) => s + e, 0);
        const value = weight.asRational;
        const isPlain = part.factors.length === 0 && part.phase.every((p) => p.isZero);
        if (!isPlain || degree > 1 || !value?.isInteger)
          return this.refuse(
            'this is not an integer combination of coordinates',
            `combine ${this.coordinates} with integers`,
            tree,
          );
        if (degree === 0) constant += Number(value.num);
        else weights[exponents.indexOf(1)]! += Number(value.num);
      }
    return { weights, constant };
  }
}

function product(x: Part, y: Part): Part {
  const known = new Set(x.factors.map((f) => JSON.stringify(f)));
  // a step and a single site are their own squares
  const fresh = y.factors.filter(
    (f) => f.kind === 'free' || f.kind === 'smooth' || !known.has(JSON.stringify(f)),
  );
  const factors = [...x.factors, ...fresh].sort((f, g) => (JSON.stringify(f) < JSON.stringify(g) ? -1 : 1));
  return {
    polynomial: x.polynomial.mul(y.polynomial),
    phase: x.phase.map((p, k) => {
      const sum = p.add(y.phase[k]!);
      return sum.sub(Rational.of(sum.floor()));
    }),
    factors,
  };
}
