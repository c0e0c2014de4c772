// What a text means, worked out from its tree by operators on functions of the sites: an oracle that shares nothing with
// src/model/. Fields are arbitrary rational functions of the site; numbers are exact.

import fc from 'fast-check';
import { Rational, rational } from '../../src/exact/rational.ts';
import type { Expression } from '../../src/model/action.ts';
import type { Tree } from '../../src/notation/tree.ts';

export const AXES = ['x', 'y'];
export type Site = readonly [number, number];
export type Sites = (site: Site) => Rational;

/** A rational function of the sites without any symmetry, one for each field. */
export function field(name: string): Sites {
  const offset = name === 'phi' ? 7 : 11;
  return ([x, y]) => rational(((x * x * offset + 13 * x * y + 5 * y + offset) % 17) + y, 1 + ((x + 40) % 3));
}

/** The same function with its values kept, since nested operators ask for each many times. */
function kept(f: Sites): Sites {
  const values = new Map<string, Rational>();
  return (site) => {
    const key = site.join();
    const known = values.get(key) ?? f(site);
    values.set(key, known);
    return known;
  };
}

const step = (f: Sites, axis: string, by: number): Sites =>
  axis === 'x' ? ([x, y]) => f([x + by, y]) : ([x, y]) => f([x, y + by]);
const plus =
  (f: Sites, g: Sites): Sites =>
  (site) =>
    f(site).add(g(site));
const scaled =
  (f: Sites, by: Rational): Sites =>
  (site) =>
    f(site).mul(by);

/** An operator-valued tree applied to a function of the sites. */
const act = (operator: Tree, f: Sites): Sites => kept(acted(operator, f));

function acted(operator: Tree, f: Sites): Sites {
  switch (operator.kind) {
    case 'number':
      return scaled(f, operator.value);
    case 'operator': {
      const forward = step(f, operator.axis, 1);
      const backward = step(f, operator.axis, -1);
      const minus = scaled(f, Rational.minusOne);
      if (operator.name === 'T') return forward;
      if (operator.name === 'Delta') return plus(forward, minus);
      if (operator.name === 'Deltab') return plus(f, scaled(backward, Rational.minusOne));
      return scaled(plus(forward, scaled(backward, Rational.minusOne)), rational(1, 2));
    }
    case 'sum':
      return operator.terms.map((t) => act(t, f)).reduce(plus);
    case 'negate':
      return scaled(act(operator.operand, f), Rational.minusOne);
    case 'product':
      return operator.factors.reduceRight((g, t) => act(t, g), f);
    case 'power': {
      if (operator.exponent.kind === 'negate') return step(f, (operator.base as { axis: string }).axis, -1);
      const n = Number((operator.exponent as { value: Rational }).value.num);
      return Array.from({ length: n }).reduce<Sites>((g) => act(operator.base, g), f);
    }
    default:
      throw new Error(`no operator: ${operator.kind}`);
  }
}

/** The value of a scalar tree as a function of the sites. */
export function value(tree: Tree): Sites {
  switch (tree.kind) {
    case 'number':
      return () => tree.value;
    case 'symbol':
      return field(tree.name);
    case 'apply':
      return act(tree.operator, value(tree.operand));
    case 'sum':
      return tree.terms.map(value).reduce(plus);
    case 'negate':
      return scaled(value(tree.operand), Rational.minusOne);
    case 'product': {
      const factors = tree.factors.map(value);
      return (site) => factors.reduce((p, f) => p.mul(f(site)), Rational.one);
    }
    case 'quotient': {
      const [top, bottom] = [value(tree.numerator), value(tree.denominator)];
      return (site) => top(site).div(bottom(site));
    }
    case 'power': {
      const base = value(tree.base);
      const n = Number((tree.exponent as { value: Rational }).value.num);
      return (site) => base(site).pow(n);
    }
    default:
      throw new Error(`no value: ${tree.kind}`);
  }
}

/** Value at a site of an expression without functions and parameters. */
export function expressionValue(e: Expression, site: Site): Rational {
  switch (e.kind) {
    case 'constant':
      return e.value.asRational!;
    case 'linear': {
      let sum = Rational.zero;
      for (const [name, stencil] of e.form)
        for (const { exponents, weight } of stencil.terms) {
          const [x, y] = exponents as [number, number];
          sum = sum.add(weight.asRational!.mul(field(name)([site[0] + x, site[1] + y])));
        }
      return sum;
    }
    case 'sum':
      return e.terms.map((t) => expressionValue(t, site)).reduce((x, y) => x.add(y));
    case 'product':
      return e.factors.map((f) => expressionValue(f, site)).reduce((x, y) => x.mul(y));
    case 'power':
      return expressionValue(e.base, site).pow(e.exponent);
    case 'function':
      throw new Error('no exact value of a function');
  }
}

const operatorText = fc.letrec<{ operator: string }>((tie) => ({
  operator: fc.oneof(
    { depthSize: 'small' },
    fc
      .tuple(fc.constantFrom('T', 'Delta', 'Deltab', 'Deltac'), fc.constantFrom(...AXES))
      .map(([name, axis]) => `${name}_${axis}`),
    fc.constantFrom(...AXES).map((axis) => `T_${axis}^-1`),
    fc.tuple(tie('operator'), tie('operator')).map(([x, y]) => `(${x} ${y})`),
    fc.tuple(tie('operator'), tie('operator')).map(([x, y]) => `(${x} - 2*${y} + 3)`),
    tie('operator').map((x) => `(${x})^2`),
  ),
})).operator;

/** Texts of polynomial expressions in phi and psi with every operator of the lattice, also on products. */
export const expressionText = fc.letrec<{ scalar: string }>((tie) => ({
  scalar: fc.oneof(
    { depthSize: 'small' },
    fc.constantFrom('phi', 'psi'),
    fc.tuple(operatorText, tie('scalar')).map(([d, u]) => `${d} (${u})`),
    fc.tuple(tie('scalar'), tie('scalar')).map(([u, v]) => `(${u} + ${v})`),
    fc.tuple(tie('scalar'), tie('scalar')).map(([u, v]) => `(${u} - 2/3*(${v}))`),
    fc.tuple(tie('scalar'), tie('scalar')).map(([u, v]) => `(${u})*(${v})`),
    tie('scalar').map((u) => `-(${u})`),
    tie('scalar').map((u) => `(${u})/4`),
    tie('scalar').map((u) => `(${u} + 1)^2`),
    tie('scalar').map((u) => `(${u})^3`),
  ),
})).scalar;
