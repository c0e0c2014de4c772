import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Quotient } from '../../src/exact/quotient.ts';
import { rational } from '../../src/exact/rational.ts';
import { expandAction } from '../../src/limit/expansion.ts';
import { type Matching, matchProposal, proposalDensity } from '../../src/limit/matching.ts';
import { normalForm } from '../../src/limit/normalForm.ts';
import { printMonomial } from '../../src/limit/printDensity.ts';
import { proposeContinuum } from '../../src/limit/proposal.ts';
import type { Expression } from '../../src/model/action.ts';
import type { Case, Proposal } from '../../src/model/case.ts';
import { readTree } from '../../src/notation/parse.ts';
import { printQuotient } from '../../src/notation/print.ts';
import {
  constant,
  d,
  forward,
  handMadeCase,
  identity,
  on,
  oneMinusCos,
  power,
  product,
  sum,
  symbol,
  T,
} from './handMadeCase.ts';

const half = constant(Coefficient.rational(rational(1, 2)));
const square = (weight: Expression, u: Expression): Expression => product(half, weight, power(u, 2));

const proposal = (parameters: string[], lagrangian: Expression, more: Partial<Proposal> = {}): Proposal => ({
  parameters: parameters.map((name) => ({ name, positive: true })),
  lagrangian,
  text: '',
  position: { file: 'hand-made.yaml', line: 1, column: 1 },
  matching: undefined,
  rescaling: new Map(),
  ...more,
});

function match(theCase: Case): { matching: Matching; kinds: string[]; values: Record<string, string> } {
  const inProposal = new Set<string>();
  const expansion = expandAction(theCase, (space) => {
    for (const m of normalForm(proposalDensity(theCase, space)!).terms.keys()) inProposal.add(m);
    return (m) => inProposal.has(m);
  });
  const matching = matchProposal(theCase, expansion, theCase.proposal!);
  return {
    matching,
    kinds: matching.differences.map((x) => `${x.kind}: ${printMonomial(expansion.space, x.monomial)}`),
    values: Object.fromEntries([...matching.parameters].map(([k, v]) => [k, printQuotient(v, ['a', 'b'])])),
  };
}

const sheet = {
  'time-link': oneMinusCos('beta0', on(forward(0))),
  plaquette: oneMinusCos('beta', on(forward(1).mul(forward(2)))),
};
const sheetProposal = sum(square(symbol('mu0'), on(d(0))), square(symbol('mu'), on(d(1).mul(d(2)))));

