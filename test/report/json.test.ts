import { describe, expect, test } from 'vitest';
import { renderJson } from '../../src/report/json.ts';
import { markdownReport, textReport } from '../../src/report/reports.ts';
import { claims, fault, handMadeReport } from './handMadeReport.ts';

const record = JSON.parse(renderJson(handMadeReport()));

describe('the record of a check', () => {
  test('has the keys that outside scripts read', () => {
    expect(record.saltus.version).toMatch(/^\d+\.\d+\.\d+/);
    expect(record.case).toBe('hand-made-sheet');
    expect(record.verdict).toBe('fails');
    expect(Object.keys(record.expansion.orders[0].terms[0])).toEqual([
      'coefficient',
      'monomial',
      'text',
      'latex',
      'from',
    ]);
    expect(Object.keys(record.matching)).toEqual(expect.arrayContaining(['parameters', 'differences']));
    expect(Object.keys(record.symmetries[0])).toEqual(
      expect.arrayContaining([
        'id',
        'kind',
        'statement',
        'lattice',
        'continuum',
        'status',
        'growth',
        'brokenBy',
        'certificate',
      ]),
    );
    expect(Object.keys(record.configurations[0])).toEqual(
      expect.arrayContaining(['profile', 'lattice', 'continuum', 'suppressed', 'truncates']),
    );
    expect(record.operators.missing).toEqual([]);
    expect(record.census).toEqual([]);
    expect(record.formula).toBeNull();
    expect(record.findings).toEqual([fault]);
    expect(record.claims.map((c: { id: string; verdict: string }) => [c.id, c.verdict])).toEqual(
      claims.map((c) => [c.claim.id, c.verdict]),
    );
  });

  test('counts orders by spacing', () => {
    expect(record.expansion.orders.map((o: { order: object }) => o.order)).toEqual([
      { b: 0, a: 0 },
      { b: 0, a: 2 },
    ]);
  });

  test('writes integral exponents as numbers, other rationals as p/q, and zero as a word', () => {
    expect(record.configurations[0].lattice).toEqual({ exponent: 'zero' });
    expect(record.configurations[1].lattice).toEqual({ exponent: { a: -1, l: 0, t: 1 } });
    expect(record.configurations[1].continuum).toEqual({ exponent: { a: '-1/2', l: 0, t: 1 } });
  });

  test('lists only what differs under differences, with whether the lattice allows it', () => {
    expect(
      record.matching.differences.map((d: { kind: string; allowed: unknown }) => [d.kind, d.allowed]),
    ).toEqual([
      ['wrong-coefficient', null],
      ['only-in-proposal', false],
    ]);
    expect(record.matching.differences[0].ratio).toBe('3/2');
    expect(record.matching.agreements).toHaveLength(1);
  });

  test('lists field reflections as internal, point group elements once, and not the identity', () => {
    expect(record.symmetries.map((s: { id: string }) => s.id)).toEqual([
      'shift: f(x)',
      'shift: x y',
      'internal: phi -> -phi',
      'point: x -> y, y -> -x',
    ]);
  });

  test('rounds floats of witnesses to twelve digits', () => {
    expect(record.witness[0].values).toEqual([0.333333333333, 0.666666666667]);
    expect(record.witness[0].fitted.exponent).toBe(-1);
  });

  test('puts a sum in parentheses before a monomial', () => {
    const sum = record.expansion.orders[1].terms[0];
    expect(sum.text).toBe(`(${sum.coefficient}) ${sum.monomial}`);
  });

  test('is the same bytes for the same report', () => {
    expect(renderJson(handMadeReport())).toBe(renderJson(handMadeReport()));
  });
});

describe('the text report', () => {
  const text = textReport(handMadeReport());

  test('goes from the verdict to the claims, the findings, the evidence and the limits', () => {
    const heads = text.split('\n').filter((line) => /^[A-Z ]{5,}$/.test(line));
    expect(text.split('\n')[0]).toBe('hand-made-sheet: FAILS (1 claim held, 1 failed, 1 undecided, 1 fault)');
    expect(heads).toEqual([
      'CLAIMS',
      'FINDINGS',
      'MATCHING',
      'SYMMETRIES',
      'ROUGH CONFIGURATIONS',
      'EXPANSION',
      'WITNESSES',
      'WHAT THIS DOES NOT PROVE',
    ]);
  });

  test('shows failed claims before undecided ones before those that hold', () => {
    const at = ['FAILS late', 'undecided twist', 'holds early'].map((words) => text.indexOf(words));
    expect(at.every((p) => p > 0)).toBe(true);
    expect([...at].sort((x, y) => x - y)).toEqual(at);
  });

  test('keeps to 80 columns', () => {
    for (const line of text.split('\n')) expect([...line].length, line).toBeLessThanOrEqual(80);
  });

  test('says of a missing proposal that there is none', () => {
    expect(textReport(handMadeReport({ analyses: { matching: undefined } }))).toContain('no proposal');
  });
});

test('a hostile title reaches no format raw', async () => {
  const report = handMadeReport({ title: 'x\u001b[2J|`<b>\u202e' });
  for (const out of [textReport(report), await markdownReport(report), renderJson(report)]) {
    expect(out).not.toContain('\u001b');
    expect(out).not.toContain('\u202e');
  }
  expect(await markdownReport(report)).toContain('x\\\\u\\{1b\\}\\[2J\\|\\`&lt;b>');
});
