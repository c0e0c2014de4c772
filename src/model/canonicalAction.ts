// Canonical form of a lattice action modulo translations. The action is expanded into products of site fields and functions
// of linear forms; every product is moved so that its least offset is the origin. Products of cosines and sines are written
// as sums (cos u cos v = ½ cos(u+v) + ½ cos(u−v)), exponentials are merged, and cos, sin are given a sign convention, so
// that trigonometric and exponential polynomials of linear forms are equal as sums over the lattice iff their canonical
// forms are. Other functions are atoms named by their canonical argument.

import { Coefficient } from '../exact/coefficient.ts';
import { compareExponents } from '../exact/laurentPolynomial.ts';
import { Rational, rational } from '../exact/rational.ts';
import { LimitError } from '../notation/source.ts';
import type { Expression, LinearForm } from './action.ts';

type Offset = readonly number[];

/** A linear form as a list of weighted sites, sorted by field and offset. */
type SiteForm = readonly { readonly field: string; readonly offset: Offset; readonly weight: Coefficient }[];

type Atom =
  | { readonly kind: 'site'; readonly field: string; readonly offset: Offset }
  | { readonly kind: 'cos' | 'sin' | 'exp'; readonly form: SiteForm }
  | {
      readonly kind: 'opaque';
      readonly name: string;
      readonly argument: readonly Product[];
      readonly exponent: number;
    };

/** coefficient × Π atoms, at a definite place of the lattice. At most one cos or sin and at most one exp. */
interface Product {
  readonly coefficient: Coefficient;
  readonly atoms: readonly Atom[];
}

/** An action as a sum over the lattice: coefficient by canonical product. */
export interface CanonicalAction {
  readonly products: readonly Product[];
  readonly coefficients: ReadonlyMap<string, Coefficient>;
}

/** How a lattice map acts: on offsets by a signed permutation matrix, on fields by image and sign. */
export interface LatticeMap {
  readonly matrix: readonly (readonly number[])[];
  readonly fields: ReadonlyMap<string, { readonly name: string; readonly sign: 1 | -1 }>;
}

/** More products than this is a stated limit. */
const MOST_PRODUCTS = 50_000;

/** Throws LimitError when the expansion is too large. */
export function canonicalAction(expression: Expression): CanonicalAction {
  return collect(expand(expression));
}

/** The action after a lattice map. */
export function mapAction(action: CanonicalAction, map: LatticeMap): CanonicalAction {
  return collect(action.products.flatMap((p) => mapProduct(p, map)));
}

/** Equality as sums over the lattice. */
export function isSameAction(x: CanonicalAction, y: CanonicalAction): boolean {
  return (
    x.coefficients.size === y.coefficients.size &&
    [...x.coefficients].every(([key, c]) => y.coefficients.get(key)?.equals(c) ?? false)
  );
}

function collect(products: readonly Product[]): CanonicalAction {
  const coefficients = new Map<string, Coefficient>();
  const representatives = new Map<string, Product>();
  for (const p of products) {
    if (p.atoms.length === 0) continue;
    const key = keyOf(p.atoms, leastOffset(p.atoms));
    const sum = coefficients.get(key)?.add(p.coefficient) ?? p.coefficient;
    if (sum.isZero) {
      coefficients.delete(key);
      representatives.delete(key);
    } else {
      coefficients.set(key, sum);
      representatives.set(key, { coefficient: sum, atoms: p.atoms });
    }
  }
  return { products: [...representatives.values()], coefficients };
}

function expand(e: Expression): Product[] {
  switch (e.kind) {
    case 'constant':
      return e.value.isZero ? [] : [{ coefficient: e.value, atoms: [] }];
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
      const base = expand(e.base);
      if (e.exponent >= 0) return Array.from({ length: e.exponent }, () => base).reduce(multiply, [unit]);
      return [{ coefficient: Coefficient.one, atoms: [opaque('power', base, e.exponent)] }];
    }
    case 'function':
      return expandFunction(e.name, e.argument);
  }
}

