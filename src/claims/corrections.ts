// Where the corrections begin. Limits are taken one after the other, so once the time spacing is at zero only the orders in
// the space spacings remain; a claim may also name the spacings one by one.

import type { Expansion, ExpansionOrder } from '../limit/expansion.ts';
import { type Lattice, spaceAxes } from '../model/geometry.ts';

/** Smallest positive order in the given spacings, among corrections of order zero in all the others; undefined when there
 *  is none through the order of the expansion. */
export function firstCorrection(
  expansion: Expansion,
  spacings: ReadonlySet<string>,
): ExpansionOrder | undefined {
  const orderIn = (o: ExpansionOrder): number =>
    [...o.order].reduce((sum, [s, n]) => (spacings.has(s) ? sum + n : sum), 0);
  const alone = expansion.orders.filter(
    (o) => orderIn(o) > 0 && [...o.order].every(([s, n]) => spacings.has(s) || n === 0),
  );
  return alone.sort((x, y) => orderIn(x) - orderIn(y))[0];
}

/** The spacings of the space axes: those that are left when the time spacing has gone to zero. */
export function spaceSpacings(lattice: Lattice): Set<string> {
  return new Set(spaceAxes(lattice).map((k) => lattice.axes[k]!.spacing));
}
