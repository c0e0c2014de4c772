// The names that a case declares, and helpful words about names that it does not.

import { NotationError } from '../notation/source.ts';
import { FUNCTION_NAMES, type Span } from '../notation/tree.ts';

/** Names known where an expression is read. */
export interface Names {
  readonly axes: readonly string[];
  readonly fields: readonly string[];
  /** Parameters and spacings that the expression may use. */
  readonly constants: ReadonlySet<string>;
  /** Parameters that exist in the case but not here, with the reason. */
  readonly elsewhere: ReadonlyMap<string, string>;
  readonly kind: 'lattice' | 'continuum';
}

/** Edit distance with neighbouring exchanges, cut off at 3. */
function distance(x: string, y: string): number {
  if (Math.abs(x.length - y.length) > 2) return 3;
  let previous = Array.from({ length: y.length + 1 }, (_, j) => j);
  for (let i = 1; i <= x.length; i++) {
    const row = [i];
    for (let j = 1; j <= y.length; j++)
      row.push(
        Math.min(previous[j]! + 1, row[j - 1]! + 1, previous[j - 1]! + (x[i - 1] === y[j - 1] ? 0 : 1)),
      );
    previous = row;
  }
  return Math.min(3, previous[y.length]!);
}

/** The known name closest to a misspelt one, if any is close. */
export function nearest(name: string, known: Iterable<string>): string | undefined {
  let best: { name: string; distance: number } | undefined;
  const limit = name.length <= 2 ? 1 : 2;
  for (const candidate of known) {
    const d = distance(name.toLowerCase(), candidate.toLowerCase());
    if (d <= limit && d < candidate.length && (!best || d < best.distance))
      best = { name: candidate, distance: d };
  }
  return best?.name;
}

/** The error for a symbol that nothing declares. */
export function unknownName(name: string, span: Span, names: Names): NotationError {
  const elsewhere = names.elsewhere.get(name);
  if (elsewhere !== undefined)
    return new NotationError(`"${name}" ${elsewhere}`, 'use what is declared here', span.start);
  if (names.axes.includes(name))
    return new NotationError(
      `the coordinate "${name}" stands in an action`,
      'an action must not depend on the position; use operators on fields',
      span.start,
    );
  const close = nearest(name, [...names.fields, ...names.constants, 'pi']);
  return new NotationError(
    `"${name}" is not declared`,
    close === undefined
      ? `declare it under parameters, as "${name}: {}"`
      : `did you mean "${close}"? Otherwise declare it`,
    span.start,
  );
}

/** The error for a call of something that is not a function. */
export function unknownFunction(name: string, span: Span, names: Names): NotationError {
  if (names.constants.has(name) || names.fields.includes(name))
    return new NotationError(
      `"${name}(…)" reads as a function called ${name}`,
      `for a product write "${name} (…)" or "${name}*(…)"`,
      span.start,
    );
  const close = nearest(name, FUNCTION_NAMES);
  return new NotationError(
    `"${name}" is not a function`,
    close === undefined ? `the functions are ${FUNCTION_NAMES.join(', ')}` : `did you mean ${close}?`,
    span.start,
  );
}
