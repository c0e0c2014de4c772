// A configuration family: a sum of products of functions of integer functionals of the coordinates. Free functions may jump
// at every site, a step and a single site are localised, smooth functions vary on the scale ℓ, coordinates are smooth with
// derivatives that end, (-1)^x alternates.

import { Rational, rational } from '../exact/rational.ts';
import type { Lattice } from '../model/geometry.ts';
import { NotationError } from '../notation/source.ts';
import { rationalValue, type Tree } from '../notation/tree.ts';

/** Integer coefficients of the coordinates, one per axis. */
export type Functional = readonly number[];

export type ProfileFactor =
  /** A generic function of one or several functionals. */
  | { readonly kind: 'free'; readonly name: string; readonly arguments: readonly Functional[] }
  | { readonly kind: 'smooth'; readonly name: string; readonly arguments: readonly Functional[] }
  | { readonly kind: 'step' | 'site'; readonly functional: Functional }
  | { readonly kind: 'coordinate'; readonly axis: number; readonly power: number }
  /** (-1)^(parity · r). */
  | { readonly kind: 'staggered'; readonly parity: Functional };

export interface ProfileTerm {
  readonly weight: Rational;
  readonly factors: readonly ProfileFactor[];
}

/** Σ_i weight_i Π factors; amplitudes of steps and sites are generic heights. */
export interface FamilyProfile {
  readonly text: string;
  /** The field that takes these values; all others are at their vacuum. */
  readonly field: string;
  readonly terms: readonly ProfileTerm[];
}

const FREE = ['f', 'g', 'h'];
const SMOOTH = ['s', 'u'];

/** Reads a profile. Throws NotationError. */
export function readFamilyProfile(text: string, tree: Tree, lattice: Lattice, field: string): FamilyProfile {
  return { text, field, terms: readTerms(tree, lattice) };
}

const mend =
  'write sums of products of f(x), theta(x), delta_site(x), s(x), (-1)^x and powers of coordinates';

function refuse(tree: Tree, problem: string): never {
  throw new NotationError(problem, mend, tree.span.start);
}

function readTerms(tree: Tree, lattice: Lattice): ProfileTerm[] {
  switch (tree.kind) {
    case 'sum':
      return tree.terms.flatMap((t) => readTerms(t, lattice));
    case 'negate':
      return readTerms(tree.operand, lattice).map((t) => ({ ...t, weight: t.weight.neg() }));
    case 'product':
      return tree.factors.map((f) => readTerms(f, lattice)).reduce(multiply);
    case 'quotient': {
      const divisor = rationalValue(tree.denominator);
      if (!divisor || divisor.isZero)
        return refuse(tree.denominator, 'a profile is divided by something that is no number');
      return readTerms(tree.numerator, lattice).map((t) => ({ ...t, weight: t.weight.div(divisor) }));
    }
    case 'number':
      return [{ weight: tree.value, factors: [] }];
    case 'power':
      return readPower(tree, lattice);
    default:
      return [{ weight: Rational.one, factors: [readFactor(tree, lattice)] }];
  }
}

function multiply(xs: readonly ProfileTerm[], ys: readonly ProfileTerm[]): ProfileTerm[] {
  return xs.flatMap((x) =>
    ys.map((y) => ({ weight: x.weight.mul(y.weight), factors: [...x.factors, ...y.factors] })),
  );
}

function readPower(tree: Extract<Tree, { kind: 'power' }>, lattice: Lattice): ProfileTerm[] {
  const base = rationalValue(tree.base);
  if (base?.equals(Rational.minusOne)) {
    const parity = readFunctional(tree.exponent, lattice).map((n) => ((n % 2) + 2) % 2);
    return [{ weight: Rational.one, factors: [{ kind: 'staggered', parity }] }];
  }
  const exponent = rationalValue(tree.exponent);
  if (!exponent?.isInteger || exponent.sign < 0 || exponent.compare(rational(12)) > 0)
    return refuse(tree.exponent, 'an exponent in a profile is a whole number up to 12');
  const power = Number(exponent.num);
  if (tree.base.kind === 'symbol')
    return [{ weight: Rational.one, factors: [coordinate(tree.base, power, lattice)] }];
  const factor = readTerms(tree.base, lattice);
  return Array.from({ length: power }, () => factor).reduce(multiply, [
    { weight: Rational.one, factors: [] },
  ]);
}

function coordinate(tree: Extract<Tree, { kind: 'symbol' }>, power: number, lattice: Lattice): ProfileFactor {
  const axis = lattice.axes.findIndex((x) => x.name === tree.name);
  if (axis < 0) return refuse(tree, `"${tree.name}" is no coordinate`);
  return { kind: 'coordinate', axis, power };
}

function readFactor(tree: Tree, lattice: Lattice): ProfileFactor {
  if (tree.kind === 'symbol') return coordinate(tree, 1, lattice);
  if (tree.kind !== 'call' || tree.args.length === 0) return refuse(tree, 'this is no profile');
  const functionals = tree.args.map((a) => readFunctional(a, lattice));
  if (FREE.includes(tree.name)) return { kind: 'free', name: tree.name, arguments: functionals };
  if (SMOOTH.includes(tree.name)) return { kind: 'smooth', name: tree.name, arguments: functionals };
  const kind = tree.name === 'theta' ? 'step' : tree.name === 'delta_site' ? 'site' : undefined;
  if (!kind || functionals.length !== 1)
    return refuse(tree, `"${tree.name}" with ${functionals.length} arguments is no profile`);
  return { kind, functional: functionals[0]! };
}

/** An integer combination of coordinates such as x + y or 2*x - y. */
function readFunctional(tree: Tree, lattice: Lattice): number[] {
  const out = lattice.axes.map(() => 0);
  const add = (t: Tree, sign: number): void => {
    if (t.kind === 'sum') for (const part of t.terms) add(part, sign);
    else if (t.kind === 'negate') add(t.operand, -sign);
    else if (t.kind === 'symbol') {
      const axis = lattice.axes.findIndex((x) => x.name === t.name);
      if (axis < 0) refuse(t, `"${t.name}" is no coordinate`);
      out[axis]! += sign;
    } else if (t.kind === 'product' && t.factors.length === 2) {
      const n = rationalValue(t.factors[0]!);
      if (!n?.isInteger) refuse(t, 'an argument is a combination of coordinates with whole numbers');
      add(t.factors[1]!, sign * Number(n!.num));
    } else refuse(t, 'an argument is a combination of coordinates with whole numbers');
  };
  add(tree, 1);
  return out;
}

/** The functionals on which a factor depends. */
export function functionalsOf(factor: ProfileFactor, dimension: number): Functional[] {
  switch (factor.kind) {
    case 'free':
    case 'smooth':
      return [...factor.arguments];
    case 'step':
    case 'site':
      return [factor.functional];
    case 'coordinate':
      return [Array.from({ length: dimension }, (_, k) => (k === factor.axis ? 1 : 0))];
    case 'staggered':
      return [factor.parity];
  }
}
