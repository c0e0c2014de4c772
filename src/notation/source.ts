// Where something was written, and the one error type for wrong input. A message has three parts: what is wrong, where,
// how to mend it.

/** One-based line and column in a named file (`-` for standard input). */
export interface SourcePosition {
  readonly file: string;
  readonly line: number;
  readonly column: number;
}

/** Wrong input (exit code 2). `mend` says what to write instead. */
export class InputError extends Error {
  override readonly name = 'InputError';
  constructor(
    readonly problem: string,
    readonly mend: string,
    readonly position: SourcePosition,
  ) {
    super(`${position.file}:${position.line}:${position.column}: ${problem} — ${mend}`);
  }
}

/** A stated limit was hit (exit code 3): which limit, and what would lift it. */
export class LimitError extends Error {
  override readonly name = 'LimitError';
}

/** Wrong notation inside one string; the caller that knows the file turns it into an InputError.
 *  `offset` is a UTF-16 offset in the string. */
export class NotationError extends Error {
  override readonly name = 'NotationError';
  constructor(
    readonly problem: string,
    readonly mend: string,
    readonly offset: number,
  ) {
    super(`${problem} — ${mend}`);
  }
}
