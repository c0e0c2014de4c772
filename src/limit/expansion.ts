// types of the expansion; see expandAction

import type { Coefficient } from '../exact/coefficient.ts';
import type { Density, JetMonomial, JetSpace } from './jets.ts';

/** Powers of each spacing beyond the leading order, e.g. {a: 2, b: 0}. */
export type MultiOrder = ReadonlyMap<string, number>;

export interface ExpansionTerm {
  /** Absolute coefficient in the Lagrangian density (parent parameters, spacings; cell volume divided out). */
  readonly coefficient: Coefficient;
  readonly monomial: JetMonomial;
  /** Names of the parent terms it comes from. */
  readonly from: readonly string[];
}

export interface ExpansionOrder {
  readonly order: MultiOrder;
  /** Sum of the entries of `order`; 0 is the leading order. */
  readonly total: number;
  readonly terms: readonly ExpansionTerm[];
}

/** Expansion of one named parent term. */
export interface TermExpansion {
  readonly name: string;
  /** As it comes out of the Taylor series about the centre, absolute coefficients. */
  readonly raw: Density;
  /** Normal form of `raw` modulo total derivatives. */
  readonly normal: Density;
  /** Absolute powers of the spacings at this term's leading order. */
  readonly leading: MultiOrder;
  /** Powers of the spacings from which relative orders of this term are counted. */
  readonly base: MultiOrder;
}

export interface Expansion {
  readonly space: JetSpace;
  /** Sorted: leading first, then by total order, then lexicographically. */
  readonly orders: readonly ExpansionOrder[];
  readonly byTerm: readonly TermExpansion[];
  /** Highest total relative order that is complete. */
  readonly through: number;
  /** Largest number of fields kept, when undifferentiated fields made a cut necessary. */
  readonly fieldCut: number | undefined;
}
