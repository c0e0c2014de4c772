// Rough configurations: what each family costs on the lattice and in the continuum, and whether the series in the spacing
// is an expansion on it at all.

import { type Expansion, rawOrders } from '../limit/expansion.ts';
import { Density } from '../limit/jets.ts';
import type { Matching } from '../limit/matching.ts';
import { ExpansionPointError } from '../limit/taylor.ts';
import type { Case } from '../model/case.ts';
import type { Claim } from '../model/claim.ts';
import { InputError, LimitError, NotationError } from '../notation/source.ts';
import type { ShiftAnalysis } from '../symmetry/family.ts';
import type { PointGroupAnalysis } from '../symmetry/pointGroup.ts';
import { ContinuumFamily } from './continuumScaling.ts';
import { defaultFamilies } from './families.ts';
import { latticeScaling } from './latticeScaling.ts';
import { mixedActionText } from './mixedAction.ts';
import {
  type Configuration,
  type CorrectionScaling,
  isLocal,
  type Profile,
  type Scaling,
} from './profile.ts';
import { readConfiguration } from './readConfiguration.ts';
import { compareSingularity, diverges, mostSingular } from './scaling.ts';

/** What the analysis of rough configurations reads. */
export interface RoughInput {
  readonly case: Case;
  readonly expansion: Expansion;
  readonly matching: Matching;
  /** Normal form of the proposal in its own parameters; used where the case has no Lagrangian of its own. */
  readonly proposalDensity: Density;
  readonly shifts: ShiftAnalysis;
  readonly pointGroup: PointGroupAnalysis;
}

export interface ConfigurationAnalysis {
  /** Claimed families first, then the default ones. */
  readonly configurations: readonly Configuration[];
  /** The configuration of each configuration claim, by claim id. */
  readonly byClaim: ReadonlyMap<string, Configuration>;
  /** The families themselves, by their text. */
  readonly profiles: ReadonlyMap<string, Profile>;
}

/** Examines every claimed and every default family. Throws InputError for a claimed profile that is none. */
export function analyseConfigurations(input: RoughInput): ConfigurationAnalysis {
  const { lattice, claims, fields } = input.case;
  const orders = ordersByTotal(input.expansion, input.case);
  const byClaim = new Map<string, Configuration>();
  const all = new Map<string, Configuration>();
  const profiles = new Map<string, Profile>();
  const add = (profile: Profile, claimed: boolean): Configuration => {
    const known = all.get(profile.text);
    if (known) return known;
    const configuration = examine(profile, claimed, input, orders);
    all.set(profile.text, configuration);
    profiles.set(profile.text, profile);
    return configuration;
  };
  for (const claim of claims)
    if (claim.kind === 'configuration') byClaim.set(claim.id, add(claimedProfile(claim, input.case), true));
  for (const profile of defaultFamilies(lattice, fields, input.shifts, input.pointGroup)) add(profile, false);
  return { configurations: [...all.values()], byClaim, profiles };
}

function claimedProfile(
  claim: Extract<Claim, { kind: 'configuration' }>,
  { lattice, fields }: Case,
): Profile {
  const { text, tree } = claim.profile;
  const name = fields.length === 1 ? text : `${claim.field}: ${text}`;
  try {
    return readConfiguration(tree, lattice, fields, claim.field, name);
  } catch (error) {
    if (error instanceof NotationError) throw new InputError(error.problem, error.mend, claim.position);
    throw error;
  }
}

/** Total orders of the expansion as they come out of the Taylor series, before total derivatives are dropped: a family on which
 *  every linear form vanishes then annihilates every order. */
function ordersByTotal(expansion: Expansion, { lattice }: Case): Map<number, Density> {
  const orders = new Map<number, Density>();
  for (const { total, terms } of rawOrders(expansion, lattice)) {
    const density = new Density(expansion.space, new Map(terms.map((t) => [t.monomial, t.coefficient])));
    const order = Math.max(0, total);
    orders.set(order, orders.get(order)?.add(density) ?? density);
  }
  return new Map([...orders].sort(([x], [y]) => x - y));
}

function examine(
  profile: Profile,
  claimed: boolean,
  input: RoughInput,
  orders: ReadonlyMap<number, Density>,
): Configuration {
  const { case: theCase, matching } = input;
  const { lattice, parent, expand } = theCase;
  const fields = theCase.fields.map((f) => f.name);
  const setting = { lattice, fields, background: expand.background, scaling: matching.scaling };
  let undecided = matching.scalingProblem ?? obstacle(profile, theCase);
  const attempt = (find: () => Scaling): Scaling => {
    try {
      return find();
    } catch (error) {
      if (!(error instanceof LimitError || error instanceof ExpansionPointError)) throw error;
      undecided ??= error.message;
      return 'zero';
    }
  };
  const byTerm = new Map(
    parent.terms.map((t) => [t.name, attempt(() => latticeScaling(t.expression, profile, setting))]),
  );
  const family = new ContinuumFamily(profile, lattice, fields);
  const continuum = theCase.proposal
    ? attempt(() => family.ofLagrangian(theCase.proposal!.lagrangian, expand.background, matching.scaling))
    : family.ofDensity(input.proposalDensity, matching.scaling);
  const scalings = [...orders].map(([order, density]) => ({
    order,
    scaling: family.ofDensity(density, matching.scaling),
  }));
  const { corrections, truncates } = judgeSeries(scalings);
  const onLattice = mostSingular([...byTerm.values()]);
  return {
    profile: profile.text,
    claimed,
    lattice: onLattice,
    continuum,
    suppressed: { lattice: diverges(onLattice), continuum: diverges(continuum) },
    truncates,
    corrections,
    byTerm,
    mixedAction: mixedActionText(
      parent.terms.filter((t) => byTerm.get(t.name) !== 'zero'),
      profile,
      lattice,
      expand.background,
    ),
    undecided,
  };
}

function judgeSeries(scalings: readonly { order: number; scaling: Scaling }[]): {
  corrections: CorrectionScaling[];
  truncates: boolean;
} {
  const leading = scalings.find((s) => s.order === 0)?.scaling ?? 'zero';
  const corrections = scalings
    .filter((s) => s.order > 0)
    .map(({ order, scaling }) => ({
      order,
      scaling,
      sameAsLeading: scaling !== 'zero' && leading !== 'zero' && compareSingularity(scaling, leading) <= 0,
    }));
  const present = scalings.flatMap((s) => (s.scaling === 'zero' ? [] : [s.scaling]));
  const truncates = present.every((s, i) => i === 0 || compareSingularity(present[i - 1]!, s) < 0);
  return { corrections, truncates };
}

/** Why the powers of a family cannot be counted, if they cannot. */
function obstacle(profile: Profile, theCase: Case): string | undefined {
  const { axes } = theCase.lattice;
  const mixes = (row: readonly number[]): boolean =>
    new Set(row.flatMap((e, k) => (e === 0 ? [] : [axes[k]!.role]))).size > 1;
  const factors = profile.terms.flatMap((t) => t.factors);
  if (factors.some((f) => (isLocal(f) ? [f.row] : f.rows).some(mixes)))
    return 'an argument mixes space with time, whose spacings go to zero at different rates';
  const uses = new Map<string, Set<string>>();
  for (const f of factors)
    if (f.kind === 'smooth') uses.set(f.name, (uses.get(f.name) ?? new Set()).add(JSON.stringify(f.rows)));
  if (factors.some(isLocal) && [...uses.values()].some((arguments_) => arguments_.size > 1))
    return 'values of one smooth function may coincide where the family is localised; give the functions different names';
  return undefined;
}
