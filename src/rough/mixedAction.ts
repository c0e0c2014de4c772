// The mixed effective action of a family in words: lattice operators along the rough directions, derivatives along the smooth
// ones, lowest order of each parent term.

import { Coefficient, type CoefficientTerm } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { ActionTerm, Expression, LinearForm } from '../model/action.ts';
import type { Lattice } from '../model/geometry.ts';
import { printCoefficient } from '../notation/print.ts';
import { composeSeries, constantSeries } from './epsilonSeries.ts';
import { formsOf, mean } from './latticeScaling.ts';
import { isLocal, type Profile, type ProfileFactor } from './profile.ts';

/** How the family varies along every axis. */
function axisKinds(profile: Profile, lattice: Lattice): ('rough' | 'smooth' | 'constant')[] {
  return lattice.axes.map((_, axis) => {
    const touches = (f: ProfileFactor): boolean =>
      (isLocal(f) ? [f.row] : f.rows).some((row) => row[axis] !== 0);
    const isRough = profile.terms.some(
      (t) => !t.phase[axis]!.isZero || t.factors.some((f) => f.kind !== 'smooth' && touches(f)),
    );
    if (isRough) return 'rough';
    const isSmooth = profile.terms.some(
      (t) => t.factors.some(touches) || t.polynomial.some((m) => m.exponents[axis] !== 0),
    );
    return isSmooth ? 'smooth' : 'constant';
  });
}

/** `name: …` for every parent term that does not vanish on the family, joined by `; `: per cell, with lattice operators along
 *  the rough directions and derivatives along the smooth ones. Where every form is small on the family the term is replaced
 *  by its lowest power. */
export function mixedActionText(
  terms: readonly ActionTerm[],
  profile: Profile,
  lattice: Lattice,
  background: ReadonlyMap<string, Rational>,
): string {
  const kinds = axisKinds(profile, lattice);
  return terms
    .flatMap((t) => {
      const forms = formsOf(t.expression);
      const known = new Map(forms.map((form) => [form, mixedForm(form, kinds, lattice)]));
      const isSmall = forms.every((form) => (known.get(form)?.order ?? 1) > 0);
      const lowest = isSmall ? lowestPower(t.expression, forms, known, lattice, background) : undefined;
      const text = lowest ?? expressionText(t.expression, known, lattice);
      return text === undefined ? [] : [`${t.name}: ${text}`];
    })
    .join('; ');
}

/** A linear form in mixed notation. */
interface MixedForm {
  /** Number of derivatives along smooth directions at which it begins. */
  readonly order: number;
  readonly factor: Coefficient;
  /** What the factor multiplies, e.g. `Delta_x d_y phi`. */
  readonly text: string;
}

/** Powers of the fields that are tried. */
const MOST_POWERS = 8;

/** F(u) − F(background) at its lowest power of the forms, e.g. `beta*a^2/2 (Delta_x d_y phi)^2`. */
function lowestPower(
  expression: Expression,
  forms: readonly LinearForm[],
  known: ReadonlyMap<LinearForm, MixedForm | undefined>,
  lattice: Lattice,
  background: ReadonlyMap<string, Rational>,
): string | undefined {
  const texts = new Map<string, MixedForm>();
  const names = new Map<LinearForm, string>();
  for (const form of forms) {
    const mixed = known.get(form);
    if (!mixed) continue;
    // forms that differ by a factor alone, such as one and two steps along a smooth direction, are one
    names.set(form, `@${mixed.text}`);
    texts.set(`@${mixed.text}`, mixed);
  }
  for (let order = 1; order <= MOST_POWERS; order++) {
    const value = (form: LinearForm): Coefficient[] => {
      const name = names.get(form);
      const series = constantSeries(mean(form, background), order);
      if (name !== undefined) series[1] = Coefficient.symbol(name).mul(known.get(form)!.factor);
      return series;
    };
    const part = composeSeries(expression, order, value)[order]!;
    if (!part.isZero)
      return part.terms
        .map((term) => monomialText(term, texts, lattice))
        .join(' + ')
        .replaceAll('+ -', '- ');
  }
  return undefined;
}

/** One power product of forms with its coefficient. */
function monomialText(
  term: CoefficientTerm,
  texts: ReadonlyMap<string, MixedForm>,
  lattice: Lattice,
): string {
  const factor = Coefficient.monomial(
    term.factor,
    term.powers.filter(([g]) => !texts.has(g)),
  );
  const powers = term.powers.flatMap(([g, e]) => {
    const form = texts.get(g);
    return form ? [e.isOne ? `(${form.text})` : `(${form.text})^${e}`] : [];
  });
  const number = printCoefficient(factor, lattice.limits);
  return number === '1' ? powers.join(' ') : `${number} ${powers.join(' ')}`;
}

