// Greek letters and their ASCII names: one table for reading, printing and LaTeX. Variants that differ in shape alone
// (ϕ, ϑ, ϵ, the micro sign, the increment sign) are the letter.

const LOWER: readonly (readonly [letter: string, name: string])[] = [
  ['α', 'alpha'],
  ['β', 'beta'],
  ['γ', 'gamma'],
  ['δ', 'delta'],
  ['ε', 'epsilon'],
  ['ζ', 'zeta'],
  ['η', 'eta'],
  ['θ', 'theta'],
  ['ι', 'iota'],
  ['κ', 'kappa'],
  ['λ', 'lambda'],
  ['μ', 'mu'],
  ['ν', 'nu'],
  ['ξ', 'xi'],
  ['ο', 'omicron'],
  ['π', 'pi'],
  ['ρ', 'rho'],
  ['σ', 'sigma'],
  ['τ', 'tau'],
  ['υ', 'upsilon'],
  ['φ', 'phi'],
  ['χ', 'chi'],
  ['ψ', 'psi'],
  ['ω', 'omega'],
];

const VARIANTS: readonly (readonly [letter: string, name: string])[] = [
  ['\u03d5', 'phi'],
  ['\u03d1', 'theta'],
  ['\u03f5', 'epsilon'],
  ['\u03f1', 'rho'],
  ['\u03f0', 'kappa'],
  ['\u00b5', 'mu'],
  ['\u2206', 'Delta'],
  ['\u2126', 'Omega'],
];

const capitalised = (name: string): string => name.charAt(0).toUpperCase() + name.slice(1);

/** ASCII name by Greek letter, capitals and variants included. */
export const GREEK_NAMES: ReadonlyMap<string, string> = new Map([
  ...LOWER,
  ...LOWER.map(([letter, name]) => [letter.toUpperCase(), capitalised(name)] as const),
  ...VARIANTS,
]);

/** True for `beta`, `Gamma`, …: the ASCII name of a Greek letter. */
export function isGreekName(name: string): boolean {
  return GREEK_ASCII.has(name);
}

const GREEK_ASCII: ReadonlySet<string> = new Set(GREEK_NAMES.values());
