// The strings, numbers and names of one case file, read with their positions. Everything that is wrong becomes an InputError
// at its place; what is right but may have been meant otherwise is collected as a warning.

import { Rational } from '../exact/rational.ts';
import { shortened } from '../notation/part.ts';
import { InputError, NotationError, type SourcePosition } from '../notation/source.ts';
import { readName } from './names.ts';
import type { Path, YamlSource } from './yamlSource.ts';

export interface Warning {
  readonly text: string;
  readonly position: SourcePosition;
}

/** Escapes of YAML that swallow the first letter of a LaTeX command, as in "\tau". */
const SWALLOWING = /^(?:[^\\]|\\[^0abefnrtvNLP_])*?(\\[0abefnrtvNLP_])/s;

export class CaseText {
  readonly warnings: Warning[] = [];

  constructor(readonly source: YamlSource) {}

  /** Throws an InputError at the value of a path, or at its key. */
  fail(problem: string, mend: string, path: Path, at: 'value' | 'key' = 'value'): never {
    const position = at === 'key' ? this.source.positionOfKey(path) : this.source.positionOf(path);
    throw new InputError(problem, mend, position);
  }

  warn(text: string, path: Path, offset = 0): void {
    this.warnings.push({ text, position: this.source.positionInString(path, offset) });
  }

  /** Reads the string at a path and gives the errors of the notation a place in the file. */
  expression<T>(text: string, path: Path, read: (text: string) => T): T {
    this.lookForChanges(path);
    return this.located(path, 'value', () => read(text));
  }

  /** The ASCII spelling of the name in a key or a value. */
  name(text: string, path: Path, at: 'value' | 'key'): string {
    return this.located(path, at, () => readName(text));
  }

  /** The exact number at a path, from its digits in the file and not from a float. */
  exact(value: string | number, path: Path): Rational {
    const text = typeof value === 'number' ? this.source.writtenAt(path) : value;
    try {
      return Rational.parse(text);
    } catch {
      return this.fail(
        `"${shortened(text)}" is not an exact number`,
        'write p, p/q or a decimal, e.g. 1/2',
        path,
      );
    }
  }

  private located<T>(path: Path, at: 'value' | 'key', read: () => T): T {
    try {
      return read();
    } catch (error) {
      if (!(error instanceof NotationError)) throw error;
      const { problem, mend, offset } = error;
      if (at === 'key') return this.fail(problem, mend, path, 'key');
      throw new InputError(problem, mend, this.source.positionInString(path, offset));
    }
  }

  /** What YAML may have changed in an expression before anybody reads it. */
  private lookForChanges(path: Path): void {
    const style = this.source.styleOf(path);
    const written = this.source.writtenAt(path);
    if (style === 'QUOTE_DOUBLE') {
      const swallowed = SWALLOWING.exec(written)?.[1];
      if (swallowed)
        this.fail(
          `"${swallowed}" in double quotes is an escape of YAML and no letter`,
          'put the string in single quotes',
          path,
        );
    }
    if (style !== 'PLAIN') return;
    const comment = this.source.commentBehind(path);
    if (comment !== '')
      this.warn(
        `this expression is not in quotes, and YAML takes "${shortened(comment)}" for a comment; put it in quotes`,
        path,
      );
    else if (/[#&]|: |\n/.test(written))
      this.warn(
        `this expression is not in quotes, and YAML has its own use for #, &, ": " and line breaks; put it in quotes`,
        path,
      );
  }
}

/** yes and no, which YAML 1.2 reads as strings, and true and false. */
export function isYes(value: boolean | 'yes' | 'no'): boolean {
  return value === true || value === 'yes';
}
