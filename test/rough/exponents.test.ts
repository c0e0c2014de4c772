// Exponents worked out by hand; the derivation stands beside each. Couplings: mu and mu0 of the proposal are fixed.

import { describe, expect, it } from 'vitest';
import { analysed, on, text } from './systems.ts';

/** Rows: family, lattice, continuum. */
function expectExponents(name: string, rows: readonly (readonly [string, string, string])[]): void {
  const input = analysed(name);
  for (const [profile, lattice, continuum] of rows)
    it(`${profile} costs ${lattice} on the lattice and ${continuum} in the continuum`, () => {
      const found = on(input, profile);
      expect(found.undecided).toBeUndefined();
      expect([text(found.lattice), text(found.continuum)]).toEqual([lattice, continuum]);
    });
}

describe('plaquette rotors, beta = mu b/a^2', () => {
  expectExponents('ring-exchange-sheet', [
    ['f(x)', 'zero', 'zero'],
    ['f(x) + g(y)', 'zero', 'zero'],
    ['theta(x)', 'zero', 'zero'],
    ['x', 'zero', 'zero'],
    // one plaquette: beta t/b = mu t/a^2
    ['theta(x) theta(y)', 'a^-2 l^0 t^1', 'a^-2 l^0 t^1'],
    ['delta_site(x) delta_site(y)', 'a^-2 l^0 t^1', 'a^-2 l^0 t^1'],
    // (l/a)^2 plaquettes
    ['f(x) g(y)', 'a^-4 l^2 t^1', 'a^-4 l^2 t^1'],
    ['f(x+y)', 'a^-4 l^2 t^1', 'a^-4 l^2 t^1'],
    // beta/2 (a/l)^2 (Delta_x f)^2 s'^2 on (l/a)^2 sites: mu/a^2 * a^2/l^2 * l^2/a^2
    ['f(x) s(y)', 'a^-2 l^0 t^1', 'a^-2 l^0 t^1'],
    // the same on l/a sites
    ['theta(x) s(y)', 'a^-1 l^-1 t^1', 'a^-1 l^-1 t^1'],
    // l/a plaquettes along the column
    ['theta(x) g(y)', 'a^-3 l^1 t^1', 'a^-3 l^1 t^1'],
    // mu/2 (s' u')^2/l^4 on l^2
    ['s(x) u(y)', 'a^0 l^-2 t^1', 'a^0 l^-2 t^1'],
    ['x*y', 'a^0 l^-2 t^1', 'a^0 l^-2 t^1'],
    // the step along the diagonal: l/a plaquettes
    ['theta(x+y)', 'a^-3 l^1 t^1', 'a^-3 l^1 t^1'],
    // x > 0 and y > 0 imply x + y > 0: this is theta(x) theta(y)
    ['theta(x) theta(y) theta(x+y)', 'a^-2 l^0 t^1', 'a^-2 l^0 t^1'],
    // the two half-planes exclude each other but for the line of sites x = 0
    ['theta(x) theta(-x)', 'zero', 'zero'],
    // Delta_x x theta(x) = theta(x+1), no y
    ['x theta(x)', 'zero', 'zero'],
    // Delta_y y = a/l: the jump in x has that height on l/a sites: mu/a^2 (a/l)^2 (l/a)
    ['y theta(x)', 'a^-1 l^-1 t^1', 'a^-1 l^-1 t^1'],
    // whole turns cost nothing, neither here nor there
    ['2*pi theta(x)', 'zero', 'zero'],
    // at the corner of a whole turn the lattice sees nothing, the continuum action does
    ['2*pi theta(x) theta(y)', 'zero', 'a^-2 l^0 t^1'],
  ]);
  it('an independent profile at every time costs 1/b^2 before a plays a role', () => {
    const found = on(analysed('ring-exchange-sheet'), 'f(x, tau)');
    expect(text(found.lattice)).toBe('a^0 l^2 t^1 b^-2');
    expect(found.suppressed).toEqual({ lattice: true, continuum: true });
  });
});

