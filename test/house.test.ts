// The house keeps its plan: imports go one way between the rooms, and never in a circle.

import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

const root = fileURLToPath(new URL('../src/', import.meta.url));
/** The order of DEVELOPERS.md: a room may import from itself and from those before it. */
const ROOMS = [
  'exact',
  'notation',
  'model',
  'limit',
  'symmetry',
  'rough',
  'census',
  'witness',
  'claims',
  'rules',
  'report',
  'cli',
];

const files = readdirSync(root, { recursive: true, encoding: 'utf8' }).filter((f) => f.endsWith('.ts'));
const imports = new Map(
  files.map((file) => {
    const text = readFileSync(join(root, file), 'utf8');
    const targets = [...text.matchAll(/(?:from |import\()'(\.[^']+)'/g)].map((m) =>
      relative(root, join(root, dirname(file), m[1]!)),
    );
    return [file, targets];
  }),
);
const room = (file: string): number => ROOMS.indexOf(file.split('/')[0]!);

describe('the rooms', () => {
  it('import from rooms above them only', () => {
    const upward = [...imports].flatMap(([file, targets]) =>
      targets
        .filter((t) => room(t) >= 0 && room(file) >= 0 && room(t) > room(file))
        .map((t) => `${file} -> ${t}`),
    );
    expect(upward).toEqual([]);
  });

  it('hold no circle of imports', () => {
    const state = new Map<string, 'open' | 'done'>();
    const circles: string[] = [];
    const visit = (file: string, path: readonly string[]): void => {
      if (state.get(file) === 'done') return;
      if (state.get(file) === 'open') {
        circles.push([...path.slice(path.indexOf(file)), file].join(' -> '));
        return;
      }
      state.set(file, 'open');
      for (const target of imports.get(file) ?? []) visit(target, [...path, file]);
      state.set(file, 'done');
    };
    for (const file of files) visit(file, []);
    expect(circles).toEqual([]);
  });
});
