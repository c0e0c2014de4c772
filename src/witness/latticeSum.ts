// Sums of an action over real periodic lattices, in floats. Static fields only: one time slice is summed, and the time spacing
// is set to one, which the powers of the parameters take into account.

import { summands } from '../limit/expansion.ts';
import type { Expression, LinearForm } from '../model/action.ts';

/** Field values on the sites of one time slice; coordinates in lattice units, one per axis (time is 0). */
export type SiteField = (site: readonly number[]) => number;

type Evaluate = (site: readonly number[], field: SiteField) => number;

/** A function of the site that evaluates an expression per cell. Parameter values by name; every field takes the same values
 *  when its name is `varied`, and zero otherwise. */
export function compileExpression(
  expression: Expression,
  values: ReadonlyMap<string, number>,
  varied: string,
): Evaluate {
  const parts = summands(expression).map(({ weight, factor }) => ({
    weight: weight.toNumber(values),
    evaluate: compile(factor, values, varied),
  }));
  return (site, field) => parts.reduce((sum, p) => sum + p.weight * p.evaluate(site, field), 0);
}

function compile(e: Expression, values: ReadonlyMap<string, number>, varied: string): Evaluate {
  const recurse = (x: Expression): Evaluate => compile(x, values, varied);
  switch (e.kind) {
    case 'constant': {
      const value = e.value.toNumber(values);
      return () => value;
    }
    case 'linear':
      return compileForm(e.form, values, varied);
    case 'sum': {
      const terms = e.terms.map(recurse);
      return (site, field) => terms.reduce((sum, t) => sum + t(site, field), 0);
    }
    case 'product': {
      const factors = e.factors.map(recurse);
      return (site, field) => factors.reduce((p, f) => p * f(site, field), 1);
    }
    case 'power': {
      const base = recurse(e.base);
      return (site, field) => base(site, field) ** e.exponent;
    }
    case 'function': {
      const argument = recurse(e.argument);
      const f = Math[e.name];
      return (site, field) => f(argument(site, field));
    }
  }
}

function compileForm(form: LinearForm, values: ReadonlyMap<string, number>, varied: string): Evaluate {
  const stencil = form.get(varied);
  if (!stencil) return () => 0;
  const points = stencil.terms.map(({ exponents, weight }) => ({
    offset: exponents,
    weight: weight.toNumber(values),
  }));
  const moved: number[] = [];
  return (site, field) => {
    let sum = 0;
    for (const { offset, weight } of points) {
      for (let k = 0; k < site.length; k++) moved[k] = site[k]! + offset[k]!;
      sum += weight * field(moved);
    }
    return sum;
  };
}

/** Σ over the sites of one time slice of a periodic lattice with `size` sites along every space axis. */
export function sliceSum(
  evaluate: Evaluate,
  field: SiteField,
  size: number,
  axes: number,
  space: readonly number[],
): number {
  const site = new Array<number>(axes).fill(0);
  let sum = 0;
  const visit = (k: number): void => {
    const axis = space[k];
    if (axis === undefined) {
      sum += evaluate(site, field);
      return;
    }
    for (let x = 0; x < size; x++) {
      site[axis] = x;
      visit(k + 1);
    }
    site[axis] = 0;
  };
  visit(0);
  return sum;
}

/** The field with its values on one period remembered, so that every site is computed once. */
export function tabulated(field: SiteField, size: number, space: readonly number[]): SiteField {
  const table = new Float64Array(size ** space.length).fill(Number.NaN);
  return (site) => {
    let index = 0;
    for (let i = 0; i < space.length; i++) index = index * size + (((site[space[i]!]! % size) + size) % size);
    const known = table[index]!;
    if (!Number.isNaN(known)) return known;
    const wrapped = site.map((x, k) => (space.includes(k) ? ((x % size) + size) % size : 0));
    const value = field(wrapped);
    table[index] = value;
    return value;
  };
}
