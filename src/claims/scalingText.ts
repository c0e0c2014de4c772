// Powers of a, l and t in words.

import type { Scaling } from '../rough/profile.ts';

/** `a^-2 l t`, `1`, or `identically zero`. */
export function scalingText(scaling: Scaling): string {
  if (scaling === 'zero') return 'identically zero';
  const factors = (['a', 'l', 't'] as const)
    .filter((k) => !scaling[k].isZero)
    .map((k) => (scaling[k].isOne ? k : `${k}^${scaling[k].isInteger ? scaling[k] : `(${scaling[k]})`}`));
  return factors.length === 0 ? '1' : factors.join(' ');
}
