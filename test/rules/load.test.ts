import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { afterAll, describe, expect, it } from 'vitest';
import { checkCase } from '../../src/check.ts';
import { InputError, NotationError } from '../../src/notation/source.ts';
import { factsOf, holds, readCondition } from '../../src/rules/condition.ts';
import { applyRules } from '../../src/rules/evaluate.ts';
import { loadRules, readRule } from '../../src/rules/load.ts';
import { factsDocumentation, SCOPES } from '../../src/rules/vocabulary.ts';
import { sheet } from '../inlineCase.ts';

const rule = (changes: Partial<Record<string, string>> = {}): string =>
  Object.entries({
    rule: 'line-like',
    level: 'note',
    'for-each': 'symmetry',
    when: '\'symmetry.growth == 1 and symmetry.status == "survives"\'',
    says: '"{symmetry.profile} is line-like"',
    why: 'because',
    mend: 'nothing to mend',
    source: 'common practice, no source',
    examples: '{fires: [], silent: []}',
    ...changes,
  })
    .filter(([, v]) => v !== '')
    .map(([k, v]) => `${k}: ${v}`)
    .join('\n');

const problem = (text: string): InputError => {
  try {
    readRule(text, 'r.yaml');
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error('the rule was accepted');
};

describe('a rule file', () => {
  it('that is right is read, and fires with its placeholders filled in', () => {
    const findings = applyRules([readRule(rule(), 'r.yaml')], checkCase(sheet, []).analyses);
    expect(findings).toEqual([
      {
        rule: 'line-like',
        level: 'note',
        statement: 'f(x) is line-like g(y) is line-like',
        why: 'because',
        evidence: 'symmetry.growth = 1, symmetry.status = survives',
        mend: 'nothing to mend',
      },
    ]);
  });

  it.each([
    ['an unknown key', rule({ when: '"true == true"\nwhn: x' }), 5, /whn/],
    ['an unknown level', rule({ level: 'fatal' }), 2, /level/],
    ['an unknown scope', rule({ 'for-each': 'particle' }), 3, /particle/],
    ['a missing key', rule({ mend: '' }), 1, /mend/],
    ['a bad identifier', rule({ rule: 'Line Like' }), 1, /rule/],
    ['an unknown fact', rule({ when: "'symmetry.grwth == 1'" }), 4, /grwth.*|symmetry/],
    ['a fact of another scope', rule({ when: "'charge.limitsCommute'" }), 4, /charge.limitsCommute/],
    ['an unknown placeholder', rule({ says: '"{symmetry.colour} is red"' }), 5, /symmetry.colour/],
    [
      'a number compared with a word',
      rule({ when: '\'symmetry.growth == "one"\'' }),
      4,
      /number is compared with a text/,
    ],
    ['an order among words', rule({ when: '\'symmetry.status < "survives"\'' }), 4, /order/],
    ['a condition that is no boolean', rule({ when: "'symmetry.growth'" }), 4, /neither true nor false/],
    ['code in a condition', rule({ when: "'process.exit(1)'" }), 4, /process.exit/],
    ['an open parenthesis', rule({ when: "'(symmetry.growth == 1'" }), 4, /parenthesis/],
    ['a list instead of a map', '- 1\n', 1, /./],
    ['binary', 'rule: \u0000', 1, /control|./],
    ['an alias bomb', 'a: &a [1]\nb: [*a, *a]\n', 1, /./],
  ])('with %s is refused with its place and a mend', (_, text, line, says) => {
    const error = problem(text);
    expect(`${error.problem} ${error.mend}`).toMatch(says);
    expect(error.position.line).toBe(line);
    expect(error.mend.length).toBeGreaterThan(3);
  });

  it('points at the place inside the condition', () => {
    const error = problem(rule({ when: "'symmetry.growth == 1 and symmetry.colour'" }));
    expect([error.position.line, error.position.column]).toEqual([4, 33]);
  });
});

describe('findings', () => {
  it('come with faults first, then cautions, then notes, whatever the order of the rules', () => {
    const levels = ['note', 'caution', 'fault'].map((level) =>
      readRule(rule({ rule: `r-${level}`, level }), 'r.yaml'),
    );
    const { analyses } = checkCase(sheet, []);
    expect(applyRules(levels, analyses).map((f) => f.level)).toEqual(['fault', 'caution', 'note']);
  });
});

describe('folders of rules', () => {
  const folder = mkdtempSync(join(tmpdir(), 'rules-'));
  afterAll(() => rmSync(folder, { recursive: true }));

  it('add to each other, and may not define a rule twice', () => {
    writeFileSync(join(folder, 'one.yaml'), rule());
    expect(loadRules([folder]).map((r) => r.id)).toEqual(['line-like']);
    expect(() => loadRules([folder, folder])).toThrow(/already defined/);
    writeFileSync(join(folder, 'notes.txt'), 'not a rule');
    expect(loadRules([folder]).length).toBe(1);
  });

  it('that do not exist are named', () => {
    expect(() => loadRules([join(folder, 'nowhere')])).toThrow(InputError);
  });
});

describe('conditions', () => {
  const facts: Record<string, boolean | string | null> = {
    'family.isFree': true,
    'family.isStaggered': false,
    'leading.exponent': 'a^-2 t',
    'correction.exponent': 'a^-2 t',
  };
  const test = (text: string, more: Record<string, boolean | string | null> = {}): boolean =>
    holds(readCondition(text, 'family'), (f) => ({ ...facts, ...more })[f] ?? null);

  it('compare exponents exactly, and none with none only', () => {
    expect(test('correction.exponent == leading.exponent and leading.exponent != none')).toBe(true);
    expect(test('correction.exponent == leading.exponent', { 'correction.exponent': 'a^-1 t' })).toBe(false);
    expect(test('leading.exponent == none', { 'leading.exponent': null })).toBe(true);
  });

  it('bind not before and before or', () => {
    expect(test('family.isFree or family.isFree and family.isStaggered')).toBe(true);
    expect(test('(family.isFree or family.isFree) and family.isStaggered')).toBe(false);
    expect(test('not family.isStaggered and family.isFree')).toBe(true);
    expect(test('not (family.isStaggered or family.isFree)')).toBe(false);
    expect(factsOf(readCondition('not family.isFree and family.isFree', 'family'))).toEqual([
      'family.isFree',
    ]);
  });

  it('are read or refused with an offset inside them, whatever the text', () => {
    const pieces = fc.constantFrom(
      'family.isFree',
      'and',
      'or',
      'not',
      '(',
      ')',
      '==',
      '<',
      '1',
      '"x"',
      'none',
      'true',
      '§',
      '__proto__',
      'constructor',
      'leading.exponent',
    );
    fc.assert(
      fc.property(fc.array(pieces, { maxLength: 12 }), fc.constantFrom(' ', ''), (words, gap) => {
        const text = words.join(gap);
        try {
          readCondition(text, 'family');
        } catch (error) {
          expect(error).toBeInstanceOf(NotationError);
          expect((error as NotationError).offset).toBeLessThanOrEqual(text.length);
        }
      }),
      { numRuns: 300 },
    );
    expect(() => readCondition('('.repeat(400), 'family')).toThrow(NotationError);
    expect(() => readCondition(`${'not '.repeat(120)}family.isFree`, 'family')).not.toThrow(RangeError);
  });
});

describe('the facts vocabulary', () => {
  it('is documented in full from the same table', () => {
    const text = factsDocumentation();
    for (const scope of Object.values(SCOPES))
      for (const fact of Object.keys(scope.facts)) expect(text).toContain(`\`${fact}\``);
  });

  it('reads every fact of every item of a real case without failing, with the type it promises', () => {
    const { analyses } = checkCase(sheet, []);
    for (const scope of Object.values(SCOPES))
      for (const item of scope.items(analyses))
        for (const [name, { type, read }] of Object.entries(scope.facts)) {
          const value = read(item, analyses);
          const found = value === null ? 'none' : typeof value === 'object' ? 'number' : typeof value;
          const wanted = {
            boolean: ['boolean'],
            text: ['string', 'none'],
            exponent: ['string', 'none'],
            number: ['number', 'none'],
          };
          expect(wanted[type], `${name} = ${value}`).toContain(found);
        }
  });
});