describe('matching the ring-exchange sheet', () => {
  it('solves mu0 = beta0 b/a² and mu = beta a²/b, and with it how beta and beta0 must scale', () => {
    const theCase = handMadeCase(sheet, {
      parameters: ['beta0', 'beta'],
      proposal: proposal(['mu0', 'mu'], sheetProposal),
    });
    const { matching, kinds, values } = match(theCase);
    expect(values).toEqual({ mu0: 'beta0*b/a^2', mu: 'beta*a^2/b' });
    expect(kinds.every((k) => k.startsWith('agrees'))).toBe(true);
    expect(matching.origin).toBe('solved');
    const scaling = (p: string, s: string): string => `${matching.scaling.get(p)?.get(s)}`;
    expect([
      scaling('beta', 'a'),
      scaling('beta', 'b'),
      scaling('beta0', 'a'),
      scaling('beta0', 'b'),
    ]).toEqual(['-2', '1', '2', '-1']);
  });

  it('shows the ratio where a given matching has a wrong factor', () => {
    const wrong = Quotient.of(
      Coefficient.monomial(rational(2), [
        ['beta', rational(1)],
        ['a', rational(2)],
        ['b', rational(-1)],
      ]),
    );
    const theCase = handMadeCase(sheet, {
      parameters: ['beta0', 'beta'],
      proposal: proposal(['mu0', 'mu'], sheetProposal, { matching: new Map([['mu', wrong]]) }),
    });
    const { matching, kinds } = match(theCase);
    expect(kinds).toContain('wrong-coefficient: (d_x d_y phi)^2');
    expect(`${matching.differences.find((x) => x.kind === 'wrong-coefficient')!.ratio}`).toBe('2');
  });

  it('names terms that are missing from the proposal and terms that only the proposal has', () => {
    const theCase = handMadeCase(sheet, {
      parameters: ['beta0', 'beta'],
      proposal: proposal(
        ['mu0', 'kappa'],
        sum(square(symbol('mu0'), on(d(0))), square(symbol('kappa'), on(d(1)))),
        { matching: new Map([['kappa', Quotient.of(Coefficient.symbol('beta'))]]) },
      ),
    });
    const { kinds } = match(theCase);
    expect(kinds).toContain('missing-from-proposal: (d_x d_y phi)^2');
    expect(kinds).toContain('only-in-proposal: (d_x phi)^2');
  });

  it('checks the corrections too when the proposal includes them', () => {
    const improved = sum(
      sheetProposal,
      product(
        constant(
          Coefficient.monomial(rational(-1, 24), [
            ['mu', rational(1)],
            ['a', rational(2)],
          ]),
        ),
        sum(power(on(d(1, 2).mul(d(2))), 2), power(on(d(1).mul(d(2, 2))), 2)),
      ),
    );
    const theCase = handMadeCase(sheet, {
      parameters: ['beta0', 'beta'],
      proposal: proposal(['mu0', 'mu'], improved),
    });
    const { kinds } = match(theCase);
    expect(kinds.filter((k) => k.startsWith('agrees')).length).toBe(4);
    // Corrections in the time spacing are not asked for: the proposal holds none.
    expect(kinds.length).toBe(4);
    const half = sum(
      sheetProposal,
      product(
        constant(
          Coefficient.monomial(rational(-1, 24), [
            ['mu', rational(1)],
            ['a', rational(2)],
          ]),
        ),
        power(on(d(1, 2).mul(d(2))), 2),
      ),
    );
    const partly = match(
      handMadeCase(sheet, { parameters: ['beta0', 'beta'], proposal: proposal(['mu0', 'mu'], half) }),
    );
    expect(partly.kinds.filter((k) => k.startsWith('missing'))).toEqual([
      'missing-from-proposal: (d_x d_y^2 phi)^2',
    ]);
  });
});

describe('solving for the proposal', () => {
  it('solves a system that is linear in several parameters and one with a product of parameters', () => {
    const rotors = {
      time: oneMinusCos('J0', on(forward(0))),
      x: oneMinusCos('J1', on(forward(1))),
      y: oneMinusCos('J2', on(forward(2))),
    };
    const linear = sum(
      square(symbol('K0'), on(d(0))),
      square(constant(Coefficient.symbol('p').add(Coefficient.symbol('q'))), on(d(1))),
      square(constant(Coefficient.symbol('p').sub(Coefficient.symbol('q'))), on(d(2))),
    );
    const one = match(
      handMadeCase(rotors, { parameters: ['J0', 'J1', 'J2'], proposal: proposal(['K0', 'p', 'q'], linear) }),
    );
    expect(one.values).toEqual({ K0: 'J0*b/a^2', p: 'J1/(2*b) + J2/(2*b)', q: 'J1/(2*b) - J2/(2*b)' });
    const velocity = sum(
      square(symbol('K'), on(d(0))),
      square(
        constant(
          Coefficient.monomial(rational(1), [
            ['K', rational(1)],
            ['c', rational(2)],
          ]),
        ),
        on(d(1)),
      ),
    );
    const two = match(
      handMadeCase(
        { time: rotors.time, x: rotors.x },
        { parameters: ['J0', 'J1'], proposal: proposal(['K', 'c'], velocity) },
      ),
    );
    expect(two.kinds.every((k) => k.startsWith('agrees'))).toBe(true);
    const c = two.matching.parameters.get('c')!;
    expect(printQuotient(c.mul(c), ['a', 'b'])).toBe('J1*a^2/(J0*b^2)');
  });

  it('suggests the field rescaling that makes a canonical proposal match', () => {
    const theory = {
      time: oneMinusCos('J0', on(forward(0))),
      mass: product(half, symbol('r'), power(on(identity), 2)),
    };
    const canonical = sum(
      product(half, power(on(d(0)), 2)),
      product(half, symbol('m2'), power(on(identity), 2)),
    );
    const { matching } = match(
      handMadeCase(theory, { parameters: ['J0', 'r'], proposal: proposal(['m2'], canonical) }),
    );
    const z = matching.rescalings.get('phi')!;
    expect(printQuotient(z.mul(z), ['a', 'b'])).toBe('a^2/(J0*b)');
  });

  it('proposes a Lagrangian of its own that agrees by construction', () => {
    const theCase = handMadeCase(sheet, { parameters: ['beta0', 'beta'] });
    const expansion = expandAction(theCase);
    const own = proposeContinuum(theCase, expansion);
    const { differences } = matchProposal({ ...theCase, proposal: own }, expansion, own);
    expect(differences.map((x) => x.kind)).toEqual(['agrees', 'agrees']);
  });
});

