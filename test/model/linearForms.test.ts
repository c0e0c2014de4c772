import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { LaurentPolynomial } from '../../src/exact/laurentPolynomial.ts';
import { reducedEchelon } from '../../src/exact/matrix.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import type { Expression, LinearForm } from '../../src/model/action.ts';
import { linearForms } from '../../src/model/linearForms.ts';
import { readContinuumExpression, readLatticeExpression } from '../../src/model/meaning.ts';
import type { Names } from '../../src/model/names.ts';
import { readTree } from '../../src/notation/parse.ts';

const names: Names = {
  axes: ['x', 'y'],
  fields: ['phi', 'psi'],
  constants: new Set(['J', 'K']),
  positive: new Set(),
  elsewhere: new Map(),
  declareUnder: 'parameters',
  background: new Map(),
};
const onLattice = (text: string): LinearForm[] =>
  linearForms(readLatticeExpression(readTree(text), names), 'lattice');
const inContinuum = (text: string): LinearForm[] =>
  linearForms(readContinuumExpression(readTree(text), names), 'continuum');

/** Forms as a subspace: reduced rows over the pairs of field and offset. */
function span(forms: readonly LinearForm[]): string[] {
  const places = [
    ...new Set(forms.flatMap((f) => [...f].flatMap(([n, p]) => p.terms.map((t) => `${n}${t.exponents}`)))),
  ].sort();
  const rows = forms.map((f) =>
    places.map((place) => {
      for (const [n, p] of f)
        for (const t of p.terms) if (`${n}${t.exponents}` === place) return t.weight.asRational!;
      return Rational.zero;
    }),
  );
  const { rows: basis } = reducedEchelon(rows, places.length);
  return basis.map((row) =>
    row
      .map((x, i) => (x.isZero ? '' : `${x} ${places[i]}`))
      .filter((t) => t)
      .join(' + '),
  );
}

const forms = (...texts: string[]): LinearForm[] => texts.flatMap((t) => onLattice(`cos(${t})`));

describe('the forms on which an action depends', () => {
  it.each([
    ['the argument of a function', 'J*(1 - cos(Delta_x phi))', ['Delta_x phi']],
    ['arguments inside arguments', 'cos(Delta_x phi + sin(Delta_y phi))', ['Delta_x phi', 'Delta_y phi']],
    ['one square', '(Delta_x phi)^2', ['Delta_x phi']],
    [
      'a square in disguise',
      '(Delta_x phi)^2 + 2 Delta_x phi Delta_y phi + (Delta_y phi)^2',
      ['(Delta_x + Delta_y) phi'],
    ],
    [
      'a square written with a factor',
      'J*((Delta_x phi)^2 - 2 Delta_x phi Delta_y phi + (Delta_y phi)^2)',
      ['(Delta_x - Delta_y) phi'],
    ],
    ['two squares', '(Delta_x phi)^2 + (Delta_y phi)^2', ['Delta_x phi', 'Delta_y phi']],
    ['a square of two fields', '(phi - psi)^2', ['phi - psi']],
    ['a product', 'phi Delta_x psi', ['phi', 'Delta_x psi']],
    ['a total difference beside a square', '(Delta_x phi)^2 + Delta_y psi', ['Delta_x phi']],
    [
      'a total difference in several terms',
      '(phi + 1)^2 - phi^2 - 2 T_x phi + (Delta_x psi)^2',
      ['Delta_x psi'],
    ],
    ['a linear term that is no total difference', '(Delta_x phi)^2 + psi', ['Delta_x phi', 'psi']],
    ['a total difference times a function', 'sin(phi)*(Delta_x psi + cos(phi))', ['phi', 'Delta_x psi']],
    ['a total difference in a power', '(Delta_x psi + cos(phi))^2', ['phi', 'Delta_x psi']],
    ['a total difference in an argument', 'cos(Delta_x psi + sin(phi))', ['phi', 'Delta_x psi']],
    ['a negative power', '1/(1 + (Delta_x phi)^2)', ['Delta_x phi']],
    ['what cancels', '(phi + psi)^2 - phi^2 - 2 phi psi', ['psi']],
    ['nothing but a total difference', 'Delta_x phi', []],
  ])('are found for %s', (_, text, wanted) => {
    expect(span(onLattice(text))).toEqual(span(forms(...wanted)));
  });

  it('are not fewer for weights with different parameters', () => {
    expect(onLattice('J (Delta_x phi)^2 + K (Delta_y phi)^2')).toHaveLength(2);
    expect(onLattice('J (Delta_x phi + Delta_y phi)^2')).toHaveLength(1);
  });

  it('tell a total derivative in the continuum from a total difference', () => {
    expect(inContinuum('(d_y phi)^2 + d_x phi')).toEqual(inContinuum('(d_y phi)^2'));
    expect(inContinuum('d_x phi - phi')).toHaveLength(1);
    expect(onLattice('T_x phi - phi')).toEqual([]);
  });

  it('stay as written when a polynomial has too many monomials to be worked out', () => {
    const sites = Array.from({ length: 12 }, (_, k) => `(T_x^${k} phi)^2`).join(' + ');
    expect(onLattice(`(${sites})^12`)).toHaveLength(12);
  });
});

describe('a quadratic form', () => {
  it('depends on as many forms as its rank, and all of them are combinations of those it was written in', () => {
    const entry = fc.integer({ min: -2, max: 2 });
    fc.assert(
      fc.property(fc.array(fc.tuple(entry, entry, entry), { minLength: 1, maxLength: 4 }), (rows) => {
        // Σ (w·u)² with integer rows w: its lineality space is the kernel of the rows.
        const unit = (k: number): LinearForm => new Map([['phi', LaurentPolynomial.variable(1, 0, k + 1)]]);
        const u = [0, 1, 2].map((k): Expression => ({ kind: 'linear', form: unit(k) }));
        const scaled = (n: number, e: Expression): Expression => ({
          kind: 'product',
          factors: [{ kind: 'constant', value: Coefficient.integer(n) }, e],
        });
        const products = rows.flatMap((w) =>
          w.flatMap((m, i) =>
            w.map((n, j): Expression => ({ kind: 'product', factors: [scaled(m * n, u[i]!), u[j]!] })),
          ),
        );
        const found = linearForms({ kind: 'sum', terms: products });
        const wanted = reducedEchelon(
          rows.map((w) => w.map((n) => rational(n))),
          3,
        ).rows;
        expect(found).toHaveLength(wanted.length);
        const weights = (f: LinearForm): string =>
          [0, 1, 2]
            .map(
              (k) =>
                f.get('phi')!.terms.find((t) => t.exponents[0] === k + 1)?.weight.asRational ?? Rational.zero,
            )
            .join();
        expect(found.map(weights).sort()).toEqual(wanted.map((row) => row.join()).sort());
      }),
    );
  });
});
