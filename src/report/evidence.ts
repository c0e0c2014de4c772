// The evidence behind a report: matching, symmetries, rough configurations, expansion, witnesses.

import { type Expansion, type ExpansionOrder, rawOrders } from '../limit/expansion.ts';
import type { Matching, MatchingDifference } from '../limit/matching.ts';
import type { Configuration } from '../rough/profile.ts';
import type { Analyses } from '../rules/facts.ts';
import type { ShiftSymmetry } from '../symmetry/family.ts';
import { type Block, heading, type Pieces, paragraph, prose, toned } from './document.ts';
import { coefficientPiece, monomialPiece, notationPiece, quotientPiece, scalingPiece } from './formula.ts';

const yesNo = (value: boolean | null): string => (value === true ? 'yes' : value === false ? 'no' : '-');

function differenceWords(d: MatchingDifference): Pieces {
  const at = d.order === undefined ? '' : d.order === 0 ? ' (leading order)' : ` (relative order ${d.order})`;
  switch (d.kind) {
    case 'agrees':
      return [toned('good', 'agrees')];
    case 'wrong-coefficient':
      return [
        toned('bad', `wrong coefficient${d.ratio ? `: proposal is ${d.ratio} times the parent` : ''}${at}`),
      ];
    case 'missing-from-proposal':
      return [toned('bad', `missing from the proposal${at}`)];
    case 'only-in-proposal':
      if (d.forbiddenBy === undefined) return [toned('bad', 'only in the proposal')];
      return d.forbiddenBy === null
        ? [
            toned(
              'warning',
              'only in the proposal; every exact lattice symmetry allows it, so it will be generated',
            ),
          ]
        : [toned('bad', `only in the proposal; forbidden by ${d.forbiddenBy}`)];
  }
}

const ORIGINS = {
  given: 'Parameters as given in the case:',
  solved: 'Parameters solved from the leading order:',
  proposed: 'The case has no proposal. Proposed here, from the leading order:',
} as const;

/** How the parameters of the proposal follow from those of the parent, and where the two sides differ. */
export function matchingBlocks({ matching, expansion, proposed, case: theCase }: Analyses): Block[] {
  const spacings = theCase.lattice.limits;
  if (!matching) return [heading(2, 'Matching'), paragraph('The case has no proposal to match.')];
  const blocks: Block[] = [heading(2, 'Matching')];
  if (matching.undetermined.length > 0)
    blocks.push(
      paragraph(
        toned('warning', 'undecided'),
        `: the expansion does not determine ${matching.undetermined.join(', ')}.`,
      ),
    );
  if (matching.parameters.size > 0)
    blocks.push(
      paragraph(ORIGINS[matching.origin]),
      ...(proposed === null ? [] : [paragraph('L = ', notationPiece(proposed))]),
      parameterTable(matching, spacings),
    );
  if (matching.scalingProblem !== undefined)
    blocks.push(paragraph(toned('warning', 'No limit at fixed couplings'), `: ${matching.scalingProblem}.`));
  else if (matching.scaling.size > 0)
    blocks.push(paragraph(`Fixed in the limit when ${scalingWords(matching)}.`));
  if (matching.differences.length > 0)
    blocks.push({
      kind: 'table',
      head: ['monomial', 'parent', 'proposal', 'verdict'],
      rows: matching.differences.map((d) => [
        [monomialPiece(expansion.space, d.monomial)],
        [quotientPiece(d.parent, spacings)],
        [quotientPiece(d.proposal, spacings)],
        differenceWords(d),
      ]),
    });
  for (const [field, factor] of matching.rescalings)
    blocks.push(
      paragraph(
        `The two sides would match after rescaling ${field} by `,
        quotientPiece(factor, spacings),
        '.',
      ),
    );
  return blocks;
}

function parameterTable(matching: Matching, spacings: readonly string[]): Block {
  return {
    kind: 'table',
    head: ['parameter', 'in parent parameters and spacings'],
    rows: [...matching.parameters].map(([name, value]) => [
      [notationPiece(name)],
      [quotientPiece(value, spacings)],
    ]),
  };
}

