// Rules that no shipped case makes fire, each on a small case or on altered analyses of its own; and none goes without a firing
// and a silent example.

import { describe, expect, it } from 'vitest';
import { checkCase } from '../../src/check.ts';
import { shippedRules } from '../../src/cli/shippedRules.ts';
import { applyRules } from '../../src/rules/evaluate.ts';
import type { Analyses } from '../../src/rules/facts.ts';
import { loadRules } from '../../src/rules/load.ts';
import { type InlineCase, inlineCase, kinetic, sheet } from '../inlineCase.ts';

const rules = loadRules([shippedRules()]);
const analyse = (parts: InlineCase): Analyses => checkCase(inlineCase(parts), []).analyses;

const links: InlineCase = {
  parameters: ['J0', 'J'],
  action: { time: kinetic, x: 'J*(1 - cos(Delta_x phi))', y: 'J*(1 - cos(Delta_y phi))' },
  lagrangian: 'K0/2 (d_tau phi)^2 + K/2 ((d_x phi)^2 + (d_y phi)^2)',
  proposalParameters: ['K0', 'K'],
};
/** Nothing ties different times together. */
const timeless: InlineCase = {
  parameters: ['J'],
  action: { x: 'J*(1 - cos(Delta_x phi))' },
  lagrangian: 'K/2 (d_x phi)^2',
  proposalParameters: ['K'],
};

const firing: Record<string, () => Analyses> = {
  // The proposal lacks the link term that makes f(x) cost something.
  'continuum-misses-suppression': () =>
    analyse({
      parameters: ['J0', 'J', 'G'],
      action: {
        time: kinetic,
        plaquette: 'J*(1 - cos(Delta_x Delta_y phi))',
        link: 'G*(1 - cos(Delta_x phi))',
      },
      lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x d_y phi)^2',
      proposalParameters: ['K0', 'K'],
    }),
  'redundancy-claimed-as-symmetry': () =>
    analyse({ ...timeless, claims: ['{id: lines, shift: "f(y)", status: survives}'] }),
  'redundancy-found': () => analyse(timeless),
  'undetermined-parameter': () =>
    analyse({
      ...links,
      lagrangian:
        'K0/2 (d_tau phi)^2 + K/2 ((d_x phi)^2 + (d_y phi)^2) + (p - p) phi^2 + p*q*(d_x d_y phi)^2',
      proposalParameters: ['K0', 'K', 'p', 'q'],
    }),
  // The lattice has the tilt x only, the proposal's second derivative along the diagonal has more.
  'symmetry-only-in-continuum': () =>
    analyse({
      values: 'real',
      axes: ['x'],
      parameters: ['J0', 'J'],
      action: { time: 'J0*(Delta_tau phi)^2', link: 'J*(Delta_x phi)^2 + J*(Delta_x Deltab_x phi)^2' },
      lagrangian: 'K0*(d_tau phi)^2 + K*(d_x^2 phi)^2',
      proposalParameters: ['K0', 'K'],
    }),
  'compact-treated-as-real': () =>
    analyse({
      ...links,
      action: { time: 'J0*(Delta_tau phi)^2', x: 'J*(Delta_x phi)^2', y: 'J*(Delta_y phi)^2' },
    }),
  'witness-contradicts': () => {
    const analyses = checkCase(sheet, []).analyses;
    return { ...analyses, witness: analyses.witness.map((w) => ({ ...w, verdict: 'contradicts' as const })) };
  },
  'term-leaves-no-trace': () =>
    analyse({
      ...links,
      values: 'real',
      action: {
        time: 'J0*(Delta_tau phi)^2',
        x: 'J*(Delta_x phi)^2 + J*(Delta_y phi)^2',
        drift: 'J*phi*(T_x - T_x^-1) phi',
      },
    }),
};

/** Rules whose only silent example is made here. */
const silent: Record<string, () => Analyses> = {
  'coupling-runs-with-spacing': () =>
    analyse({
      ...links,
      time: false,
      axes: ['x', 'y'],
      parameters: ['J'],
      action: { x: links.action.x!, y: links.action.y! },
      lagrangian: 'K/2 ((d_x phi)^2 + (d_y phi)^2)',
      proposalParameters: ['K'],
    }),
};

describe('every shipped rule', () => {
  for (const rule of rules) {
    it(`${rule.id} has an example on which it fires`, () => {
      const own = firing[rule.id];
      expect(rule.examples.fires.length > 0 || own !== undefined).toBe(true);
      if (own) expect(applyRules([rule], own()).map((f) => f.rule)).toEqual([rule.id]);
    });
    it(`${rule.id} has an example on which it is silent`, () => {
      const own = silent[rule.id];
      expect(rule.examples.silent.length > 0 || own !== undefined).toBe(true);
      if (own) expect(applyRules([rule], own())).toEqual([]);
    });
  }
});
