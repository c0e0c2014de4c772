// types of the point group analysis; see pointGroup

/** A lattice automorphism with the field action that makes it a symmetry. */
export interface PointElement {
  /** Signed permutation matrix on all axes (rows: image of each axis), integer entries. */
  readonly matrix: readonly (readonly number[])[];
  /** Image of each field: index and sign. */
  readonly fields: readonly { readonly field: number; readonly sign: 1 | -1 }[];
}

export interface PointGroupAnalysis {
  /** Order of the space part alone on the lattice, the number a claim quotes. */
  readonly order: number;
  /** Crystallographic name of the space part where it has one. */
  readonly name: string | undefined;
  /** Order of the lattice's own automorphism group (space part). */
  readonly holohedry: number;
  readonly generators: readonly string[];
  readonly timeReflection: boolean;
  /** φ → -φ alone. */
  readonly fieldReflection: boolean;
  /** All symmetric elements with trivial or non-trivial field action, time reflections included. */
  readonly elements: readonly PointElement[];
  /** Order of the same group on the proposal; null without one. */
  readonly continuumOrder: number | null;
}
