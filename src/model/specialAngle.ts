// Exact values of cosine and sine at multiples of π/6 and π/4.

import { Coefficient } from '../exact/coefficient.ts';
import { rational } from '../exact/rational.ts';

const HALF = rational(1, 2);

/** sin(n π/12) in the first quadrant. */
const FIRST_QUADRANT: ReadonlyMap<number, Coefficient> = new Map([
  [0, Coefficient.zero],
  [2, Coefficient.rational(HALF)],
  [3, Coefficient.root(HALF, HALF)],
  [4, Coefficient.root(rational(3, 4), HALF)],
  [6, Coefficient.one],
]);

function sineOfTwelfths(n: number): Coefficient | undefined {
  const turned = ((n % 24) + 24) % 24;
  const folded = turned % 12 <= 6 ? turned % 12 : 12 - (turned % 12);
  const value = FIRST_QUADRANT.get(folded);
  return turned >= 12 ? value?.neg() : value;
}

/** Cosine and sine of an angle in radians, or undefined unless it is a multiple of π/6 or π/4. */
export function specialAngle(angle: Coefficient): { cos: Coefficient; sin: Coefficient } | undefined {
  const twelfths = angle.div(Coefficient.symbol('pi')).asRational?.mul(rational(12));
  if (!twelfths?.isInteger) return undefined;
  const n = Number(twelfths.num % 24n);
  const sin = sineOfTwelfths(n);
  const cos = sineOfTwelfths(n + 6);
  return sin && cos && { cos, sin };
}
