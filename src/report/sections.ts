// What a report says, in the order in which a reader needs it: the verdict, the claims, the findings, then the evidence.

import type { Expansion, ExpansionOrder } from '../limit/expansion.ts';
import type { Matching, MatchingDifference } from '../limit/matching.ts';
import type { Claim } from '../model/claim.ts';
import type { Configuration } from '../rough/profile.ts';
import type { Analyses, ClaimVerdict, Finding, Verdict } from '../rules/facts.ts';
import type { ShiftSymmetry } from '../symmetry/family.ts';
import { type Block, heading, type Piece, type Pieces, paragraph, prose, type Tone, toned } from './document.ts';
import { type CheckReport, WHAT_IS_NOT_PROVED } from './findings.ts';
import { coefficientPiece, monomialPiece, notationPiece, quotientPiece, scalingPiece } from './formula.ts';

const VERDICT_WORDS: Record<Verdict, { readonly word: string; readonly tone: Tone }> = {
  holds: { word: 'holds', tone: 'good' },
  fails: { word: 'FAILS', tone: 'bad' },
  undecided: { word: 'undecided', tone: 'warning' },
};

/** `holds`, `FAILS` or `undecided`, toned. */
export const verdictPiece = (verdict: Verdict): Piece =>
  toned(VERDICT_WORDS[verdict].tone, VERDICT_WORDS[verdict].word);

const plural = (n: number, word: string): string => `${n} ${word}${n === 1 ? '' : 's'}`;
const yesNo = (value: boolean | null | undefined): string => (value === true ? 'yes' : value === false ? 'no' : '-');

/** Numbers of claims by verdict and of faults. */
export function tally(report: CheckReport): { holds: number; fails: number; undecided: number; faults: number } {
  const count = (verdict: Verdict): number => report.analyses.claims.filter((c) => c.verdict === verdict).length;
  return {
    holds: count('holds'),
    fails: count('fails'),
    undecided: count('undecided'),
    faults: report.findings.filter((f) => f.level === 'fault').length,
  };
}

/** The first line: case, verdict, and what the verdict rests on. */
export function verdictPieces(report: CheckReport): Pieces {
  const { holds, fails, undecided, faults } = tally(report);
  const parts = [
    holds + fails + undecided === 0 ? 'nothing is claimed' : `${plural(holds, 'claim')} held`,
    ...(fails > 0 ? [`${fails} failed`] : []),
    ...(undecided > 0 ? [`${undecided} undecided`] : []),
    plural(faults, 'fault'),
  ];
  const cautions = report.findings.filter((f) => f.level === 'caution').length;
  if (cautions > 0) parts.push(plural(cautions, 'caution'));
  return [`${report.analyses.case.id}: `, verdictPiece(report.verdict), ` (${parts.join(', ')})`];
}

/** A claim in words, e.g. `shift f(x) + g(y) survives`. */
export function claimPieces(claim: Claim): Pieces {
  switch (claim.kind) {
    case 'shift':
      return [`shift of ${claim.field} by `, notationPiece(claim.profile.text), `: ${claim.status}`];
    case 'point-group': {
      const name = claim.name === undefined ? '' : ` ${claim.name}`;
      return [`point group${name}${claim.order === undefined ? '' : ` of order ${claim.order}`}: ${claim.status}`];
    }
    case 'configuration': {
      const { continuum, lattice } = claim.suppressed;
      const said = [
        ...(continuum === undefined ? [] : [`${continuum ? '' : 'not '}suppressed in the continuum`]),
        ...(lattice === undefined ? [] : [`${lattice ? '' : 'not '}suppressed on the lattice`]),
        ...(claim.exponent === undefined ? [] : [`action like a^${claim.exponent.a} l^${claim.exponent.l}`]),
        ...(claim.truncates === undefined ? [] : [`the series ${claim.truncates ? 'truncates' : 'does not truncate'}`]),
      ];
      return ['configuration ', notationPiece(claim.profile.text), `: ${said.join(', ')}`];
    }
    case 'corrections': {
      const { begin } = claim;
      if (typeof begin === 'number') return [`corrections begin at order ${begin}`];
      return [`corrections begin at ${[...begin].map(([s, n]) => `order ${n} in ${s}`).join(', ')}`];
    }
    case 'count':
      return [`number of ${claim.group} factors is `, notationPiece(claim.text)];
    default:
      return [`${claim.kind} ${claim.text}${claim.status === undefined ? '' : `: ${claim.status}`}`];
  }
}

