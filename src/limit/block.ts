// One block of the quotient by total derivatives: all monomials with given numbers of fields and a given total number
// of derivatives along each axis. Total derivatives never leave a block's number of fields and raise its degree by one,
// so the quotient splits into blocks and each is a small exact elimination.
//
// The order of the monomials decides the representative. Best is, in this order: a large derivative common to all
// factors ((∂_x∂_y φ)² before φ ∂_x²∂_y² φ), few derivatives on the most-differentiated factor, repeated factors
// (squares), and a fixed order for the rest. The classical one-dimensional normal form, where the highest derivative
// occurs at least squared (I. M. Gel'fand and L. A. Dikii, Russ. Math. Surveys 30 (1975) no. 5, 77), is a special case.

import { gcd } from '../exact/rational.ts';
import { LimitError } from '../notation/source.ts';

/** A stated limit: blocks with more monomials than this are refused. */
export const MOST_BLOCK_MONOMIALS = 6000;

/** A factor ∂^α of a field, numbered inside the block; larger numbers carry more derivatives. */
interface Factor {
  readonly field: number;
  readonly derivative: readonly number[];
  readonly order: number;
}

/** A monomial of the block: factor numbers in descending order as code units. */
type BlockMonomial = string;

/** Σ numerators[i]·monomial_i / denominator, over standard monomials. */
interface Reduced {
  numerators: Map<number, bigint>;
  denominator: bigint;
}

/** Monomials of one block, best first, and for each its reduction to the standard ones modulo total derivatives. */
export class Block {
  private readonly factors: Factor[];
  private readonly factorNumbers = new Map<string, number>();
  private readonly raisedFactors: (number | undefined)[] = [];
  readonly monomials: readonly BlockMonomial[];
  private readonly index = new Map<BlockMonomial, number>();
  /** Undefined: the monomial is standard (its own normal form). */
  private readonly reduced: (Reduced | undefined)[];

  /** @param counts number of factors of each field; @param degree total derivatives along each axis.
   *  Throws LimitError for a block beyond MOST_BLOCK_MONOMIALS. */
  constructor(
    readonly counts: readonly number[],
    readonly degree: readonly number[],
  ) {
    this.factors = factorsUpTo(counts, degree);
    for (const [i, f] of this.factors.entries()) this.factorNumbers.set(factorKey(f.field, f.derivative), i);
    const found = this.enumerate(degree, MOST_BLOCK_MONOMIALS);
    this.monomials = this.sortBestFirst(found);
    for (const [i, m] of this.monomials.entries()) this.index.set(m, i);
    this.reduced = new Array<Reduced | undefined>(this.monomials.length).fill(undefined);
    this.eliminate();
  }

  /** Number of standard monomials: the dimension of the block modulo total derivatives. */
  get standardCount(): number {
    return this.reduced.filter((r) => r === undefined).length;
  }
  /** The monomial with the given factors. */
  number(factors: readonly { field: number; derivative: readonly number[] }[]): number {
    const codes = factors.map((f) => this.factorNumbers.get(factorKey(f.field, f.derivative))!);
    return this.index.get(monomialOf(codes))!;
  }
  factorsOf(monomial: number): Factor[] {
    return Array.from(this.monomials[monomial]!, (c) => this.factors[c.charCodeAt(0)]!);
  }
  /** Normal form of a monomial: standard monomials with numerators over one denominator. */
  reduction(monomial: number): Reduced {
    return this.reduced[monomial] ?? { numerators: new Map([[monomial, 1n]]), denominator: 1n };
  }

