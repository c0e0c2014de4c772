// Trees for the tests of this room: an arbitrary tree of the shape that reading gives, trees without their spans, and a
// small evaluator that shares nothing with the printers.

import fc from 'fast-check';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Quotient } from '../../src/exact/quotient.ts';
import { Rational } from '../../src/exact/rational.ts';
import type { OperatorName, Tree } from '../../src/notation/tree.ts';

const span = { start: 0, end: 0 };

/** A tree as nested arrays without spans, for comparison. */
export function shape(t: Tree): unknown {
  switch (t.kind) {
    case 'number':
      return t.value.toString();
    case 'symbol':
      return `symbol ${t.name}`;
    case 'operator':
      return `operator ${t.name} along ${t.axis}`;
    case 'apply':
      return ['apply', shape(t.operator), shape(t.operand)];
    case 'call':
      return ['call', t.name, ...t.args.map(shape)];
    case 'sum':
      return ['sum', ...t.terms.map(shape)];
    case 'negate':
      return ['negate', shape(t.operand)];
    case 'product':
      return ['product', ...t.factors.map(shape)];
    case 'quotient':
      return ['quotient', shape(t.numerator), shape(t.denominator)];
    case 'power':
      return ['power', shape(t.base), shape(t.exponent)];
  }
}

const natural = fc
  .oneof(fc.bigInt({ min: 0n, max: 12n }), fc.bigInt({ min: 10n ** 30n, max: 10n ** 31n }))
  .map((n): Tree => ({ kind: 'number', value: Rational.of(n), span }));
const decimal = fc
  .tuple(fc.bigInt({ min: 0n, max: 99999n }), fc.integer({ min: 1, max: 6 }))
  .map(([n, k]): Tree => ({ kind: 'number', value: Rational.of(n, 10n ** BigInt(k)), span }));
const symbol = fc
  .constantFrom('a', 'b', 'x', 'phi', 'psi', 'mu0', 'beta', 'pi', 'pi_phi', 'J_1', 'Lx', 'Gamma')
  .map((name): Tree => ({ kind: 'symbol', name, span }));
const elementary = fc
  .tuple(
    fc.constantFrom<OperatorName>('T', 'Delta', 'Deltab', 'Deltac', 'd'),
    fc.constantFrom('x', 'y', 'tau'),
  )
  .map(([name, axis]): Tree => ({ kind: 'operator', name, axis, span }));

/** Arbitrary scalar and operator-valued trees of the shape that readTree and readOperator give: numbers are decimals
 *  ≥ 0, operators stand at the end of a product and act on scalars. */
export const arbitrary = fc.letrec<{ scalar: Tree; operator: Tree }>((tie) => {
  const scalars = (minLength: number) => fc.array(tie('scalar'), { minLength, maxLength: 3 });
  const negate = (of: fc.Arbitrary<Tree>) => of.map((operand): Tree => ({ kind: 'negate', operand, span }));
  const quotient = (of: fc.Arbitrary<Tree>) =>
    fc
      .tuple(of, tie('scalar'))
      .map(([numerator, denominator]): Tree => ({ kind: 'quotient', numerator, denominator, span }));
  const power = (of: fc.Arbitrary<Tree>) =>
    fc.tuple(of, tie('scalar')).map(([base, exponent]): Tree => ({ kind: 'power', base, exponent, span }));
  return {
    scalar: fc.oneof(
      { depthSize: 'small', withCrossShrink: true },
      symbol,
      natural,
      decimal,
      fc
        .tuple(tie('operator'), tie('scalar'))
        .map(([operator, operand]): Tree => ({ kind: 'apply', operator, operand, span })),
      fc
        .tuple(fc.constantFrom('cos', 'sqrt', 'exp'), tie('scalar'))
        .map(([name, argument]): Tree => ({ kind: 'call', name, args: [argument], span })),
      fc
        .tuple(fc.constantFrom('f', 'theta', 'delta_site'), scalars(1))
        .map(([name, args]): Tree => ({ kind: 'call', name, args, span })),
      scalars(2).map((terms): Tree => ({ kind: 'sum', terms, span })),
      scalars(2).map((factors): Tree => ({ kind: 'product', factors, span })),
      negate(tie('scalar')),
      quotient(tie('scalar')),
      power(tie('scalar')),
    ),
    operator: fc.oneof(
      { depthSize: 'small', withCrossShrink: true },
      elementary,
      fc.tuple(scalars(0), tie('operator'), scalars(1)).map(
        ([before, operator, after]): Tree => ({
          kind: 'sum',
          terms: [...before, operator, ...after],
          span,
        }),
      ),
      fc
        .tuple(scalars(0), fc.array(tie('operator'), { minLength: 2, maxLength: 3 }))
        .map(([before, operators]): Tree => ({ kind: 'product', factors: [...before, ...operators], span })),
      fc
        .tuple(scalars(1), tie('operator'))
        .map(([before, operator]): Tree => ({ kind: 'product', factors: [...before, operator], span })),
      negate(tie('operator')),
      quotient(tie('operator')),
      power(tie('operator')),
    ),
  };
});

/** Exact value of a tree without operators and fields, as a quotient of coefficients. */
export function exactValue(t: Tree): Quotient {
  switch (t.kind) {
    case 'number':
      return Quotient.of(Coefficient.rational(t.value));
    case 'symbol':
      return Quotient.of(Coefficient.symbol(t.name));
    case 'sum':
      return t.terms.map(exactValue).reduce((x, y) => x.add(y));
    case 'product':
      return t.factors.map(exactValue).reduce((x, y) => x.mul(y));
    case 'negate':
      return exactValue(t.operand).neg();
    case 'quotient':
      return exactValue(t.numerator).div(exactValue(t.denominator));
    case 'power':
      return root(exactValue(t.base), exactValue(t.exponent).asCoefficient!.asRational!);
    case 'call':
      if (t.name === 'sqrt') return root(exactValue(t.args[0]!), Rational.of(1, 2));
      throw new Error(`no exact value of ${t.name}`);
    default:
      throw new Error(`no exact value of ${t.kind}`);
  }
}

function root(base: Quotient, exponent: Rational): Quotient {
  const number = base.asCoefficient?.asRational;
  return number ? Quotient.of(Coefficient.root(number, exponent)) : base.pow(exponent);
}

/** Float value with operators taken as numbers that multiply; enough to see a misplaced bracket. */
export function floatValue(t: Tree, values: ReadonlyMap<string, number>): number {
  const at = (u: Tree): number => floatValue(u, values);
  switch (t.kind) {
    case 'number':
      return t.value.toNumber();
    case 'symbol':
      return values.get(t.name)!;
    case 'operator':
      return values.get(`${t.name}_${t.axis}`)!;
    case 'apply':
      return at(t.operator) * at(t.operand);
    case 'sum':
      return t.terms.map(at).reduce((x, y) => x + y);
    case 'product':
      return t.factors.map(at).reduce((x, y) => x * y);
    case 'negate':
      return -at(t.operand);
    case 'quotient':
      return at(t.numerator) / at(t.denominator);
    case 'power':
      return at(t.base) ** at(t.exponent);
    case 'call': {
      const args = t.args.map(at);
      const known = { cos: Math.cos, sqrt: Math.sqrt, exp: Math.exp }[t.name];
      return known ? known(args[0]!) : args.reduce((x, y, i) => x + (i + 2) * Math.sin(y), t.name.length);
    }
  }
}
