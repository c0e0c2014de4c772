// Composition of an expression with the jet series of its linear forms: truncated power series whose grading is the
// number of derivatives. A spacing power accompanies every derivative, so this grading is the order in the spacings.
//
// The work is done in scaled jets q_α = ∂^α φ / (α! 2^|α|), in which the Taylor series of a stencil about a half-integer
// centre has integer coefficients, and over Q whenever no parameter or root stands inside the functions.

import { Coefficient } from '../exact/coefficient.ts';
import { Rational, rational } from '../exact/rational.ts';
import type { Expression, LinearForm } from '../model/action.ts';
import { LimitError } from '../notation/source.ts';
import { Density, type JetMonomial, type JetSpace, multiplyMonomials } from './jets.ts';
import { powerSeries, taylorCoefficients } from './taylor.ts';

/** Where a series is cut. */
export interface Truncation {
  /** Highest number of derivatives kept. */
  readonly order: number;
  /** Highest number of field factors kept; Infinity when the order alone makes the series finite. */
  readonly fields: number;
}

/** How a linear form turns into jets: Taylor moments on the lattice, the derivatives themselves in the continuum. */
export type FormSeries = (form: LinearForm, order: number) => Map<JetMonomial, Coefficient>;

/** More terms than this in one series is a stated limit. */
const MOST_TERMS = 200_000;

/** What Rational and Coefficient have in common. */
interface RingElement<C> {
  readonly isZero: boolean;
  add(o: C): C;
  mul(o: C): C;
}

/** The ring of the coefficients; `from` throws NotInRing for values outside. */
interface Ring<C> {
  readonly one: C;
  from(value: Coefficient): C;
  toCoefficient(value: C): Coefficient;
}

class NotInRing extends Error {}

const overRationals: Ring<Rational> = {
  one: Rational.one,
  from: (value) => {
    const r = value.asRational;
    if (!r) throw new NotInRing();
    return r;
  },
  toCoefficient: (value) => Coefficient.rational(value),
};

const overCoefficients: Ring<Coefficient> = {
  one: Coefficient.one,
  from: (value) => value,
  toCoefficient: (value) => value,
};

/** Terms by number of derivatives. */
type Graded<C> = readonly ReadonlyMap<JetMonomial, C>[];

function addInto<C extends RingElement<C>>(terms: Map<JetMonomial, C>, m: JetMonomial, c: C): void {
  const old = terms.get(m);
  if (old === undefined) {
    if (!c.isZero) terms.set(m, c);
    return;
  }
  const sum = old.add(c);
  if (sum.isZero) terms.delete(m);
  else terms.set(m, sum);
}

/** A truncated power series in scaled jets, graded by the number of derivatives. */
class Series<C extends RingElement<C>> {
  constructor(
    readonly cut: Truncation,
    readonly graded: Graded<C>,
  ) {}

  static constant<C extends RingElement<C>>(cut: Truncation, value: C): Series<C> {
    return new Series(cut, value.isZero ? [] : [new Map([['', value]])]);
  }
  get constantPart(): C | undefined {
    return this.graded[0]?.get('');
  }
  get isZero(): boolean {
    return this.graded.every((terms) => terms.size === 0);
  }
  withoutConstant(): Series<C> {
    if (this.constantPart === undefined) return this;
    const lowest = new Map(this.graded[0]);
    lowest.delete('');
    return new Series(this.cut, [lowest, ...this.graded.slice(1)]);
  }
  scale(by: C): Series<C> {
    if (by.isZero) return new Series(this.cut, []);
    return new Series(
      this.cut,
      this.graded.map((terms) => new Map([...terms].map(([m, c]) => [m, c.mul(by)]))),
    );
  }
  add(o: Series<C>): Series<C> {
    const length = Math.max(this.graded.length, o.graded.length);
    const sum = Array.from({ length }, (_, degree) => {
      const terms = new Map(this.graded[degree]);
      for (const [m, c] of o.graded[degree] ?? []) addInto(terms, m, c);
      return terms;
    });
    return new Series(this.cut, sum);
  }
  mul(o: Series<C>): Series<C> {
    const { order, fields } = this.cut;
    const out: Map<JetMonomial, C>[] = [];
    let size = 0;
    for (const [i, left] of this.graded.entries())
      for (const [j, right] of o.graded.entries()) {
        if (i + j > order) break;
        if (left.size === 0 || right.size === 0) continue;
        while (out.length <= i + j) out.push(new Map());
        const terms = out[i + j]!;
        const before = terms.size;
        for (const [m, c] of left)
          for (const [n, d] of right)
            if (m.length + n.length <= fields) addInto(terms, multiplyMonomials(m, n), c.mul(d));
        size += terms.size - before;
        if (size > MOST_TERMS)
          throw new LimitError(
            `the expansion has more than ${MOST_TERMS} terms; lower expand: beyond-leading or fields`,
          );
      }
    return new Series(this.cut, out);
  }
}

