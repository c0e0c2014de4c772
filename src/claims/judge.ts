// The author's claims against what the analyses found. A claim holds, fails, or stays undecided with the reason; each
// verdict comes with what was found, so that a failed claim says what is true instead.

import { torusShiftCount } from '../census/torus.ts';
import type { ClaimVerdict } from '../claims/verdict.ts';
import { Rational } from '../exact/rational.ts';
import type { Expansion, ExpansionOrder } from '../limit/expansion.ts';
import { Density } from '../limit/jets.ts';
import { printDensity } from '../limit/printDensity.ts';
import type { LinearForm } from '../model/action.ts';
import type { Case } from '../model/case.ts';
import type { Claim, Status } from '../model/claim.ts';
import { spaceAxes, timeAxis } from '../model/geometry.ts';
import type { Configuration, Scaling } from '../rough/profile.ts';
import type { ShiftFamily } from '../symmetry/family.ts';
import type { PointGroupAnalysis } from '../symmetry/pointGroup.ts';
import { readShiftProfile } from '../symmetry/shiftProfile.ts';
import { testShiftFamily } from '../symmetry/shifts.ts';
import { firstCorrection, spaceSpacings } from './corrections.ts';
import { evaluateCount } from './countFormula.ts';
import { scalingText } from './scalingText.ts';

/** What judging needs from the analyses. */
export interface Evidence {
  readonly case: Case;
  readonly latticeForms: readonly LinearForm[];
  readonly continuumForms: readonly LinearForm[] | null;
  /** Whether a discrete shift of angles leaves the continuum Lagrangian as it is. */
  readonly discreteInContinuum: (family: ShiftFamily) => boolean;
  readonly expansion: Expansion;
  readonly pointGroup: PointGroupAnalysis;
  /** Configuration of each configuration claim, by claim id. */
  readonly configurations: ReadonlyMap<string, Configuration>;
}

/** Judges one claim. */
export function judgeClaim(claim: Claim, evidence: Evidence): ClaimVerdict {
  return { claim, ...decide(claim, evidence) };
}

type Decision = Omit<ClaimVerdict, 'claim'>;

const holdsIf = (condition: boolean, found: string): Decision => ({
  verdict: condition ? 'holds' : 'fails',
  found,
});

function decide(claim: Claim, evidence: Evidence): Decision {
  switch (claim.kind) {
    case 'shift':
      return decideShift(claim, evidence);
    case 'point-group':
      return decidePointGroup(claim, evidence.pointGroup);
    case 'configuration':
      return decideConfiguration(claim, evidence.configurations.get(claim.id)!);
    case 'corrections':
      return decideCorrections(claim, evidence);
    case 'count':
      return decideCount(claim, evidence);
    default:
      return {
        verdict: 'undecided',
        found: `${claim.kind} claims need an analysis that this version does not have`,
      };
  }
}

/** Status of a symmetry from its two sides; without a proposal the lattice alone is known. */
export function statusOf(lattice: boolean, continuum: boolean): Status {
  if (lattice) return continuum ? 'survives' : 'lattice-only';
  return continuum ? 'continuum-only' : 'absent';
}

function decideShift(claim: Extract<Claim, { kind: 'shift' }>, evidence: Evidence): Decision {
  const { lattice, fields } = evidence.case;
  const families = readShiftProfile(claim.profile.tree, lattice, fields, claim.field);
  const onLattice = families.every((f) => testShiftFamily(f, evidence.latticeForms, 'lattice'));
  const subject = `${claim.field} -> ${claim.field} + ${claim.profile.text}`;
  if (!evidence.continuumForms)
    return { verdict: 'undecided', found: `${subject}: no continuum action to compare with` };
  const { continuumForms, discreteInContinuum } = evidence;
  const inContinuum = families.every((f) =>
    f.discrete === undefined ? testShiftFamily(f, continuumForms, 'continuum') : discreteInContinuum(f),
  );
  const status = statusOf(onLattice, inContinuum);
  const say = (is: boolean): string => (is ? 'a symmetry' : 'no symmetry');
  let found = `${subject} is ${say(onLattice)} of the lattice action and ${say(inContinuum)} of the continuum action`;
  const redundancy = status === 'survives' && isRedundancy(families, evidence);
  if (redundancy)
    found += '; its parameter may depend freely on time, so it is a redundancy of the description';
  return {
    ...holdsIf(status === claim.status, status === claim.status ? found : `${found}: ${status}`),
    redundancy,
  };
}

/** True when every family stays a symmetry of the lattice with the time coordinate added to its free arguments. */
function isRedundancy(families: readonly ShiftFamily[], evidence: Evidence): boolean {
  const time = timeAxis(evidence.case.lattice);
  if (time === undefined) return false;
  const functional = evidence.case.lattice.axes.map((_, k) => (k === time ? 1 : 0));
  return families.every((f) =>
    testShiftFamily({ ...f, free: [...f.free, functional] }, evidence.latticeForms, 'lattice'),
  );
}

function decidePointGroup(
  claim: Extract<Claim, { kind: 'point-group' }>,
  group: PointGroupAnalysis,
): Decision {
  const name = group.name === undefined ? '' : ` (${group.name})`;
  const continuum =
    group.continuumOrder === null
      ? ''
      : `; of these lattice maps the continuum action keeps ${group.continuumOrder}`;
  const found = `the space part of the lattice point group has order ${group.order}${name}${continuum}`;
  const isRight =
    (claim.order === undefined || claim.order === group.order) &&
    (claim.name === undefined || claim.name === group.name);
  const survives = group.continuumOrder === null || group.continuumOrder >= group.order;
  if (claim.status === 'survives') return holdsIf(isRight && survives, found);
  if (claim.status === 'lattice-only') return holdsIf(isRight && !survives, found);
  const continuumRight =
    claim.order !== undefined && group.continuumOrder === claim.order && group.order !== claim.order;
  return holdsIf(claim.status === 'continuum-only' ? continuumRight : !isRight && !continuumRight, found);
}

