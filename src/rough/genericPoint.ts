// Values for the independent quantities of a family: f at each distance of its argument, the heights of steps, derivatives of
// smooth functions. They are fixed large integers made from the name, so that a sum which vanishes identically vanishes here
// exactly, and one that does not vanishes only if the point lies on its zero set (J. T. Schwartz, J. ACM 27 (1980) 701).

import { Rational } from '../exact/rational.ts';

const known = new Map<string, Rational>();

/** An integer between 2^30 and 2^31 that depends on the name alone (FNV-1a, mixed). */
export function genericValue(name: string): Rational {
  const old = known.get(name);
  if (old) return old;
  let hash = 0x811c9dc5;
  for (let i = 0; i < name.length; i++) hash = Math.imul(hash ^ name.charCodeAt(i), 0x01000193);
  hash ^= hash >>> 15;
  hash = Math.imul(hash, 0x2c1b3c6d);
  hash ^= hash >>> 12;
  const value = Rational.of((hash >>> 2) + 2 ** 30);
  known.set(name, value);
  return value;
}
