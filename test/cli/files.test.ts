import { spawn, spawnSync } from 'node:child_process';
import {
  closeSync,
  mkdirSync,
  mkdtempSync,
  openSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildProgram, type Program } from './program.ts';

let saltus: Program;
let folder: string;
const file = (name: string): string => join(folder, name);

beforeAll(() => {
  saltus = buildProgram();
  folder = mkdtempSync(join(tmpdir(), 'saltus-files-'));
  writeFileSync(file('good.yaml'), saltus.run(['new', 'good']).stdout);
  mkdirSync(file('folder'));
  symlinkSync(file('nowhere'), file('dangling.yaml'));
  symlinkSync(file('circle.yaml'), file('circle.yaml'));
  writeFileSync(file('empty.yaml'), '');
  writeFileSync(file('binary.yaml'), Buffer.from(Array.from({ length: 4096 }, (_, i) => (i * 131) % 256)));
  writeFileSync(file('large.yaml'), `case: x\ntitle: "${'x'.repeat(10_000_000)}"\n`);
}, 60_000);
afterAll(() => {
  saltus?.remove();
  rmSync(folder, { recursive: true, force: true });
});

describe('files that are no case', () => {
  test.each(['missing.yaml', 'folder', 'dangling.yaml', 'circle.yaml', 'good.yaml/below'])(
    '%s is named with line and column 1 and a mend',
    (name) => {
      const { status, stdout, stderr } = saltus.run(['check', name], { cwd: folder });
      expect(stderr).toMatch(/^[a-z./]+:1:1: .+ — .+\n$/);
      expect(stdout).toBe('');
      expect(status).toBe(2);
    },
  );

  test.each(['empty.yaml', 'binary.yaml'])('%s is wrong input at a place in the file', (name) => {
    const { status, stderr } = saltus.run(['check', name], { cwd: folder });
    expect(stderr).toMatch(new RegExp(`^${name}:\\d+:\\d+: .+ — .+\\n$`));
    expect(status).toBe(2);
  });

  test.each(['large.yaml', '/dev/zero'])('%s is beyond the stated size', (name) => {
    const { status, stderr } = saltus.run(['check', name], { cwd: folder });
    expect(stderr).toContain(`${name}:1:1: the file has more than`);
    expect(status).toBe(2);
  });

  test('control characters of a file name do not reach the terminal', () => {
    const { stderr } = saltus.run(['check', 'a\u001b[31mb\u202e.yaml'], { cwd: folder });
    expect(stderr).toContain('a\\u{1b}[31mb\\u{202e}.yaml:1:1');
  });
});

describe('several cases', () => {
  test('the good ones are reported, the bad one is named, and the gravest code is kept', () => {
    const { status, stdout, stderr } = saltus.run(['check', 'good.yaml', 'missing.yaml'], { cwd: folder });
    expect(status).toBe(2);
    expect(stderr).toMatch(/^missing\.yaml:1:1: /);
    expect(stdout).toMatch(/SUMMARY[\s\S]*good +holds[\s\S]*missing\.yaml +not checked/);
  });

  test('records of several cases are a list with the error in its place', () => {
    const { stdout } = saltus.run(['check', '--format', 'json', 'good.yaml', 'missing.yaml'], {
      cwd: folder,
    });
    const [good, missing] = JSON.parse(stdout);
    expect(good.case).toBe('good');
    expect(missing).toMatchObject({ file: 'missing.yaml', error: { code: 2 } });
  });

  test('standard input can be named once only', () => {
    expect(saltus.run(['check', '-', '-']).status).toBe(2);
  });
});

describe('--out', () => {
  test('the file holds what standard output would, and nothing else is left in the folder', () => {
    const out = mkdtempSync(join(folder, 'out-'));
    const { status, stdout } = saltus.run(['check', 'good.yaml', '--out', join(out, 'r.txt')], {
      cwd: folder,
    });
    expect(status).toBe(0);
    expect(stdout).toBe('');
    expect(readdirSync(out)).toEqual(['r.txt']);
    expect(readFileSync(join(out, 'r.txt'), 'utf8')).toBe(
      saltus.run(['check', 'good.yaml'], { cwd: folder }).stdout,
    );
  });

  test('the old file stays whole when the case is wrong', () => {
    writeFileSync(file('old.txt'), 'old');
    expect(saltus.run(['check', 'empty.yaml', '--out', 'old.txt'], { cwd: folder }).status).toBe(2);
    expect(readFileSync(file('old.txt'), 'utf8')).toBe('old');
  });

  test.each(['nowhere/r.txt', 'folder', 'good.yaml/r.txt', ''])(
    'the path "%s" is refused with a reason',
    (out) => {
      const { status, stderr } = saltus.run(['schema', '--out', out], { cwd: folder });
      expect(status).toBe(2);
      expect(stderr).toMatch(/--out|cannot write/);
      expect(stderr).not.toMatch(/\n {4}at /);
    },
  );

  test('a device is written to and not replaced', () => {
    expect(saltus.run(['schema', '--out', '/dev/null']).status).toBe(0);
  });
});

describe('the other side goes away', () => {
  test('a closed pipe ends the run quietly', async () => {
    const child = spawn(process.execPath, [saltus.path, 'check', '--format', 'json', 'good.yaml'], {
      cwd: folder,
    });
    child.stdout.destroy();
    let stderr = '';
    child.stderr.on('data', (chunk) => {
      stderr += chunk;
    });
    const code = await new Promise((resolve) => child.on('close', resolve));
    expect(stderr).toBe('');
    expect(code).toBe(0);
  });

  test('a full disk behind standard output is said in one line', () => {
    const full = openSync('/dev/full', 'w');
    const { status, stderr } = spawnSync(process.execPath, [saltus.path, 'schema'], {
      stdio: ['ignore', full, 'pipe'],
      encoding: 'utf8',
    });
    closeSync(full);
    expect(stderr).toBe('saltus: cannot write to standard output: ENOSPC\n');
    expect(status).toBe(2);
  });

  test('an interrupt ends the run at once', async () => {
    const child = spawn(process.execPath, [saltus.path, 'check', '-'], {
      stdio: ['pipe', 'ignore', 'ignore'],
    });
    await new Promise((resolve) => setTimeout(resolve, 300));
    child.kill('SIGINT');
    const signal = await new Promise((resolve) => child.on('close', (_, s) => resolve(s)));
    // A shell reports a process that SIGINT ended as 130 = 128 + 2 (common practice, no source).
    expect(signal).toBe('SIGINT');
  });
});