const unit: Product = { coefficient: Coefficient.one, atoms: [] };

const opaque = (name: string, argument: readonly Product[], exponent: number): Atom => ({
  kind: 'opaque',
  name,
  argument,
  exponent,
});

function expandFunction(name: string, argument: Expression): Product[] {
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
        return [...exponential(form, half), ...exponential(scaled(form, -1), sign)];
      }
    }
  }
  return [{ coefficient: Coefficient.one, atoms: [opaque(name, expand(argument), 1)] }];
}

/** coefficient·cos(form) or ·sin(form) in the convention that the first weight is positive. */
function trigonometric(kind: 'cos' | 'sin', form: SiteForm, coefficient: Coefficient): Product[] {
  const [first] = form;
  if (!first) return kind === 'cos' ? [{ coefficient, atoms: [] }] : [];
  const isNegative = first.weight.terms[0]!.factor.sign < 0;
  return [
    {
      coefficient: isNegative && kind === 'sin' ? coefficient.neg() : coefficient,
      atoms: [{ kind, form: isNegative ? scaled(form, -1) : form }],
    },
  ];
}

function exponential(form: SiteForm, coefficient: Coefficient): Product[] {
  return [{ coefficient, atoms: form.length === 0 ? [] : [{ kind: 'exp', form }] }];
}

function siteForm(form: LinearForm): SiteForm {
  return sortForm(
    [...form].flatMap(([field, stencil]) =>
      stencil.terms.map(({ exponents, weight }) => ({ field, offset: exponents, weight })),
    ),
  );
}

function sortForm(terms: SiteForm): SiteForm {
  return [...terms].sort(
    (x, y) => compareExponents(x.offset, y.offset) || (x.field < y.field ? -1 : x.field > y.field ? 1 : 0),
  );
}

const scaled = (form: SiteForm, by: number): SiteForm =>
  form.map((t) => ({ ...t, weight: t.weight.scale(Rational.of(by)) }));

function addForms(x: SiteForm, y: SiteForm): SiteForm {
  const out = new Map<string, SiteForm[number]>();
  for (const t of [...x, ...y]) {
    const key = `${t.field}:${t.offset.join(',')}`;
    const old = out.get(key);
    const weight = old ? old.weight.add(t.weight) : t.weight;
    if (weight.isZero) out.delete(key);
    else out.set(key, { ...t, weight });
  }
  return sortForm([...out.values()]);
}

function multiply(xs: readonly Product[], ys: readonly Product[]): Product[] {
  if (xs.length * ys.length > MOST_PRODUCTS)
    throw new LimitError(
      `a term of the action has more than ${MOST_PRODUCTS} products of site fields; the point group is not worked out for it`,
    );
  const out = new Map<string, Product>();
  for (const x of xs)
    for (const y of ys)
      for (const p of multiplyProducts(x, y)) {
        const key = keyOf(p.atoms, undefined);
        const old = out.get(key);
        const coefficient = old ? old.coefficient.add(p.coefficient) : p.coefficient;
        if (coefficient.isZero) out.delete(key);
        else out.set(key, { coefficient, atoms: p.atoms });
      }
  return [...out.values()];
}

type Trigonometric = Extract<Atom, { form: SiteForm }> & { kind: 'cos' | 'sin' };
const isTrigonometric = (a: Atom): a is Trigonometric => a.kind === 'cos' || a.kind === 'sin';

function multiplyProducts(x: Product, y: Product): Product[] {
  const coefficient = x.coefficient.mul(y.coefficient);
  const others = [...x.atoms, ...y.atoms].filter((a) => !isTrigonometric(a) && a.kind !== 'exp');
  const exponents = [...x.atoms, ...y.atoms].flatMap((a) => (a.kind === 'exp' ? [a.form] : []));
  const exponent = exponents.reduce<SiteForm>(addForms, []);
  const plain: Atom[] = exponent.length > 0 ? [...others, { kind: 'exp', form: exponent }] : others;
  const waves = [...x.atoms, ...y.atoms].filter(isTrigonometric);
  return linearise(waves, coefficient).map((p) => ({ ...p, atoms: [...p.atoms, ...plain] }));
}