describe('ordinary rotors in two dimensions of space, beta = mu b', () => {
  expectExponents('rotor-square', [
    ['1', 'zero', 'zero'],
    ['f(x)', 'a^-2 l^2 t^1', 'a^-2 l^2 t^1'],
    ['theta(x)', 'a^-1 l^1 t^1', 'a^-1 l^1 t^1'],
    ['theta(x) theta(y)', 'a^-1 l^1 t^1', 'a^-1 l^1 t^1'],
    ['delta_site(x) delta_site(y)', 'a^0 l^0 t^1', 'a^0 l^0 t^1'],
    ['s(x)', 'a^0 l^0 t^1', 'a^0 l^0 t^1'],
    ['(-1)^x', 'a^-2 l^2 t^1', 'a^-2 l^2 t^1'],
    // a kink: (a/l)^2 on (l/a)^2/2 sites
    ['x theta(x)', 'a^0 l^0 t^1', 'a^0 l^0 t^1'],
    ['x delta_site(x)', 'zero', 'a^1 l^-1 t^1'],
    ['2*pi theta(x)', 'zero', 'a^-1 l^1 t^1'],
    ['2*pi f(x)', 'zero', 'a^-2 l^2 t^1'],
    ['pi theta(x)', 'a^-1 l^1 t^1', 'a^-1 l^1 t^1'],
    // mu0/2 (d_tau phi)^2 = mu0/2 b^-2 on one slice of thickness b
    ['theta(tau)', 'a^0 l^2 t^0 b^-1', 'a^0 l^2 t^0 b^-1'],
    ['s(tau)', 'a^0 l^2 t^-1', 'a^0 l^2 t^-1'],
    // the links in space cost 1/a^2, those in time 1/b^2, and b goes to zero first
    ['f(x, tau)', 'a^0 l^2 t^1 b^-2', 'a^0 l^2 t^1 b^-2'],
  ]);
});

describe('ordinary rotors in three dimensions of space, beta = mu a b', () => {
  expectExponents('rotor-cube', [
    ['theta(x)', 'a^-1 l^2 t^1', 'a^-1 l^2 t^1'],
    ['delta_site(x) delta_site(y) delta_site(z)', 'a^1 l^0 t^1', 'a^1 l^0 t^1'],
    ['theta(x) theta(y) theta(z)', 'a^-1 l^2 t^1', 'a^-1 l^2 t^1'],
  ]);
});

describe('central differences', () => {
  expectExponents('central-differences', [
    // the lattice links every second site and sees no alternation; the operator (d_x phi)^2 sees a jump at each site
    ['(-1)^x', 'zero', 'a^-2 l^2 t^1'],
    ['(-1)^x (-1)^y', 'zero', 'a^-2 l^2 t^1'],
    ['(-1)^x s(x)', 'a^0 l^0 t^1', 'a^-2 l^2 t^1'],
    ['theta(x)', 'a^-1 l^1 t^1', 'a^-1 l^1 t^1'],
  ]);
});

describe('double plaquettes', () => {
  expectExponents('central-ring-exchange', [
    ['(-1)^x f(y)', 'zero', 'a^-4 l^2 t^1'],
    ['theta(x) theta(y)', 'a^-2 l^0 t^1', 'a^-2 l^0 t^1'],
  ]);
});

describe('the dipole chain, beta = mu b/a^3', () => {
  expectExponents('dipole-chain', [
    ['x', 'zero', 'zero'],
    ['theta(x)', 'a^-3 l^0 t^1', 'a^-3 l^0 t^1'],
    ['f(x)', 'a^-4 l^1 t^1', 'a^-4 l^1 t^1'],
    // Delta Deltab x theta(x) = a/l at one site: mu/a^3 (a/l)^2
    ['x theta(x)', 'a^-1 l^-2 t^1', 'a^-1 l^-2 t^1'],
    ['x^2', 'a^0 l^-3 t^1', 'a^0 l^-3 t^1'],
    ['s(x)', 'a^0 l^-3 t^1', 'a^0 l^-3 t^1'],
  ]);
});

