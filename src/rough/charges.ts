// Energy of the unit charge of a shift family. With the kinetic term μ0/2 (∂_t φ)² the momentum of an angle is quantised on
// the support of the family: π is spread over the directions on which the parameter does not depend and confined to one
// spacing in the r on which it does, so π = 1/(a^r ℓ^(D−r)) on a volume a^r ℓ^(D−r), and E = 1/(2 μ0 a^r ℓ^(D−r)).

import { rational } from '../exact/rational.ts';
import type { Density } from '../limit/jets.ts';
import { spaceAxes, timeAxis } from '../model/geometry.ts';
import { printCoefficient } from '../notation/print.ts';
import type { RoughInput } from './configurations.ts';
import type { ChargeEnergy } from './profile.ts';

/** One entry for every exact continuous shift family of a single angle. */
export function chargeEnergies(input: RoughInput): ChargeEnergy[] {
  const { lattice, fields } = input.case;
  const dimension = spaceAxes(lattice).length;
  const time = timeAxis(lattice);
  const reason = noKineticTerm(input.proposalDensity, time);
  const coupling = kineticCoupling(input.proposalDensity, time);
  return input.shifts.symmetries
    .filter((s) => s.status === 'survives' && s.family.discrete === undefined && !s.redundancy)
    .filter((s) =>
      fields.every((f, i) => (s.family.prefactor[i]?.length ?? 0) === 0 || f.values.kind === 'angle'),
    )
    .map(({ family, growth }): ChargeEnergy => {
      const isPolynomial = family.prefactor.some((p) => p.some((t) => t.exponents.some((n) => n > 0)));
      const undecided = isPolynomial
        ? 'the charge is weighted with a coordinate, so its unit depends on the origin'
        : fields.length > 1
          ? 'charges of several fields share a kinetic form that is not worked out here'
          : reason;
      const [p, q] = [growth, dimension - growth];
      const power = (name: string, n: number): string =>
        n === 0 ? '' : n === 1 ? ` ${name}` : ` ${name}^${n}`;
      return {
        family: family.profile,
        p: rational(p),
        q: rational(q),
        limitsCommute: !(p > 0 && q > 0),
        text: `E ~ 1/(${coupling}${power('a', p)}${power('l', q)})`,
        undecided,
      };
    });
}

/** μ0 in the proposal's own words: twice the coefficient of (∂_t φ)². */
function kineticCoupling({ space, terms }: Density, time: number | undefined): string {
  for (const [m, c] of terms)
    if (
      m.length === 2 &&
      space.factors(m).every((f) => f.derivative.every((n, k) => n === (k === time ? 1 : 0)))
    ) {
      const doubled = c.scale(rational(2));
      return doubled.asMonomial ? printCoefficient(doubled) : `(${printCoefficient(doubled)})`;
    }
  return 'mu0';
}

/** Why the unit-charge energy cannot be read off, or undefined when it can: exactly one kinetic term (∂_t φ)². */
function noKineticTerm(density: Density, time: number | undefined): string | undefined {
  if (time === undefined) return 'there is no time axis';
  const kinetic = [...density.terms.keys()].filter(
    (m) => m.length === 2 && density.space.factors(m).some((f) => f.derivative[time]! > 0),
  );
  if (kinetic.length === 0) return 'the continuum action has no kinetic term';
  const isPlain = kinetic.every((m) =>
    density.space.factors(m).every((f) => f.derivative.every((n, k) => n === (k === time ? 1 : 0))),
  );
  return isPlain ? undefined : 'the kinetic term has derivatives along space or higher ones along time';
}
