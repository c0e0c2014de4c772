// An action or a density on a configuration family in one region, exactly: which powers of the spacings it starts with, or
// that it vanishes. Rough directions keep the lattice operator; smooth ones are Taylor expanded.

import { Coefficient } from '../exact/coefficient.ts';
import { Rational, rational } from '../exact/rational.ts';
import { addTerm, type Density, type JetMonomial, JetSpace } from '../limit/jets.ts';
import { composeDensity } from '../limit/series.ts';
import type { Expression, LinearForm } from '../model/action.ts';
import type { FamilyProfile, Functional, ProfileFactor } from './familyProfile.ts';
import { genericValue } from './genericPoint.ts';
import { functionalKey, type Region, valueAt } from './regions.ts';

/** Highest total number of smooth derivatives that is looked at before a form counts as vanishing. */
const MOST_SMOOTH = 12;
/** Powers of the amplitude in which a function is looked at. */
const MOST_POWERS = 6;

/** Numbers of smooth derivatives along space and along time. */
export interface SmoothOrder {
  readonly space: number;
  readonly time: number;
}

/** A value as a power series in the smooth derivatives: by `space,time`. */
type Graded = Map<string, { order: SmoothOrder; value: Rational }>;

const flat: SmoothOrder = { space: 0, time: 0 };

function addGraded(out: Graded, order: SmoothOrder, value: Rational): void {
  const key = `${order.space},${order.time}`;
  const sum = out.get(key)?.value.add(value) ?? value;
  if (sum.isZero) out.delete(key);
  else out.set(key, { order, value: sum });
}

function multiplyGraded(x: Graded, y: Graded, most: number): Graded {
  const out: Graded = new Map();
  for (const s of x.values())
    for (const t of y.values()) {
      const order = { space: s.order.space + t.order.space, time: s.order.time + t.order.time };
      if (order.space + order.time <= most) addGraded(out, order, s.value.mul(t.value));
    }
  return out;
}

const gradedConstant = (value: Rational): Graded =>
  new Map(value.isZero ? [] : [['0,0', { order: flat, value }]]);

/** The lowest smooth derivatives with which a lattice expression, less its vacuum value, survives in a region; undefined when
 *  it vanishes identically. The amplitude of the family is kept as a formal variable. */
export function latticeOrder(
  expression: Expression,
  profile: FamilyProfile,
  region: Region,
  time: number | undefined,
): SmoothOrder | undefined {
  const isRough = profile.terms.every((t) =>
    t.factors.every((f) => f.kind !== 'smooth' && f.kind !== 'coordinate'),
  );
  const space = new JetSpace(['amplitude'], ['space', 'time']);
  const form = (f: LinearForm, most: number): Map<JetMonomial, Coefficient> => {
    const out = new Map<JetMonomial, Coefficient>();
    for (const { order, value } of formOnFamily(f, profile, region, time, most).values())
      addTerm(
        out,
        space.monomial([{ field: 0, derivative: [order.space, order.time] }]),
        Coefficient.rational(value),
      );
    return out;
  };
  for (let most = 0; most <= (isRough ? 0 : MOST_SMOOTH); most++) {
    const density = composeDensity(expression, { order: most, fields: MOST_POWERS }, form, space);
    const [m] = density.terms.keys();
    if (m !== undefined) {
      const [inSpace, inTime] = space.degree(m) as [number, number];
      return { space: inSpace, time: inTime };
    }
  }
  return undefined;
}

function formOnFamily(
  form: LinearForm,
  profile: FamilyProfile,
  region: Region,
  time: number | undefined,
  most: number,
): Graded {
  const out: Graded = new Map();
  const stencil = form.get(profile.field);
  if (stencil)
    for (const { exponents, weight } of stencil.terms) {
      // Parameters inside a form are generic too; they enter as numbers.
      const factor = genericCoefficient(weight);
      for (const term of profile.terms) {
        const value = term.factors
          .map((f) => factorAt(f, exponents, region, time, most))
          .reduce((x, y) => multiplyGraded(x, y, most), gradedConstant(term.weight));
        for (const { order, value: v } of value.values()) addGraded(out, order, v.mul(factor));
      }
    }
  return out;
}

function genericCoefficient(c: Coefficient): Rational {
  return c.terms.reduce(
    (sum, t) => sum.add(t.powers.length === 0 ? t.factor : t.factor.mul(genericValue(`parameter ${t.key}`))),
    Rational.zero,
  );
}

