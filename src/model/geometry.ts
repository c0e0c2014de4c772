// The lattice of a case: its axes, their spacings and the order in which the spacings go to zero.

import type { Rational } from '../exact/rational.ts';

export interface Axis {
  readonly name: string;
  /** Symbol of the lattice spacing along this axis; several axes may share one. */
  readonly spacing: string;
  readonly role: 'space' | 'time';
}

export interface Lattice {
  /** In the order of the case file; this order fixes exponents and multi-indices everywhere. */
  readonly axes: readonly Axis[];
  /** Spacing symbols without repetition, in the order in which they are sent to zero (default: time first). */
  readonly limits: readonly string[];
}

/** Indices of the axes with role `space`. */
export function spaceAxes(lattice: Lattice): number[] {
  return lattice.axes.flatMap((axis, i) => (axis.role === 'space' ? [i] : []));
}

/** Index of the time axis, or undefined for a purely spatial lattice. */
export function timeAxis(lattice: Lattice): number | undefined {
  const i = lattice.axes.findIndex((axis) => axis.role === 'time');
  return i < 0 ? undefined : i;
}

/** What a field's values are; for `residue` the field lives in Z_N. */
export type FieldValues =
  | { readonly kind: 'angle' | 'real' | 'integer' }
  | { readonly kind: 'residue'; readonly modulus: number };

export interface Field {
  readonly name: string;
  readonly values: FieldValues;
  /** Offset inside the cell, in lattice units, one entry per axis; zero for a field on the sites. */
  readonly at: readonly Rational[];
}

export interface Parameter {
  readonly name: string;
  readonly positive: boolean;
}
