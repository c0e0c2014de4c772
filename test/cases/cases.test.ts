// Every case of the folder: what is claimed holds, and in each faulty sibling exactly the planted mistake is found.

import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { checkCase } from '../../src/check.ts';
import { shippedRules } from '../../src/cli/shippedRules.ts';
import { printMonomial } from '../../src/limit/printDensity.ts';
import { readCase } from '../../src/model/caseFile.ts';
import { type CheckReport, isFailure } from '../../src/report/findings.ts';
import { textReport } from '../../src/report/reports.ts';
import { loadRules } from '../../src/rules/load.ts';

const folder = new URL('../../cases/', import.meta.url);
const files = readdirSync(folder).filter((name) => name.endsWith('.yaml'));
const rules = loadRules([shippedRules()]);

function check(file: string): CheckReport {
  return checkCase(readCase(readFileSync(new URL(file, folder)), `cases/${file}`), rules);
}

/** What is wrong in a sibling, and only that. */
interface Mistake {
  /** Claims that fail. */
  readonly claims?: readonly string[];
  /** Kind and monomial of every disagreement between expansion and proposal. */
  readonly differences?: readonly string[];
  /** Rules that find a fault. */
  readonly faults?: readonly string[];
  /** What the report must say about it. */
  readonly says: RegExp;
}