function scalingWords(matching: Matching): string {
  return [...matching.scaling]
    .map(([parameter, powers]) => {
      const product = [...powers]
        .filter(([, e]) => !e.isZero)
        .map(([s, e]) => (e.isOne ? s : `${s}^${e.isInteger ? e : `(${e})`}`));
      return product.length === 0
        ? `${parameter} is constant`
        : `${parameter} scales like ${product.join(' ')}`;
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
    s.brokenBy
      ? [
          {
            first: [
              notationPiece(s.family.profile),
              ' is broken on the lattice by ',
              notationPiece(s.brokenBy.text),
              ` at relative order ${s.brokenBy.order}`,
            ],
            more: [],
          },
        ]
      : [],
  );
  if (broken.length > 0) blocks.push({ kind: 'list', items: broken });
  blocks.push(paragraph(`Lattice: ${shifts.lattice.text}.`));
  if (shifts.continuum) blocks.push(paragraph(`Continuum: ${shifts.continuum.text}.`));
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

/** Undecided families, by reason. */
function configurationNotes(configurations: readonly Configuration[]): Block[] {
  const byReason = new Map<string, string[]>();
  for (const { undecided, profile } of configurations)
    if (undecided !== undefined) byReason.set(undecided, [...(byReason.get(undecided) ?? []), profile]);
  if (byReason.size === 0) return [];
  const items = [...byReason].map(([reason, profiles]) => ({
    first: [
      toned('warning', 'undecided'),
      ' ',
      ...profiles.flatMap((p, i) => [...(i > 0 ? ['; '] : []), notationPiece(p)]),
      `: ${reason}`,
    ],
    more: [],
  }));
  return [{ kind: 'list', items }];
}

/** Rough configurations: powers of the spacing a and the size l (t: extent in time) of the action, and what they mean. */
export function configurationBlocks({ configurations, charges }: Analyses): Block[] {
  const blocks: Block[] = [heading(2, 'Rough configurations')];
  const decided = configurations.filter((c) => c.undecided === undefined);
  if (configurations.length === 0) blocks.push(paragraph('No family was examined.'));
  if (decided.length > 0)
    blocks.push({
      kind: 'table',
      head: [
        'family',
        'S on lattice',
        'S in continuum',
        'suppressed on lattice',
        'in continuum',
        'series in a',
      ],
      rows: decided.map((c) => [
        [notationPiece(c.profile), ...(c.claimed ? [' (claimed)'] : [])],
        [scalingPiece(c.lattice)],
        [scalingPiece(c.continuum)],
        [yesNo(c.suppressed.lattice)],
        [yesNo(c.suppressed.continuum)],
        [c.truncates ? 'truncates' : toned('warning', 'all orders count')],
      ]),
    });
  blocks.push(...configurationNotes(configurations));
  const mixed = decided.filter((c) => c.mixedAction !== '');
  if (mixed.length > 0)
    blocks.push(heading(3, 'Effective actions on the families'), {
      kind: 'list',
      items: mixed.map((c) => ({
        first: [notationPiece(c.profile), ': ', notationPiece(c.mixedAction)],
        more: [],
      })),
    });
  if (charges.length > 0)
    blocks.push(heading(3, 'Energy of a unit charge'), {
      kind: 'list',
      items: charges.map((c) => ({
        first: [
          notationPiece(c.family),
          ': ',
          ...(c.undecided === undefined
            ? prose(c.text)
            : [toned('warning', 'undecided'), `, ${c.undecided}`]),
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
export function expansionBlocks({ expansion, case: theCase }: Analyses): Block[] {
  const cut =
    expansion.fieldCut === undefined
      ? ''
      : ` Monomials of more than ${expansion.fieldCut} field factors are left out.`;
  return [
    heading(2, 'Expansion'),
    paragraph(
      `Lagrangian density modulo total derivatives, complete through relative order ${expansion.through}.${cut}`,
    ),
    ...orderBlocks(expansion.orders, expansion, theCase),
  ];
}

/** The series as it comes out of the Taylor expansion about the centre of each stencil: what stands here and not under
 *  "Expansion" differs from it by total derivatives, the boundary terms that were dropped. */
export function rawExpansionBlocks({ expansion, case: theCase }: Analyses): Block[] {
  return [
    heading(2, 'Before dropping total derivatives'),
    paragraph(
      'The Taylor series about the centre of each stencil. It differs from the expansion above by total derivatives.',
    ),
    ...orderBlocks(rawOrders(expansion, theCase.lattice), expansion, theCase),
  ];
}

function orderBlocks(
  orders: readonly ExpansionOrder[],
  { space }: Expansion,
  { lattice }: Analyses['case'],
): Block[] {
  return orders.flatMap((order): Block[] => [
    heading(3, orderWords(order)),
    order.terms.length === 0
      ? paragraph('No term.')
      : {
          kind: 'table',
          head: ['coefficient', 'monomial', 'from'],
          rows: order.terms.map((t) => [
            [coefficientPiece(t.coefficient, lattice.limits)],
            [monomialPiece(space, t.monomial)],
            [t.from.join(', ')],
          ]),
        },
  ]);
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
        first: [
          toned(WITNESS_TONES[w.verdict], w.verdict),
          ' ',
          notationPiece(w.subject),
          ': ',
          ...prose(w.text),
        ],
        more: [],
      })),
    },
  ];
}
