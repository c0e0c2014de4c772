// Witnesses of exact results on the shipped cases, and of wrong ones, which they must contradict.

import { describe, expect, it } from 'vitest';
import { Rational } from '../../src/exact/rational.ts';
import { analyseConfigurations } from '../../src/rough/configurations.ts';
import type { Configuration } from '../../src/rough/profile.ts';
import { familyWitness } from '../../src/witness/familyWitness.ts';
import { runWitnesses } from '../../src/witness/run.ts';
import { smoothLimitWitness } from '../../src/witness/smoothLimit.ts';
import { analysed, claiming } from '../rough/systems.ts';

const names = [
  'ring-exchange-sheet',
  'rotor-square',
  'dipole-chain',
  'laplacian-sheet',
  'cube-rotors',
  'rotor-rectangle',
];

describe('witnesses', () => {
  for (const name of names)
    it(`of ${name} contradict nothing and confirm the smooth limit`, () => {
      const input = analysed(name);
      const records = runWitnesses({ ...input, ...analyseConfigurations(input) });
      expect(records.filter((r) => r.verdict === 'contradicts')).toEqual([]);
      expect(records.at(-1)).toMatchObject({
        kind: 'smooth-limit',
        verdict: 'confirms',
        predicted: { exponent: 2 },
      });
      expect(records.filter((r) => r.verdict === 'confirms').length).toBeGreaterThan(records.length / 2);
    });
  it('of an action improved in space alone see the correction of the time link', () => {
    const { case: theCase, expansion, matching } = analysed('improved-rotor-square');
    const record = smoothLimitWitness(theCase, expansion, matching)!;
    // b shrinks with a, and only the links in space are improved
    expect(record.predicted.exponent).toBe(2);
    expect(record.verdict).toBe('confirms');
  });
  it('are the same on every run', () => {
    const input = analysed('ring-exchange-sheet');
    const run = (): unknown => runWitnesses({ ...input, ...analyseConfigurations(input) });
    expect(run()).toEqual(run());
  });

  const mistakes: [string, string, (c: Configuration) => Configuration][] = [
    ['an exponent off by one', 'theta(x)', (c) => ({ ...c, lattice: withExponent(c, -2) })],
    ['a zero that is none', 'theta(x)', (c) => ({ ...c, lattice: 'zero' })],
    ['a cost that is none', '2*pi theta(x)', (c) => ({ ...c, lattice: withExponent(c, -1) })],
  ];
  for (const [what, profile, spoil] of mistakes)
    it(`contradict ${what}`, () => {
      const input = claiming(analysed('rotor-square'), profile);
      const { byClaim, profiles } = analyseConfigurations(input);
      const exact = byClaim.get('family')!;
      const witness = (c: Configuration) =>
        familyWitness(c, profiles.get(profile)!, input.case, input.matching)!.verdict;
      expect(witness(exact)).toBe('confirms');
      expect(witness(spoil(exact))).toBe('contradicts');
    });
  it('contradict a correction with a wrong coefficient', () => {
    const { case: theCase, expansion, matching } = analysed('rotor-square');
    const two = Rational.of(2);
    const orders = expansion.orders.map((o) =>
      o.total === 2
        ? { ...o, terms: o.terms.map((t) => ({ ...t, coefficient: t.coefficient.scale(two) })) }
        : o,
    );
    expect(smoothLimitWitness(theCase, { ...expansion, orders }, matching)!.verdict).toBe('contradicts');
  });
  it('are left out for families that move in time or grow with the coordinates', () => {
    for (const profile of ['s(tau)', 'x']) {
      const input = claiming(analysed('rotor-square'), profile);
      const records = runWitnesses({ ...input, ...analyseConfigurations(input) });
      expect(records.map((r) => r.subject)).not.toContain(profile);
    }
  });
});

function withExponent(c: Configuration, a: number): Configuration['lattice'] {
  const base = c.lattice === 'zero' ? { l: Rational.one, t: Rational.one } : c.lattice;
  return { ...base, a: Rational.of(a) };
}
