// The gradient expansion of the ring-exchange action against values computed outside. Source: SymPy polynomial rings
// (sympy.polys.rings and ring_series), an independent script that expands both cosines in jets and evaluates their
// symmetrised momentum polynomials with Σ k = 0 at k_i = i + 1 for the links and k_i = (i, 2 i + 1) for the plaquettes;
// PARI/GP and FORM gave the same values at orders 2 and 8.

import { describe, expect, it } from 'vitest';
import { expansionCheck, ringExchangeExpansion } from '../bench/expansionTask.ts';

const published: { order: number; link: string; plaquette: string }[] = [
  { order: 2, link: '19/3', plaquette: '33/4' },
  { order: 4, link: '4949/180', plaquette: '-376471/160' },
  { order: 6, link: '-229253/840', plaquette: '-84209019/2240' },
  { order: 8, link: '-1101270721/907200', plaquette: '263835306811/403200' },
];

describe('the expansion of the ring-exchange action', () => {
  for (const { order, link, plaquette } of published) {
    const expansion = ringExchangeExpansion(order);
    it(`agrees with SymPy polynomial rings through relative order ${order}`, () => {
      expect(expansionCheck(expansion, 'raw')).toEqual([link, plaquette]);
    });
    it(`keeps its momentum polynomials in the normal form at relative order ${order}`, () => {
      expect(expansionCheck(expansion, 'normal')).toEqual([link, plaquette]);
    });
  }
});
