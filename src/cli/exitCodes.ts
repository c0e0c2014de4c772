// Exit codes and the one place where an error becomes a message on standard error.

import { InputError, LimitError } from '../notation/source.ts';
import { visible, visibleLines } from '../report/escape.ts';

/** What the shell is told. */
export const EXIT = {
  /** Every claim holds, or nothing is claimed; undecided claims are printed as such but do not fail a run. */
  ok: 0,
  /** A claim fails, the proposal does not match, or a fault was found. */
  failed: 1,
  /** The input or the command line is wrong. */
  input: 2,
  /** A stated limit was hit. */
  limit: 3,
  /** A bug in saltus. */
  bug: 70,
} as const;

const SEVERITY = [EXIT.ok, EXIT.failed, EXIT.limit, EXIT.input, EXIT.bug] as readonly number[];

/** The code of a run over several cases: a bug over wrong input over a limit over a failure. */
export const worst = (codes: readonly number[]): number =>
  codes.reduce((x, y) => (SEVERITY.indexOf(y) > SEVERITY.indexOf(x) ? y : x), EXIT.ok as number);

/** A wrong command line (exit code 2): what is wrong and how to mend it. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}

/** The message for an error and its exit code. A stack trace appears only for a bug and with SALTUS_TRACE=1. */
export function explainError(error: unknown): { readonly code: number; readonly message: string } {
  if (error instanceof InputError) return { code: EXIT.input, message: visible(error.message) };
  if (error instanceof UsageError) return { code: EXIT.input, message: `saltus: ${visible(error.message)}` };
  if (error instanceof LimitError)
    return { code: EXIT.limit, message: `saltus: a stated limit was hit: ${visible(error.message)}` };
  const trace =
    process.env.SALTUS_TRACE === '1' && error instanceof Error ? `\n${visibleLines(error.stack ?? '')}` : '';
  const said = error instanceof Error ? `${error.name}: ${error.message}` : String(error);
  return {
    code: EXIT.bug,
    message:
      `saltus: this is a bug in saltus, not in your case (${visible(said)}). No verdict was reached. Please report it ` +
      `with the case file, the command and the output of the same command under SALTUS_TRACE=1.${trace}`,
  };
}

/** Runs some work; an error is printed to standard error. Returns the exit code. */
export async function guarded(work: () => Promise<number>): Promise<number> {
  try {
    return await work();
  } catch (error) {
    const { code, message } = explainError(error);
    process.stderr.write(`${message}\n`);
    return code;
  }
}