describe('the scaling of the lattice parameters', () => {
  it('keeps the ratio of a correction to the term that it corrects', () => {
    const theCase = handMadeCase(
      {
        time: oneMinusCos('J0', on(forward(0))),
        x: oneMinusCos('J', on(forward(1))),
        bend: oneMinusCos('G', on(forward(1).mul(forward(1)))),
      },
      {
        parameters: ['J0', 'J', 'G'],
        proposal: proposal(['K0', 'K'], sum(square(symbol('K0'), on(d(0))), square(symbol('K'), on(d(1))))),
      },
    );
    const { matching } = match(theCase);
    const powers = (p: string): string[] => ['a', 'b'].map((s) => `${matching.scaling.get(p)?.get(s) ?? 0}`);
    expect([powers('J0'), powers('J'), powers('G')]).toEqual([
      ['2', '-1'],
      ['0', '1'],
      ['0', '1'],
    ]);
    expect(matching.scalingProblem).toBeUndefined();
  });

  it('says so when no scaling keeps the couplings fixed', () => {
    // One parameter in front of terms that need different powers of the spacings.
    const theCase = handMadeCase(
      { time: oneMinusCos('J', on(forward(0))), x: oneMinusCos('J', on(forward(1))) },
      {
        parameters: ['J'],
        proposal: proposal(['K0', 'K'], sum(square(symbol('K0'), on(d(0))), square(symbol('K'), on(d(1))))),
      },
    );
    const { matching } = match(theCase);
    expect(matching.scalingProblem).toMatch(/no powers of b/);
    expect(matching.scaling.size).toBe(0);
  });

  it('lets a proposal of its own keep the symmetry of the lattice: equal coefficients share a parameter', () => {
    const theCase = handMadeCase(
      { x: oneMinusCos('J', on(forward(1))), y: oneMinusCos('J', on(forward(2))) },
      { parameters: ['J'] },
    );
    expect(proposeContinuum(theCase, expandAction(theCase)).parameters.map((p) => p.name)).toEqual(['mu1']);
  });
});

describe('a proposal made here', () => {
  const laplacian = forward(1)
    .mul(T(1, -1).mul(forward(1)))
    .add(forward(2).mul(T(2, -1).mul(forward(2))));
  const text = (terms: Record<string, Expression>, parameters: string[]): string => {
    const theCase = handMadeCase(terms, { parameters });
    return proposeContinuum(theCase, expandAction(theCase)).text;
  };

  it('keeps the forms together, so that what annihilates them still does, and reads back', () => {
    const found = text({ time: oneMinusCos('J0', on(forward(0))), bend: oneMinusCos('J', on(laplacian)) }, [
      'J0',
      'J',
    ]);
    expect(found).toBe('mu1/2 (d_tau phi)^2 + mu2/2 (d_x^2 phi + d_y^2 phi)^2');
    expect(() => readTree(found)).not.toThrow();
  });

  it('falls back on monomials where forms do not give the leading order', () => {
    expect(
      text({ mixed: product(symbol('J'), on(forward(1)), on(forward(1)), on(identity), on(identity)) }, [
        'J',
      ]),
    ).toMatch(/^mu1 .*phi/);
  });
});
