// Canonical form of a lattice action modulo translations. The action is expanded into products of site fields and functions
// of linear forms; every product is moved so that its least offset is the origin. Products of cosines and sines are written
// as sums (cos u cos v = ½ cos(u+v) + ½ cos(u−v)), constant phases are taken out by the addition theorems, exponentials are
// merged, and cos, sin are given a sign convention, so that trigonometric and exponential polynomials of linear forms are
// equal as sums over the lattice iff their canonical forms are. Other functions are atoms named by their canonical argument,
// up to its sign where the function has a parity.

import { Coefficient } from '../exact/coefficient.ts';
import { compareExponents } from '../exact/laurentPolynomial.ts';
import { rational } from '../exact/rational.ts';
import { LimitError } from '../notation/source.ts';
import type { FunctionName } from '../notation/tree.ts';
import type { Expression } from './action.ts';
import { valueAtConstant } from './constants.ts';
import {
  addForms,
  negated,
  type Offset,
  type SiteForm,
  siteForm,
  sortForm,
  startsNegative,
} from './siteForm.ts';
import { specialAngle } from './specialAngle.ts';

type Atom =
  | { readonly kind: 'site'; readonly field: string; readonly offset: Offset }
  | { readonly kind: 'cos' | 'sin' | 'exp'; readonly form: SiteForm }
  | { readonly kind: 'opaque'; readonly name: FunctionName; readonly argument: readonly Product[] }
  | { readonly kind: 'inverse'; readonly base: readonly Product[]; readonly exponent: number };

/** coefficient × Π atoms, at a definite place of the lattice. At most one cos or sin and at most one exp. */
interface Product {
  readonly coefficient: Coefficient;
  readonly atoms: readonly Atom[];
}

/** An action as a sum over the lattice, without its field-independent constant: one product and coefficient for each key. */
export interface CanonicalAction {
  readonly products: readonly Product[];
  readonly coefficients: ReadonlyMap<string, Coefficient>;
}

/** How a lattice map acts: on offsets by a signed permutation matrix, on fields by image and sign; different fields have
 *  different images. Fields stand on the sites. */
export interface LatticeMap {
  readonly matrix: readonly (readonly number[])[];
  readonly fields: ReadonlyMap<string, { readonly name: string; readonly sign: 1 | -1 }>;
}

/** More products than this is a stated limit. */
const MOST_PRODUCTS = 50_000;

const ODD: ReadonlySet<string> = new Set(['sin', 'tan', 'sinh']);
const EVEN: ReadonlySet<string> = new Set(['cos', 'cosh']);

/** Throws LimitError when the expansion is too large. */
export function canonicalAction(expression: Expression): CanonicalAction {
  const products = collect(expand(expression), (atoms) => leastOffset(atoms)).filter(
    (p) => p.atoms.length > 0,
  );
  return { products, coefficients: new Map(products.map((p) => [canonicalKey(p.atoms), p.coefficient])) };
}

/** Equality as sums over the lattice, up to a field-independent constant. */
export function isSameAction(x: CanonicalAction, y: CanonicalAction): boolean {
  return (
    x.coefficients.size === y.coefficients.size &&
    [...x.coefficients].every(([key, c]) => y.coefficients.get(key)?.equals(c) ?? false)
  );
}

/** True when the map takes the action to itself as a sum over the lattice. A map takes different canonical products to
 *  different ones, so it is enough that every image is there with the coefficient of its original. */
export function isInvariant(action: CanonicalAction, map: LatticeMap): boolean {
  return action.products.every((p) => {
    const image = mapProduct(p, map);
    return action.coefficients.get(canonicalKey(image.atoms))?.equals(image.coefficient) ?? false;
  });
}

/** Adds up equal products. Places count from `origin` of a product; they stand as they are where it is undefined. */
function collect(
  products: readonly Product[],
  origin: (atoms: readonly Atom[]) => Offset | undefined = () => undefined,
): Product[] {
  if (products.length > MOST_PRODUCTS) refuseSize();
  const sums = new Map<string, Product>();
  for (const p of products) {
    const key = keyOf(p.atoms, origin(p.atoms));
    const coefficient = sums.get(key)?.coefficient.add(p.coefficient) ?? p.coefficient;
    if (coefficient.isZero) sums.delete(key);
    else sums.set(key, { coefficient, atoms: p.atoms });
  }
  return [...sums.values()];
}

function refuseSize(): never {
  throw new LimitError(
    `the action has more than ${MOST_PRODUCTS} products of site fields; the point group is not worked out for it`,
  );
}

const constantProduct = (coefficient: Coefficient): Product[] =>
  coefficient.isZero ? [] : [{ coefficient, atoms: [] }];

const scaled = (products: readonly Product[], by: Coefficient): Product[] =>
  by.isZero ? [] : products.map((p) => ({ ...p, coefficient: p.coefficient.mul(by) }));

