// Total derivatives and the Euler operator (variational derivative) on densities: E_φ(L) = Σ_α (−D)^α ∂L/∂φ_α. It
// vanishes exactly on total derivatives plus constants (P. J. Olver, Applications of Lie Groups to Differential
// Equations, Theorem 4.7), which makes it the independent check of the normal form.

import { Coefficient } from '../exact/coefficient.ts';
import { rational } from '../exact/rational.ts';
import { addTerm, Density, type JetMonomial, sortedMonomial } from './jets.ts';

/** D_axis of a density. */
export function totalDerivative(density: Density, axis: number): Density {
  const { space } = density;
  const out = new Map<JetMonomial, Coefficient>();
  const raised = new Map<number, number>();
  const raise = (code: number): number => {
    let next = raised.get(code);
    if (next === undefined) {
      const { field, derivative } = space.variable(code);
      next = space.number(
        field,
        derivative.map((n, k) => (k === axis ? n + 1 : n)),
      );
      raised.set(code, next);
    }
    return next;
  };
  for (const [m, c] of density.terms) {
    const codes = Array.from({ length: m.length }, (_, i) => m.charCodeAt(i));
    for (let i = 0; i < codes.length; ) {
      let repeats = 1;
      while (codes[i + repeats] === codes[i]) repeats++;
      const next = [...codes];
      next[i] = raise(codes[i]!);
      addTerm(out, sortedMonomial(next), c.scale(rational(repeats)));
      i += repeats;
    }
  }
  return new Density(space, out);
}

/** ∂L/∂φ_α for every jet variable of the field that occurs, by the derivative's key. */
function partials(
  density: Density,
  field: number,
): Map<string, { alpha: readonly number[]; value: Density }> {
  const { space } = density;
  const out = new Map<string, { alpha: readonly number[]; terms: Map<JetMonomial, Coefficient> }>();
  for (const [m, c] of density.terms)
    for (let i = 0; i < m.length; ) {
      let repeats = 1;
      while (m[i + repeats] === m[i]) repeats++;
      const variable = space.variable(m.charCodeAt(i));
      if (variable.field === field) {
        const key = variable.derivative.join(',');
        const entry = out.get(key) ?? { alpha: variable.derivative, terms: new Map() };
        out.set(key, entry);
        addTerm(entry.terms, m.slice(0, i) + m.slice(i + 1), c.scale(rational(repeats)));
      }
      i += repeats;
    }
  return new Map(
    [...out].map(([key, { alpha, terms }]) => [key, { alpha, value: new Density(space, terms) }]),
  );
}

/** The variational derivative of a density with respect to one field (by number). Axis by axis in Horner form, so that
 *  no more total derivatives are taken than the highest derivative along each axis. */
export function eulerOperator(density: Density, field: number): Density {
  const axes = density.space.axes.length;
  const horner = (pieces: { alpha: readonly number[]; value: Density }[], axis: number): Density => {
    if (axis === axes) return pieces.reduce((sum, p) => sum.add(p.value), Density.zero(density.space));
    let sum = Density.zero(density.space);
    const highest = Math.max(0, ...pieces.map((p) => p.alpha[axis]!));
    for (let n = highest; n >= 0; n--) {
      const here = pieces.filter((p) => p.alpha[axis] === n);
      if (!sum.isZero) sum = totalDerivative(sum, axis).scale(Coefficient.integer(-1));
      if (here.length > 0) sum = sum.add(horner(here, axis + 1));
    }
    return sum;
  };
  return horner([...partials(density, field).values()], 0);
}
