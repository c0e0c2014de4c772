import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dot, positionOn, type Region, regionsOf, rowKey } from '../../src/rough/regions.ts';

const row = fc
  .tuple(fc.integer({ min: -2, max: 2 }), fc.integer({ min: -2, max: 2 }))
  // rows of steps are primitive
  .filter(([p, q]) => [p, q].some((e) => Math.abs(e) === 1))
  .map(([p, q]): number[] => (p < 0 || (p === 0 && q < 0) ? [-p, -q] : [p, q]));
const rows = fc.uniqueArray(row, { minLength: 1, maxLength: 3, selector: rowKey });

/** Whether a site belongs to a region, when everything beyond the reach counts as far. */
function holds(
  region: Region,
  functionals: readonly number[][],
  site: readonly number[],
  reach: number,
): boolean {
  return functionals.every((f) => {
    const position = positionOn(region, f, [0, 0]);
    const value = dot(f, site);
    return 'side' in position ? value * position.side > reach : value === position.value;
  });
}

describe('regions of a family with steps', () => {
  it('cover every site of the plane that is far from or near to each functional at a time', () => {
    fc.assert(
      fc.property(rows, fc.integer({ min: -60, max: 60 }), fc.integer({ min: -60, max: 60 }), (fs, x, y) => {
        const site = [x, y];
        const reach = 1;
        // within the reach of one functional and just beyond that of another the site belongs to no asymptotic region
        const values = fs.map((f) => Math.abs(dot(f, site)));
        fc.pre(values.every((v) => v <= reach || v > 12));
        const near = fs.filter((_, i) => values[i]! <= reach);
        const regions = regionsOf(fs, 2, () => [-reach, reach]);
        const found = regions.filter((r) => holds(r, fs, site, reach));
        expect(found.length).toBeGreaterThan(0);
        expect(found.some((r) => r.near.length === Math.min(near.length, 2))).toBe(true);
      }),
    );
  });
  it('have points: along their directions every far functional reaches its side', () => {
    fc.assert(
      fc.property(rows, (fs) => {
        for (const region of regionsOf(fs, 2, () => [-1, 1])) {
          const far = fs.filter((f) => region.sides.has(rowKey(f)));
          const span = region.directions;
          const steps = [-9, -7, -5, -3, -2, -1, 0, 1, 2, 3, 5, 7, 9];
          const points =
            span.length === 0
              ? [[0, 0]]
              : steps.flatMap((s) => (span.length === 1 ? [s] : steps).map((t) => [s, t]));
          const reached = points.some(([s, t]) =>
            far.every((f) => {
              const growth = s! * dot(f, span[0] ?? [0, 0]) + t! * dot(f, span[1] ?? [0, 0]);
              return growth * region.sides.get(rowKey(f))! > 0;
            }),
          );
          expect(far.length === 0 || reached).toBe(true);
        }
      }),
    );
  });
  it('of x, y and x + y: the quadrants of opposite signs split, the others do not', () => {
    const open = regionsOf(
      [
        [1, 0],
        [0, 1],
        [1, 1],
      ],
      2,
      () => [0, 0],
    ).filter((r) => r.near.length === 0);
    expect(open).toHaveLength(6);
  });
  it('of x + y and x - y at the crossing: both values have the same parity', () => {
    const crossing = regionsOf(
      [
        [1, 1],
        [1, -1],
      ],
      2,
      () => [0, 1],
    ).filter((r) => r.near.length === 2);
    expect(crossing.map((r) => [dot([1, 1], r.base), dot([1, -1], r.base)])).toEqual([
      [0, 0],
      [1, 1],
    ]);
  });
});
