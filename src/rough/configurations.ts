// Rough configurations: what each family costs on the lattice and in the continuum, and whether the series in the spacing is
// an expansion on it at all.

import type { Rational } from '../exact/rational.ts';
import { type Expansion, type ExpansionOrder, rawOrders } from '../limit/expansion.ts';
import { Density, type JetSpace } from '../limit/jets.ts';
import type { Matching } from '../limit/matching.ts';
import type { Case } from '../model/case.ts';
import type { Claim } from '../model/claim.ts';
import type { Lattice } from '../model/geometry.ts';
import { InputError, NotationError } from '../notation/source.ts';
import type { ShiftAnalysis } from '../symmetry/family.ts';
import type { PointGroupAnalysis } from '../symmetry/pointGroup.ts';
import { defaultFamilies } from './families.ts';
import { type FamilyProfile, readFamilyProfile } from './familyProfile.ts';
import { mixedActionText } from './mixedAction.ts';
import type { Configuration, CorrectionScaling } from './profile.ts';
import {
  asScaling,
  densityScaling,
  type FullScaling,
  latticeScaling,
  mostSingular,
  ScalingSetting,
} from './scaling.ts';

/** What the analysis of rough configurations reads. */
export interface RoughInput {
  readonly case: Case;
  readonly expansion: Expansion;
  readonly matching: Matching;
  /** The proposal in its own parameters, as written: total derivatives are kept, since a family need not decay. */
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
  readonly profiles: ReadonlyMap<string, FamilyProfile>;
}

/** Throws InputError for a claimed profile that is none. */
export function analyseConfigurations(input: RoughInput): ConfigurationAnalysis {
  const { lattice, claims } = input.case;
  const setting = new ScalingSetting(lattice, input.matching.scaling);
  const orders = rawOrders(input.expansion, lattice);
  const byClaim = new Map<string, Configuration>();
  const all = new Map<string, Configuration>();
  const profiles = new Map<string, FamilyProfile>();
  const examine = (profile: FamilyProfile, claimed: boolean): Configuration => {
    const name = input.case.fields.length === 1 ? profile.text : `${profile.field}: ${profile.text}`;
    const known = all.get(name);
    if (known) return known;
    const configuration = { ...examineFamily(profile, claimed, input, setting, orders), profile: name };
    all.set(name, configuration);
    profiles.set(name, profile);
    return configuration;
  };
  for (const claim of claims)
    if (claim.kind === 'configuration') {
      byClaim.set(claim.id, examine(claimedProfile(claim, lattice), true));
    }
  for (const { name } of input.case.fields)
    for (const profile of defaultFamilies(lattice, name, input.shifts, input.pointGroup))
      examine(profile, false);
  return { configurations: [...all.values()], byClaim, profiles };
}

function claimedProfile(claim: Extract<Claim, { kind: 'configuration' }>, lattice: Lattice): FamilyProfile {
  try {
    return readFamilyProfile(claim.profile.text, claim.profile.tree, lattice, claim.field);
  } catch (error) {
    if (error instanceof NotationError) throw new InputError(error.problem, error.mend, claim.position);
    throw error;
  }
}

function examineFamily(
  profile: FamilyProfile,
  claimed: boolean,
  input: RoughInput,
  setting: ScalingSetting,
  orders: readonly ExpansionOrder[],
): Configuration {
  const { parent, lattice } = input.case;
  const byTerm = new Map(parent.terms.map((t) => [t.name, latticeScaling(t.expression, profile, setting)]));
  const onLattice = mostSingular(byTerm.values());
  const inContinuum = densityScaling(input.proposalDensity, profile, setting);
  const corrections = correctionScalings(orders, input.expansion.space, profile, setting);
  const isDivergent = (s: FullScaling | undefined): boolean => s !== undefined && s.a.sign < 0;
  return {
    profile: profile.text,
    claimed,
    lattice: asScaling(onLattice),
    continuum: asScaling(inContinuum),
    suppressed: { lattice: isDivergent(onLattice), continuum: isDivergent(inContinuum) },
    truncates: corrections.truncates,
    corrections: corrections.list,
    byTerm: new Map([...byTerm].map(([name, s]) => [name, asScaling(s)])),
    mixedAction: mixedActionText(
      parent.terms.filter((t) => byTerm.get(t.name) !== undefined),
      profile,
      lattice,
    ),
    undecided: openPower(onLattice, 'lattice') ?? openPower(inContinuum, 'continuum'),
  };
}

/** A power of the time spacing that is left when it should have cancelled. */
function openPower(scaling: FullScaling | undefined, side: string): string | undefined {
  return scaling && !scaling.b.isZero
    ? `the ${side} action keeps the power ${scaling.b} of the time spacing, so its exponent in a means nothing by itself`
    : undefined;
}

interface Corrections {
  readonly list: CorrectionScaling[];
  readonly truncates: boolean;
}

/** Every order of the expansion that is left when the time spacing has gone to zero. The series truncates iff the orders after
 *  the first that does not vanish are all less singular than it. */
function correctionScalings(
  orders: readonly ExpansionOrder[],
  space: JetSpace,
  profile: FamilyProfile,
  setting: ScalingSetting,
): Corrections {
  const byOrder = new Map<number, (FullScaling | undefined)[]>();
  for (const { total, terms } of orders) {
    const density = new Density(space, new Map(terms.map((t) => [t.monomial, t.coefficient])));
    const scaling = densityScaling(density, profile, setting);
    if (scaling && scaling.b.sign > 0) continue;
    byOrder.set(total, [...(byOrder.get(total) ?? []), scaling]);
  }
  const scalings = [...byOrder].map(([order, list]) => ({ order, scaling: mostSingular(list) }));
  const first = scalings.find((s) => s.scaling !== undefined);
  const leading = scalings.find((s) => s.order <= 0 && s.scaling !== undefined)?.scaling;
  const isAsSingular = (s: FullScaling, than: Rational): boolean => s.a.compare(than) <= 0;
  const list = scalings
    .filter((s) => s.order > 0)
    .map(({ order, scaling }) => ({
      order,
      scaling: asScaling(scaling),
      sameAsLeading: scaling !== undefined && leading !== undefined && isAsSingular(scaling, leading.a),
    }));
  const truncates = !scalings.some(
    ({ order, scaling }) =>
      first?.scaling !== undefined &&
      order > first.order &&
      scaling !== undefined &&
      isAsSingular(scaling, first.scaling.a),
  );
  return { list, truncates };
}
