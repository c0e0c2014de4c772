import { describe, expect, it } from 'vitest';
import { checkCase } from '../../src/check.ts';
import { Rational } from '../../src/exact/rational.ts';
import { proposalDensity } from '../../src/limit/matching.ts';
import { analyseConfigurations } from '../../src/rough/configurations.ts';
import { runWitnesses, type WitnessInput } from '../../src/witness/run.ts';
import { sheet } from '../inlineCase.ts';

const { analyses } = checkCase(sheet, []);
const setting = {
  case: sheet,
  expansion: analyses.expansion,
  matching: analyses.matching!,
  proposalDensity: proposalDensity(sheet, analyses.expansion.space)!,
  shifts: analyses.shifts,
  pointGroup: analyses.pointGroup,
};
const input: WitnessInput = { ...setting, ...analyseConfigurations(setting) };

describe('numerical witnesses', () => {
  it('confirm every exponent and the smooth limit of the ring-exchange sheet', () => {
    const records = runWitnesses(input);
    expect(records.length).toBeGreaterThan(6);
    expect(records.filter((r) => r.verdict !== 'confirms')).toEqual([]);
  });

  it('contradict an exponent that is off by one, a family that is not zero, and one that is', () => {
    const wrong = input.configurations.map((c) =>
      c.lattice === 'zero'
        ? { ...c, lattice: { a: Rational.of(-1), l: Rational.one, t: Rational.one } }
        : c.profile === 'f(x, y)'
          ? { ...c, lattice: 'zero' as const }
          : { ...c, lattice: { ...c.lattice, a: c.lattice.a.add(Rational.one) } },
    );
    const families = runWitnesses({ ...input, configurations: wrong }).filter(
      (r) => r.kind === 'configuration',
    );
    expect(families.map((r) => r.verdict)).toEqual(families.map(() => 'contradicts'));
  });

  it('contradict a first correction with the wrong coefficient or at the wrong order', () => {
    const double = (by: Rational) => ({
      ...input.expansion,
      orders: input.expansion.orders.map((o) =>
        o.total === 2
          ? { ...o, terms: o.terms.map((t) => ({ ...t, coefficient: t.coefficient.scale(by) })) }
          : o,
      ),
    });
    const verdict = (expansion: WitnessInput['expansion']): string | undefined =>
      runWitnesses({ ...input, expansion }).find((r) => r.kind === 'smooth-limit')?.verdict;
    expect(verdict(double(Rational.of(2)))).toBe('contradicts');
    expect(verdict(double(Rational.minusOne))).toBe('contradicts');
    const orders = input.expansion.orders.filter((o) => o.total !== 2);
    expect(verdict({ ...input.expansion, orders })).toBe('contradicts');
  });

  it('are the same on every run', () => {
    expect(JSON.stringify(runWitnesses(input))).toBe(JSON.stringify(runWitnesses(input)));
  });
});
