// A continuum Lagrangian for a case without a proposal: every stencil replaced by the lowest derivative that it starts with and
// every function by its lowest power, (Δ_xΔ⁻_xφ + Δ_yΔ⁻_yφ)² by (∂_x²φ + ∂_y²φ)², so that the forms keep the shifts that
// annihilate them. Where that does not give the leading order, its monomials are taken one by one.

import { Coefficient } from '../exact/coefficient.ts';
import { LaurentPolynomial, type LaurentTerm } from '../exact/laurentPolynomial.ts';
import { Quotient, rationalRatio } from '../exact/quotient.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { Expression, LinearForm } from '../model/action.ts';
import type { Case, Proposal } from '../model/case.ts';
import { printCoefficient } from '../notation/print.ts';
import { cellVolume, type Expansion } from './expansion.ts';
import { continuumDensity, summands, undividedDensity } from './formDensity.ts';
import type { Density, JetMonomial, JetSpace } from './jets.ts';
import { normalForm } from './normalForm.ts';
import { printDensity } from './printDensity.ts';
import { taylorCoefficients } from './taylor.ts';

const EVERYTHING = { order: Number.POSITIVE_INFINITY, fields: Number.POSITIVE_INFINITY };

/** coefficient × factor, the coefficient in parent parameters and spacings. */
interface LeadingPart {
  readonly coefficient: Coefficient;
  readonly factor: Expression;
}

/** A proposal that agrees with the leading order by construction; coefficients in a rational ratio share a parameter, ½ μ_i for
 *  squares. */
export function proposeContinuum(theCase: Case, expansion: Expansion): Proposal {
  const parts = leadingForms(theCase, expansion) ?? leadingMonomials(expansion);
  const taken = new Set([...theCase.parameters.map((p) => p.name), ...theCase.lattice.limits]);
  const matching = new Map<string, Quotient>();
  const freshName = (): string => {
    for (let i = 1; ; i++) if (!taken.has(`mu${i}`) && !matching.has(`mu${i}`)) return `mu${i}`;
  };
  const terms = parts.map(({ coefficient, factor }) => {
    const isSquare = factor.kind === 'power' && factor.exponent === 2;
    const own = Quotient.of(isSquare ? coefficient.scale(rational(2)) : coefficient);
    const known = [...matching].find(([, value]) => rationalRatio(own, value) !== undefined);
    const [name, value] = known ?? [freshName(), own];
    matching.set(name, value);
    const ratio = rationalRatio(own, value)!.mul(isSquare ? rational(1, 2) : Rational.one);
    return { weight: Coefficient.symbol(name).scale(ratio), factor };
  });
  return {
    parameters: [...matching.keys()].map((name) => ({ name, positive: true })),
    lagrangian: {
      kind: 'sum',
      terms: terms.map(({ weight, factor }) => ({
        kind: 'product',
        factors: [{ kind: 'constant', value: weight }, factor],
      })),
    },
    text: terms.map((t) => termText(t.weight, t.factor, expansion.space)).join(' + '),
    position: { file: theCase.file, line: 1, column: 1 },
    matching,
    rescaling: new Map(),
  };
}

/** A term in the notation of case files. */
function termText(weight: Coefficient, factor: Expression, space: JetSpace): string {
  return `${printCoefficient(weight)} ${factorText(factor, space)}`;
}

function factorText(e: Expression, space: JetSpace): string {
  switch (e.kind) {
    case 'linear':
      return parenthesised(printDensity(continuumDensity(e, space, EVERYTHING)));
    case 'power':
      return `${factorText(e.base, space)}^${e.exponent}`;
    case 'product':
      return e.factors.map((f) => factorText(f, space)).join(' ');
    default:
      throw new Error('a proposed term is made of forms');
  }
}

const parenthesised = (text: string): string => (/^\w+$/.test(text) ? text : `(${text})`);

function leadingMonomials({ orders, space }: Expansion): LeadingPart[] {
  return orders
    .filter((o) => o.total <= 0)
    .flatMap((o) => o.terms)
    .map(({ monomial, coefficient }) => ({ coefficient, factor: monomialExpression(space, monomial) }));
}