  private enumerate(degree: readonly number[], limit: number): BlockMonomial[] {
    const out: BlockMonomial[] = [];
    const counts = [...this.counts];
    const left = [...degree];
    const chosen: number[] = [];
    // Factors are taken in descending number, so every multiset appears once and the first factor has the highest order:
    // once it is too low for the rest to reach the degree, nothing further down can.
    const extend = (highest: number, remaining: number, missing: number): void => {
      if (remaining === 0) {
        if (missing === 0) out.push(String.fromCharCode(...chosen));
        if (out.length > limit)
          throw new LimitError(
            `a block of densities with ${this.counts.join('+')} fields and derivatives (${degree.join(', ')}) has more than ${limit} monomials; lower expand: beyond-leading`,
          );
        return;
      }
      for (let i = highest; i >= 0; i--) {
        const { field, derivative, order } = this.factors[i]!;
        if (order * remaining < missing) return;
        if (counts[field] === 0 || exceeds(derivative, left)) continue;
        counts[field]!--;
        for (let k = 0; k < left.length; k++) left[k]! -= derivative[k]!;
        chosen.push(i);
        extend(i, remaining - 1, missing - order);
        chosen.pop();
        for (let k = 0; k < left.length; k++) left[k]! += derivative[k]!;
        counts[field]!++;
      }
    };
    const sum = (ns: readonly number[]): number => ns.reduce((x, y) => x + y, 0);
    extend(this.factors.length - 1, sum(this.counts), sum(degree));
    return out;
  }

  private sortBestFirst(monomials: BlockMonomial[]): BlockMonomial[] {
    const keyed = monomials.map((m) => {
      const factors = Array.from(m, (c) => this.factors[c.charCodeAt(0)]!);
      const common = factors[0]
        ? factors[0].derivative.map((_, k) => Math.min(...factors.map((f) => f.derivative[k]!)))
        : [];
      return {
        m,
        common: common.reduce((x, y) => x + y, 0),
        orders: String.fromCharCode(...factors.map((f) => f.order)),
        distinct: new Set(m).size,
      };
    });
    keyed.sort(
      (x, y) =>
        y.common - x.common ||
        (x.orders < y.orders ? -1 : x.orders > y.orders ? 1 : 0) ||
        x.distinct - y.distinct ||
        (x.m < y.m ? -1 : 1),
    );
    return keyed.map((k) => k.m);
  }

  /** Total derivative along an axis of a monomial one degree lower: monomial numbers with multiplicities. */
  private divergence(lower: BlockMonomial, axis: number): Map<number, bigint> {
    const row = new Map<number, bigint>();
    const codes = Array.from(lower, (c) => c.charCodeAt(0));
    for (let i = 0; i < codes.length; ) {
      let repeats = 1;
      while (codes[i + repeats] === codes[i]) repeats++;
      const next = [...codes];
      next[i] = this.raised(codes[i]!, axis);
      row.set(this.index.get(monomialOf(next))!, BigInt(repeats));
      i += repeats;
    }
    return row;
  }

  /** The factor with one more derivative along the axis. */
  private raised(code: number, axis: number): number {
    const known = this.raisedFactors[code * this.degree.length + axis];
    if (known !== undefined) return known;
    const { field, derivative } = this.factors[code]!;
    const key = factorKey(
      field,
      derivative.map((n, k) => (k === axis ? n + 1 : n)),
    );
    const raised = this.factorNumbers.get(key)!;
    this.raisedFactors[code * this.degree.length + axis] = raised;
    return raised;
  }

  /** Gauss-Jordan over Q, relation by relation in ascending order of the worst monomial. Most relations bring in a
   *  monomial never seen before and need no back-substitution. */
  private eliminate(): void {
    const relations: { row: Map<number, bigint>; worst: number }[] = [];
    for (const [axis, n] of this.degree.entries()) {
      if (n === 0) continue;
      const lower = this.degree.map((d, k) => (k === axis ? d - 1 : d));
      for (const m of this.enumerate(lower, MOST_BLOCK_MONOMIALS)) {
        const row = this.divergence(m, axis);
        relations.push({ row, worst: Math.max(...row.keys()) });
      }
    }
    relations.sort((x, y) => x.worst - y.worst);
    const seen = new Uint8Array(this.monomials.length);
    for (const { row } of relations) {
      const sum = this.combine(row);
      if (sum.size === 0) continue;
      let pivot = -1;
      for (const i of sum.keys()) if (i > pivot) pivot = i;
      const lead = sum.get(pivot)!;
      sum.delete(pivot);
      for (const [i, c] of sum) {
        sum.set(i, -c);
        seen[i] = 1;
      }
      const rule = lowestTerms(sum, lead);
      if (seen[pivot]) this.substitute(pivot, rule);
      this.reduced[pivot] = rule;
    }
  }

