import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { type Rational, rational } from '../../src/exact/rational.ts';
import { type Expansion, expandAction } from '../../src/limit/expansion.ts';
import { isEquivalent, normalForm } from '../../src/limit/normalForm.ts';
import { printMonomial } from '../../src/limit/printDensity.ts';
import { printCoefficient } from '../../src/notation/print.ts';
import {
  forward,
  handMadeCase,
  identity,
  number,
  on,
  oneMinusCos,
  power,
  product,
  sum,
  symbol,
  T,
} from './handMadeCase.ts';

const plaquette = forward(1).mul(forward(2));

/** `{a:2,b:0}: coefficient * monomial` lines, for reading. */
const lines = (e: Expansion): string[] =>
  e.orders.flatMap((o) =>
    o.terms.map(
      (t) =>
        `${o.order.get('b')},${o.order.get('a')}: ${printCoefficient(t.coefficient, ['a', 'b'])} * ${printMonomial(e.space, t.monomial)}`,
    ),
  );

describe('the expansion of the ring-exchange action', () => {
  const theCase = handMadeCase(
    { 'time-link': oneMinusCos('beta0', on(forward(0))), plaquette: oneMinusCos('beta', on(plaquette)) },
    { expand: { beyondLeading: 8 } },
  );
  const expansion = expandAction(theCase);
  const coefficient = (dx: number, dy: number, n: number): Rational | undefined => {
    const factors = Array.from({ length: n }, () => ({ field: 0, derivative: [0, dx, dy] }));
    const monomial = expansion.space.monomial(factors);
    const found = expansion.orders.flatMap((o) => o.terms).find((t) => t.monomial === monomial);
    return found?.coefficient.terms[0]?.factor;
  };

  it('starts with beta a²/(2b) (∂x∂yφ)² and beta0 b/(2a²) (∂τφ)²', () => {
    expect(lines(expansion).slice(0, 2)).toEqual([
      '0,0: beta*a^2/(2*b) * (d_x d_y phi)^2',
      '0,0: beta0*b/(2*a^2) * (d_tau phi)^2',
    ]);
  });

  it('has the quadratic part (1/2)(2 − 2 cos kx)(2 − 2 cos ky) through relative order a⁸', () => {
    // 2 − 2 cos k = Σ 2(−1)^(j+1) k^(2j)/(2j)!: the entry khat2 of the published values, H. J. Rothe, Lattice Gauge
    // Theories (lattice momentum; number not checked), k² − k⁴/12 + k⁶/360 − k⁸/20160 + k¹⁰/1814400.
    const series = [
      rational(1),
      rational(-1, 12),
      rational(1, 360),
      rational(-1, 20160),
      rational(1, 1814400),
    ];
    for (let i = 1; i <= 5; i++)
      for (let j = 1; i + j <= 6; j++) {
        const expected = series[i - 1]!.mul(series[j - 1]!).div(rational(2));
        expect(`${i},${j}: ${coefficient(i, j, 2)}`).toBe(`${i},${j}: ${expected}`);
      }
  });

  it('carries the quartic −1/24 and the sextic 1/720 field terms where they belong', () => {
    const at = (n: number): number | undefined =>
      expansion.orders.find((o) =>
        o.terms.some(
          (t) =>
            t.monomial ===
            expansion.space.monomial(Array.from({ length: n }, () => ({ field: 0, derivative: [0, 1, 1] }))),
        ),
      )?.total;
    expect(`${coefficient(1, 1, 4)}`).toBe('-1/24');
    expect(at(4)).toBe(4);
    expect(`${coefficient(1, 1, 6)}`).toBe('1/720');
    expect(at(6)).toBe(8);
  });

  it('has no odd orders, since every term is expanded about the centre of its support', () => {
    expect(expansion.orders.every((o) => [...o.order.values()].every((n) => n % 2 === 0))).toBe(true);
  });
});

describe('an expansion modulo total derivatives', () => {
  it('does not depend on how the same lattice action is written', () => {
    // (T−1)φ squared, and site by site: φ(1)² − 2 φ(1)φ(0) + φ(0)², each product about its own centre.
    const [here, there] = [on(identity), on(T(1))];
    const compact = expandAction(handMadeCase({ link: product(symbol('J'), power(on(forward(1)), 2)) }));
    const sites = expandAction(
      handMadeCase({
        link: product(symbol('J'), sum(power(there, 2), product(number(-2), there, here), power(here, 2))),
      }),
    );
    expect(lines(sites)).toEqual(lines(compact));
  });

  it('does not change when the whole stencil is translated, also off centre', () => {
    const shifted = plaquette.mul(T(1, 3)).mul(T(2, -2));
    const one = expandAction(handMadeCase({ p: oneMinusCos('beta', on(plaquette)) }));
    const other = expandAction(handMadeCase({ p: oneMinusCos('beta', on(shifted)) }));
    expect(lines(other)).toEqual(lines(one));
    // A product of the operator at two places of the lattice is another action, but it differs at corrections only.
    const apart = expandAction(handMadeCase({ p: product(symbol('beta'), on(plaquette), on(shifted)) }));
    const square = expandAction(handMadeCase({ p: product(symbol('beta'), power(on(plaquette), 2)) }));
    expect(lines(apart)[0]).toBe(lines(square)[0]);
    expect(lines(apart)).not.toEqual(lines(square));
  });

  it('keeps the raw series, which differs from its normal form by a total derivative', () => {
    const e = expandAction(handMadeCase({ p: oneMinusCos('beta', on(plaquette)) }));
    const { raw, normal } = e.byTerm[0]!;
    expect(isEquivalent(raw, normal)).toBe(true);
    expect(normalForm(raw).equals(normal)).toBe(true);
  });

  it('cuts the number of fields where a function acts on an undifferentiated field, and says so', () => {
    const e = expandAction(
      handMadeCase({ clock: oneMinusCos('h', on(identity.scale(Coefficient.integer(2)))) }),
    );
    expect(e.fieldCut).toBe(6);
    expect(lines(e)).toEqual([
      '0,0: 2*h/(a^2*b) * phi^2',
      '0,0: -2*h/(3*a^2*b) * phi^4',
      '0,0: 4*h/(45*a^2*b) * phi^6',
    ]);
  });

  it('counts a term that is all total derivatives as vanishing', () => {
    const e = expandAction(handMadeCase({ linear: product(symbol('J'), on(forward(1))) }));
    expect(e.orders).toEqual([]);
    expect(e.byTerm[0]!.leading).toBeUndefined();
  });

  it('expands about a declared background: (1 + φ)⁴ = 4φ + 6φ² + 4φ³ + φ⁴ up to its constant', () => {
    const e = expandAction(
      handMadeCase(
        { well: product(symbol('g'), power(on(identity), 4)) },
        {
          expand: { background: new Map([['phi', rational(1)]]) },
        },
      ),
    );
    expect(lines(e)).toEqual([
      '0,0: 4*g/(a^2*b) * phi',
      '0,0: 6*g/(a^2*b) * phi^2',
      '0,0: 4*g/(a^2*b) * phi^3',
      '0,0: g/(a^2*b) * phi^4',
    ]);
  });
});
