// types of the numerical witnesses; floats live in this folder alone

/** A numerical run on real lattices that confirms or contradicts an exact result; it never decides one. */
export interface WitnessRecord {
  readonly kind: 'configuration' | 'smooth-limit';
  /** Profile of the family, or the smooth test field. */
  readonly subject: string;
  readonly sizes: readonly number[];
  readonly values: readonly number[];
  readonly predicted: { readonly exponent: number; readonly coefficient?: number };
  readonly fitted: { readonly exponent: number; readonly coefficient?: number };
  readonly verdict: 'confirms' | 'contradicts' | 'inconclusive';
  readonly text: string;
}
