// The mixed effective action of a family in words: lattice operators along the rough directions, derivatives along the smooth
// ones, lowest order of each parent term.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial } from '../exact/laurentPolynomial.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { ActionTerm, Expression, LinearForm } from '../model/action.ts';
import type { Lattice } from '../model/geometry.ts';
import { printCoefficient } from '../notation/print.ts';
import { type FamilyProfile, functionalsOf } from './familyProfile.ts';

/** Axes along which the family varies roughly, smoothly, or not at all. */
function axisKinds(profile: FamilyProfile, lattice: Lattice): ('rough' | 'smooth' | 'constant')[] {
  return lattice.axes.map((_, axis) => {
    const along = profile.terms.flatMap((t) =>
      t.factors.filter((f) => functionalsOf(f, lattice.axes.length).some((l) => l[axis] !== 0)),
    );
    if (along.length === 0) return 'constant';
    return along.some((f) => f.kind !== 'smooth' && f.kind !== 'coordinate') ? 'rough' : 'smooth';
  });
}

/** `name: …` for every parent term that does not vanish on the family, joined by `; `. */
export function mixedActionText(
  terms: readonly ActionTerm[],
  profile: FamilyProfile,
  lattice: Lattice,
): string {
  const kinds = axisKinds(profile, lattice);
  return terms
    .flatMap((t) => {
      const text = expressionText(t.expression, kinds, lattice);
      return text === undefined ? [] : [`${t.name}: ${text}`];
    })
    .join('; ');
}

/** An expression with its forms in mixed notation; undefined when every form vanishes. */
function expressionText(e: Expression, kinds: readonly string[], lattice: Lattice): string | undefined {
  switch (e.kind) {
    case 'constant':
      return e.value.terms.length > 1
        ? `(${printCoefficient(e.value, lattice.limits)})`
        : printCoefficient(e.value, lattice.limits);
    case 'linear':
      return formText(e.form, kinds, lattice);
    case 'sum': {
      const parts = e.terms.map((t) => expressionText(t, kinds, lattice));
      const fields = parts.filter((p, i) => p !== undefined && e.terms[i]!.kind !== 'constant');
      if (fields.length === 0) return undefined;
      const kept = parts.filter((p) => p !== undefined);
      return `(${kept.join(' + ').replaceAll('+ -', '- ')})`;
    }
    case 'product': {
      const parts = e.factors.map((f) => expressionText(f, kinds, lattice));
      if (parts.some((p) => p === undefined)) return undefined;
      const negative = parts[0] === '-1' && parts.length > 1;
      return negative ? `-${parts.slice(1).join('*')}` : parts.join('*');
    }
    case 'power': {
      const base = expressionText(e.base, kinds, lattice);
      return base && `(${base})^${e.exponent}`;
    }
    case 'function': {
      const argument = expressionText(e.argument, kinds, lattice);
      return argument && `${e.name}(${argument.replace(/^\((.*)\)$/, '$1')})`;
    }
  }
}

/** The form with constant directions set to no shift, smooth ones expanded to their lowest surviving order. */
function formText(form: LinearForm, kinds: readonly string[], lattice: Lattice): string | undefined {
  const parts = [...form].flatMap(([field, stencil]) => {
    const lowest = lowestMixed(stencil, kinds);
    if (!lowest) return [];
    return [`${operatorText(lowest, kinds, lattice)} ${field}`.trim()];
  });
  return parts.length === 0 ? undefined : parts.length === 1 ? parts[0] : `(${parts.join(' + ')})`;
}

/** Groups the stencil by derivatives along smooth axes and keeps the lowest order: terms (shift along rough axes, derivatives
 *  along smooth ones) with weights. */
function lowestMixed(stencil: LaurentPolynomial, kinds: readonly string[]): LaurentPolynomial | undefined {
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
    if (!sum.isZero) return sum;
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

function operatorText(operator: LaurentPolynomial, kinds: readonly string[], lattice: Lattice): string {
  const words = operator.terms.map(({ exponents, weight }) => {
    const spacings = exponents.map((n, k): [string, Rational] => [
      lattice.axes[k]!.spacing,
      rational(kinds[k] === 'rough' ? 0 : n),
    ]);
    const full = weight.mul(
      Coefficient.monomial(
        Rational.one,
        spacings.filter(([, n]) => !n.isZero),
      ),
    );
    const letters = exponents.flatMap((n, k) => {
      if (n === 0) return [];
      const letter = `${kinds[k] === 'rough' ? 'T' : 'd'}_${lattice.axes[k]!.name}`;
      return [n === 1 ? letter : `${letter}^${n}`];
    });
    const factor = printCoefficient(full, lattice.limits);
    if (letters.length === 0) return factor;
    return factor === '1'
      ? letters.join(' ')
      : factor === '-1'
        ? `-${letters.join(' ')}`
        : `${factor} ${letters.join(' ')}`;
  });
  if (words.length === 1) return words[0] === '1' ? '' : words[0]!;
  return `(${words.reverse().join(' + ').replaceAll('+ -', '- ')})`;
}