/** The parts by forms, or undefined when they do not make up the leading order. */
function leadingForms(theCase: Case, expansion: Expansion): LeadingPart[] | undefined {
  const perCell = Coefficient.one.div(cellVolume(theCase.lattice));
  const parts: LeadingPart[] = [];
  for (const { expression } of theCase.parent.terms)
    for (const { weight, factor } of summands(expression)) {
      if (factor.kind === 'constant') continue;
      const lead = leadingPower(factor);
      const form = lead && leadingForm(lead.form, expansion.space, theCase);
      if (!lead || !form) return undefined;
      const scale = Coefficient.rational(lead.coefficient).mul(form.scale.pow(rational(lead.power)));
      const base: Expression = { kind: 'linear', form: form.form };
      parts.push({
        coefficient: weight.mul(scale).mul(perCell),
        factor: lead.power === 1 ? base : { kind: 'power', base, exponent: lead.power },
      });
    }
  const density = (part: LeadingPart): Density =>
    continuumDensity(part.factor, expansion.space, EVERYTHING).scale(part.coefficient);
  const [first, ...others] = parts.map(density);
  const leading = expansion.orders.filter((o) => o.total <= 0).flatMap((o) => o.terms);
  const sum = first && normalForm(others.reduce((x, y) => x.add(y), first));
  const agrees =
    sum?.terms.size === leading.length && leading.every((t) => sum.get(t.monomial).equals(t.coefficient));
  return agrees ? parts : undefined;
}

/** Lowest power of the form in u^n or F(u), with its Taylor coefficient. */
function leadingPower(e: Expression): { form: LinearForm; power: number; coefficient: Rational } | undefined {
  if (e.kind === 'linear') return { form: e.form, power: 1, coefficient: Rational.one };
  if (e.kind === 'power' && e.base.kind === 'linear' && e.exponent > 0)
    return { form: e.base.form, power: e.exponent, coefficient: Rational.one };
  if (e.kind !== 'function' || e.argument.kind !== 'linear' || e.name === 'log' || e.name === 'sqrt')
    return undefined;
  const series = taylorCoefficients(e.name, Coefficient.zero, 2);
  const power = series.findIndex((c, k) => k > 0 && !c.isZero);
  return { form: e.argument.form, power, coefficient: series[power]!.asRational! };
}

/** The derivatives of lowest order with which a form starts about its centre, times scale: the spacings of its first term. */
function leadingForm(
  form: LinearForm,
  space: JetSpace,
  theCase: Case,
): { form: LinearForm; scale: Coefficient } | undefined {
  const { axes } = theCase.lattice;
  for (let order = 0; order <= 8; order++) {
    const cut = { order, fields: 1 };
    const density = undividedDensity({ kind: 'linear', form }, space, cut, new Map());
    if (density.isZero) continue;
    const byField = new Map<string, LaurentTerm[]>();
    let scale: Coefficient | undefined;
    for (const [m, c] of density.terms) {
      const { field, derivative } = space.variable(m.charCodeAt(0));
      const spacings = derivative.reduce(
        (p, n, k) => p.mul(Coefficient.symbol(axes[k]!.spacing, rational(n))),
        Coefficient.one,
      );
      scale ??= spacings;
      const name = space.fields[field]!;
      byField.set(name, [
        ...(byField.get(name) ?? []),
        { exponents: derivative, weight: c.mul(spacings).div(scale) },
      ]);
    }
    const operators = [...byField].map(([name, terms]): [string, LaurentPolynomial] => [
      name,
      LaurentPolynomial.of(axes.length, terms),
    ]);
    return { form: new Map(operators), scale: scale! };
  }
  return undefined;
}

/** A jet monomial as an expression: powers of derivatives. */
function monomialExpression(space: JetSpace, monomial: JetMonomial): Expression {
  const dimension = space.axes.length;
  const powers = new Map<string, number>();
  for (const code of monomial) powers.set(code, (powers.get(code) ?? 0) + 1);
  const factors = [...powers].map(([code, exponent]): Expression => {
    const { field, derivative } = space.variable(code.charCodeAt(0));
    const operator = LaurentPolynomial.of(dimension, [{ exponents: derivative, weight: Coefficient.one }]);
    const base: Expression = { kind: 'linear', form: new Map([[space.fields[field]!, operator]]) };
    return exponent === 1 ? base : { kind: 'power', base, exponent };
  });
  return factors.length === 1 ? factors[0]! : { kind: 'product', factors };
}