/** Highest power of u that can survive the cut. Throws LimitError when nothing bounds it. */
function powerBound<C extends RingElement<C>>(u: Series<C>): number {
  const lowest = u.graded.findIndex((terms) => terms.size > 0);
  if (lowest < 0) return 0;
  let fewest = Number.POSITIVE_INFINITY;
  for (const terms of u.graded) for (const m of terms.keys()) fewest = Math.min(fewest, m.length);
  const byOrder = lowest > 0 ? Math.floor(u.cut.order / lowest) : Number.POSITIVE_INFINITY;
  const bound = Math.min(byOrder, Math.floor(u.cut.fields / fewest));
  if (bound === Number.POSITIVE_INFINITY)
    throw new LimitError('a function of an undifferentiated field needs a cut in the number of fields');
  return bound;
}

/** Evaluates expressions as series over one coefficient ring. */
class Composer<C extends RingElement<C>> {
  constructor(
    readonly ring: Ring<C>,
    readonly cut: Truncation,
    readonly form: FormSeries,
    readonly space: JetSpace,
  ) {}

  /** Throws ExpansionPointError (taylor.ts), LimitError and NotInRing. */
  series(expression: Expression): Series<C> {
    switch (expression.kind) {
      case 'constant':
        return Series.constant(this.cut, this.ring.from(expression.value));
      case 'linear':
        return this.linear(expression.form);
      case 'sum':
        return expression.terms.map((t) => this.series(t)).reduce((x, y) => x.add(y));
      case 'product':
        return expression.factors.map((f) => this.series(f)).reduce((x, y) => x.mul(y));
      case 'power': {
        const base = this.series(expression.base);
        const { exponent } = expression;
        if (exponent < 0) return this.compose((point, k) => powerSeries(rational(exponent), point, k), base);
        let out = Series.constant(this.cut, this.ring.one);
        for (let k = 0; k < exponent; k++) out = out.mul(base);
        return out;
      }
      case 'function':
        return this.compose(
          (point, k) => taylorCoefficients(expression.name, point, k),
          this.series(expression.argument),
        );
    }
  }

  private linear(form: LinearForm): Series<C> {
    const graded: Map<JetMonomial, C>[] = [];
    for (const [m, c] of this.form(form, this.cut.order)) {
      const degree = m === '' ? 0 : this.space.degree(m).reduce((x, y) => x + y, 0);
      while (graded.length <= degree) graded.push(new Map());
      graded[degree]!.set(m, this.ring.from(c.scale(jetScale(this.space, m))));
    }
    return new Series(this.cut, graded);
  }

  /** Σ_k F^(k)(point)/k! u^k with the argument split into its constant part and u; ends when powers are cut away. */
  private compose(
    taylor: (point: Coefficient, order: number) => Coefficient[],
    argument: Series<C>,
  ): Series<C> {
    const constant = argument.constantPart;
    const point = constant === undefined ? Coefficient.zero : this.ring.toCoefficient(constant);
    const u = argument.withoutConstant();
    const highest = powerBound(u);
    const weights = taylor(point, highest).map((w) => this.ring.from(w));
    const isEven = weights.every((c, k) => k % 2 === 0 || c.isZero);
    const stride = isEven ? 2 : 1;
    const step = isEven ? u.mul(u) : u;
    let power = step;
    let sum = Series.constant(this.cut, weights[0]!);
    for (let k = stride; k <= highest && !power.isZero; k += stride) {
      if (k > stride) power = power.mul(step);
      sum = sum.add(power.scale(weights[k]!));
    }
    return sum;
  }
}

/** Π_i α_i! 2^|α_i| over the factors of a monomial: the ratio of its jets to scaled jets. */
function jetScale(space: JetSpace, monomial: JetMonomial): Rational {
  let scale = 1n;
  for (const { derivative } of space.factors(monomial))
    for (const n of derivative) for (let k = 2n; k <= 2n * BigInt(n); k += 2n) scale *= k;
  return Rational.of(scale);
}

/** The density of an expression up to the cut, without its field-independent constant.
 *  Throws ExpansionPointError (taylor.ts) and LimitError. */
export function composeDensity(
  expression: Expression,
  cut: Truncation,
  form: FormSeries,
  space: JetSpace,
): Density {
  try {
    return evaluate(new Composer(overRationals, cut, form, space), expression);
  } catch (error) {
    if (error instanceof NotInRing)
      return evaluate(new Composer(overCoefficients, cut, form, space), expression);
    throw error;
  }
}

function evaluate<C extends RingElement<C>>(composer: Composer<C>, expression: Expression): Density {
  const terms = new Map<JetMonomial, Coefficient>();
  for (const graded of composer.series(expression).graded)
    for (const [m, c] of graded)
      if (m !== '') terms.set(m, composer.ring.toCoefficient(c).scale(jetScale(composer.space, m).inv()));
  return new Density(composer.space, terms);
}