const mistakes: Record<string, Mistake> = {
  'rotor-chain-wrong-sign': {
    differences: ['wrong-coefficient (d_x phi)^2'],
    faults: ['quadratic-form-indefinite', 'wrong-coefficient'],
    says: /-1/,
  },
  'rotor-chain-wrong-corrections': { claims: ['artefacts'], says: /begin at order 2/ },
  'rotor-square-wrong-point-group': { claims: ['quarter-turn'], says: /order 8/ },
  'rotor-square-wrong-suppression': { claims: ['wall'], says: /continuum action ~ [^(]*\(suppressed\)/ },
  'rotor-square-wrong-mass': {
    differences: ['only-in-proposal phi^2'],
    faults: ['proposal-term-forbidden'],
    says: /phi\^2/,
  },
  'rotor-cube-wrong-power': {
    differences: [
      'wrong-coefficient (d_x phi)^2',
      'wrong-coefficient (d_y phi)^2',
      'wrong-coefficient (d_z phi)^2',
    ],
    faults: ['wrong-coefficient'],
    says: /beta\/\(2\*a\*b\)/,
  },
  'rotor-cube-wrong-count': { claims: ['charges'], says: /there (is 1|are 1)/ },
  'ring-exchange-sheet-wrong-coefficient': {
    differences: ['wrong-coefficient (d_x d_y phi)^2'],
    faults: ['wrong-coefficient'],
    says: /1\/2/,
  },
  'ring-exchange-sheet-wrong-redundancy': { claims: ['gauge'], says: /no symmetry of the lattice/ },
  'ring-exchange-sheet-wrong-status': { claims: ['momentum'], says: /survives/ },
  'ring-exchange-sheet-wrong-suppression': { claims: ['rough'], says: /identically zero/ },
  'ring-exchange-sheet-wrong-count': { claims: ['charges'], says: /U\(1\)/ },
  'ring-exchange-sheet-wrong-gradient': {
    differences: ['only-in-proposal (d_x phi)^2', 'only-in-proposal (d_y phi)^2'],
    faults: ['proposal-term-forbidden'],
    says: /f\(x\)/,
  },
  'face-rotors-wrong-missing-face': {
    differences: ['missing-from-proposal (d_x d_z phi)^2'],
    faults: ['missing-leading-term'],
    says: /missing/,
  },
  'face-rotors-wrong-count': { claims: ['charges'], says: /U\(1\)/ },
  'cube-rotors-wrong-redundancy': { claims: ['everything'], says: /no symmetry of the lattice/ },
  'cube-rotors-wrong-exponent': { claims: ['corner'], says: /a\^-3/ },
  'two-foliated-rotors-wrong-axes': {
    differences: [
      'missing-from-proposal (d_x d_y phi)^2',
      'missing-from-proposal (d_z phi)^2',
      'only-in-proposal (d_x d_z phi)^2',
      'only-in-proposal (d_y phi)^2',
    ],
    faults: ['missing-leading-term', 'proposal-term-forbidden'],
    says: /missing/,
  },
  'two-foliated-rotors-wrong-shift': { claims: ['film-by-film'], says: /absent/ },
  'dipole-chain-wrong-exponent': { claims: ['jump'], says: /a\^-3/ },
  'dipole-chain-wrong-gradient': {
    differences: ['only-in-proposal (d_x phi)^2'],
    faults: ['proposal-term-forbidden'],
    says: /the shift phi -> phi \+ x/,
  },
  'laplacian-sheet-wrong-missing-term': {
    differences: ['missing-from-proposal (d_x d_y phi)^2'],
    faults: ['missing-leading-term'],
    says: /missing/,
  },
  'laplacian-sheet-wrong-bowl': { claims: ['bowl'], says: /absent/ },
  'central-differences-wrong-status': { claims: ['alternating-columns'], says: /lattice-only/ },
  'central-differences-wrong-count': { claims: ['charges'], says: /there are [24]/ },
  'central-ring-exchange-wrong-coefficient': {
    differences: ['wrong-coefficient (d_x d_y phi)^2'],
    faults: ['wrong-coefficient'],
    says: /1\/4/,
  },
  'diagonal-ring-exchange-wrong-shift': { claims: ['momentum'], says: /absent/ },
  'clock-anisotropy-wrong-shift': { claims: ['charge'], says: /absent/ },
  'clock-anisotropy-wrong-period': {
    differences: ['wrong-coefficient phi^4'],
    faults: ['wrong-coefficient'],
    says: /phi\^4/,
  },
  'improved-rotor-square-wrong-order': { claims: ['artefacts'], says: /begin at order 4/ },
  'rotor-rectangle-wrong-point-group': { claims: ['mirrors'], says: /order 4/ },
  'rotor-rectangle-wrong-matching': {
    differences: ['wrong-coefficient (d_x phi)^2'],
    faults: ['wrong-coefficient'],
    says: /betax/,
  },
};

/** Analyses that do not exist yet leave their claims open. */
const mayStayOpen = new Set(['winding', 'rotation', 'boost', 'dilatation', 'duality']);

const failingClaims = ({ analyses }: CheckReport): string[] =>
  analyses.claims.filter((c) => c.verdict === 'fails').map((c) => `${c.claim.id}: ${c.found}`);

const differences = ({ analyses: { matching, expansion } }: CheckReport): string[] =>
  (matching?.differences ?? [])
    .filter((d) => d.kind !== 'agrees')
    .map((d) => `${d.kind} ${printMonomial(expansion.space, d.monomial)}`)
    .sort();

/** Rules that found a fault, without repetition. */
const faults = ({ findings }: CheckReport): string[] =>
  [...new Set(findings.filter((f) => f.level === 'fault').map((f) => f.rule))].sort();

const idOf = (file: string): string => file.replace(/\.yaml$/, '');

describe('cases that hold', () => {
  for (const file of files.filter((name) => !name.includes('-wrong-')))
    it(`everything claimed in ${file} holds or stays open for a reason`, () => {
      const report = check(file);
      expect(report.analyses.case.id).toBe(idOf(file));
      expect([...failingClaims(report), ...differences(report), ...faults(report)]).toEqual([]);
      const open = report.analyses.claims.filter((c) => c.verdict === 'undecided');
      expect(
        open.filter((c) => !mayStayOpen.has(c.claim.kind)).map((c) => `${c.claim.id}: ${c.found}`),
      ).toEqual([]);
      expect(open.every((c) => c.found.length > 0)).toBe(true);
      expect(report.verdict).toBe(open.length > 0 ? 'undecided' : 'holds');
      expect(isFailure(report)).toBe(false);
      expect(report.analyses.case.warnings).toEqual([]);
    });
});

describe('cases with a planted mistake', () => {
  const siblings = files.filter((name) => name.includes('-wrong-'));
  it('are all listed here, and each has a sibling that holds', () => {
    expect(siblings.map(idOf).sort()).toEqual(Object.keys(mistakes).sort());
    for (const name of siblings) expect(files).toContain(`${name.replace(/-wrong-.*/, '')}.yaml`);
  });
  for (const [id, { claims = [], differences: wanted = [], faults: rulesOf = [], says }] of Object.entries(
    mistakes,
  ))
    it(`${id} fails for its mistake alone`, () => {
      const report = check(`${id}.yaml`);
      expect(report.analyses.case.id).toBe(id);
      expect(failingClaims(report).map((c) => c.split(':')[0])).toEqual(claims);
      expect(differences(report)).toEqual([...wanted].sort());
      expect(faults(report)).toEqual(rulesOf);
      expect(report.verdict).toBe('fails');
      expect(isFailure(report)).toBe(true);
      expect(textReport(report).replace(/\s+/g, ' ')).toMatch(says);
    });
});
