// Open boxes of lattice sites and the conditions D λ = 0 at every cell that fits into them.

import type { PrimeField, SparseRow } from '../exact/matrix.ts';
import type { ShiftSystem } from './constantSystem.ts';
import { residue } from './genericPoint.ts';

/** Boxes are used up to this number of unknowns, and three sizes in any case. */
const MOST_UNKNOWNS = 700;

/** An open box of sites inside a larger one: solutions are counted on the inner box, conditions hold on the outer one. */
export class Box {
  readonly sites: readonly (readonly number[])[];
  private readonly strides: readonly number[];
  /** Number of a site among the unknowns: those outside the inner box first. */
  private readonly numbers: Int32Array;
  readonly innerSites: readonly (readonly number[])[];

  constructor(
    readonly edges: readonly number[],
    margin: number,
  ) {
    let sites: number[][] = [[]];
    for (const edge of edges) sites = sites.flatMap((s) => Array.from({ length: edge }, (_, i) => [...s, i]));
    this.sites = sites;
    const strides: number[] = [];
    for (let k = edges.length - 1, stride = 1; k >= 0; stride *= edges[k--]!) strides[k] = stride;
    this.strides = strides;
    const isInner = sites.map((s) => s.every((x, k) => x >= margin && x < edges[k]! - margin));
    this.innerSites = sites.filter((_, i) => isInner[i]);
    this.numbers = new Int32Array(sites.length);
    let [outer, inner] = [0, sites.length - this.innerSites.length];
    for (let i = 0; i < sites.length; i++) this.numbers[i] = isInner[i] ? inner++ : outer++;
  }

  get outerCount(): number {
    return this.sites.length - this.innerSites.length;
  }
  number(site: readonly number[]): number {
    let at = 0;
    for (let k = 0; k < site.length; k++) at += site[k]! * this.strides[k]!;
    return this.numbers[at]!;
  }
}

/** A condition with residues as weights. */
export type ResidueForm = readonly {
  readonly field: number;
  readonly exponents: readonly number[];
  readonly weight: number;
}[];

/** The conditions modulo a prime, at the generic point of the parameters. */
export const residueForms = (system: ShiftSystem, field: PrimeField): ResidueForm[] =>
  system.unsplit.map((row) =>
    row.flatMap((d, j) =>
      (d?.terms ?? []).map((t) => ({ field: j, exponents: t.exponents, weight: residue(t.weight, field) })),
    ),
  );

/** Each condition at every cell where all its points lie inside the box. */
export function* conditionsOn(box: Box, forms: readonly ResidueForm[], fields: number): Generator<SparseRow> {
  for (const form of forms) {
    const low = box.edges.map((_, k) => Math.min(...form.map((t) => t.exponents[k]!)));
    const high = box.edges.map((_, k) => Math.max(...form.map((t) => t.exponents[k]!)));
    const offsets = form.map((t) => box.edges.map((_, k) => t.exponents[k]! - low[k]!));
    const values = form.map((t) => t.weight);
    for (const cell of box.sites) {
      if (cell.some((x, k) => x + high[k]! - low[k]! >= box.edges[k]!)) continue;
      const columns = form.map(
        (t, i) => box.number(cell.map((x, k) => x + offsets[i]![k]!)) * fields + t.field,
      );
      yield { columns, values };
    }
  }
}

/** Edge lengths, all equal, that hold every stencil: enough of them to recognise the growth of the counts. */
export function edgeLengths(system: ShiftSystem): number[] {
  const dimension = system.axes.length;
  if (dimension === 0) return [1];
  let extent = 1;
  for (const form of system.forms)
    for (let k = 0; k < dimension; k++) {
      const reach = form.map((t) => t.exponents[k]!);
      extent = Math.max(extent, Math.max(...reach) - Math.min(...reach));
    }
  const sizes: number[] = [];
  for (let edge = extent + 2; sizes.length < dimension + 3; edge++) {
    if (sizes.length >= 3 && edge ** dimension * system.fields.length > MOST_UNKNOWNS) break;
    sizes.push(edge);
  }
  return sizes;
}
