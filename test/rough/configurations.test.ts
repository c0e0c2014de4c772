import { describe, expect, it } from 'vitest';
import { readTree } from '../../src/notation/parse.ts';
import { chargeEnergies } from '../../src/rough/charges.ts';
import { analyseConfigurations } from '../../src/rough/configurations.ts';
import { analysed, claiming, on } from './systems.ts';

const names = [
  'ring-exchange-sheet',
  'rotor-square',
  'central-ring-exchange',
  'face-rotors',
  'clock-anisotropy',
];

describe('the families that are examined', () => {
  it('are all different and include what the shift analysis found', () => {
    const { configurations, profiles } = analyseConfigurations(analysed('central-ring-exchange'));
    const texts = configurations.map((c) => c.profile);
    expect(new Set(texts).size).toBe(texts.length);
    expect(texts.some((t) => t.startsWith('(-1)^'))).toBe(true);
    expect([...profiles.keys()]).toEqual(texts);
  });
  it('name a claimed family once and mark it', () => {
    const { configurations, byClaim } = analyseConfigurations(claiming(analysed('rotor-square'), 'theta(x)'));
    const found = configurations.filter((c) => c.profile === 'theta(x)');
    expect(found).toEqual([byClaim.get('family')]);
    expect(found[0]!.claimed).toBe(true);
  });
  for (const name of names)
    it(`of ${name} are suppressed exactly when their exponent of a is negative, and cost what their dearest term costs`, () => {
      for (const c of analyseConfigurations(analysed(name)).configurations) {
        expect(c.undecided).toBeUndefined();
        expect(c.suppressed.lattice).toBe(c.lattice !== 'zero' && c.lattice.a.sign < 0);
        const terms = [...c.byTerm.values()].flatMap((s) => (s === 'zero' ? [] : [s.a.toNumber()]));
        if (c.lattice === 'zero') expect(terms).toEqual([]);
        else expect(c.lattice.a.toNumber()).toBe(Math.min(...terms));
      }
    });
  for (const name of names)
    it(`of ${name} have a mixed action exactly when they cost something, and it reads back`, () => {
      for (const c of analyseConfigurations(analysed(name)).configurations) {
        expect(c.mixedAction === '').toBe(c.lattice === 'zero');
        for (const part of c.mixedAction.split('; ').filter((p) => p !== ''))
          expect(() => readTree(part.replace(/^[^:]*: /, ''))).not.toThrow();
      }
    });
  it('include those that cost the lattice nothing and the continuum everything', () => {
    const found = on(analysed('central-differences'), '(-1)^x');
    expect(found.suppressed).toEqual({ lattice: false, continuum: true });
  });
});

describe('unit charges', () => {
  it('of f(x) on the sheet cost 1/(a l), so the two limits do not commute', () => {
    const energies = chargeEnergies(analysed('ring-exchange-sheet'));
    expect(energies.map((e) => [e.family, `${e.p}`, `${e.q}`, e.limitsCommute])).toEqual([
      ['f(x)', '1', '1', false],
      ['g(y)', '1', '1', false],
    ]);
  });
  it('of the global shift cost 1/l^2 in two dimensions', () => {
    const [energy] = chargeEnergies(analysed('rotor-square'));
    expect([`${energy!.p}`, `${energy!.q}`, energy!.limitsCommute]).toEqual(['0', '2', true]);
  });
  it('weighted with a coordinate stay undecided', () => {
    const dipole = chargeEnergies(analysed('dipole-chain')).find((e) => e.family === 'x');
    expect(dipole!.undecided).toMatch(/coordinate/);
  });
});

describe('mixed effective actions', () => {
  const rows: [string, string, string][] = [
    ['ring-exchange-sheet', 'theta(x) theta(y)', 'plaquette: beta*(1 - cos(Delta_x Delta_y phi))'],
    ['ring-exchange-sheet', 'f(x) s(y)', 'plaquette: beta*a^2/2 (Delta_x d_y phi)^2'],
    ['laplacian-sheet', 'f(x)', 'bending: K/2*(Delta_x Deltab_x phi)^2'],
    ['rotor-square', 's(x)', 'x-link: beta*a^2/2 (d_x phi)^2'],
    // 2/3 − (1/24) 2^2 = 1/2: the improved stencil has the same leading order
    ['improved-rotor-square', 's(x)', 'x-link: beta*a^2/2 (d_x phi)^2'],
    ['central-ring-exchange', 'f(x) s(y)', 'double-plaquette: 2*beta*a^2 ((T_x d_y - T_x^-1 d_y) phi)^2'],
  ];
  for (const [name, profile, wanted] of rows)
    it(`of ${profile} in ${name} is ${wanted}`, () => {
      expect(on(analysed(name), profile).mixedAction).toBe(wanted);
    });
});
