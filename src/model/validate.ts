// Shape errors with positions: what zod found, said about the file.

import type * as z from 'zod';
import { InputError } from '../notation/source.ts';
import { nearest } from './names.ts';
import type { Path, YamlSource } from './yamlSource.ts';

/** The first shape error as an InputError. @param known keys that exist anywhere, for near misses. */
export function shapeError(error: z.ZodError, source: YamlSource, known: readonly string[]): InputError {
  // A misspelt key explains the key that is missing in its place.
  const first = error.issues.find((i) => i.code === 'unrecognized_keys') ?? error.issues[0]!;
  const issue = deepest([first]);
  const path = issue.path.filter((p): p is string | number => typeof p !== 'symbol');
  const name = path.at(-1);
  const label =
    name === undefined ? 'the file' : typeof name === 'number' ? `entry ${name + 1}` : `"${name}"`;
  switch (issue.code) {
    case 'unrecognized_keys': {
      const [key] = issue.keys as [string];
      const close = nearest(key, known);
      return new InputError(
        `"${key}" is not a key here`,
        close === undefined ? 'leave it out; saltus schema lists the keys' : `did you mean "${close}"?`,
        source.positionOfKey([...path, key]),
      );
    }
    case 'invalid_type': {
      if (isMissing(source, path))
        return new InputError(
          `${label} is missing`,
          `add the key ${label}`,
          source.positionOf(path.slice(0, -1)),
        );
      const wanted =
        issue.expected === 'record' || issue.expected === 'object'
          ? 'a map of keys and values'
          : issue.expected;
      const mend = issue.expected === 'string' ? 'put it in quotes' : `write ${article(wanted)}`;
      return new InputError(`${label} must be ${article(wanted)}`, mend, source.positionOf(path));
    }
    case 'invalid_value':
      return new InputError(
        `${label} has a value that is not known`,
        `write one of ${issue.values.map(String).join(', ')}`,
        source.positionOf(path),
      );
    case 'too_small':
    case 'too_big':
      return new InputError(
        `${label} is out of range: ${issue.message}`,
        'use a value in range',
        source.positionOf(path),
      );
    case 'invalid_format':
      return new InputError(`${label} must be ${issue.message}`, 'rename it', source.positionOf(path));
    default:
      return new InputError(
        `${label} does not fit: ${issue.message}`,
        'saltus schema describes what fits',
        source.positionOf(path),
      );
  }
}

/** Inside unions the issue that got furthest tells most. */
function deepest(issues: readonly z.core.$ZodIssue[]): z.core.$ZodIssue {
  const [first] = issues as [z.core.$ZodIssue];
  if (first.code !== 'invalid_union') return first;
  const inner = first.errors.flat();
  const typeOnly = inner.every((i) => i.path.length === 0);
  const best =
    inner.filter((i) => i.path.length > 0)[0] ?? inner.find((i) => i.code !== 'invalid_type') ?? inner[0];
  if (!best || typeOnly) {
    const options = inner.map((i) =>
      i.code === 'invalid_value' ? i.values.join(', ') : 'expected' in i ? String(i.expected) : '',
    );
    const wanted = [...new Set(options.filter((o) => o !== ''))].join(' or ');
    return { ...first, code: 'custom', message: `it must be ${wanted}` } as z.core.$ZodIssue;
  }
  return { ...best, path: [...first.path, ...best.path] } as z.core.$ZodIssue;
}

function isMissing(source: YamlSource, path: Path): boolean {
  let value: unknown = source.toPlain();
  for (const key of path) {
    if (value === null || typeof value !== 'object') return false;
    value = (value as Record<string | number, unknown>)[key];
  }
  return value === undefined;
}

function article(noun: string): string {
  if (/^an? /.test(noun)) return noun;
  const word = noun === 'int' ? 'integer' : noun === 'array' ? 'array (a list)' : noun;
  return `${/^[aeiou]/.test(word) ? 'an' : 'a'} ${word}`;
}
