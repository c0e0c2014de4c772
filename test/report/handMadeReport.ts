// A small report made by hand, so that the formats are tested without the analyses. The values are invented but of the
// right shape: an angle on a square sheet with one time-like and one ring-exchange term.

import type { ClaimVerdict } from '../../src/claims/verdict.ts';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Quotient } from '../../src/exact/quotient.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import type { Expansion } from '../../src/limit/expansion.ts';
import { JetSpace } from '../../src/limit/jets.ts';
import type { Matching } from '../../src/limit/matching.ts';
import type { Case } from '../../src/model/case.ts';
import type { Claim } from '../../src/model/claim.ts';
import type { CheckReport } from '../../src/report/findings.ts';
import type { Configuration, Scaling } from '../../src/rough/profile.ts';
import type { Analyses, Finding } from '../../src/rules/facts.ts';
import type { PointGroupAnalysis } from '../../src/symmetry/pointGroup.ts';

const position = { file: 'sheet.yaml', line: 1, column: 1 };
const space = new JetSpace(['phi'], ['tau', 'x', 'y']);
const power = (name: string, exponent: number): Coefficient => Coefficient.symbol(name, rational(exponent));
const timeLink = power('beta0', 1).mul(power('b', 1)).mul(power('a', -2)).scale(rational(1, 2));
const ring = power('beta', 1).mul(power('a', 2)).mul(power('b', -1)).scale(rational(1, 2));
const velocity = space.monomial([
  { field: 0, derivative: [1, 0, 0] },
  { field: 0, derivative: [1, 0, 0] },
]);
const twist = space.monomial([
  { field: 0, derivative: [0, 1, 1] },
  { field: 0, derivative: [0, 1, 1] },
]);
const slope = space.monomial([
  { field: 0, derivative: [0, 1, 0] },
  { field: 0, derivative: [0, 1, 0] },
]);

const expansion: Expansion = {
  space,
  through: 2,
  fieldCut: undefined,
  byTerm: [],
  orders: [
    {
      order: new Map([
        ['b', 0],
        ['a', 0],
      ]),
      total: 0,
      terms: [
        { coefficient: timeLink, monomial: velocity, from: ['time-link'] },
        { coefficient: ring, monomial: twist, from: ['plaquette'] },
      ],
    },
    {
      order: new Map([
        ['b', 0],
        ['a', 2],
      ]),
      total: 2,
      terms: [
        {
          coefficient: ring.mul(power('a', 2)).sub(timeLink),
          monomial: slope,
          from: ['plaquette', 'time-link'],
        },
      ],
    },
  ],
};

const matching: Matching = {
  origin: 'given',
  parameters: new Map([
    ['mu0', Quotient.of(timeLink.scale(rational(2)))],
    ['mu', Quotient.of(ring.scale(rational(2)))],
  ]),
  differences: [
    {
      kind: 'agrees',
      monomial: velocity,
      parent: Quotient.of(timeLink),
      proposal: Quotient.of(timeLink),
      ratio: Rational.one,
      order: 0,
      forbiddenBy: undefined,
    },
    {
      kind: 'wrong-coefficient',
      monomial: twist,
      parent: Quotient.of(ring),
      proposal: Quotient.of(ring.scale(rational(3, 2))),
      ratio: rational(3, 2),
      order: 0,
      forbiddenBy: undefined,
    },
    {
      kind: 'only-in-proposal',
      monomial: slope,
      parent: Quotient.of(Coefficient.zero),
      proposal: Quotient.of(Coefficient.one),
      ratio: undefined,
      order: undefined,
      forbiddenBy: 'shift by f(x) + g(y)',
    },
  ],
  rescalings: new Map(),
  undetermined: [],
  scalingProblem: undefined,
  scaling: new Map([['beta', new Map([['a', rational(-2)]])]]),
};

const scaling = (a: number, l: number): Scaling => ({ a: rational(a), l: rational(l), t: Rational.one });

function configuration(profile: string, lattice: Scaling, continuum: Scaling): Configuration {
  return {
    profile,
    claimed: false,
    lattice,
    continuum,
    suppressed: { lattice: lattice !== 'zero', continuum: continuum !== 'zero' },
    truncates: false,
    corrections: [{ order: 2, scaling: lattice, sameAsLeading: true }],
    byTerm: new Map([['plaquette', lattice]]),
    mixedAction: '',
    undecided: undefined,
  };
}

