// T1: expansion of the ring-exchange action, beta0 (1 − cos Δ_τ φ) + beta (1 − cos Δ_x Δ_y φ), to a relative order, in
// normal form modulo total derivatives.

import { type Expansion, expandAction } from '../../src/limit/expansion.ts';
import { forward, handMadeCase, on, oneMinusCos } from '../limit/handMadeCase.ts';
import { momentumValue } from './momentumPolynomial.ts';

const action = {
  'time-link': oneMinusCos('beta0', on(forward(0))),
  plaquette: oneMinusCos('beta', on(forward(1).mul(forward(2)))),
};

/** The expansion through the relative order, in a jet space of its own: no block or series of an earlier call is used. */
export const ringExchangeExpansion = (order: number): Expansion =>
  expandAction(handMadeCase(action, { expand: { beyondLeading: order } }));

/** Values of the momentum polynomials of both terms at fixed momenta, all parameters and spacings 1: what the outside
 *  scripts print under `check`. The Taylor series (`raw`) and the normal form must have the same. */
export function expansionCheck(
  { byTerm }: Expansion,
  part: 'raw' | 'normal' = 'normal',
): [link: string, plaquette: string] {
  const [link, plaquette] = byTerm;
  return [
    momentumValue(link![part], (i) => [i + 1, 0, 0]).toString(),
    momentumValue(plaquette![part], (i) => [0, i, 2 * i + 1]).toString(),
  ];
}
