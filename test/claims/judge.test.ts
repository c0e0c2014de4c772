import { describe, expect, it } from 'vitest';
import { checkCase } from '../../src/check.ts';
import { evaluateCount } from '../../src/claims/countFormula.ts';
import type { ClaimVerdict } from '../../src/claims/verdict.ts';
import { readTree } from '../../src/notation/parse.ts';
import { NotationError } from '../../src/notation/source.ts';
import { type InlineCase, inlineCase, kinetic } from '../inlineCase.ts';

const sheet: InlineCase = {
  parameters: ['J0', 'J'],
  action: { time: kinetic, plaquette: 'J*(1 - cos(Delta_x Delta_y phi))' },
  lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x d_y phi)^2',
  proposalParameters: ['K0', 'K'],
};

function judge(claims: readonly string[], parts: InlineCase = sheet): ClaimVerdict[] {
  const numbered = claims.map((c, i) => `{id: c${i}, ${c}}`);
  return [...checkCase(inlineCase({ ...parts, claims: numbered }), []).analyses.claims];
}
const verdicts = (claims: readonly string[], parts?: InlineCase): string[] =>
  judge(claims, parts).map((c) => c.verdict);

describe('claims', () => {
  it('about shifts hold for one status each', () => {
    const statuses = ['survives', 'continuum-only', 'lattice-only', 'absent'];
    const of = (profile: string): string[] =>
      verdicts(statuses.map((s) => `shift: "${profile}", status: ${s}`));
    expect(of('f(x) + g(y)')).toEqual(['holds', 'fails', 'fails', 'fails']);
    expect(of('f(x, y)')).toEqual(['fails', 'fails', 'fails', 'holds']);
    expect(of('f(x, tau)')).toEqual(['fails', 'fails', 'fails', 'holds']);
  });

  it('about a shift whose parameter may depend on time are told that it is a redundancy', () => {
    const [claim] = judge(['shift: "f(y)", status: survives'], {
      parameters: ['J'],
      action: { x: 'J*(1 - cos(Delta_x phi))' },
      lagrangian: 'K/2 (d_x phi)^2',
      proposalParameters: ['K'],
    });
    expect(claim).toMatchObject({ verdict: 'holds', redundancy: true });
    expect(claim!.found).toMatch(/redundancy/);
  });

  it('about the point group compare the order of the space part, and its name when given', () => {
    expect(
      verdicts([
        'point-group: {order: 8}, status: survives',
        'point-group: {order: 8, name: 4mm}, status: survives',
        'point-group: {order: 16}, status: survives',
        'point-group: {order: 8, name: 2mm}, status: survives',
        'point-group: {order: 8}, status: lattice-only',
      ]),
    ).toEqual(['holds', 'holds', 'fails', 'fails', 'fails']);
  });

  it('about the point group fail when the proposal breaks what the lattice has', () => {
    const broken: InlineCase = {
      parameters: ['J0', 'J'],
      action: { time: kinetic, x: 'J*(1 - cos(Delta_x phi))', y: 'J*(1 - cos(Delta_y phi))' },
      lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x phi)^2 + L/2 (d_y phi)^2',
      proposalParameters: ['K0', 'K', 'L'],
    };
    expect(
      verdicts(
        ['point-group: {order: 8}, status: survives', 'point-group: {order: 8}, status: lattice-only'],
        broken,
      ),
    ).toEqual(['fails', 'holds']);
  });

  it('about the first correction are decided per spacing, and stay open beyond the order kept', () => {
    expect(
      verdicts([
        'corrections: {begin: 2}',
        'corrections: {begin: 4}',
        'corrections: {begin: {a: 2, b: 2}}',
        'corrections: {begin: {a: 2, b: 4}}',
      ]),
    ).toEqual(['holds', 'fails', 'holds', 'fails']);
    const free: InlineCase = {
      ...sheet,
      values: 'real',
      action: { time: 'J0*(Delta_tau phi)^2', plaquette: 'J*(T_x phi)*phi - J*phi^2' },
      lagrangian: 'K0*(d_tau phi)^2 + K*(d_x phi)^2',
    };
    expect(verdicts(['corrections: {begin: 6}'], { ...free, expand: '{beyond-leading: 0}' })).toEqual([
      'undecided',
    ]);
  });

  it('about counts are tried on every small torus, and the first counterexample is shown', () => {
    const [right, wrong] = judge(['count: "Lx + Ly - 1", group: U(1)', 'count: "Lx + Ly", group: U(1)']);
    expect(right!.verdict).toBe('holds');
    expect(wrong).toMatchObject({
      verdict: 'fails',
      found: expect.stringContaining('Lx = 2, Ly = 2 there are 3'),
    });
  });

  it('about configurations compare verdicts, exponents and truncation', () => {
    expect(
      verdicts([
        'configuration: "theta(x) theta(y)", suppressed: {continuum: yes, lattice: yes}, exponent: {a: -2, l: 0}, truncates: no',
        'configuration: "theta(x) theta(y)", exponent: {a: -1, l: 0}',
        'configuration: "f(x)", suppressed: {lattice: yes}',
        'configuration: "s(x) u(y)", truncates: yes',
      ]),
    ).toEqual(['holds', 'fails', 'fails', 'holds']);
  });

  it('that need a later analysis stay undecided with the reason', () => {
    const [winding] = judge(['winding: phi, status: continuum-only']);
    expect(winding).toMatchObject({ verdict: 'undecided', found: expect.stringContaining('analysis') });
  });
});

describe('count formulas', () => {
  const sizes = new Map([
    ['x', 6],
    ['y', 4],
  ]);
  const value = (text: string): string => evaluateCount(readTree(text), sizes).toString();

  it('are exact', () => {
    expect(['Lx + Ly - 1', 'gcd(Lx, Ly)', '2^Ly/3', 'min(Lx, Ly, 2)', 'L_x*(L_y - 1)'].map(value)).toEqual([
      '9',
      '2',
      '16/3',
      '2',
      '18',
    ]);
  });

  it('refuse what is no formula in the sizes', () => {
    for (const text of ['Lz', 'x', 'cos(Lx)', 'Lx/(Ly - 4)', 'Lx^Lx^2', 'd_x phi'])
      expect(() => value(text), text).toThrow(NotationError);
  });
});
