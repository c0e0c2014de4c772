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
      '(d_x d_y phi)^3': expect.stringMatching(/y -> -y|x -> -x|phi -> -phi/),
    });
    expect(
      forbidden({
        values: 'real',
        axes: ['x'],
        parameters: ['J'],
        action: { time: 'J*(Delta_tau phi)^2', x: 'J*(Delta_x phi)^2', well: 'J*phi^4' },
        lagrangian: 'K0*(d_tau phi)^2 + K*(d_x phi)^2 + u*phi^4 + c*phi^3',
        proposalParameters: ['K0', 'K', 'u', 'c'],
      }),
    ).toEqual({ 'phi^3': 'the field reflection phi -> -phi' });
    expect(Object.values(sheetWith('(d_tau phi) (d_x d_y phi)^3'))).toEqual([
      expect.stringMatching(/tau -> -tau|x -> -x|y -> -y/),
    ]);
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

  it('is forbidden by a shift proportional to x although its variation is a total derivative', () => {
    // φ → φ + c x turns (∂φ)² into (∂φ)² + 2c ∂φ + c²: the last term is extensive, and for an angle 2c ∂φ counts windings.
    const chain = (values: 'angle' | 'real', term: string) =>
      forbidden({
        axes: ['x'],
        values,
        parameters: ['J0', 'J'],
        action: {
          time: values === 'angle' ? kinetic : 'J0/2 (Delta_tau phi)^2',
          hop: values === 'angle' ? 'J*(1 - cos(Delta_x Deltab_x phi))' : 'J/2 (Delta_x Deltab_x phi)^2',
        },
        lagrangian: `K0/2 (d_tau phi)^2 + K/2 (d_x^2 phi)^2 + c*${term}`,
        proposalParameters: ['K0', 'K', 'c'],
      });
    for (const values of ['angle', 'real'] as const) {
      expect(chain(values, '(d_x phi)^2')).toEqual({ '(d_x phi)^2': 'the shift phi -> phi + x' });
      expect(chain(values, '(d_tau d_x^2 phi)^2')).toEqual({ '(d_tau d_x^2 phi)^2': null });
    }
  });

  it('is forbidden for an angle when a winding is left over, and allowed for a real field', () => {
    // With the exact shift by x alone, ∂xφ ∂yφ varies into c ∂yφ: no extensive constant, but the winding along y.
    const tilted = (values: 'angle' | 'real') =>
      forbidden({
        values,
        parameters: ['J0', 'J', 'G'],
        action: {
          time: values === 'angle' ? kinetic : 'J0/2 (Delta_tau phi)^2',
          hop: values === 'angle' ? 'J*(1 - cos(Delta_x Deltab_x phi))' : 'J/2 (Delta_x Deltab_x phi)^2',
          skew:
            values === 'angle'
              ? 'G*(1 - cos((Delta_y + Delta_x Deltab_x) phi))'
              : 'G/2 ((Delta_y + Delta_x Deltab_x) phi)^2',
        },
        lagrangian: 'K0/2 (d_tau phi)^2 + K/2 (d_x^2 phi)^2 + L/2 (d_y phi)^2 + c*(d_x phi)*(d_y phi)',
        proposalParameters: ['K0', 'K', 'L', 'c'],
      });
    expect(tilted('angle')['(d_y phi) (d_x phi)'] ?? tilted('angle')['(d_x phi) (d_y phi)']).toMatch(
      /shift phi -> phi \+ x/,
    );
  });
});
