// What a report says, in the order in which a reader needs it: the verdict, the claims, the findings, then the evidence.

import type { ClaimVerdict, Verdict } from '../claims/verdict.ts';
import type { Claim } from '../model/claim.ts';
import type { Finding } from '../rules/facts.ts';
import {
  type Block,
  heading,
  type Piece,
  type Pieces,
  paragraph,
  prose,
  type Tone,
  toned,
} from './document.ts';
import {
  configurationBlocks,
  expansionBlocks,
  matchingBlocks,
  symmetryBlocks,
  witnessBlocks,
} from './evidence.ts';
import { type CheckReport, WHAT_IS_NOT_PROVED } from './findings.ts';
import { notationPiece } from './formula.ts';

const VERDICT_WORDS: Record<Verdict, { readonly word: string; readonly tone: Tone }> = {
  holds: { word: 'holds', tone: 'good' },
  fails: { word: 'FAILS', tone: 'bad' },
  undecided: { word: 'undecided', tone: 'warning' },
};

/** `holds`, `FAILS` or `undecided`, toned. */
export const verdictPiece = (verdict: Verdict): Piece =>
  toned(VERDICT_WORDS[verdict].tone, VERDICT_WORDS[verdict].word);

const plural = (n: number, word: string): string => `${n} ${word}${n === 1 ? '' : 's'}`;

/** Numbers of claims by verdict and of faults. */
export function tally(report: CheckReport): {
  holds: number;
  fails: number;
  undecided: number;
  faults: number;
} {
  const count = (verdict: Verdict): number =>
    report.analyses.claims.filter((c) => c.verdict === verdict).length;
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
      return [
        `point group${name}${claim.order === undefined ? '' : ` of order ${claim.order}`}: ${claim.status}`,
      ];
    }
    case 'configuration': {
      const { continuum, lattice } = claim.suppressed;
      const said = [
        ...(continuum === undefined ? [] : [`${continuum ? '' : 'not '}suppressed in the continuum`]),
        ...(lattice === undefined ? [] : [`${lattice ? '' : 'not '}suppressed on the lattice`]),
        ...(claim.exponent === undefined ? [] : [`action like a^${claim.exponent.a} l^${claim.exponent.l}`]),
        ...(claim.truncates === undefined
          ? []
          : [`the series ${claim.truncates ? 'truncates' : 'does not truncate'}`]),
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
  return { first: [verdictPiece(verdict), ` ${claim.id}: `, ...claimPieces(claim)], more: [prose(found)] };
}

/** The author's claims: failed ones first, then undecided, then those that hold. */
export function claimBlocks(report: CheckReport): Block[] {
  const { claims } = report.analyses;
  if (claims.length === 0)
    return [
      heading(2, 'Claims'),
      paragraph('The case claims nothing, so nothing was judged; what follows is what was found.'),
    ];
  const inOrder = (['fails', 'undecided', 'holds'] as const).flatMap((v) =>
    claims.filter((c) => c.verdict === v),
  );
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
    first: [
      toned(LEVEL_TONES[finding.level], finding.level),
      ': ',
      ...prose(finding.statement),
      ` [${finding.rule}]`,
    ],
    more,
  };
}

/** What the rules say, faults first; warnings about the file itself belong here too. */
export function findingBlocks(report: CheckReport): Block[] {
  const { warnings } = report.analyses.case;
  const inOrder = (['fault', 'caution', 'note'] as const).flatMap((l) =>
    report.findings.filter((f) => f.level === l),
  );
  const items = [
    ...inOrder.map(findingItem),
    ...warnings.map(({ text, position }) => ({
      first: [toned('warning', 'caution'), `: ${position.file}:${position.line}:${position.column}: ${text}`],
      more: [],
    })),
  ];
  return [heading(2, 'Findings'), items.length === 0 ? paragraph('None.') : { kind: 'list', items }];
}

/** The whole report of one case. */
export function reportDocument(report: CheckReport): Block[] {
  const { analyses } = report;
  return [
    heading(1, ...verdictPieces(report)),
    ...(analyses.case.title === '' ? [] : [paragraph(analyses.case.title)]),
    ...claimBlocks(report),
    ...findingBlocks(report),
    ...matchingBlocks(analyses),
    ...symmetryBlocks(analyses),
    ...configurationBlocks(analyses),
    ...expansionBlocks(analyses),
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
  return [
    heading(3, ...verdictPieces(report)),
    ...(items.length === 0 ? [] : [{ kind: 'list', items } as const]),
  ];
}

/** One line a case, for a run over several; a case without a report could not be checked. */
export function summaryDocument(
  cases: readonly { readonly file: string; readonly report: CheckReport | undefined }[],
): Block[] {
  return [
    heading(2, 'Summary'),
    {
      kind: 'table',
      head: ['case', 'verdict', 'held', 'failed', 'undecided', 'faults'],
      rows: cases.map(({ file, report }) => {
        if (!report) return [[file], [toned('bad', 'not checked')], ['-'], ['-'], ['-'], ['-']];
        const { holds, fails, undecided, faults } = tally(report);
        const counts = [holds, fails, undecided, faults].map((n) => [String(n)]);
        return [[report.analyses.case.id], [verdictPiece(report.verdict)], ...counts];
      }),
    },
  ];
}
