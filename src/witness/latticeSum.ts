// Sums of an action over real periodic lattices, in floats. A whole lattice is evaluated at once: every node of the
// expression becomes one array over the sites.

import type { Expression, LinearForm } from '../model/action.ts';

/** A periodic lattice: sites along every axis, in the order of the case; 1 for an axis along which nothing varies. */
export type Box = readonly number[];

/** Site values of the fields in a box, the last axis fastest; a field that is left out is zero. */
export type FieldValues = ReadonlyMap<string, Float64Array>;

/** Fills a box: one value per site. */
export function onSites(box: Box, value: (site: readonly number[]) => number): Float64Array {
  const out = new Float64Array(box.reduce((n, size) => n * size, 1));
  const site = new Array<number>(box.length).fill(0);
  for (let i = 0; i < out.length; i++) {
    out[i] = value(site);
    for (let k = box.length - 1; k >= 0 && ++site[k]! === box[k]!; k--) site[k] = 0;
  }
  return out;
}

/** Index of site r + offset for every site r of a periodic box. */
function neighbours(box: Box, offset: readonly number[]): Int32Array {
  let out = new Int32Array(1);
  for (const [k, size] of box.entries()) {
    const next = new Int32Array(out.length * size);
    for (let i = 0; i < out.length; i++)
      for (let x = 0; x < size; x++)
        next[i * size + x] = out[i]! * size + ((((x + offset[k]!) % size) + size) % size);
    out = next;
  }
  return out;
}

/** Evaluates expressions on one box; remembers the neighbour tables. */
export class LatticeBox {
  private readonly tables = new Map<string, Int32Array>();
  readonly sites: number;

  constructor(
    readonly box: Box,
    private readonly parameters: ReadonlyMap<string, number>,
  ) {
    this.sites = box.reduce((n, size) => n * size, 1);
  }

  /** Σ over all sites of an expression of the fields. */
  sum(expression: Expression, fields: FieldValues): number {
    const value = this.evaluate(expression, fields);
    if (typeof value === 'number') return value * this.sites;
    let sum = 0;
    for (let i = 0; i < value.length; i++) sum += value[i]!;
    return sum;
  }

  private evaluate(e: Expression, fields: FieldValues): Value {
    const recurse = (x: Expression): Value => this.evaluate(x, fields);
    switch (e.kind) {
      case 'constant':
        return e.value.toNumber(this.parameters);
      case 'linear':
        return this.form(e.form, fields);
      case 'sum':
        return e.terms.map(recurse).reduce(add, 0);
      case 'product':
        return e.factors.map(recurse).reduce(multiply, 1);
      case 'power': {
        const { exponent } = e;
        return mapped(recurse(e.base), exponent === 2 ? (x) => x * x : (x) => x ** exponent);
      }
      case 'function':
        return mapped(recurse(e.argument), Math[e.name]);
    }
  }

  private form(form: LinearForm, fields: FieldValues): Float64Array {
    const out = new Float64Array(this.sites);
    for (const [name, stencil] of form) {
      const field = fields.get(name);
      if (!field) continue;
      for (const { exponents, weight } of stencil.terms) {
        const factor = weight.toNumber(this.parameters);
        const table = this.table(exponents);
        for (let i = 0; i < out.length; i++) out[i]! += factor * field[table[i]!]!;
      }
    }
    return out;
  }

  private table(offset: readonly number[]): Int32Array {
    const key = offset.join(',');
    const known = this.tables.get(key) ?? neighbours(this.box, offset);
    this.tables.set(key, known);
    return known;
  }
}

type Value = number | Float64Array;

/** x + y; arrays are fresh in every node, so that one of them can take the result. */
function add(x: Value, y: Value): Value {
  if (typeof x === 'number') return typeof y === 'number' ? x + y : add(y, x);
  for (let i = 0; i < x.length; i++) x[i]! += typeof y === 'number' ? y : y[i]!;
  return x;
}

function multiply(x: Value, y: Value): Value {
  if (typeof x === 'number') return typeof y === 'number' ? x * y : multiply(y, x);
  if (y === 1) return x;
  for (let i = 0; i < x.length; i++) x[i]! *= typeof y === 'number' ? y : y[i]!;
  return x;
}

function mapped(x: Value, f: (x: number) => number): Value {
  if (typeof x === 'number') return f(x);
  for (let i = 0; i < x.length; i++) x[i] = f(x[i]!);
  return x;
}
