// The names that a case declares, and helpful words about names that it does not.

import type { Rational } from '../exact/rational.ts';
import { NotationError } from '../notation/source.ts';
import { tokens } from '../notation/tokens.ts';
import { FUNCTION_NAMES, type Span } from '../notation/tree.ts';
import { LONGEST_NAME } from './limits.ts';

/** Names known where an expression is read. */
export interface Names {
  readonly axes: readonly string[];
  readonly fields: readonly string[];
  /** Parameters and spacings that the expression may use. */
  readonly constants: ReadonlySet<string>;
  /** Those of them that are known to be positive; spacings always are. */
  readonly positive: ReadonlySet<string>;
  /** Names that exist in the case but not here, with the reason and what to do. */
  readonly elsewhere: ReadonlyMap<string, { readonly problem: string; readonly mend: string }>;
  /** The key under which a missing parameter would be declared, e.g. `proposal: parameters`. */
  readonly declareUnder: string;
  /** Constant background about which functions will be expanded, by field name; absent means 0. */
  readonly background: ReadonlyMap<string, Rational>;
}

/** Names with a meaning of their own in the notation. */
const RESERVED: ReadonlySet<string> = new Set([
  'pi',
  'T',
  'd',
  'Delta',
  'Deltab',
  'Deltac',
  ...FUNCTION_NAMES,
]);

/** The ASCII spelling of a name as the notation reads it (`phi` for φ). Throws NotationError for anything else than one
 *  name, and for a name that the notation keeps for itself. */
export function readName(text: string): string {
  const mend = 'write a letter followed by letters, digits and _, or one Greek letter';
  if (text.length > LONGEST_NAME)
    throw new NotationError(
      `a name of ${text.length} characters is too long`,
      `use at most ${LONGEST_NAME}`,
      0,
    );
  const [first, second] = tokens(text);
  if (first?.kind === 'operator')
    throw new NotationError(`"${text}" reads as an operator along ${first.axis}`, 'choose another name', 0);
  if (first?.kind !== 'name' || second?.kind !== 'end' || first.span.end - first.span.start !== text.length)
    throw new NotationError(`"${text}" cannot be a name`, mend, 0);
  if (RESERVED.has(first.name))
    throw new NotationError(
      `"${first.name}" has a meaning of its own in the notation`,
      'choose another name',
      0,
    );
  return first.name;
}

/** Number of insertions, deletions, replacements and exchanges of neighbours between two words (the optimal string
 *  alignment distance); 3 stands for more than two. */
function distance(x: string, y: string): number {
  if (Math.abs(x.length - y.length) > 2) return 3;
  let beforeLast: number[] = [];
  let last = Array.from({ length: y.length + 1 }, (_, j) => j);
  for (let i = 1; i <= x.length; i++) {
    const row = [i];
    for (let j = 1; j <= y.length; j++) {
      const same = x[i - 1] === y[j - 1];
      let best = Math.min(last[j]! + 1, row[j - 1]! + 1, last[j - 1]! + (same ? 0 : 1));
      if (i > 1 && j > 1 && x[i - 1] === y[j - 2] && x[i - 2] === y[j - 1])
        best = Math.min(best, beforeLast[j - 2]! + 1);
      row.push(best);
    }
    [beforeLast, last] = [last, row];
  }
  return Math.min(3, last[y.length]!);
}

/** The known name closest to a misspelt one, if any is close. */
export function nearest(name: string, known: Iterable<string>): string | undefined {
  let best: { name: string; distance: number } | undefined;
  const limit = name.length <= 3 ? 1 : 2;
  for (const candidate of known) {
    const d = distance(name.toLowerCase(), candidate.toLowerCase());
    if (d <= limit && d < candidate.length && (!best || d < best.distance))
      best = { name: candidate, distance: d };
  }
  return best?.name;
}

/** `did you mean "phi"?`, or the words for when nothing is close. */
export function didYouMean(name: string, known: Iterable<string>, otherwise: string): string {
  const close = nearest(name, known);
  return close === undefined ? otherwise : `did you mean "${close}"?`;
}

/** The error for a symbol that may not be used here. */
export function unknownName(name: string, span: Span, names: Names): NotationError {
  const elsewhere = names.elsewhere.get(name);
  if (elsewhere) return new NotationError(elsewhere.problem, elsewhere.mend, span.start);
  if (names.axes.includes(name))
    return new NotationError(
      `the coordinate "${name}" stands in an action`,
      'an action must not depend on the position; use operators on fields',
      span.start,
    );
  const declare = `declare it under ${names.declareUnder}, e.g. ${name}: {positive: true}`;
  const close = nearest(name, [...names.fields, ...names.constants, 'pi']);
  return new NotationError(
    `"${name}" is not declared`,
    close === undefined ? declare : `did you mean "${close}"? Otherwise ${declare}`,
    span.start,
  );
}

/** The error for a call of something that is not a function. */
export function unknownFunction(name: string, span: Span, names: Names): NotationError {
  if (names.fields.includes(name))
    return new NotationError(
      `"${name}(…)" reads as a function called ${name}`,
      `a field stands without arguments; for a product write ${name}*(…), for another site T_${names.axes.at(-1)} ${name}`,
      span.start,
    );
  if (names.constants.has(name) || names.elsewhere.has(name))
    return new NotationError(
      `"${name}(…)" reads as a function called ${name}`,
      `for a product write ${name}*(…)`,
      span.start,
    );
  const list = `the functions are ${FUNCTION_NAMES.join(', ')}`;
  const close = nearest(name, FUNCTION_NAMES);
  return new NotationError(
    `"${name}" is not a function`,
    close === undefined ? `${list}; for a product write ${name}*(…)` : `did you mean ${close}? ${list}`,
    span.start,
  );
}
