// T2: are two densities with four fields and d derivatives in two dimensions equivalent modulo total derivatives? The
// input is a list of densities L1, L2 = L1 + D_x F + D_y G and L3 = L2 + (∂_x^(d/2) φ)² φ²: the first two are
// equivalent, the third is not.

import { Coefficient } from '../../src/exact/coefficient.ts';
import { eulerOperator } from '../../src/limit/eulerOperator.ts';
import { addTerm, Density, type JetMonomial, JetSpace } from '../../src/limit/jets.ts';
import { isEquivalent } from '../../src/limit/normalForm.ts';

/** A derivative (∂_x^i ∂_y^j) of the field. */
type Jet = readonly [number, number];
/** Coefficient and four jets. */
export type Monomial = readonly [number, ...Jet[]];
export type Densities = readonly (readonly Monomial[])[];

export type Mode = 'sparse' | 'dense';

/** Pseudo-random integers 0 … n − 1, the same in every run (linear congruence modulo 2^32; D. E. Knuth, The Art of
 *  Computer Programming 2, section 3.3.4). */
function randomIntegers(start: number): (n: number) => number {
  let state = start >>> 0;
  return (n) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * n);
  };
}

/** All multisets of four jets with d derivatives together. */
function jetMultisets(d: number): Jet[][] {
  const jets: Jet[] = [];
  for (let i = 0; i <= d; i++) for (let j = 0; i + j <= d; j++) jets.push([i, j]);
  const out: Jet[][] = [];
  const extend = (from: number, left: number, chosen: Jet[]): void => {
    if (chosen.length === 4) {
      if (left === 0) out.push(chosen);
      return;
    }
    for (let q = from; q < jets.length; q++) {
      const [i, j] = jets[q]!;
      if (i + j <= left) extend(q, left - i - j, [...chosen, jets[q]!]);
    }
  };
  extend(0, d, []);
  return out;
}

class MonomialSum {
  private readonly terms = new Map<string, Monomial>();

  add(coefficient: number, jets: readonly Jet[]): void {
    const sorted = [...jets].sort(([i, j], [k, l]) => i - k || j - l);
    const key = sorted.join(';');
    const sum = coefficient + (this.terms.get(key)?.[0] ?? 0);
    if (sum === 0) this.terms.delete(key);
    else this.terms.set(key, [sum, ...sorted]);
  }
  addDerivative(monomials: readonly Monomial[], axis: 0 | 1): void {
    for (const [coefficient, ...jets] of monomials)
      for (const q of jets.keys())
        this.add(
          coefficient,
          jets.map(([i, j], p): Jet => (p === q ? [i + (1 - axis), j + axis] : [i, j])),
        );
  }
  get list(): Monomial[] {
    return [...this.terms.values()];
  }
}

/** An input of our own, for when no outside system is there to give one: all monomials, or twelve of them. */
export function inventedDensities(d: number, mode: Mode): Densities {
  const random = randomIntegers(1000 * d + (mode === 'dense' ? 1 : 0));
  const weight = (): number => (random(2) === 0 ? -1 : 1) * (1 + random(9));
  const pick = (order: number): Monomial[] => {
    const all = jetMultisets(order);
    const chosen =
      mode === 'dense' ? all : Array.from({ length: 12 }, () => all.splice(random(all.length), 1)[0]!);
    return chosen.map((jets): Monomial => [weight(), ...jets]);
  };
  const first = pick(d);
  const sum = new MonomialSum();
  for (const [coefficient, ...jets] of first) sum.add(coefficient, jets);
  sum.addDerivative(pick(d - 1), 0);
  sum.addDerivative(pick(d - 1), 1);
  const second = sum.list;
  sum.add(1, [
    [d / 2, 0],
    [d / 2, 0],
    [0, 0],
    [0, 0],
  ]);
  return [first, second, sum.list];
}

function density(space: JetSpace, monomials: readonly Monomial[]): Density {
  const terms = new Map<JetMonomial, Coefficient>();
  for (const [coefficient, ...jets] of monomials)
    addTerm(
      terms,
      space.monomial(jets.map((derivative) => ({ field: 0, derivative }))),
      Coefficient.integer(coefficient),
    );
  return new Density(space, terms);
}

export type Method = 'normal form' | 'Euler operator';

/** [L1 ~ L2, L1 ~ L3], from the lists on: a new jet space, so that no table of an earlier call is used. */
export function equivalences(densities: Densities, method: Method): [boolean, boolean] {
  const space = new JetSpace(['phi'], ['x', 'y']);
  const [first, second, third] = densities.map((monomials) => density(space, monomials));
  const agree = (x: Density, y: Density): boolean =>
    method === 'normal form' ? isEquivalent(x, y) : eulerOperator(x.sub(y), 0).isZero;
  return [agree(second!, first!), agree(third!, first!)];
}
