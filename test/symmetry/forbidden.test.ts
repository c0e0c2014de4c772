import { describe, expect, it } from 'vitest';
import { checkCase } from '../../src/check.ts';
import { printMonomial } from '../../src/limit/printDensity.ts';
import { type InlineCase, inlineCase, kinetic } from '../inlineCase.ts';

/** What forbids each term that only the proposal has. */
function forbidden(parts: InlineCase): Record<string, string | null | undefined> {
  const { analyses } = checkCase(inlineCase(parts), []);
  const extra = analyses.matching!.differences.filter((d) => d.kind === 'only-in-proposal');
  return Object.fromEntries(
    extra.map((d) => [printMonomial(analyses.expansion.space, d.monomial), d.forbiddenBy]),
  );
}

const sheetWith = (term: string, more: Partial<InlineCase> = {}): Record<string, string | null | undefined> =>
  forbidden({
    parameters: ['J0', 'J'],
    action: { time: kinetic, plaquette: 'J*(1 - cos(Delta_x Delta_y phi))' },
    lagrangian: `K0/2 (d_tau phi)^2 + K/2 (d_x d_y phi)^2 + c*${term}`,
    proposalParameters: ['K0', 'K', 'c'],
    ...more,
  });

describe('a term that only the proposal has', () => {
  it('is forbidden in the ring-exchange sheet when a free function of one coordinate changes it', () => {
    expect(sheetWith('(d_x phi)^2')).toEqual({ '(d_x phi)^2': 'the shift phi -> phi + f(x)' });
    expect(sheetWith('(d_x^2 phi)^2')).toEqual({ '(d_x^2 phi)^2': 'the shift phi -> phi + f(x)' });
    expect(sheetWith('phi^2')).toEqual({ 'phi^2': 'the shift phi -> phi + f(x)' });
  });

  it('is allowed, and will be generated, when it is built from what the shifts leave alone', () => {
    // (∂τ∂x∂yφ)² is invariant under everything that the lattice action is.
    expect(sheetWith('(d_tau d_x d_y phi)^2')).toEqual({ '(d_tau d_x d_y phi)^2': null });
  });

  it('is forbidden by reflections of space, of time and of the field', () => {
    expect(sheetWith('(d_x d_y phi)^3')).toEqual({
      '(d_x d_y phi)^3': 'the field reflection phi -> -phi',
    });
    expect(sheetWith('(d_tau phi) (d_x d_y phi)^3')).toMatchObject({
      '(d_x d_y phi)^3 (d_tau phi)': expect.stringMatching(/tau -> -tau|x -> -x|y -> -y/),
    });
  });

  it('is forbidden for an angle by its period even when no continuous shift is left', () => {
    const clock = forbidden({
      parameters: ['J0', 'J', 'v'],
      action: { time: kinetic, x: 'J*(1 - cos(Delta_x phi))', field: 'v*(1 - cos(2 phi))' },
      axes: ['x'],
      lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x phi)^2 + w*(1 - cos(2 phi)) + c*phi^3',
      proposalParameters: ['K0', 'K', 'w', 'c'],
    });
    expect(clock['phi^3']).toMatch(/period phi -> phi \+ 2 pi/);
  });

  it('is forbidden by a shift proportional to x for an angle, whose winding is no total derivative, but not for a real field', () => {
    const chain = (values: 'angle' | 'real') =>
      forbidden({
        axes: ['x'],
        values,
        parameters: ['J0', 'J'],
        action: {
          time: values === 'angle' ? kinetic : 'J0/2 (Delta_tau phi)^2',
          hop: values === 'angle' ? 'J*(1 - cos(Delta_x Deltab_x phi))' : 'J/2 (Delta_x Deltab_x phi)^2',
        },
        lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x^2 phi)^2 + c*(d_x phi)^2',
        proposalParameters: ['K0', 'K', 'c'],
      });
    expect(chain('angle')).toEqual({ '(d_x phi)^2': 'the shift phi -> phi + x' });
    expect(chain('real')).toEqual({ '(d_x phi)^2': null });
  });
});
