import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { LatticeBox, onSites } from '../../src/witness/latticeSum.ts';
import {
  cos,
  forward,
  number,
  on,
  oneMinusCos,
  power,
  product,
  sum,
  symbol,
  T,
} from '../limit/handMadeCase.ts';

const box = [1, 4, 6];
const parameters = new Map([['beta', 2]]);
const lattice = new LatticeBox(box, parameters);
const values = onSites(box, ([, x, y]) => 0.3 * x! * x! - 0.7 * y! + 0.2 * x! * y!);
const at = (x: number, y: number): number => values[(((x % 4) + 4) % 4) * 6 + (((y % 6) + 6) % 6)]!;
const fields = new Map([['phi', values]]);

/** Σ over the box by plain loops. */
function looped(term: (x: number, y: number) => number): number {
  let total = 0;
  for (let x = 0; x < 4; x++) for (let y = 0; y < 6; y++) total += term(x, y);
  return total;
}

describe('sums over a periodic lattice', () => {
  it('of a plaquette term agree with plain loops', () => {
    const u = (x: number, y: number): number => at(x + 1, y + 1) - at(x + 1, y) - at(x, y + 1) + at(x, y);
    const plaquette = oneMinusCos('beta', on(forward(1).mul(forward(2))));
    expect(lattice.sum(plaquette, fields)).toBeCloseTo(
      looped((x, y) => 2 * (1 - Math.cos(u(x, y)))),
      10,
    );
  });
  it('of products, powers and backward shifts agree with plain loops', () => {
    const e = sum(product(on(T(1, -1)), power(on(T(2, 2)), 3), symbol('beta')), cos(on(T(1))), number(5));
    expect(lattice.sum(e, fields)).toBeCloseTo(
      looped((x, y) => 2 * at(x - 1, y) * at(x, y + 2) ** 3 + Math.cos(at(x + 1, y)) + 5),
      8,
    );
  });
  it('of a total difference vanish', () => {
    expect(lattice.sum(on(forward(1).mul(forward(2))), fields)).toBeCloseTo(0, 12);
  });
  it('leave the field as it was', () => {
    const before = Float64Array.from(values);
    lattice.sum(power(on(T(1, 0)), 2), fields);
    expect(values).toEqual(before);
  });
  it('take a field that is not given for zero', () => {
    expect(lattice.sum(cos(on(forward(1), 'chi')), fields)).toBe(24);
  });
  it('refuse a parameter without a value', () => {
    expect(() => lattice.sum({ kind: 'constant', value: Coefficient.symbol('nu') }, fields)).toThrow(
      RangeError,
    );
  });
});