describe('diagonal squares', () => {
  expectExponents('diagonal-ring-exchange', [
    // (d_x^2 - d_y^2) annihilates functions of x + y and of x - y, term by term of the square only up to total derivatives
    ['f(x+y) + g(x-y)', 'zero', 'zero'],
    ['s(x+y) + u(x-y)', 'zero', 'zero'],
    ['x*y', 'zero', 'zero'],
    ['x^2 + y^2', 'zero', 'zero'],
    ['f(x+y) f(x-y)', 'a^-4 l^2 t^1', 'a^-4 l^2 t^1'],
    ['theta(x)', 'a^-3 l^1 t^1', 'a^-3 l^1 t^1'],
    ['(-1)^(x+y)', 'zero', 'zero'],
  ]);
});

describe('the square of the Laplacian', () => {
  expectExponents('laplacian-sheet', [
    ['x*y', 'zero', 'zero'],
    ['x^2 - y^2', 'zero', 'zero'],
    ['x^3 - 3 x y^2', 'zero', 'zero'],
    // the lattice Laplacian of the harmonic quartic is 4 (a/l)^4: K = kappa b/a^2, (a/l)^8 on (l/a)^2 sites
    ['x^4 - 6 x^2 y^2 + y^4', 'a^4 l^-6 t^1', 'zero'],
    ['theta(x)', 'a^-3 l^1 t^1', 'a^-3 l^1 t^1'],
  ]);
});

describe('cubes', () => {
  expectExponents('cube-rotors', [
    ['f(x, y) + g(y, z) + h(z, x)', 'zero', 'zero'],
    ['theta(x) theta(y) theta(z)', 'a^-3 l^0 t^1', 'a^-3 l^0 t^1'],
    ['theta(x) theta(y) s(z)', 'a^-2 l^-1 t^1', 'a^-2 l^-1 t^1'],
    ['f(x) g(y) h(z)', 'a^-6 l^3 t^1', 'a^-6 l^3 t^1'],
  ]);
});

describe('the series in the spacing', () => {
  it('truncates on smooth families, each order less singular by its powers of a', () => {
    const found = on(analysed('rotor-square'), 's(x)');
    expect(found.truncates).toBe(true);
    expect(found.corrections.map((c) => [c.order, text(c.scaling), c.sameAsLeading])).toEqual([
      [2, 'a^2 l^-2 t^1', false],
      [4, 'a^4 l^-4 t^1', false],
    ]);
  });
  it('does not truncate at a jump: every order costs as much as the leading one', () => {
    const found = on(analysed('rotor-square'), 'theta(x)');
    expect(found.truncates).toBe(false);
    expect(found.corrections.map((c) => [c.order, text(c.scaling), c.sameAsLeading])).toEqual([
      [2, 'a^-1 l^1 t^1', true],
      [4, 'a^-1 l^1 t^1', true],
    ]);
  });
  it('truncates where every order vanishes', () => {
    const found = on(analysed('diagonal-ring-exchange'), 'f(x+y) + g(x-y)');
    expect(found.truncates).toBe(true);
    expect(found.corrections.every((c) => c.scaling === 'zero' && !c.sameAsLeading)).toBe(true);
  });
  it('truncates where a correction alone is left', () => {
    const found = on(analysed('laplacian-sheet'), 'x^4 - 6 x^2 y^2 + y^4');
    expect(found.corrections.map((c) => text(c.scaling))).toContain('a^4 l^-6 t^1');
    expect(found.truncates).toBe(true);
  });
});

describe('what cannot be counted', () => {
  it('an argument that mixes space with time stays undecided', () => {
    expect(on(analysed('rotor-square'), 'theta(x+tau)').undecided).toMatch(/mixes space with time/);
  });
});