function expand(e: Expression): Product[] {
  switch (e.kind) {
    case 'constant':
      return constantProduct(e.value);
    case 'linear':
      return siteForm(e.form).map(({ field, offset, weight }) => ({
        coefficient: weight,
        atoms: [{ kind: 'site', field, offset }],
      }));
    case 'sum':
      return e.terms.flatMap(expand);
    case 'product':
      return e.factors.map(expand).reduce(multiply);
    case 'power': {
      const base = collect(expand(e.base));
      if (e.exponent >= 0)
        return Array.from({ length: e.exponent }, () => base).reduce(
          multiply,
          constantProduct(Coefficient.one),
        );
      return [{ coefficient: Coefficient.one, atoms: [{ kind: 'inverse', base, exponent: e.exponent }] }];
    }
    case 'function':
      return expandFunction(e.name, e.argument);
  }
}

function expandFunction(name: FunctionName, argument: Expression): Product[] {
  if (name === 'cos' || name === 'sin') {
    const { constant, rest } = splitConstant(argument);
    const values = specialAngle(constant);
    if (values && !constant.isZero) {
      const [ofCos, ofSin] = name === 'cos' ? [values.cos, values.sin.neg()] : [values.sin, values.cos];
      return [...scaled(expandFunction('cos', rest), ofCos), ...scaled(expandFunction('sin', rest), ofSin)];
    }
  }
  if (argument.kind === 'linear') {
    const form = siteForm(argument.form);
    const half = Coefficient.rational(rational(1, 2));
    switch (name) {
      case 'cos':
      case 'sin':
        return trigonometric(name, form, Coefficient.one);
      case 'exp':
        return exponential(form, Coefficient.one);
      case 'cosh':
      case 'sinh': {
        const sign = name === 'cosh' ? half : half.neg();
        return [...exponential(form, half), ...exponential(negated(form), sign)];
      }
    }
  }
  return opaque(name, collect(expand(argument)));
}

/** A sum as its constant and the rest. */
function splitConstant(e: Expression): { constant: Coefficient; rest: Expression } {
  if (e.kind !== 'sum') return { constant: Coefficient.zero, rest: e };
  let constant = Coefficient.zero;
  const others = e.terms.filter((t) => {
    if (t.kind === 'constant') constant = constant.add(t.value);
    return t.kind !== 'constant';
  });
  return { constant, rest: others.length === 1 ? others[0]! : { kind: 'sum', terms: others } };
}

/** A function of collected products. Of an argument and its negative one is chosen where the function has a parity. */
function opaque(name: FunctionName, argument: readonly Product[]): Product[] {
  if (argument.every((p) => p.atoms.length === 0)) {
    const value = valueAtConstant(name, argument[0]?.coefficient ?? Coefficient.zero);
    if (value) return constantProduct(value);
  }
  const { atom, sign } = withParity(name, argument);
  return [{ coefficient: Coefficient.integer(sign), atoms: [atom] }];
}

function withParity(name: FunctionName, argument: readonly Product[]): { atom: Atom; sign: 1 | -1 } {
  if (!ODD.has(name) && !EVEN.has(name)) return { atom: { kind: 'opaque', name, argument }, sign: 1 };
  const negative = argument.map((p) => ({ ...p, coefficient: p.coefficient.neg() }));
  const origin = leastOffsetOf(argument);
  const isTurned = argumentKey(negative, origin) < argumentKey(argument, origin);
  return {
    atom: { kind: 'opaque', name, argument: isTurned ? negative : argument },
    sign: isTurned && ODD.has(name) ? -1 : 1,
  };
}

/** coefficient·cos(form) or ·sin(form) in the convention that the first weight is positive. */
function trigonometric(kind: 'cos' | 'sin', form: SiteForm, coefficient: Coefficient): Product[] {
  if (form.length === 0) return kind === 'cos' ? constantProduct(coefficient) : [];
  const { atom, sign } = wave(kind, form);
  return [{ coefficient: sign < 0 ? coefficient.neg() : coefficient, atoms: [atom] }];
}

function wave(kind: 'cos' | 'sin', form: SiteForm): { atom: Atom; sign: 1 | -1 } {
  const isNegative = startsNegative(form);
  return {
    atom: { kind, form: isNegative ? negated(form) : form },
    sign: isNegative && kind === 'sin' ? -1 : 1,
  };
}

function exponential(form: SiteForm, coefficient: Coefficient): Product[] {
  return [{ coefficient, atoms: form.length === 0 ? [] : [{ kind: 'exp', form }] }];
}

function multiply(xs: readonly Product[], ys: readonly Product[]): Product[] {
  if (xs.length * ys.length > MOST_PRODUCTS) refuseSize();
  return collect(xs.flatMap((x) => ys.flatMap((y) => multiplyProducts(x, y))));
}

type Wave = Extract<Atom, { form: SiteForm }> & { kind: 'cos' | 'sin' };
const isWave = (a: Atom): a is Wave => a.kind === 'cos' || a.kind === 'sin';

