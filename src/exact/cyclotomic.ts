// Sums of roots of unity, exactly: Z[ζ_N] is Z[X] modulo the cyclotomic polynomial Φ_N, so a power of ζ_N is an integer vector
// in the basis 1, ζ, …, ζ^{φ(N)−1}, and a sum vanishes iff its vector does.

/** Coefficients of Φ_n, lowest power first: X^n − 1 divided by Φ_d for all proper divisors d of n. */
function cyclotomicPolynomial(n: number): number[] {
  let quotient = new Array<number>(n + 1).fill(0);
  quotient[0] = -1;
  quotient[n] = 1;
  for (let d = 1; d < n; d++) if (n % d === 0) quotient = divideMonic(quotient, cyclotomicPolynomial(d));
  return quotient;
}

function divideMonic(dividend: readonly number[], divisor: readonly number[]): number[] {
  const rest = [...dividend];
  const degree = divisor.length - 1;
  const quotient = new Array<number>(dividend.length - degree).fill(0);
  for (let k = quotient.length - 1; k >= 0; k--) {
    const factor = rest[k + degree]!;
    quotient[k] = factor;
    for (let i = 0; i <= degree; i++) rest[k + i]! -= factor * divisor[i]!;
  }
  return quotient;
}

const known = new Map<number, readonly (readonly number[])[]>();

/** ζ_N^k for k = 0 … N − 1 as integer vectors in the basis 1, ζ, …, ζ^{φ(N)−1}. */
export function rootPowers(n: number): readonly (readonly number[])[] {
  const found = known.get(n);
  if (found) return found;
  const modulus = cyclotomicPolynomial(n);
  const degree = modulus.length - 1;
  const powers: number[][] = [];
  let current: number[] = Array.from({ length: degree }, (_, i) => (i === 0 ? 1 : 0));
  for (let k = 0; k < n; k++) {
    powers.push(current);
    const top = current[degree - 1]!;
    current = current.map((_, i) => (i === 0 ? 0 : current[i - 1]!) - top * modulus[i]!);
  }
  known.set(n, powers);
  return powers;
}
