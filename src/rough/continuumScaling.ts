// How continuum actions scale on a family: the proposal, and the orders of the expansion.

import { Coefficient } from '../exact/coefficient.ts';
import type { Rational } from '../exact/rational.ts';
import type { Density } from '../limit/jets.ts';
import type { Expression, LinearForm } from '../model/action.ts';
import type { Lattice } from '../model/geometry.ts';
import { ContinuumJets, ContinuumValues, volumeOf } from './continuumValues.ts';
import { composeSeries } from './epsilonSeries.ts';
import type { Profile, Scaling } from './profile.ts';
import { localFunctionals, regionsOf } from './regions.ts';
import { mostSingular, type ParameterScaling, scalingOf } from './scaling.ts';

/** A family on all its regions in the continuum. */
export class ContinuumFamily {
  private readonly regions: readonly { values: ContinuumValues; volume: Coefficient }[];

  constructor(
    profile: Profile,
    private readonly lattice: Lattice,
    private readonly fields: readonly string[],
  ) {
    const jets = new ContinuumJets(profile, lattice);
    // one strip per functional: where it lies does not matter
    const regions = regionsOf(localFunctionals(profile), lattice.axes.length, () => [0, 0]);
    this.regions = regions.map((region) => ({
      values: new ContinuumValues(jets, fields, region),
      volume: volumeOf(lattice, region),
    }));
  }

  /** Scaling of ∫ L with the terms of L as they stand: a normal form would differ by total derivatives, which do not vanish
   *  point by point where L does. Throws ExpansionPointError for a negative power of zero. */
  ofLagrangian(
    lagrangian: Expression,
    background: ReadonlyMap<string, Rational>,
    scaling: ParameterScaling,
  ): Scaling {
    const mean = (form: LinearForm): Coefficient =>
      [...form].reduce((sum, [name, operator]) => {
        const value = background.get(name);
        const constant = operator.terms.find((t) => t.exponents.every((e) => e === 0));
        return value && constant ? sum.add(constant.weight.scale(value)) : sum;
      }, Coefficient.zero);
    const constant = composeSeries(lagrangian, 0, (form) => [mean(form)])[0]!;
    return mostSingular(
      this.regions.map(({ values, volume }) => {
        const value = (form: LinearForm): Coefficient => values.form(form).add(mean(form));
        const density = composeSeries(lagrangian, 0, (form) => [value(form)])[0]!.sub(constant);
        return scalingOf(density.mul(volume), this.lattice, scaling);
      }),
    );
  }

  /** Scaling of the integral of a density; its constant term does not count. */
  ofDensity(density: Density, scaling: ParameterScaling): Scaling {
    const { space } = density;
    const terms = [...density.terms].filter(([monomial]) => monomial.length > 0);
    return mostSingular(
      this.regions.map(({ values, volume }) => {
        let sum = Coefficient.zero;
        for (const [monomial, coefficient] of terms) {
          let product = coefficient;
          for (const { field, derivative } of space.factors(monomial)) {
            const at = this.fields.indexOf(space.fields[field]!);
            const value = values.derivative(at, derivative);
            product = product.mul(value);
            if (product.isZero) break;
          }
          sum = sum.add(product);
        }
        return scalingOf(sum.mul(volume), this.lattice, scaling);
      }),
    );
  }
}
