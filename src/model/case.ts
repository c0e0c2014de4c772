// A case after reading: everything has a meaning, nothing is a string that still needs parsing.

import type { Quotient } from '../exact/quotient.ts';
import type { Rational } from '../exact/rational.ts';
import type { SourcePosition } from '../notation/source.ts';
import type { ActionTerm, Expression } from './action.ts';
import type { Claim } from './claim.ts';
import type { Field, Lattice, Parameter } from './geometry.ts';

export interface Parent {
  readonly terms: readonly ActionTerm[];
  readonly compactness: 'cosine' | 'villain' | 'villain-flat';
}

export interface Proposal {
  readonly parameters: readonly Parameter[];
  /** In derivatives of the fields; its integral over space-time is the proposed action. */
  readonly lagrangian: Expression;
  readonly text: string;
  readonly position: SourcePosition;
  /** Proposal parameters in terms of parent parameters and spacings; solved when absent. */
  readonly matching: ReadonlyMap<string, Quotient> | undefined;
  /** Declared field rescalings φ → Z φ, by field name. */
  readonly rescaling: ReadonlyMap<string, Quotient>;
}

export interface ExpandSettings {
  /** Orders in the spacings beyond the leading one. */
  readonly beyondLeading: number;
  /** Largest number of field factors kept in a monomial; undefined: bounded by the order alone where that is finite. */
  readonly fields: number | undefined;
  /** Constant background about which F is expanded, by field name; absent means 0. */
  readonly background: ReadonlyMap<string, Rational>;
}

export interface Case {
  readonly id: string;
  readonly title: string;
  readonly file: string;
  /** The text of the case file as read. */
  readonly source: string;
  readonly lattice: Lattice;
  readonly fields: readonly Field[];
  readonly parameters: readonly Parameter[];
  readonly parent: Parent;
  readonly proposal: Proposal | undefined;
  readonly expand: ExpandSettings;
  readonly claims: readonly Claim[];
  /** Things the reader should be warned about although the file is valid, e.g. an unquoted `#` in a string. */
  readonly warnings: readonly { readonly text: string; readonly position: SourcePosition }[];
}