function claimItem({ claim, verdict, found }: ClaimVerdict): { first: Pieces; more: Pieces[] } {
  return { first: [verdictPiece(verdict), `  ${claim.id}: `, ...claimPieces(claim)], more: [prose(found)] };
}

/** The author's claims: failed ones first, then undecided, then those that hold. */
export function claimBlocks(report: CheckReport): Block[] {
  const { claims } = report.analyses;
  if (claims.length === 0)
    return [heading(2, 'Claims'), paragraph('The case claims nothing, so nothing was judged; what follows is what was found.')];
  const inOrder = (['fails', 'undecided', 'holds'] as const).flatMap((v) => claims.filter((c) => c.verdict === v));
  return [heading(2, 'Claims'), { kind: 'list', items: inOrder.map(claimItem) }];
}

const LEVEL_TONES = { fault: 'bad', caution: 'warning', note: 'faint' } as const;

function findingItem(finding: Finding): { first: Pieces; more: Pieces[] } {
  const more: Pieces[] = [
    ...(finding.evidence.trim() === '' ? [] : [['Evidence: ', ...prose(finding.evidence)]]),
    ...(finding.why.trim() === '' ? [] : [['Why: ', ...prose(finding.why)]]),
    ...(finding.mend.trim() === '' ? [] : [['Mend: ', ...prose(finding.mend)]]),
  ];
  return {
    first: [toned(LEVEL_TONES[finding.level], finding.level), '  ', ...prose(finding.statement), ` [${finding.rule}]`],
    more,
  };
}

/** What the rules say, faults first; warnings about the file itself belong here too. */
export function findingBlocks(report: CheckReport): Block[] {
  const { warnings } = report.analyses.case;
  const inOrder = (['fault', 'caution', 'note'] as const).flatMap((l) => report.findings.filter((f) => f.level === l));
  const items = [
    ...inOrder.map(findingItem),
    ...warnings.map(({ text, position }) => ({
      first: [toned('warning', 'caution'), `  ${position.file}:${position.line}:${position.column}: ${text}`],
      more: [],
    })),
  ];
  return [heading(2, 'Findings'), items.length === 0 ? paragraph('None.') : { kind: 'list', items }];
}

function differenceWords(d: MatchingDifference): Pieces {
  const at = d.order === undefined ? '' : d.order === 0 ? ' (leading order)' : ` (relative order ${d.order})`;
  switch (d.kind) {
    case 'agrees':
      return [toned('good', 'agrees')];
    case 'wrong-coefficient':
      return [toned('bad', `wrong coefficient${d.ratio ? `: proposal is ${d.ratio} times the parent` : ''}${at}`)];
    case 'missing-from-proposal':
      return [toned('bad', `missing from the proposal${at}`)];
    case 'only-in-proposal':
      if (d.forbiddenBy === undefined) return [toned('bad', 'only in the proposal')];
      return d.forbiddenBy === null
        ? [toned('warning', 'only in the proposal; every exact lattice symmetry allows it, so it will be generated')]
        : [toned('bad', `only in the proposal; forbidden by ${d.forbiddenBy}`)];
  }
}

const ORIGINS = {
  given: 'Parameters as given in the case:',
  solved: 'Parameters solved from the leading order:',
  proposed: 'The case has no proposal; the leading order itself is the one proposed here:',
} as const;

/** How the parameters of the proposal follow from those of the parent, and where the two sides differ. */
export function matchingBlocks(matching: Matching | undefined, expansion: Expansion): Block[] {
  if (!matching) return [heading(2, 'Matching'), paragraph('The case has no proposal to match.')];
  const blocks: Block[] = [heading(2, 'Matching')];
  if (matching.undecided !== undefined) blocks.push(paragraph(toned('warning', 'undecided'), `: ${matching.undecided}`));
  if (matching.parameters.size > 0) {
    blocks.push(paragraph(ORIGINS[matching.origin]), {
      kind: 'table',
      head: ['parameter', 'in terms of the parent', 'kept fixed as the spacings vanish by'],
      rows: [...matching.parameters].map(([name, value]) => [[notationPiece(name)], [quotientPiece(value)], []]),
    });
    blocks[blocks.length - 1] = parameterTable(matching);
  }
  if (matching.scaling.size > 0) blocks.push(paragraph(`Fixed in the limit when ${scalingWords(matching)}.`));
  if (matching.differences.length > 0)
    blocks.push({
      kind: 'table',
      head: ['monomial', 'parent', 'proposal', 'verdict'],
      rows: matching.differences.map((d) => [
        [monomialPiece(expansion.space, d.monomial)],
        [quotientPiece(d.parent)],
        [quotientPiece(d.proposal)],
        differenceWords(d),
      ]),
    });
  return [...blocks, ...matching.rescalings.map((text) => paragraph(...prose(text)))];
}