const identity = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
];
const quarterTurn = [
  [1, 0, 0],
  [0, 0, 1],
  [0, -1, 0],
];

const pointGroup: PointGroupAnalysis = {
  order: 2,
  name: undefined,
  holohedry: 8,
  generators: ['x -> y, y -> -x'],
  timeReflection: false,
  fieldReflection: true,
  elements: [identity, quarterTurn].flatMap((matrix) => [
    { matrix, fields: [{ field: 0, sign: 1 as const }] },
    { matrix, fields: [{ field: 0, sign: -1 as const }] },
  ]),
  continuumOrder: 4,
};

const certificate = {
  rows: [{ size: [3, 3, 3], solutions: 5, explained: 5 }],
  primes: [2147483647],
  complete: true,
  growth: 1,
  text: 'complete on open boxes 3^3 modulo two primes',
};

/** The case of the hand-made report, with another title where a test wants one. */
function handMadeCase(title = 'A sheet made by hand'): Case {
  return {
    id: 'hand-made-sheet',
    title,
    file: 'sheet.yaml',
    source: '',
    lattice: {
      axes: [
        { name: 'tau', spacing: 'b', role: 'time' },
        { name: 'x', spacing: 'a', role: 'space' },
        { name: 'y', spacing: 'a', role: 'space' },
      ],
      limits: ['b', 'a'],
    },
    fields: [{ name: 'phi', values: { kind: 'angle' }, at: [Rational.zero, Rational.zero, Rational.zero] }],
    parameters: [],
    parent: { terms: [], compactness: 'cosine' },
    proposal: undefined,
    expand: { beyondLeading: 2, fields: undefined, background: new Map() },
    claims: [],
    warnings: [],
  };
}

const claim: Claim = { id: 'early', position, kind: 'corrections', begin: 2 };

export const claims: readonly ClaimVerdict[] = [
  { claim, verdict: 'holds', found: 'The first correction is $a^2$.' },
  { claim: { ...claim, id: 'late' }, verdict: 'fails', found: 'The first correction is of order 2.' },
  {
    claim: { id: 'twist', position, kind: 'winding', text: 'phi', status: undefined },
    verdict: 'undecided',
    found: 'Not examined.',
  },
];

export const fault: Finding = {
  rule: 'made-by-hand',
  level: 'fault',
  statement: 'The proposal has a term that the lattice forbids.',
  why: 'A term like $(\\partial_x \\phi)^2$ changes under $f(x)$.',
  evidence: '(d_x phi)^2',
  mend: 'Leave it out.',
};

/** The hand-made report; parts can be replaced. */
export function handMadeReport(
  parts: { title?: string; analyses?: Partial<Analyses>; report?: Partial<CheckReport> } = {},
): CheckReport {
  const analyses: Analyses = {
    case: handMadeCase(parts.title),
    expansion,
    matching,
    shifts: {
      symmetries: [
        {
          family: { prefactor: [], phase: [], free: [[0, 1, 0]], discrete: undefined, profile: 'f(x)' },
          lattice: true,
          continuum: true,
          status: 'survives',
          growth: 1,
          redundancy: false,
          brokenBy: null,
        },
        {
          family: { prefactor: [], phase: [], free: [], discrete: undefined, profile: 'x y' },
          lattice: false,
          continuum: true,
          status: 'continuum-only',
          growth: 0,
          redundancy: false,
          brokenBy: { text: '(d_x^2 d_y phi)^2', order: 2 },
        },
      ],
      lattice: certificate,
      continuum: null,
    },
    pointGroup,
    configurations: [
      configuration('f(x)', 'zero', 'zero'),
      configuration('theta(x) theta(y)', scaling(-1, 0), {
        a: rational(-1, 2),
        l: Rational.zero,
        t: Rational.one,
      }),
    ],
    charges: [],
    witness: [
      {
        kind: 'configuration',
        subject: 'theta(x) theta(y)',
        sizes: [4, 8],
        values: [1 / 3, 2 / 3],
        predicted: { exponent: -1 },
        fitted: { exponent: -1.0000000000001 },
        verdict: 'confirms',
        text: 'two sizes agree',
      },
    ],
    claims,
    quadraticForm: 'positive',
    compactAsReal: false,
    proposed: null,
    ...parts.analyses,
  };
  return { analyses, findings: [fault], verdict: 'fails', ...parts.report };
}
