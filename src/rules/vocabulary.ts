// The facts that rules may read, in one table: from it come what a condition sees, the check when a rule is loaded, and the
// documentation. A fact is read off the analyses; nothing is computed here.

import { spaceSpacings } from '../claims/corrections.ts';
import { scalingText } from '../claims/scalingText.ts';
import type { Quotient } from '../exact/quotient.ts';
import { Rational } from '../exact/rational.ts';
import { printMonomial } from '../limit/printDensity.ts';
import { printQuotient } from '../notation/print.ts';
import type { Scaling } from '../rough/profile.ts';
import type { Analyses } from './facts.ts';

/** A fact's value: `null` is written `none`. Exponents are canonical texts such as `a^-2 l t`. */
export type FactValue = boolean | string | Rational | null;
export type FactType = 'boolean' | 'text' | 'number' | 'exponent';

export interface FactDefinition<Item> {
  readonly type: FactType;
  readonly meaning: string;
  readonly read: (item: Item, analyses: Analyses) => FactValue;
}

/** One kind of item that a rule can be about. */
export interface Scope<Item = unknown> {
  readonly meaning: string;
  readonly items: (analyses: Analyses) => readonly Item[];
  readonly facts: Readonly<Record<string, FactDefinition<Item>>>;
}

const number = (n: number): Rational => Rational.of(n);
const exponentOf = (s: Scaling | null): string | null => (s === null || s === 'zero' ? null : scalingText(s));

function scope<Item>(definition: Scope<Item>): Scope {
  return definition as Scope;
}

