// Exponents worked out by hand, for jumps of fixed height, fixed size and fixed continuum couplings.

import { describe, expect, it } from 'vitest';
import { checkCase } from '../../src/check.ts';
import { scalingText } from '../../src/claims/scalingText.ts';
import type { Configuration } from '../../src/rough/profile.ts';
import { type InlineCase, inlineCase, kinetic } from '../inlineCase.ts';

/** Claims about any verdict, so that the families are examined. */
const asking = (profiles: readonly string[]): string[] =>
  profiles.map((p, i) => `{id: c${i}, configuration: "${p}", suppressed: {lattice: yes}}`);

function examine(parts: InlineCase, profiles: readonly string[]): Configuration[] {
  const { analyses } = checkCase(inlineCase({ ...parts, claims: asking(profiles) }), []);
  return profiles.map((p) => analyses.configurations.find((c) => c.profile === p)!);
}

const both = (c: Configuration): [string, string, string] => [
  c.profile,
  scalingText(c.lattice),
  scalingText(c.continuum!),
];

const sheet: InlineCase = {
  parameters: ['J0', 'J'],
  action: { time: kinetic, plaquette: 'J*(1 - cos(Delta_x Delta_y phi))' },
  lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x d_y phi)^2',
  proposalParameters: ['K0', 'K'],
};
const square: InlineCase = {
  parameters: ['J0', 'J'],
  action: { time: kinetic, x: 'J*(1 - cos(Delta_x phi))', y: 'J*(1 - cos(Delta_y phi))' },
  lagrangian: 'K0/2 (d_tau phi)^2 + K/2 ((d_x phi)^2 + (d_y phi)^2)',
  proposalParameters: ['K0', 'K'],
};

describe('exponents on rough families', () => {
  it('of the plaquette action: lines are free, corners cost K t/a², a generic field K ℓ² t/a⁴, one rough direction K t/a²', () => {
    const zero = 'identically zero';
    expect(
      examine(sheet, [
        'f(x)',
        'f(x) + g(y)',
        'theta(x) theta(y)',
        'f(x, y)',
        'f(x) s(y)',
        'theta(x) s(y)',
        's(x) u(y)',
      ]).map(both),
    ).toEqual([
      ['f(x)', zero, zero],
      ['f(x) + g(y)', zero, zero],
      // J (one plaquette) at each of t/b times, J = K b/a².
      ['theta(x) theta(y)', 'a^-2 t', 'a^-2 t'],
      // J on (ℓ/a)² plaquettes.
      ['f(x, y)', 'a^-4 l^2 t', 'a^-4 l^2 t'],
      // J a² (f(x+a) − f(x))² s'(y)²/2 on (ℓ/a)² plaquettes; s' ~ 1/ℓ.
      ['f(x) s(y)', 'a^-2 t', 'a^-2 t'],
      // the same on one column: J a² s'² on ℓ/a plaquettes.
      ['theta(x) s(y)', 'a^-1 l^-1 t', 'a^-1 l^-1 t'],
      // smooth fields: K s'² u'² ℓ² = K/ℓ².
      ['s(x) u(y)', 'l^-2 t', 'l^-2 t'],
    ]);
  });

  it('of ordinary rotors: a rough line costs K ℓ² t/a², a wall K ℓ t/a, a spike K t', () => {
    expect(
      examine(square, ['f(x)', 'theta(x)', 'delta_site(x) delta_site(y)', 'theta(x+y)', 's(x)']).map(both),
    ).toEqual([
      ['f(x)', 'a^-2 l^2 t', 'a^-2 l^2 t'],
      ['theta(x)', 'a^-1 l t', 'a^-1 l t'],
      ['delta_site(x) delta_site(y)', 't', 't'],
      ['theta(x+y)', 'a^-1 l t', 'a^-1 l t'],
      ['s(x)', 't', 't'],
    ]);
  });

  it('tell a lattice that does not see alternating fields from a continuum that does', () => {
    const [stripes] = examine(
      {
        ...square,
        action: { time: kinetic, x: 'J*(1 - cos((T_x - T_x^-1) phi))', y: 'J*(1 - cos((T_y - T_y^-1) phi))' },
      },
      ['(-1)^x'],
    );
    expect(both(stripes!)).toEqual(['(-1)^x', 'identically zero', 'a^-2 l^2 t']);
    expect(stripes!.suppressed).toEqual({ lattice: false, continuum: true });
  });

  it('see exact cancellations: f(x+y) under the diagonal ring exchange, x² − y² under the Laplacian', () => {
    const diagonal: InlineCase = {
      ...sheet,
      action: { time: kinetic, ring: 'J*(1 - cos((T_x T_y - 1) (T_x T_y^-1 - 1) phi))' },
      lagrangian: 'K0/2 (d_tau phi)^2 + K/2 ((d_x^2 - d_y^2) phi)^2',
    };
    expect(examine(diagonal, ['f(x+y)', 'f(x-y)', 'f(x)']).map((c) => c.suppressed)).toEqual([
      { lattice: false, continuum: false },
      { lattice: false, continuum: false },
      { lattice: true, continuum: true },
    ]);
    const bending: InlineCase = {
      values: 'real',
      parameters: ['J'],
      action: { bending: 'J*((Delta_x Deltab_x + Delta_y Deltab_y) phi)^2' },
      lagrangian: 'K*((d_x^2 + d_y^2) phi)^2',
      proposalParameters: ['K'],
    };
    expect(examine(bending, ['x^2 - y^2', 'x*y']).map((c) => [c.lattice, c.continuum])).toEqual([
      ['zero', 'zero'],
      ['zero', 'zero'],
    ]);
  });

  it('of steps in three dimensions and of functions that may move in time', () => {
    const films: InlineCase = {
      axes: ['x', 'y', 'z'],
      parameters: ['J0', 'J', 'G'],
      action: { time: kinetic, film: 'J*(1 - cos(Delta_x Delta_y phi))', link: 'G*(1 - cos(Delta_z phi))' },
      lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x d_y phi)^2 + L/2 (d_z phi)^2',
      proposalParameters: ['K0', 'K', 'L'],
    };
    expect(examine(films, ['theta(z)', 'theta(x) theta(y)', 'f(x) s(z)', 'f(x) s(tau)']).map(both)).toEqual([
      ['theta(z)', 'a^-1 l^2 t', 'a^-1 l^2 t'],
      ['theta(x) theta(y)', 'a^-2 l t', 'a^-2 l t'],
      ['f(x) s(z)', 'l t', 'l t'],
      ['f(x) s(tau)', 'l^3 t^-1', 'l^3 t^-1'],
    ]);
  });
});