/** An expression with its forms in mixed notation; undefined when every form vanishes. */
function expressionText(
  e: Expression,
  known: ReadonlyMap<LinearForm, MixedForm | undefined>,
  lattice: Lattice,
): string | undefined {
  const recurse = (x: Expression): string | undefined => expressionText(x, known, lattice);
  switch (e.kind) {
    case 'constant':
      return e.value.terms.length > 1
        ? `(${printCoefficient(e.value, lattice.limits)})`
        : printCoefficient(e.value, lattice.limits);
    case 'linear': {
      const form = known.get(e.form);
      if (!form) return undefined;
      if (form.factor.isOne) return form.text;
      return `${printCoefficient(form.factor, lattice.limits)} ${form.text}`;
    }
    case 'sum': {
      const parts = e.terms.map(recurse);
      const fields = parts.filter((p, i) => p !== undefined && e.terms[i]!.kind !== 'constant');
      if (fields.length === 0) return undefined;
      const kept = parts.filter((p) => p !== undefined);
      return `(${kept.join(' + ').replaceAll('+ -', '- ')})`;
    }
    case 'product': {
      const parts = e.factors.map((f) => {
        const text = recurse(f);
        return text !== undefined && f.kind === 'linear' ? `(${text})` : text;
      });
      if (parts.some((p) => p === undefined)) return undefined;
      const negative = parts[0] === '-1' && parts.length > 1;
      return negative ? `-${parts.slice(1).join('*')}` : parts.join('*');
    }
    case 'power': {
      const base = recurse(e.base);
      return base && `(${base})^${e.exponent < 0 ? `(${e.exponent})` : e.exponent}`;
    }
    case 'function': {
      const argument = recurse(e.argument);
      return argument && `${e.name}(${argument})`;
    }
  }
}

/** The form with constant directions set to no shift, smooth ones expanded to their lowest surviving order. */
function mixedForm(form: LinearForm, kinds: readonly string[], lattice: Lattice): MixedForm | undefined {
  const parts = [...form].flatMap(([field, stencil]) => {
    const lowest = lowestMixed(stencil, kinds);
    return lowest ? [{ field, ...lowest }] : [];
  });
  const order = Math.min(...parts.map((p) => p.order));
  const kept = parts
    .filter((p) => p.order === order)
    .map((p) => ({ ...p, ...operatorText(p.operator, kinds, lattice) }));
  const [first, ...more] = kept;
  if (!first) return undefined;
  const say = (p: typeof first): string => (p.text === '' ? p.field : `${p.text} ${p.field}`);
  if (more.length === 0) return { order, factor: first.factor, text: say(first) };
  const sum = kept
    .map((p) => {
      const number = printCoefficient(p.factor, lattice.limits);
      return number === '1' ? say(p) : number === '-1' ? `-${say(p)}` : `${number} ${say(p)}`;
    })
    .join(' + ');
  return { order, factor: Coefficient.one, text: `(${sum.replaceAll('+ -', '- ')})` };
}

/** Groups the stencil by derivatives along smooth axes and keeps the lowest order: terms (shift along rough axes, derivatives
 *  along smooth ones) with weights. */
function lowestMixed(
  stencil: LaurentPolynomial,
  kinds: readonly string[],
): { order: number; operator: LaurentPolynomial } | undefined {
  for (let order = 0; order <= 8; order++) {
    const terms = stencil.terms.flatMap(({ exponents, weight }) =>
      derivativeOrders(kinds, order).flatMap((orders) => {
        let factor = Rational.one;
        for (const [k, n] of orders.entries())
          for (let i = 1; i <= n; i++) factor = factor.mul(rational(exponents[k]!, i));
        const mixed = exponents.map((e, k) => (kinds[k] === 'rough' ? e : orders[k]!));
        return factor.isZero ? [] : [{ exponents: mixed, weight: weight.scale(factor) }];
      }),
    );
    const sum = LaurentPolynomial.of(kinds.length, terms);
    if (!sum.isZero) return { order, operator: sum };
    if (!kinds.includes('smooth')) return undefined;
  }
  return undefined;
}

/** Multi-indices over the smooth axes with the given total. */
function derivativeOrders(kinds: readonly string[], total: number): number[][] {
  let out: number[][] = [[]];
  for (const kind of kinds)
    out = out.flatMap((o) => {
      const left = kind === 'smooth' ? total - o.reduce((x, y) => x + y, 0) : 0;
      return Array.from({ length: left + 1 }, (_, n) => [...o, n]);
    });
  return out.filter((o) => o.reduce((x, y) => x + y, 0) === total);
}