/** Product-to-sum for at most two waves. */
function linearise(waves: readonly Trigonometric[], coefficient: Coefficient): Product[] {
  const [u, v] = waves;
  if (!u) return [{ coefficient, atoms: [] }];
  if (!v) return [{ coefficient, atoms: [u] }];
  const half = coefficient.scale(rational(1, 2));
  const sum = addForms(u.form, v.form);
  const difference = addForms(u.form, scaled(v.form, -1));
  if (u.kind === v.kind)
    return [
      ...trigonometric('cos', difference, half),
      ...trigonometric('cos', sum, u.kind === 'cos' ? half : half.neg()),
    ];
  const [sine, cosine] = u.kind === 'sin' ? [u, v] : [v, u];
  return [
    ...trigonometric('sin', sum, half),
    ...trigonometric('sin', addForms(sine.form, scaled(cosine.form, -1)), half),
  ];
}

function mapProduct(p: Product, map: LatticeMap): Product[] {
  return p.atoms.map((a) => mapAtom(a, map)).reduce(multiply, [{ coefficient: p.coefficient, atoms: [] }]);
}

function mapAtom(atom: Atom, map: LatticeMap): Product[] {
  const move = (offset: Offset): Offset =>
    map.matrix.map((row) => row.reduce((sum, m, k) => sum + m * offset[k]!, 0));
  const moveForm = (form: SiteForm): SiteForm =>
    sortForm(
      form.map(({ field, offset, weight }) => {
        const image = map.fields.get(field)!;
        return { field: image.name, offset: move(offset), weight: image.sign === 1 ? weight : weight.neg() };
      }),
    );
  switch (atom.kind) {
    case 'site': {
      const image = map.fields.get(atom.field)!;
      return [
        {
          coefficient: Coefficient.integer(image.sign),
          atoms: [{ kind: 'site', field: image.name, offset: move(atom.offset) }],
        },
      ];
    }
    case 'cos':
    case 'sin':
      return trigonometric(atom.kind, moveForm(atom.form), Coefficient.one);
    case 'exp':
      return exponential(moveForm(atom.form), Coefficient.one);
    case 'opaque': {
      const argument = atom.argument.flatMap((p) => mapProduct(p, map));
      return [{ coefficient: Coefficient.one, atoms: [opaque(atom.name, argument, atom.exponent)] }];
    }
  }
}

function leastOffset(atoms: readonly Atom[]): Offset | undefined {
  let least: Offset | undefined;
  const see = (offset: Offset | undefined): void => {
    if (offset && (!least || compareExponents(offset, least) < 0)) least = offset;
  };
  for (const a of atoms) {
    if (a.kind === 'site') see(a.offset);
    else if (a.kind === 'opaque') for (const p of a.argument) see(leastOffset(p.atoms));
    else for (const t of a.form) see(t.offset);
  }
  return least;
}

/** Name of a product, with offsets counted from `origin` (or as they stand). */
function keyOf(atoms: readonly Atom[], origin: Offset | undefined): string {
  const place = (offset: Offset): string => offset.map((n, k) => n - (origin?.[k] ?? 0)).join(',');
  const atomKey = (a: Atom): string => {
    switch (a.kind) {
      case 'site':
        return `${a.field}@${place(a.offset)}`;
      case 'opaque': {
        const inside = a.argument.map((p) => `${coefficientKey(p.coefficient)}*${keyOf(p.atoms, origin)}`);
        return `${a.name}^${a.exponent}[${inside.sort().join(' + ')}]`;
      }
      default:
        return `${a.kind}(${a.form.map((t) => `${coefficientKey(t.weight)}*${t.field}@${place(t.offset)}`).join(' + ')})`;
    }
  };
  return atoms.map(atomKey).sort().join(' ');
}

const coefficientKey = (c: Coefficient): string => c.terms.map((t) => `${t.factor}*${t.key}`).join('+');