const caseFacts = scope<Analyses>({
  meaning: 'the case as a whole; these facts are available in every other scope too',
  items: (a) => [a],
  facts: {
    'case.id': { type: 'text', meaning: 'identifier', read: (a) => a.case.id },
    'case.quadraticForm': {
      type: 'text',
      meaning: '"positive", "indefinite" or "unknown": sign of the quadratic part of the continuum action',
      read: (a) => a.quadraticForm,
    },
    'case.keepsRoughFields': {
      type: 'boolean',
      meaning: 'some family with a free function is unsuppressed by the continuum action',
      read: (a) =>
        a.configurations.some(
          (c) => c.undecided === undefined && /\b[fgh]\(/.test(c.profile) && c.suppressed.continuum === false,
        ),
    },
    'case.compactAsReal': {
      type: 'boolean',
      meaning: 'an angle field enters the parent through polynomials only, so that its period plays no part',
      read: (a) => a.compactAsReal,
    },
    'case.latticeComplete': {
      type: 'boolean',
      meaning: 'the list of lattice shift families explains all solutions on open boxes',
      read: (a) => a.shifts.lattice.complete,
    },
    'case.latticeCertificate': {
      type: 'text',
      meaning: 'the completeness certificate of the lattice in words',
      read: (a) => a.shifts.lattice.text,
    },
    'case.pointGroupOrder': {
      type: 'number',
      meaning: 'order of the space part of the lattice point group',
      read: (a) => number(a.pointGroup.order),
    },
    'case.continuumPointGroupOrder': {
      type: 'number',
      meaning: 'how many of these lattice maps leave the continuum action as it is',
      read: (a) => number(a.pointGroup.continuumOrder ?? a.pointGroup.order),
    },
    'case.hasProposal': {
      type: 'boolean',
      meaning: 'the author proposed a continuum action',
      read: (a) => a.case.proposal !== undefined,
    },
  },
});

type Families = Analyses['configurations'][number];

const familyFacts = scope<Families>({
  meaning:
    'a rough configuration family; `leading` is the continuum action, `correction` the first correction that does not vanish on it',
  items: (a) => a.configurations.filter((c) => c.undecided === undefined),
  facts: {
    'family.profile': { type: 'text', meaning: 'the profile', read: (c) => c.profile },
    'family.isFree': {
      type: 'boolean',
      meaning: 'a free function, which may jump everywhere, occurs in it',
      read: (c) => /\b[fgh]\(/.test(c.profile),
    },
    'family.isStaggered': {
      type: 'boolean',
      meaning: 'an alternating sign occurs in it',
      read: (c) => c.profile.includes('(-1)^'),
    },
    'family.latticeSuppressed': {
      type: 'boolean',
      meaning: 'the lattice action diverges on it as a → 0',
      read: (c) => c.suppressed.lattice,
    },
    'family.continuumSuppressed': {
      type: 'boolean',
      meaning: 'the continuum action diverges on it as a → 0',
      read: (c) => c.suppressed.continuum ?? c.suppressed.lattice,
    },
    'family.latticeExponent': {
      type: 'exponent',
      meaning: 'powers of the lattice action, none if identically zero',
      read: (c) => exponentOf(c.lattice),
    },
    'family.truncates': {
      type: 'boolean',
      meaning: 'the series in a is an expansion on it',
      read: (c) => c.truncates,
    },
    'leading.exponent': {
      type: 'exponent',
      meaning: 'powers of the continuum action, none if identically zero',
      read: (c) => exponentOf(c.continuum),
    },
    'correction.order': {
      type: 'number',
      meaning: 'order of the first correction that does not vanish, 0 if all do',
      read: (c) => number(c.corrections.find((x) => x.scaling !== 'zero')?.order ?? 0),
    },
    'correction.exponent': {
      type: 'exponent',
      meaning: 'powers of that correction, none if all vanish',
      read: (c) => exponentOf(c.corrections.find((x) => x.scaling !== 'zero')?.scaling ?? null),
    },
    'correction.sameAsLeading': {
      type: 'boolean',
      meaning: 'some correction is as singular in a as the leading order, which does not vanish',
      read: (c) => c.corrections.some((x) => x.sameAsLeading),
    },
  },
});

type Symmetries = Analyses['shifts']['symmetries'][number];

const symmetryFacts = scope<Symmetries>({
  meaning: 'a family of shift symmetries',
  items: (a) => a.shifts.symmetries,
  facts: {
    'symmetry.profile': { type: 'text', meaning: 'the shift parameter', read: (s) => s.family.profile },
    'symmetry.status': {
      type: 'text',
      meaning: '"survives", "continuum-only" or "lattice-only"',
      read: (s) => s.status,
    },
    'symmetry.growth': {
      type: 'number',
      meaning: 'number of free space coordinates',
      read: (s) => number(s.growth),
    },
    'symmetry.isStaggered': {
      type: 'boolean',
      meaning: 'an alternating sign or a root of unity is in it',
      read: (s) => s.family.phase.some((p) => !p.isZero),
    },
    'symmetry.isDiscrete': {
      type: 'boolean',
      meaning: 'only discrete shifts of an angle',
      read: (s) => s.family.discrete !== undefined,
    },
    'symmetry.isRedundancy': {
      type: 'boolean',
      meaning: 'the parameter may depend freely on time',
      read: (s) => s.redundancy,
    },
    'symmetry.brokenBy': {
      type: 'text',
      meaning: 'the lowest correction that breaks it, none if no order kept does',
      read: (s) => s.brokenBy?.text ?? null,
    },
    'symmetry.brokenAt': {
      type: 'number',
      meaning: 'order of that correction, 0 if none',
      read: (s) => number(s.brokenBy?.order ?? 0),
    },
  },
});

type Differences = NonNullable<Analyses['matching']>['differences'][number];

const differenceFacts = scope<Differences>({
  meaning: 'a monomial of the matching between expansion and proposal',
  items: (a) => (a.case.proposal ? (a.matching?.differences ?? []) : []),
  facts: {
    'difference.kind': {
      type: 'text',
      meaning: '"agrees", "wrong-coefficient", "missing-from-proposal" or "only-in-proposal"',
      read: (d) => d.kind,
    },
    'difference.monomial': {
      type: 'text',
      meaning: 'the monomial',
      read: (d, a) => printMonomial(a.expansion.space, d.monomial),
    },
    'difference.parent': {
      type: 'text',
      meaning: 'coefficient in the expansion',
      read: (d, a) => printQuotient(d.parent, [...a.case.lattice.limits].sort()),
    },
    'difference.proposal': {
      type: 'text',
      meaning: 'coefficient in the proposal after matching',
      read: (d, a) => printQuotient(d.proposal, [...a.case.lattice.limits].sort()),
    },
    'difference.ratio': {
      type: 'text',
      meaning: 'proposal/parent when a rational number, else none',
      read: (d) => d.ratio?.toString() ?? null,
    },
    'difference.order': {
      type: 'number',
      meaning: 'relative order in the expansion, 0 if it is not in it',
      read: (d) => number(d.order ?? 0),
    },
    'difference.forbiddenBy': {
      type: 'text',
      meaning: 'exact lattice symmetry that forbids it, none if nothing does',
      read: (d) => d.forbiddenBy ?? null,
    },
  },
});

interface Coupling {
  readonly name: string;
  readonly value: Quotient;
}

/** Power of the space spacings in a matched parameter at fixed lattice parameters, none for a sum of different powers. */
function spacingPower({ value }: Coupling, analyses: Analyses): Rational | null {
  const spacings = spaceSpacings(analyses.case.lattice);
  const terms = value.asCoefficient?.terms;
  if (!terms) return null;
  const powers = terms.map((t) =>
    t.powers.reduce((sum, [g, e]) => (spacings.has(g) ? sum.add(e) : sum), Rational.zero),
  );
  return powers.every((p) => p.equals(powers[0]!)) ? (powers[0] ?? null) : null;
}

const couplingFacts = scope<Coupling>({
  meaning: 'a parameter of the proposal with its matched value',
  items: (a) => [...(a.matching?.parameters ?? [])].map(([name, value]) => ({ name, value })),
  facts: {
    'coupling.name': { type: 'text', meaning: 'name in the proposal', read: (c) => c.name },
    'coupling.value': {
      type: 'text',
      meaning: 'in lattice parameters and spacings',
      read: (c, a) => printQuotient(c.value, [...a.case.lattice.limits].sort()),
    },
    'coupling.power': {
      type: 'number',
      meaning: 'its power of the space spacings at fixed lattice parameters, none if mixed',
      read: spacingPower,
    },
  },
});

type Charges = Analyses['charges'][number];

const chargeFacts = scope<Charges>({
  meaning: 'the unit charge of a shift family on its smallest support',
  items: (a) => a.charges.filter((c) => c.undecided === undefined),
  facts: {
    'charge.family': { type: 'text', meaning: 'the shift family', read: (c) => c.family },
    'charge.energy': { type: 'text', meaning: 'its energy in powers of a and l', read: (c) => c.text },
    'charge.limitsCommute': {
      type: 'boolean',
      meaning: 'a → 0 and l → ∞ may be exchanged in it',
      read: (c) => c.limitsCommute,
    },
  },
});

type Claims = Analyses['claims'][number];

const claimFacts = scope<Claims>({
  meaning: 'a claim with its verdict',
  items: (a) => a.claims,
  facts: {
    'claim.id': { type: 'text', meaning: 'identifier', read: (c) => c.claim.id },
    'claim.kind': { type: 'text', meaning: 'what it states, e.g. "shift"', read: (c) => c.claim.kind },
    'claim.verdict': { type: 'text', meaning: '"holds", "fails" or "undecided"', read: (c) => c.verdict },
    'claim.isRedundancy': {
      type: 'boolean',
      meaning: 'a shift that holds, with a parameter that may depend freely on time',
      read: (c) => c.redundancy ?? false,
    },
    'claim.claimedOrder': {
      type: 'number',
      meaning: 'claimed first order of the corrections, 0 for other claims',
      read: (c) => number(c.corrections?.claimed ?? 0),
    },
    'claim.foundOrder': {
      type: 'number',
      meaning: 'first order found, 0 for other claims',
      read: (c) => number(c.corrections?.found ?? 0),
    },
  },
});

type Witnesses = Analyses['witness'][number];

const witnessFacts = scope<Witnesses>({
  meaning: 'a numerical witness',
  items: (a) => a.witness,
  facts: {
    'witness.subject': { type: 'text', meaning: 'what was summed', read: (w) => w.subject },
    'witness.verdict': {
      type: 'text',
      meaning: '"confirms", "contradicts" or "inconclusive"',
      read: (w) => w.verdict,
    },
    'witness.text': { type: 'text', meaning: 'the result in words', read: (w) => w.text },
  },
});

const parameterFacts = scope<string>({
  meaning: 'a parameter of the proposal that the expansion does not determine',
  items: (a) => a.matching?.undetermined ?? [],
  facts: { 'parameter.name': { type: 'text', meaning: 'its name', read: (name) => name } },
});

type Terms = Analyses['expansion']['byTerm'][number];

const termFacts = scope<Terms>({
  meaning: 'a term of the parent action',
  items: (a) => a.expansion.byTerm,
  facts: {
    'term.name': { type: 'text', meaning: 'its name', read: (t) => t.name },
    'term.vanishes': {
      type: 'boolean',
      meaning: 'its expansion is a total derivative as far as it was followed',
      read: (t) => t.leading === undefined,
    },
  },
});

/** All scopes by the word that stands behind `for-each`. */
export const SCOPES: Readonly<Record<string, Scope>> = {
  case: caseFacts,
  family: familyFacts,
  symmetry: symmetryFacts,
  difference: differenceFacts,
  coupling: couplingFacts,
  parameter: parameterFacts,
  charge: chargeFacts,
  claim: claimFacts,
  witness: witnessFacts,
  term: termFacts,
};

/** Definition of a fact in a scope; facts of the case are known everywhere. */
export function factIn(scopeName: string, fact: string): FactDefinition<unknown> | undefined {
  return SCOPES[scopeName]?.facts[fact] ?? caseFacts.facts[fact];
}

/** Value of a fact for one item of a scope. */
export function readFact(scopeName: string, fact: string, item: unknown, analyses: Analyses): FactValue {
  const own = SCOPES[scopeName]?.facts[fact];
  if (own) return own.read(item, analyses);
  return caseFacts.facts[fact]!.read(analyses, analyses);
}

/** The vocabulary in Markdown, generated from the table. */
export function factsDocumentation(): string {
  const sections = Object.entries(SCOPES).map(([name, s]) => {
    const rows = Object.entries(s.facts).map(([fact, d]) => `| \`${fact}\` | ${d.type} | ${d.meaning} |`);
    return `## ${name}\n\n${s.meaning[0]!.toUpperCase()}${s.meaning.slice(1)}.\n\n| fact | type | meaning |\n| --- | --- | --- |\n${rows.join('\n')}\n`;
  });
  return `# Facts that rules may read\n\nThe word behind \`for-each\` names the section. Facts of \`case\` may be read everywhere.\n\n${sections.join('\n')}`;
}