/** Value of a factor at r + offset, r in the region. */
function factorAt(
  factor: ProfileFactor,
  offset: readonly number[],
  region: Region,
  time: number | undefined,
  most: number,
): Graded {
  switch (factor.kind) {
    case 'free': {
      const distance = factor.arguments.map((a) => valueAt(a, offset)).join(',');
      return gradedConstant(genericValue(`${nameOf(factor)} at ${distance}`));
    }
    case 'step':
    case 'site': {
      const place = region.places.get(functionalKey(factor.functional))!;
      const height = genericValue(nameOf(factor));
      if (typeof place !== 'number')
        return gradedConstant(factor.kind === 'step' && place === 'right' ? height : Rational.zero);
      const distance = place + valueAt(factor.functional, offset);
      const isOn = factor.kind === 'step' ? distance >= 0 : distance === 0;
      return gradedConstant(isOn ? height : Rational.zero);
    }
    case 'staggered':
      return gradedConstant(valueAt(factor.parity, offset) % 2 === 0 ? Rational.one : Rational.minusOne);
    case 'coordinate':
      return coordinateAt(factor, offset, time, most);
    case 'smooth':
      return smoothAt(factor, offset, time, most);
  }
}

function nameOf(factor: ProfileFactor): string {
  switch (factor.kind) {
    case 'free':
    case 'smooth':
      return `${factor.name}(${factor.arguments.map(functionalKey).join(';')})`;
    case 'step':
    case 'site':
      return `${factor.kind}(${functionalKey(factor.functional)})`;
    case 'coordinate':
      return `coordinate ${factor.axis}`;
    case 'staggered':
      return `parity(${functionalKey(factor.parity)})`;
  }
}

/** (x + v)^m = Σ_n C(m, n) v^n x^(m−n), n derivatives each. */
function coordinateAt(
  { axis, power }: Extract<ProfileFactor, { kind: 'coordinate' }>,
  offset: readonly number[],
  time: number | undefined,
  most: number,
): Graded {
  const x = genericValue(`coordinate ${axis}`);
  const v = rational(offset[axis]!);
  const out: Graded = new Map();
  let binomial = Rational.one;
  for (let n = 0; n <= Math.min(power, most); n++) {
    addGraded(
      out,
      axis === time ? { space: 0, time: n } : { space: n, time: 0 },
      binomial.mul(v.pow(n)).mul(x.pow(power - n)),
    );
    binomial = binomial.mul(rational(power - n)).div(rational(n + 1));
  }
  return out;
}

/** Taylor series of a smooth function of one or several functionals. */
function smoothAt(
  factor: Extract<ProfileFactor, { kind: 'smooth' }>,
  offset: readonly number[],
  time: number | undefined,
  most: number,
): Graded {
  const out: Graded = new Map();
  const visit = (argument: number, orders: readonly number[], weight: Rational, order: SmoothOrder): void => {
    const functional = factor.arguments[argument];
    if (!functional) {
      addGraded(out, order, weight.mul(genericValue(`${nameOf(factor)} derivative ${orders.join(',')}`)));
      return;
    }
    const v = rational(valueAt(functional, offset));
    const isTime = isAlong(functional, time);
    let power = weight;
    for (let n = 0; order.space + order.time + n <= most; n++) {
      if (n > 0) power = power.mul(v).div(rational(n));
      if (power.isZero) break;
      const next = isTime ? { ...order, time: order.time + n } : { ...order, space: order.space + n };
      visit(argument + 1, [...orders, n], power, next);
    }
  };
  visit(0, [], Rational.one, flat);
  return out;
}

const isAlong = (functional: Functional, axis: number | undefined): boolean =>
  axis !== undefined && functional.every((n, k) => n === 0 || k === axis);

/** Derivatives with which a continuum density survives. Rough ones cost 1/a along space and 1/b along time. */
export interface DerivativeCount {
  readonly rough: number;
  readonly roughTime: number;
  readonly smooth: number;
  readonly smoothTime: number;
}

const noDerivatives: DerivativeCount = { rough: 0, roughTime: 0, smooth: 0, smoothTime: 0 };

/** The most singular part of a continuum density on a family in a region; undefined when the density vanishes there. Its
 *  coefficients are taken as independent where they differ by parameters. */
export function continuumOrder(
  density: Density,
  profile: FamilyProfile,
  region: Region,
  time: number | undefined,
): DerivativeCount | undefined {
  const sums = new Map<string, { value: Coefficient; count: DerivativeCount }>();
  for (const [m, c] of density.terms) {
    const product = density.space
      .factors(m)
      .map(({ field, derivative }) =>
        density.space.fields[field] === profile.field
          ? derivativeOnFamily(profile, derivative, region, time)
          : [],
      )
      .reduce(multiplyParts, [{ value: Rational.one, count: noDerivatives }]);
    for (const { value, count } of product) {
      const key = Object.values(count).join(',');
      const sum = (sums.get(key)?.value ?? Coefficient.zero).add(c.scale(value));
      if (sum.isZero) sums.delete(key);
      else sums.set(key, { value: sum, count });
    }
  }
  const counts = [...sums.values()].map((s) => s.count);
  return counts.sort(
    (x, y) =>
      y.roughTime - x.roughTime || y.rough - x.rough || x.smooth - y.smooth || x.smoothTime - y.smoothTime,
  )[0];
}

