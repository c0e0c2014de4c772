// Where results go: standard output, or a file that is replaced in one step.

import { randomBytes } from 'node:crypto';
import { closeSync, openSync, realpathSync, renameSync, rmSync, statSync, writeSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { UsageError } from './exitCodes.ts';

const REASONS: Readonly<Record<string, string>> = {
  ENOENT: 'the folder does not exist; make it first',
  ENOTDIR: 'a part of the path is no folder',
  EISDIR: 'it is a folder; give a file name inside it',
  EACCES: 'writing there is not permitted',
  EPERM: 'writing there is not permitted',
  EROFS: 'the file system is read-only',
  ENOSPC: 'the disk is full; the old file, if there was one, is untouched',
};

/** The file that a link points at, so that replacing it does not replace the link. */
function target(path: string): string {
  try {
    return realpathSync(path);
  } catch {
    return path;
  }
}

function isSpecial(path: string): boolean {
  const stat = statSync(path, { throwIfNoEntry: false });
  if (stat?.isDirectory()) throw Object.assign(new Error('directory'), { code: 'EISDIR' });
  return stat !== undefined && !stat.isFile();
}

function writeWhole(path: string, text: string): void {
  const bytes = Buffer.from(text, 'utf8');
  const descriptor = openSync(path, 'w');
  try {
    for (let at = 0; at < bytes.length; ) at += writeSync(descriptor, bytes, at);
  } finally {
    closeSync(descriptor);
  }
}

/** Writes to a temporary file beside the target and renames it, so that a reader sees the old file or the new one, whole.
 *  Throws UsageError with the reason when the path cannot be written. */
export function writeFileAtomically(file: string, text: string): void {
  try {
    const path = target(file);
    // A device such as /dev/stdout cannot be renamed over.
    if (isSpecial(path)) {
      writeWhole(path, text);
      return;
    }
    const temporary = join(dirname(path), `.${basename(path)}.${randomBytes(6).toString('hex')}`);
    try {
      writeWhole(temporary, text);
      renameSync(temporary, path);
    } catch (error) {
      rmSync(temporary, { force: true });
      throw error;
    }
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    if (code === undefined) throw error;
    throw new UsageError(`cannot write ${file}: ${REASONS[code] ?? code}`);
  }
}

/** Prints to standard output, or into the file given with --out. */
export function deliver(text: string, out: string | undefined): void {
  if (out === undefined) process.stdout.write(text);
  else writeFileAtomically(out, text);
}

/** True when colours may be used on standard output: a terminal, no NO_COLOR, no --no-colour, no --out. */
export function mayColour(options: { readonly colour: boolean; readonly out?: string | undefined }): boolean {
  const { NO_COLOR, TERM } = process.env;
  return (
    options.colour &&
    options.out === undefined &&
    process.stdout.isTTY === true &&
    !NO_COLOR &&
    TERM !== 'dumb'
  );
}
