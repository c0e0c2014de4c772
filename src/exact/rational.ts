// Exact rational numbers on BigInt. Every verdict of the program rests on this arithmetic, so nothing here
// ever passes through a float; `toNumber` exists for numerical witnesses and plots alone.

/** Greatest common divisor of two integers, non-negative. */
export function gcd(a: bigint, b: bigint): bigint {
  let x = a < 0n ? -a : a;
  let y = b < 0n ? -b : b;
  while (y !== 0n) {
    const r = x % y;
    x = y;
    y = r;
  }
  return x;
}

/** A rational number in lowest terms with a positive denominator. Immutable. */
export class Rational {
  static readonly zero = new Rational(0n, 1n);
  static readonly one = new Rational(1n, 1n);
  static readonly minusOne = new Rational(-1n, 1n);

  private constructor(
    readonly num: bigint,
    readonly den: bigint,
  ) {}

  /** num/den in lowest terms. Throws RangeError when den is zero or a number argument is not an integer. */
  static of(num: bigint | number, den: bigint | number = 1n): Rational {
    let n = BigInt(num);
    let d = BigInt(den);
    if (d === 1n) return new Rational(n, 1n);
    if (d === 0n) throw new RangeError('denominator is zero');
    if (d < 0n) {
      n = -n;
      d = -d;
    }
    const g = gcd(n, d);
    return g === 1n ? new Rational(n, d) : new Rational(n / g, d / g);
  }

  /** Reads `p`, `p/q` or a decimal such as `-0.125`, exactly. Throws SyntaxError on anything else. */
  static parse(text: string): Rational {
    const m = /^\s*([+-]?)(\d+)(?:\.(\d+)|\s*\/\s*(\d+))?\s*$/.exec(text);
    if (!m) throw new SyntaxError(`"${text}" is not an exact number`);
    const sign = m[1] === '-' ? -1n : 1n;
    const fraction = m[3];
    if (fraction !== undefined)
      return Rational.of(sign * BigInt(m[2]! + fraction), 10n ** BigInt(fraction.length));
    return Rational.of(sign * BigInt(m[2]!), m[4] === undefined ? 1n : BigInt(m[4]));
  }

  get isZero(): boolean {
    return this.num === 0n;
  }
  get isOne(): boolean {
    return this.num === 1n && this.den === 1n;
  }
  get isInteger(): boolean {
    return this.den === 1n;
  }
  /** -1, 0 or 1. */
  get sign(): number {
    return this.num > 0n ? 1 : this.num < 0n ? -1 : 0;
  }

  add(o: Rational): Rational {
    if (this.den === 1n && o.den === 1n) return new Rational(this.num + o.num, 1n);
    return Rational.of(this.num * o.den + o.num * this.den, this.den * o.den);
  }
  sub(o: Rational): Rational {
    if (this.den === 1n && o.den === 1n) return new Rational(this.num - o.num, 1n);
    return Rational.of(this.num * o.den - o.num * this.den, this.den * o.den);
  }
  mul(o: Rational): Rational {
    if (this.den === 1n && o.den === 1n) return new Rational(this.num * o.num, 1n);
    return Rational.of(this.num * o.num, this.den * o.den);
  }
  /** Throws RangeError when o is zero. */
  div(o: Rational): Rational {
    return Rational.of(this.num * o.den, this.den * o.num);
  }
  neg(): Rational {
    return new Rational(-this.num, this.den);
  }
  /** Throws RangeError when zero. */
  inv(): Rational {
    return Rational.of(this.den, this.num);
  }
  abs(): Rational {
    return this.num < 0n ? this.neg() : this;
  }
  /** Integer power; throws RangeError for 0 to a negative power. */
  pow(k: number): Rational {
    if (k < 0) return this.inv().pow(-k);
    return new Rational(this.num ** BigInt(k), this.den ** BigInt(k));
  }
  /** Negative, zero or positive as this <, =, > o. */
  compare(o: Rational): number {
    const d = this.num * o.den - o.num * this.den;
    return d < 0n ? -1 : d > 0n ? 1 : 0;
  }
  equals(o: Rational): boolean {
    return this.num === o.num && this.den === o.den;
  }
  /** Largest integer not above the number. */
  floor(): bigint {
    const q = this.num / this.den;
    return this.num < 0n && q * this.den !== this.num ? q - 1n : q;
  }
  /** `p` or `p/q`; `Rational.parse` reads it back. */
  toString(): string {
    return this.den === 1n ? `${this.num}` : `${this.num}/${this.den}`;
  }
  /** Nearest float, also for parts beyond the range of floats. For witnesses and plots, never for a verdict. */
  toNumber(): number {
    const direct = Number(this.num) / Number(this.den);
    if (Number.isFinite(direct) && direct !== 0) return direct;
    if (this.num === 0n) return 0;
    const shift = this.num.toString(2).length - this.den.toString(2).length - 64;
    const scaled =
      shift >= 0 ? this.num / (this.den << BigInt(shift)) : (this.num << BigInt(-shift)) / this.den;
    return Number(scaled) * 2 ** shift;
  }
}

/** Shorthand for Rational.of with machine integers. */
export const rational = (num: number, den = 1): Rational => Rational.of(num, den);