/** An operator as a factor times a product of differences and derivatives where it is one, else as a sum of shifts. */
function operatorText(
  operator: LaurentPolynomial,
  kinds: readonly string[],
  lattice: Lattice,
): { factor: Coefficient; text: string } {
  const spaced = LaurentPolynomial.of(
    operator.dimension,
    operator.terms.map(({ exponents, weight }) => ({
      exponents,
      weight: exponents.reduce(
        (w, n, k) =>
          kinds[k] === 'rough' || n === 0
            ? w
            : w.mul(Coefficient.symbol(lattice.axes[k]!.spacing, rational(n))),
        weight,
      ),
    })),
  );
  const product = asProduct(spaced, kinds, lattice);
  if (product) return product;
  // what all terms share goes in front
  const first = spaced.terms[0]!.weight.asMonomial;
  const shared = first && Coefficient.ofTerm({ ...first, factor: first.factor.abs() });
  const isShared = shared && spaced.terms.every((t) => t.weight.div(shared).asRational?.isInteger);
  const factor = isShared ? shared : Coefficient.one;
  const words = spaced.terms.map(({ exponents, weight: whole }) => {
    const weight = isShared ? whole.div(factor) : whole;
    const letters = exponents.flatMap((n, k) => powerText(kinds[k] === 'rough' ? 'T' : 'd', n, k, lattice));
    const number = printCoefficient(weight, lattice.limits);
    if (letters.length === 0) return weight.terms.length > 1 ? `(${number})` : number;
    if (number === '1' || number === '-1') return `${number === '1' ? '' : '-'}${letters.join(' ')}`;
    return `${weight.terms.length > 1 ? `(${number})` : number} ${letters.join(' ')}`;
  });
  return { factor, text: `(${words.reverse().join(' + ').replaceAll('+ -', '- ')})` };
}

function powerText(letter: string, n: number, axis: number, lattice: Lattice): string[] {
  const name = `${letter}_${lattice.axes[axis]!.name}`;
  return n === 0 ? [] : [n === 1 ? name : `${name}^${n}`];
}

/** Divides (T_k − 1) out of the operator as often as it goes along every rough axis; undefined unless a single term is left.
 *  A backward shift that is left over turns Delta into Deltab. */
function asProduct(
  operator: LaurentPolynomial,
  kinds: readonly string[],
  lattice: Lattice,
): { factor: Coefficient; text: string } | undefined {
  let rest = operator;
  const times = kinds.map((kind, k) => {
    let n = 0;
    for (
      let q = kind === 'rough' ? withoutDifference(rest, k) : undefined;
      q;
      q = withoutDifference(rest, k)
    ) {
      rest = q;
      n++;
    }
    return n;
  });
  const [term, ...more] = rest.terms;
  if (!term || more.length > 0) return undefined;
  const words = term.exponents.flatMap((shift, k) => {
    if (kinds[k] !== 'rough') return powerText('d', shift, k, lattice);
    const backward = Math.max(0, Math.min(times[k]!, -shift));
    return [
      ...powerText('Delta', times[k]! - backward, k, lattice),
      ...powerText('Deltab', backward, k, lattice),
      ...powerText('T', shift + backward, k, lattice),
    ];
  });
  return { factor: term.weight, text: words.join(' ') };
}

/** The operator divided by T_axis − 1, or undefined when it does not go. */
function withoutDifference(operator: LaurentPolynomial, axis: number): LaurentPolynomial | undefined {
  const lines = new Map<string, { exponents: readonly number[]; weight: Coefficient }[]>();
  for (const t of operator.terms) {
    const key = t.exponents.map((e, k) => (k === axis ? 0 : e)).join(',');
    lines.set(key, [...(lines.get(key) ?? []), t]);
  }
  const out: { exponents: readonly number[]; weight: Coefficient }[] = [];
  for (const line of lines.values()) {
    // q_n = − Σ_{m ≤ n} p_m, which must end at zero
    const along = line.map((t) => t.exponents[axis]!);
    let sum = Coefficient.zero;
    for (let n = Math.min(...along); n <= Math.max(...along); n++) {
      const here = line.find((t) => t.exponents[axis] === n);
      if (here) sum = sum.add(here.weight);
      if (!sum.isZero)
        out.push({ exponents: line[0]!.exponents.map((e, k) => (k === axis ? n : e)), weight: sum.neg() });
    }
    if (!sum.isZero) return undefined;
  }
  return operator.isZero ? undefined : LaurentPolynomial.of(operator.dimension, out);
}
