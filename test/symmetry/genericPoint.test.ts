import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { PRIMES, PrimeField } from '../../src/exact/matrix.ts';
import { rational } from '../../src/exact/rational.ts';
import { LimitError } from '../../src/notation/source.ts';
import { residue } from '../../src/symmetry/genericPoint.ts';

describe('residues at the generic point', () => {
  const field = new PrimeField(PRIMES[0]);
  const terms = fc
    .tuple(
      fc.integer({ min: -5, max: 5 }),
      fc.constantFrom('beta', 'r', 'pi', '#2', '#3', '#7'),
      fc.constantFrom(rational(1), rational(-1), rational(1, 2), rational(3, 2), rational(2)),
    )
    .map(([w, name, power]) =>
      name.startsWith('#')
        ? Coefficient.root(rational(Number(name.slice(1))), power).scale(rational(w))
        : Coefficient.symbol(name, power).scale(rational(w)),
    );
  const coefficients = fc
    .array(terms, { maxLength: 3 })
    .map((ts) => ts.reduce((x, y) => x.add(y), Coefficient.zero));

  it('add and multiply as the coefficients do', () => {
    fc.assert(
      fc.property(coefficients, coefficients, (x, y) => {
        expect(residue(x.add(y), field)).toBe((residue(x, field) + residue(y, field)) % field.p);
        expect(residue(x.mul(y), field)).toBe(field.multiply(residue(x, field), residue(y, field)));
      }),
    );
  });

  it('differ between parameters', () => {
    const names = ['beta', 'beta0', 'mu', 'a', 'b', 'pi'];
    expect(new Set(names.map((n) => residue(Coefficient.symbol(n), field))).size).toBe(names.length);
  });

  it('refuse roots that they do not have', () => {
    expect(() => residue(Coefficient.symbol('beta', rational(1, 5)), field)).toThrow(LimitError);
    expect(() => residue(Coefficient.root(rational(2), rational(1, 3)), field)).toThrow(LimitError);
  });
});
