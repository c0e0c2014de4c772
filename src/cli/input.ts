// Reading case files: from a path, or from standard input for `-`.

import { closeSync, openSync, readSync } from 'node:fs';
import { LARGEST_FILE } from '../model/limits.ts';
import { InputError } from '../notation/source.ts';

const REASONS: Readonly<Record<string, readonly [problem: string, mend: string]>> = {
  ENOENT: ['there is no such file', 'give the path of a case file, or - to read standard input'],
  ENOTDIR: ['there is no such file', 'give the path of a case file, or - to read standard input'],
  EISDIR: ['this is a directory', 'give the case file inside it'],
  EACCES: ['the file may not be read', 'change its permissions, or give another file'],
  EPERM: ['the file may not be read', 'change its permissions, or give another file'],
  ELOOP: ['the file is a link that leads in a circle', 'give the path of a case file'],
  ENAMETOOLONG: ['the name is too long for a file', 'give the path of a case file'],
};

function sleep(milliseconds: number): void {
  Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, milliseconds);
}

/** Bytes read into `into` from `offset`; 0 at the end. Waits where standard input is not ready yet. */
function readSome(descriptor: number, into: Uint8Array, offset: number): number {
  for (;;) {
    try {
      return readSync(descriptor, into, offset, into.length - offset, null);
    } catch (error) {
      const code = (error as NodeJS.ErrnoException).code;
      if (code === 'EOF') return 0;
      if (code !== 'EAGAIN') throw error;
      sleep(10);
    }
  }
}

function readBounded(descriptor: number, file: string): Uint8Array {
  const buffer = new Uint8Array(LARGEST_FILE + 1);
  let length = 0;
  for (;;) {
    const read = readSome(descriptor, buffer, length);
    if (read === 0) return buffer.slice(0, length);
    length += read;
    // This also ends the reading of a device or a pipe that never ends.
    if (length > LARGEST_FILE)
      throw new InputError(
        `the file has more than the ${LARGEST_FILE} bytes that are read`,
        'split it into several cases',
        { file, line: 1, column: 1 },
      );
  }
}

/** The bytes of a case file, or of standard input for `-`.
 *  Throws InputError at line 1, column 1 when it cannot be read or is larger than LARGEST_FILE. */
export function readInput(file: string): Uint8Array {
  let descriptor: number | undefined;
  try {
    descriptor = file === '-' ? 0 : openSync(file, 'r');
    return readBounded(descriptor, file);
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    if (code === undefined) throw error;
    const [problem, mend] = REASONS[code] ?? [
      `the file cannot be read (${code})`,
      'give the path of a case file',
    ];
    throw new InputError(problem, mend, { file, line: 1, column: 1 });
  } finally {
    if (descriptor !== undefined && descriptor !== 0) closeSync(descriptor);
  }
}