  /** A row written in monomials that are standard so far, up to a positive factor. */
  private combine(row: ReadonlyMap<number, bigint>): Map<number, bigint> {
    let common = 1n;
    for (const i of row.keys()) {
      const d = this.reduced[i]?.denominator ?? 1n;
      if (d !== 1n) common = (common / gcd(common, d)) * d;
    }
    const sum = new Map<number, bigint>();
    const add = (i: number, c: bigint): void => {
      const total = (sum.get(i) ?? 0n) + c;
      if (total === 0n) sum.delete(i);
      else sum.set(i, total);
    };
    for (const [i, c] of row) {
      const r = this.reduced[i];
      if (!r) add(i, c * common);
      else {
        const scale = c * (common / r.denominator);
        for (const [j, n] of r.numerators) add(j, n * scale);
      }
    }
    return sum;
  }

  private substitute(pivot: number, rule: Reduced): void {
    for (const [i, r] of this.reduced.entries()) {
      const weight = r?.numerators.get(pivot);
      if (!r || weight === undefined) continue;
      const sum = new Map<number, bigint>();
      for (const [j, n] of r.numerators) if (j !== pivot) sum.set(j, n * rule.denominator);
      for (const [j, n] of rule.numerators) {
        const total = (sum.get(j) ?? 0n) + n * weight;
        if (total === 0n) sum.delete(j);
        else sum.set(j, total);
      }
      this.reduced[i] = lowestTerms(sum, r.denominator * rule.denominator);
    }
  }
}

/** True when some entry of x is above that of y. */
function exceeds(x: readonly number[], y: readonly number[]): boolean {
  for (let k = 0; k < x.length; k++) if (x[k]! > y[k]!) return true;
  return false;
}

const factorKey = (field: number, derivative: readonly number[]): string =>
  `${field}:${derivative.join(',')}`;

function monomialOf(codes: number[]): BlockMonomial {
  return String.fromCharCode(...codes.sort((x, y) => y - x));
}

/** All factors that can occur, ordered by number of derivatives, then derivative, then field. */
function factorsUpTo(counts: readonly number[], degree: readonly number[]): Factor[] {
  let derivatives: number[][] = [[]];
  for (const n of degree)
    derivatives = derivatives.flatMap((d) => Array.from({ length: n + 1 }, (_, k) => [...d, k]));
  const factors = derivatives.flatMap((derivative) =>
    counts.flatMap((count, field) =>
      count > 0 ? [{ field, derivative, order: derivative.reduce((x, y) => x + y, 0) }] : [],
    ),
  );
  return factors.sort((x, y) => {
    if (x.order !== y.order) return x.order - y.order;
    for (let k = 0; k < degree.length; k++)
      if (x.derivative[k] !== y.derivative[k]) return x.derivative[k]! - y.derivative[k]!;
    return x.field - y.field;
  });
}

function lowestTerms(numerators: Map<number, bigint>, denominator: bigint): Reduced {
  let g = denominator < 0n ? -denominator : denominator;
  for (const n of numerators.values()) {
    if (g === 1n) break;
    g = gcd(g, n);
  }
  if (denominator < 0n) g = -g;
  if (g === 1n) return { numerators, denominator };
  for (const [i, n] of numerators) numerators.set(i, n / g);
  return { numerators, denominator: denominator / g };
}