function decideConfiguration(
  claim: Extract<Claim, { kind: 'configuration' }>,
  configuration: Configuration,
): Decision {
  if (configuration.undecided !== undefined) return { verdict: 'undecided', found: configuration.undecided };
  const { suppressed, lattice, continuum } = configuration;
  const word = (is: boolean): string => (is ? 'suppressed' : 'not suppressed');
  const sides = [
    `lattice action ~ ${scalingText(lattice)} (${word(suppressed.lattice)})`,
    continuum === null || suppressed.continuum === null
      ? 'no continuum action'
      : `continuum action ~ ${scalingText(continuum)} (${word(suppressed.continuum)})`,
    configuration.truncates ? 'the series in a truncates' : 'the series in a does not truncate',
  ];
  const found = `on ${configuration.profile}: ${sides.join('; ')}`;
  const wanted = claim.suppressed;
  if (wanted.continuum !== undefined && suppressed.continuum === null) return { verdict: 'undecided', found };
  const isRight =
    (wanted.lattice === undefined || wanted.lattice === suppressed.lattice) &&
    (wanted.continuum === undefined || wanted.continuum === suppressed.continuum) &&
    (claim.truncates === undefined || claim.truncates === configuration.truncates) &&
    (claim.exponent === undefined || sameExponent(claim.exponent, lattice));
  return holdsIf(isRight, found);
}

function sameExponent(claimed: { readonly a: string; readonly l: string }, found: Scaling): boolean {
  if (found === 'zero') return false;
  return found.a.equals(Rational.parse(claimed.a)) && found.l.equals(Rational.parse(claimed.l));
}

function decideCorrections(claim: Extract<Claim, { kind: 'corrections' }>, evidence: Evidence): Decision {
  const { lattice } = evidence.case;
  const { expansion } = evidence;
  const wanted: [Set<string>, number, string][] =
    typeof claim.begin === 'number'
      ? [[spaceSpacings(lattice), claim.begin, [...spaceSpacings(lattice)].join(', ')]]
      : [...claim.begin].map(([s, n]) => [new Set([s]), n, s]);
  const decisions = wanted.map(([spacings, begin, name]): Decision => {
    const first = firstCorrection(expansion, spacings);
    if (first) {
      const order = [...first.order].reduce((sum, [s, n]) => (spacings.has(s) ? sum + n : sum), 0);
      const text = `corrections in ${name} begin at order ${order}: ${firstTerm(first, expansion)}`;
      return { ...holdsIf(order === begin, text), corrections: { claimed: begin, found: order } };
    }
    const none = `no correction in ${name} through order ${expansion.through}`;
    if (begin > expansion.through)
      return { verdict: 'undecided', found: `${none}; raise expand: beyond-leading to ${begin}` };
    return { verdict: 'fails', found: none };
  });
  const verdicts = decisions.map((d) => d.verdict);
  const verdict = verdicts.includes('fails')
    ? 'fails'
    : verdicts.includes('undecided')
      ? 'undecided'
      : 'holds';
  const found = decisions.map((d) => d.found).join('; ');
  const wrong = decisions.find((d) => d.verdict === 'fails')?.corrections;
  return wrong ? { verdict, found, corrections: wrong } : { verdict, found };
}

function firstTerm(order: ExpansionOrder, expansion: Expansion): string {
  const { monomial, coefficient } = order.terms[0]!;
  const rest = order.terms.length > 1 ? ' + …' : '';
  return printDensity(new Density(expansion.space, new Map([[monomial, coefficient]]))) + rest;
}

/** Periodic sizes tried for a count claim: all combinations from 2 up to a bound that keeps the boxes small. */
function censusSizes(dimension: number): number[][] {
  const largest = [12, 6, 4, 3][dimension - 1] ?? 3;
  let out: number[][] = [[]];
  for (let k = 0; k < dimension; k++)
    out = out.flatMap((s) => Array.from({ length: largest - 1 }, (_, i) => [...s, i + 2]));
  return out;
}

function decideCount(claim: Extract<Claim, { kind: 'count' }>, evidence: Evidence): Decision {
  if (claim.group !== 'U(1)')
    return {
      verdict: 'undecided',
      found: `counts over ${claim.group} need the census, which this version does not have`,
    };
  const { lattice, fields } = evidence.case;
  const axes = spaceAxes(lattice).map((k) => lattice.axes[k]!.name);
  const sizesList = censusSizes(axes.length);
  for (const sizes of sizesList) {
    const formula = evaluateCount(claim.formula, new Map(axes.map((x, i) => [x, sizes[i]!])));
    const { free } = torusShiftCount(evidence.latticeForms, lattice, fields, sizes, { torsion: false });
    if (!formula.equals(Rational.of(free))) {
      const box = axes.map((x, i) => `L${x} = ${sizes[i]}`).join(', ');
      return {
        verdict: 'fails',
        found: `at ${box} there are ${free} U(1) factors, the formula gives ${formula}`,
      };
    }
  }
  const range = `${sizesList[0]!.join('x')} to ${sizesList.at(-1)!.join('x')}`;
  return {
    verdict: 'holds',
    found: `the number of U(1) shift symmetries is ${claim.text} on all ${sizesList.length} periodic lattices from ${range}`,
  };
}