describe('the series in the spacing', () => {
  it('truncates on smooth families and not on rough ones that cost something', () => {
    expect(examine(sheet, ['s(x) u(y)', 'f(x)', 'f(x) s(y)']).map((c) => c.truncates)).toEqual([
      true,
      true,
      false,
    ]);
    expect(examine(square, ['s(x)', 's(x) u(y)', 'theta(x)']).map((c) => c.truncates)).toEqual([
      true,
      true,
      false,
    ]);
  });

  it('prints the mixed action with lattice operators along rough directions only', () => {
    const [mixed] = examine(sheet, ['f(x) s(y)']);
    expect(mixed!.mixedAction).toBe('plaquette: J*a^2/2 (Delta_x d_y phi)^2');
  });
});

describe('the energy of a unit charge', () => {
  it('is 1/(mu0 a ℓ) for line-like charges of a sheet, and the limits do not commute; 1/(mu0 ℓ²) for the global charge', () => {
    const lines = checkCase(inlineCase(sheet), []).analyses.charges;
    expect(lines.map((c) => [c.family, `${c.p}`, `${c.q}`, c.limitsCommute])).toEqual([
      ['f(x)', '1', '1', false],
      ['g(y)', '1', '1', false],
    ]);
    const global = checkCase(inlineCase(square), []).analyses.charges;
    expect(global.map((c) => [c.family, `${c.p}`, `${c.q}`, c.limitsCommute])).toEqual([
      ['1', '0', '2', true],
    ]);
  });

  it('names the kinetic coupling as the proposal does', () => {
    expect(checkCase(inlineCase(sheet), []).analyses.charges[0]!.text).toBe('E ~ 1/(K0 a l)');
    const split = {
      ...sheet,
      lagrangian: '(p + q)/2 (d_tau phi)^2 + K/2 (d_x d_y phi)^2',
      proposalParameters: ['p', 'q', 'K'],
    };
    expect(checkCase(inlineCase(split), []).analyses.charges[0]!.text).toBe('E ~ 1/((p + q) a l)');
  });

  it('stays undecided without a plain kinetic term', () => {
    const [charge] = checkCase(
      inlineCase({
        ...sheet,
        action: { time: 'J0*(1 - cos(Delta_tau Delta_x phi))', plaquette: sheet.action.plaquette! },
        lagrangian: 'K0/2 (d_tau d_x phi)^2 + K/2 (d_x d_y phi)^2',
      }),
      [],
    ).analyses.charges;
    expect(charge?.undecided ?? 'no charge').toMatch(/kinetic|no charge/);
  });
});