function parameterTable(matching: Matching): Block {
  return {
    kind: 'table',
    head: ['parameter', 'in parent parameters and spacings'],
    rows: [...matching.parameters].map(([name, value]) => [[notationPiece(name)], [quotientPiece(value)]]),
  };
}

function scalingWords(matching: Matching): string {
  return [...matching.scaling]
    .map(([parameter, powers]) => {
      const product = [...powers].filter(([, e]) => !e.isZero).map(([s, e]) => (e.isOne ? s : `${s}^${e.isInteger ? e : `(${e})`}`));
      return product.length === 0 ? `${parameter} is constant` : `${parameter} grows like ${product.join(' ')}`;
    })
    .join(', ');
}

const GROWTH_WORDS = ['global', 'line-like', 'plane-like'];

function growthWords(s: ShiftSymmetry): string {
  if (s.redundancy) return 'redundancy (free in time)';
  return GROWTH_WORDS[s.growth] ?? `${s.growth} free coordinates`;
}

/** Shift families with their status, the point group, and how complete the list is. */
export function symmetryBlocks({ shifts, pointGroup, case: theCase }: Analyses): Block[] {
  const blocks: Block[] = [heading(2, 'Symmetries')];
  if (shifts.symmetries.length > 0)
    blocks.push({
      kind: 'table',
      head: ['shift', 'lattice', 'continuum', 'status', 'parameter'],
      rows: shifts.symmetries.map((s) => [
        [notationPiece(s.family.profile)],
        [yesNo(s.lattice)],
        [yesNo(s.continuum)],
        [s.status],
        [growthWords(s)],
      ]),
    });
  else blocks.push(paragraph('No shift symmetry was found.'));
  const broken = shifts.symmetries.flatMap((s) =>
    s.brokenBy ? [{ first: [notationPiece(s.family.profile), ' is broken on the lattice by ', notationPiece(s.brokenBy.text), ` at relative order ${s.brokenBy.order}`], more: [] }] : [],
  );
  if (broken.length > 0) blocks.push({ kind: 'list', items: broken });
  blocks.push(paragraph(`Completeness on the lattice: ${shifts.lattice.text}.`));
  if (shifts.continuum) blocks.push(paragraph(`Completeness in the continuum: ${shifts.continuum.text}.`));
  const g = pointGroup;
  const name = g.name === undefined ? '' : ` ${g.name}`;
  const continuum = g.continuumOrder === null ? '' : `; the proposal has order ${g.continuumOrder}`;
  blocks.push(
    paragraph(`Point group${name} of order ${g.order} (lattice alone: ${g.holohedry})${continuum}.`),
    paragraph(
      `Generators: ${g.generators.length === 0 ? 'none' : g.generators.join('; ')}. ` +
        `Time reflection: ${theCase.lattice.axes.some((axis) => axis.role === 'time') ? yesNo(g.timeReflection) : 'no time axis'}. ` +
        `Reflection of all fields: ${yesNo(g.fieldReflection)}.`,
    ),
  );
  return blocks;
}

const suppressionWord = (value: boolean | null): Piece => (value === null ? '-' : value ? 'suppressed' : 'unsuppressed');

function configurationNotes(configurations: readonly Configuration[]): Block[] {
  const items = configurations.flatMap((c) =>
    c.undecided === undefined ? [] : [{ first: [notationPiece(c.profile), ': ', toned('warning', 'undecided'), `, ${c.undecided}`], more: [] }],
  );
  return items.length === 0 ? [] : [{ kind: 'list', items }];
}