function multiplyProducts(x: Product, y: Product): Product[] {
  const coefficient = x.coefficient.mul(y.coefficient);
  const atoms = [...x.atoms, ...y.atoms];
  const exponent = atoms.flatMap((a) => (a.kind === 'exp' ? [a.form] : [])).reduce<SiteForm>(addForms, []);
  const others = atoms.filter((a) => !isWave(a) && a.kind !== 'exp');
  const plain: Atom[] = exponent.length > 0 ? [...others, { kind: 'exp', form: exponent }] : others;
  return linearise(atoms.filter(isWave), coefficient).map((p) => ({ ...p, atoms: [...p.atoms, ...plain] }));
}

/** Product-to-sum for at most two waves. */
function linearise(waves: readonly Wave[], coefficient: Coefficient): Product[] {
  const [u, v] = waves;
  if (!u) return [{ coefficient, atoms: [] }];
  if (!v) return [{ coefficient, atoms: [u] }];
  const half = coefficient.scale(rational(1, 2));
  const sum = addForms(u.form, v.form);
  if (u.kind === v.kind)
    return [
      ...trigonometric('cos', addForms(u.form, negated(v.form)), half),
      ...trigonometric('cos', sum, u.kind === 'cos' ? half : half.neg()),
    ];
  const [sine, cosine] = u.kind === 'sin' ? [u, v] : [v, u];
  return [
    ...trigonometric('sin', sum, half),
    ...trigonometric('sin', addForms(sine.form, negated(cosine.form)), half),
  ];
}

function mapProduct(p: Product, map: LatticeMap): Product {
  let isNegative = false;
  const atoms = p.atoms.map((a) => {
    const { atom, sign } = mapAtom(a, map);
    if (sign < 0) isNegative = !isNegative;
    return atom;
  });
  return { coefficient: isNegative ? p.coefficient.neg() : p.coefficient, atoms };
}

function mapAtom(atom: Atom, map: LatticeMap): { atom: Atom; sign: 1 | -1 } {
  switch (atom.kind) {
    case 'site': {
      const { name, sign } = map.fields.get(atom.field)!;
      return { atom: { kind: 'site', field: name, offset: mapOffset(atom.offset, map) }, sign };
    }
    case 'cos':
    case 'sin':
      return wave(atom.kind, mapForm(atom.form, map));
    case 'exp':
      return { atom: { kind: 'exp', form: mapForm(atom.form, map) }, sign: 1 };
    case 'opaque':
      return withParity(
        atom.name,
        atom.argument.map((p) => mapProduct(p, map)),
      );
    case 'inverse':
      return { atom: { ...atom, base: atom.base.map((p) => mapProduct(p, map)) }, sign: 1 };
  }
}

const mapOffset = (offset: Offset, { matrix }: LatticeMap): Offset =>
  matrix.map((row) => row.reduce((sum, m, k) => sum + m * offset[k]!, 0));

const mapForm = (form: SiteForm, map: LatticeMap): SiteForm =>
  sortForm(
    form.map(({ field, offset, weight }) => {
      const { name, sign } = map.fields.get(field)!;
      return { field: name, offset: mapOffset(offset, map), weight: sign === 1 ? weight : weight.neg() };
    }),
  );

/** Lexicographically least place that occurs; undefined for constants. */
function leastOffset(atoms: readonly Atom[]): Offset | undefined {
  return least(
    atoms.map((a) => {
      switch (a.kind) {
        case 'site':
          return a.offset;
        case 'opaque':
          return leastOffsetOf(a.argument);
        case 'inverse':
          return leastOffsetOf(a.base);
        default:
          return a.form[0]!.offset;
      }
    }),
  );
}

const leastOffsetOf = (products: readonly Product[]): Offset | undefined =>
  least(products.map((p) => leastOffset(p.atoms)));

const least = (offsets: readonly (Offset | undefined)[]): Offset | undefined =>
  offsets.reduce((x, y) => (x && (!y || compareExponents(x, y) <= 0) ? x : y), undefined);

const canonicalKey = (atoms: readonly Atom[]): string => keyOf(atoms, leastOffset(atoms));

/** Name of a product, with offsets counted from `origin` (or as they stand). */
function keyOf(atoms: readonly Atom[], origin: Offset | undefined): string {
  const place = (offset: Offset): string =>
    (origin ? offset.map((n, k) => n - origin[k]!) : offset).join(',');
  const atomKey = (a: Atom): string => {
    switch (a.kind) {
      case 'site':
        return `${a.field}@${place(a.offset)}`;
      case 'opaque':
        return `${a.name}[${argumentKey(a.argument, origin)}]`;
      case 'inverse':
        return `power ${a.exponent}[${argumentKey(a.base, origin)}]`;
      default:
        return `${a.kind}(${a.form.map((t) => `${coefficientKey(t.weight)}*${t.field}@${place(t.offset)}`).join(' + ')})`;
    }
  };
  return atoms.map(atomKey).sort().join(' ');
}

const argumentKey = (products: readonly Product[], origin: Offset | undefined): string =>
  products
    .map((p) => `${coefficientKey(p.coefficient)}*${keyOf(p.atoms, origin)}`)
    .sort()
    .join(' + ');

const coefficientKey = (c: Coefficient): string => c.terms.map((t) => `${t.factor}*${t.key}`).join('+');