interface Part {
  readonly value: Rational;
  readonly count: DerivativeCount;
}

function addCounts(x: DerivativeCount, y: DerivativeCount): DerivativeCount {
  return {
    rough: x.rough + y.rough,
    roughTime: x.roughTime + y.roughTime,
    smooth: x.smooth + y.smooth,
    smoothTime: x.smoothTime + y.smoothTime,
  };
}

const multiplyParts = (xs: readonly Part[], ys: readonly Part[]): Part[] =>
  xs.flatMap((x) => ys.map((y) => ({ value: x.value.mul(y.value), count: addCounts(x.count, y.count) })));

/** A factor of the family with derivatives along its functionals taken. */
interface Differentiated {
  readonly factor: ProfileFactor;
  readonly orders: readonly number[];
  readonly count: DerivativeCount;
}

/** ∂^α of the family by the product and chain rules, at the generic point. */
function derivativeOnFamily(
  profile: FamilyProfile,
  alpha: readonly number[],
  region: Region,
  time: number | undefined,
): Part[] {
  return profile.terms.flatMap((term) => {
    const start = term.factors.map(
      (factor): Differentiated => ({
        factor,
        orders: argumentsOf(factor).map(() => 0),
        count: noDerivatives,
      }),
    );
    let products: { weight: Rational; factors: readonly Differentiated[] }[] = [
      { weight: term.weight, factors: start },
    ];
    for (const [axis, n] of alpha.entries())
      for (let i = 0; i < n; i++)
        products = products.flatMap(({ weight, factors }) =>
          factors.flatMap((f, k) =>
            differentiate(f, axis, axis === time).map(({ slope, result }) => ({
              weight: weight.mul(slope),
              factors: factors.map((g, j) => (j === k ? result : g)),
            })),
          ),
        );
    return products.map(({ weight, factors }): Part => {
      const value = factors.reduce((v, f) => v.mul(valueAtPoint(f, region)), weight);
      return { value, count: factors.map((f) => f.count).reduce(addCounts, noDerivatives) };
    });
  });
}

const argumentsOf = (factor: ProfileFactor): readonly Functional[] => {
  switch (factor.kind) {
    case 'free':
    case 'smooth':
      return factor.arguments;
    case 'step':
    case 'site':
      return [factor.functional];
    case 'staggered':
      return [factor.parity];
    case 'coordinate': {
      const unit: number[] = [];
      unit[factor.axis] = 1;
      return [unit];
    }
  }
};

/** Chain rule along one axis. */
function differentiate(
  f: Differentiated,
  axis: number,
  isTime: boolean,
): { slope: Rational; result: Differentiated }[] {
  const isSmooth = f.factor.kind === 'smooth' || f.factor.kind === 'coordinate';
  const key = `${isSmooth ? 'smooth' : 'rough'}${isTime ? 'Time' : ''}` as keyof DerivativeCount;
  return argumentsOf(f.factor).flatMap((functional, j) => {
    const slope = functional[axis] ?? 0;
    if (slope === 0) return [];
    const result = {
      ...f,
      orders: f.orders.map((n, i) => (i === j ? n + 1 : n)),
      count: { ...f.count, [key]: f.count[key] + 1 },
    };
    return [{ slope: rational(slope), result }];
  });
}

/** Value at the generic point. Near its jump every derivative of a step or a site is generic; away from it there is none. */
function valueAtPoint({ factor, orders }: Differentiated, region: Region): Rational {
  const total = orders.reduce((x, y) => x + y, 0);
  switch (factor.kind) {
    case 'free':
    case 'smooth':
      return genericValue(`${nameOf(factor)} derivative ${orders.join(',')}`);
    case 'staggered':
      return total === 0 ? Rational.one : genericValue(`${nameOf(factor)} derivative ${total}`);
    case 'coordinate': {
      if (total > factor.power) return Rational.zero;
      let value = genericValue(nameOf(factor)).pow(factor.power - total);
      for (let n = 0; n < total; n++) value = value.mul(rational(factor.power - n));
      return value;
    }
    case 'step':
    case 'site': {
      const place = region.places.get(functionalKey(factor.functional))!;
      if (typeof place === 'number') return genericValue(`${nameOf(factor)} derivative ${total}`);
      return factor.kind === 'step' && place === 'right' && total === 0
        ? genericValue(nameOf(factor))
        : Rational.zero;
    }
  }
}