/** Rough configurations: powers of the spacing a and the size l (t: extent in time) of the action, and what they mean. */
export function configurationBlocks({ configurations, charges }: Analyses): Block[] {
  const blocks: Block[] = [heading(2, 'Rough configurations')];
  if (configurations.length === 0) blocks.push(paragraph('No family was examined.'));
  else
    blocks.push(
      {
        kind: 'table',
        head: ['family', 'lattice S ~', 'continuum S ~', 'on the lattice', 'in the continuum', 'series'],
        rows: configurations.map((c) => [
          [notationPiece(c.profile), ...(c.claimed ? [' (claimed)'] : [])],
          [scalingPiece(c.lattice)],
          [scalingPiece(c.continuum)],
          [suppressionWord(c.suppressed.lattice)],
          [suppressionWord(c.suppressed.continuum)],
          [c.truncates ? 'truncates' : toned('warning', 'all orders count')],
        ]),
      },
      ...configurationNotes(configurations),
    );
  if (charges.length > 0)
    blocks.push(heading(3, 'Energy of a unit charge'), {
      kind: 'list',
      items: charges.map((c) => ({
        first: [
          notationPiece(c.family),
          ': ',
          ...(c.undecided === undefined ? prose(c.text) : [toned('warning', 'undecided'), `, ${c.undecided}`]),
        ],
        more: [],
      })),
    });
  return blocks;
}

function orderWords(order: ExpansionOrder): string {
  if (order.total === 0) return 'Leading order';
  const powers = [...order.order].filter(([, n]) => n !== 0).map(([s, n]) => (n === 1 ? s : `${s}^${n}`));
  return `Relative order ${powers.join(' ')}`;
}

/** The expanded Lagrangian density modulo total derivatives, order by order. */
export function expansionBlocks(expansion: Expansion): Block[] {
  const cut = expansion.fieldCut === undefined ? '' : ` Monomials of more than ${expansion.fieldCut} field factors are left out.`;
  return [
    heading(2, 'Expansion'),
    paragraph(
      `Lagrangian density modulo total derivatives, complete through relative order ${expansion.through}.${cut}`,
    ),
    ...expansion.orders.flatMap((order): Block[] => [
      heading(3, orderWords(order)),
      order.terms.length === 0
        ? paragraph('No term.')
        : {
            kind: 'table',
            head: ['coefficient', 'monomial', 'from'],
            rows: order.terms.map((t) => [
              [coefficientPiece(t.coefficient)],
              [monomialPiece(expansion.space, t.monomial)],
              [t.from.join(', ')],
            ]),
          },
    ]),
  ];
}

const WITNESS_TONES = { confirms: 'good', contradicts: 'bad', inconclusive: 'warning' } as const;

/** Numerical runs on real lattices. They confirm or contradict; they decide nothing. */
export function witnessBlocks({ witness }: Analyses): Block[] {
  if (witness.length === 0) return [];
  return [
    heading(2, 'Witnesses'),
    {
      kind: 'list',
      items: witness.map((w) => ({
        first: [toned(WITNESS_TONES[w.verdict], w.verdict), '  ', notationPiece(w.subject), ': ', ...prose(w.text)],
        more: [],
      })),
    },
  ];
}

/** The whole report of one case. */
export function reportDocument(report: CheckReport): Block[] {
  const { analyses } = report;
  return [
    heading(1, ...verdictPieces(report)),
    ...(analyses.case.title === '' ? [] : [paragraph(analyses.case.title)]),
    ...claimBlocks(report),
    ...findingBlocks(report),
    ...matchingBlocks(analyses.matching, analyses.expansion),
    ...symmetryBlocks(analyses),
    ...configurationBlocks(analyses),
    ...expansionBlocks(analyses.expansion),
    ...witnessBlocks(analyses),
    heading(2, 'What this does not prove'),
    paragraph(WHAT_IS_NOT_PROVED),
  ];
}

/** Only what needs attention: the verdict, the claims that do not hold, the faults. */
export function briefDocument(report: CheckReport): Block[] {
  const open = report.analyses.claims.filter((c) => c.verdict !== 'holds').map(claimItem);
  const faults = report.findings.filter((f) => f.level === 'fault').map(findingItem);
  const items = [...open, ...faults];
  return [paragraph(...verdictPieces(report)), ...(items.length === 0 ? [] : [{ kind: 'list', items } as const])];
}

/** One line a case, for a run over several. */
export function summaryDocument(reports: readonly CheckReport[]): Block[] {
  return [
    heading(2, 'Summary'),
    {
      kind: 'table',
      head: ['case', 'verdict', 'held', 'failed', 'undecided', 'faults'],
      rows: reports.map((report) => {
        const { holds, fails, undecided, faults } = tally(report);
        return [[report.analyses.case.id], [verdictPiece(report.verdict)], ...[holds, fails, undecided, faults].map((n) => [String(n)])];
      }),
    },
  ];
}
