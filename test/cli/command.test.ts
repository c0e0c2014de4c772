import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildProgram, checkout, type Program } from './program.ts';

const COMMANDS = ['check', 'expand', 'symmetries', 'configurations', 'rules', 'schema', 'new'];
let saltus: Program;

beforeAll(() => {
  saltus = buildProgram();
}, 60_000);
afterAll(() => saltus?.remove());

/** A starter case with its lines changed; every test starts from a file that a user would start from. */
const starter = (): string => saltus.run(['new', 'my-sheet']).stdout;

describe('help and version', () => {
  test('the version is that of package.json', () => {
    const { version } = JSON.parse(readFileSync(join(checkout, 'package.json'), 'utf8'));
    expect(saltus.run(['--version']).stdout).toBe(`${version}\n`);
  });

  test('the version is answered before any library is loaded', () => {
    const entry = readFileSync(saltus.path, 'utf8');
    const imports = [...entry.matchAll(/(?:from|import)\s*"(\.\/chunks\/[^"]+)"/g)].map((m) => m[1]!);
    const loaded = [entry, ...imports.map((file) => readFileSync(join(saltus.path, '..', file), 'utf8'))];
    expect(loaded.join('').length).toBeLessThan(4000);
  });

  test.each(COMMANDS)('the help of %s has an example', (command) => {
    const { stdout, status } = saltus.run([command, '--help']);
    expect(status).toBe(0);
    expect(stdout).toMatch(new RegExp(`Example:\\n {2}saltus ${command}`));
  });

  test.each([
    [['nonsense']],
    [['check']],
    [['check', '--format', 'html', 'x.yaml']],
    [['check', '--nonsense', 'x.yaml']],
    [['new', 'Not A Name']],
    [['rules', 'explain', 'no-such-rule']],
    [['rules', 'nonsense']],
    [[]],
  ])('the command line %j is wrong input', (args) => {
    const { status, stdout, stderr } = saltus.run(args);
    expect(status).toBe(2);
    expect(stdout).toBe('');
    expect(stderr).not.toBe('');
    expect(stderr).not.toMatch(/\bat .*:\d+:\d+/);
  });
});

describe('new, schema and rules', () => {
  test('a starter case checks as it stands', () => {
    const { status, stdout } = saltus.run(['check', '-'], { input: starter() });
    expect(stdout).toContain('my-sheet: holds');
    expect(status).toBe(0);
  });

  test('the schema is a JSON Schema of an object', () => {
    const schema = JSON.parse(saltus.run(['schema']).stdout);
    expect(schema.type).toBe('object');
    expect(Object.keys(schema.properties)).toEqual(
      expect.arrayContaining(['case', 'lattice', 'parent', 'claims']),
    );
  });

  test('every rule in the list can be explained', () => {
    const rules = JSON.parse(saltus.run(['rules', '--format', 'json']).stdout);
    expect(rules.length).toBeGreaterThan(0);
    const explained = saltus.run(['rules', 'explain', rules[0].rule]);
    expect(explained.status).toBe(0);
    expect(explained.stdout).toContain(rules[0].rule);
    expect(saltus.run(['rules']).stdout).toContain(rules[0].rule);
    expect(saltus.run(['rules', 'facts']).stdout).toContain('family');
  });
});

describe('check', () => {
  test('the record has the stable keys and the same bytes every time', () => {
    const first = saltus.run(['check', '--format', 'json', '-'], { input: starter() });
    const record = JSON.parse(first.stdout);
    for (const key of [
      'saltus',
      'case',
      'verdict',
      'expansion',
      'matching',
      'symmetries',
      'configurations',
      'operators',
      'census',
      'formula',
      'claims',
      'findings',
      'witness',
    ])
      expect(record).toHaveProperty(key);
    expect(saltus.run(['check', '--format', 'json', '-'], { input: starter() }).stdout).toBe(first.stdout);
  });

  test('a claim that fails gives exit code 1 and says so', () => {
    const wrong = `${starter().replace(/^claims:[\s\S]*$/m, '')}\nclaims:\n  - {id: late, corrections: {begin: 4}}\n`;
    const { status, stdout } = saltus.run(['check', '-'], { input: wrong });
    expect(stdout).toContain('FAILS late');
    expect(status).toBe(1);
  });

  test('quiet text is the verdict alone when all is well', () => {
    const { stdout } = saltus.run(['check', '--quiet', '-'], { input: starter() });
    expect(stdout.trim().split('\n')).toHaveLength(1);
  });

  test('without a terminal there is no colour and no progress', () => {
    const { stdout, stderr } = saltus.run(['check', '-'], { input: starter() });
    expect(stdout).not.toContain('\u001b');
    expect(stderr).toBe('');
  });

  test('no line of a text report is longer than 80 columns', () => {
    const { stdout } = saltus.run(['check', '-'], { input: starter() });
    for (const line of stdout.split('\n')) expect([...line].length, line).toBeLessThanOrEqual(80);
  });

  test('one section alone is printed by the command of its name', () => {
    const input = starter();
    expect(saltus.run(['expand', '-'], { input }).stdout).toContain('EXPANSION');
    expect(saltus.run(['symmetries', '-'], { input }).stdout).toContain('SYMMETRIES');
    const record = JSON.parse(saltus.run(['configurations', '--format', 'json', '-'], { input }).stdout);
    expect(Object.keys(record)).toEqual(['saltus', 'case', 'configurations', 'charges']);
  });

  test('the second opinion on the Taylor coefficients agrees', () => {
    const { stdout, status } = saltus.run(['expand', '--second-opinion', '-'], { input: starter() });
    expect(status).toBe(0);
    expect(stdout).toContain('agrees');
    expect(stdout).not.toContain('DIFFERS');
  });
});
