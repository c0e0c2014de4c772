// A family of shift symmetries φ_i → φ_i + λ_i with λ(r) = p(r) · ε(r) · f(ℓ_1(r), …, ℓ_k(r)): a polynomial prefactor, a
// character of finite order, and a free function of integer linear functionals of the coordinates (lattice units).

import type { Coefficient } from '../exact/coefficient.ts';
import type { Exponents } from '../exact/laurentPolynomial.ts';
import type { Rational } from '../exact/rational.ts';
import type { Status } from '../model/claim.ts';

/** A polynomial in the coordinates: exponents (one per axis) and weights. */
export type CoordinatePolynomial = readonly { readonly exponents: Exponents; readonly weight: Coefficient }[];

export interface ShiftFamily {
  /** One amplitude per field of the case, in order. */
  readonly prefactor: readonly CoordinatePolynomial[];
  /** Names of the fields that the amplitudes belong to; may be left out when the case has a single field. */
  readonly fields?: readonly string[];
  /** ε(r) = exp(2πi Σ phase_k r_k); entries in [0, 1), one per axis. Where ε is not real, its real and its imaginary part
   *  are both shifts. */
  readonly phase: readonly Rational[];
  /** Rows: the functionals ℓ_i, one integer entry per axis, including the time axis. Empty: no free function. */
  readonly free: readonly (readonly number[])[];
  /** For a discrete shift of angle fields: values in (2π/N) Z. Undefined: continuous. */
  readonly discrete: number | undefined;
  /** In the notation of claims, e.g. `f(x)`, `(-1)^x g(y)`, `x f(y)`, `pi`. */
  readonly profile: string;
}

export interface ShiftSymmetry {
  readonly family: ShiftFamily;
  readonly lattice: boolean;
  readonly continuum: boolean | null;
  readonly status: Status;
  /** Number of free space coordinates: 0 global, 1 line-like, 2 plane-like, all of them: gauge redundancy. */
  readonly growth: number;
  /** True when the parameter may depend freely on time too: a redundancy, not a symmetry. */
  readonly redundancy: boolean;
  /** For continuum-only families: the lowest correction that breaks it. */
  readonly brokenBy: { readonly text: string; readonly order: number } | null;
}

/** What the counts on open boxes say about a set of families. */
export interface CompletenessCertificate {
  /** Edge lengths (sites) or, in the continuum, polynomial degrees; solution-space and explained dimensions there. */
  readonly rows: readonly {
    readonly size: readonly number[];
    readonly solutions: number;
    readonly explained: number;
  }[];
  readonly primes: readonly number[];
  readonly complete: boolean;
  /** Growth exponent of the solution space with the linear size (all directions scaled together). */
  readonly growth: number | undefined;
  /** In words, e.g. `complete on open boxes 3^3, 4^3, 5^3 modulo two primes`. */
  readonly text: string;
}

export interface ShiftAnalysis {
  readonly symmetries: readonly ShiftSymmetry[];
  readonly lattice: CompletenessCertificate;
  readonly continuum: CompletenessCertificate | null;
}
