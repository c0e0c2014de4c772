// Bytes to text: size, encoding and control characters, before any parser sees the input.

import { InputError, type SourcePosition } from '../notation/source.ts';
import { LARGEST_FILE } from './limits.ts';

/** Where the lines of a text start. */
export class Lines {
  private readonly starts: readonly number[];

  constructor(
    text: string,
    private readonly file: string,
  ) {
    const starts = [0];
    for (let at = text.indexOf('\n'); at >= 0; at = text.indexOf('\n', at + 1)) starts.push(at + 1);
    this.starts = starts;
  }

  /** One-based line and column (in UTF-16 units) of an offset in the text. */
  position(offset: number): SourcePosition {
    let [low, high] = [0, this.starts.length];
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (this.starts[middle]! <= offset) low = middle;
      else high = middle;
    }
    return { file: this.file, line: low + 1, column: offset - this.starts[low]! + 1 };
  }
}

/** The text of a file. Throws InputError for a file that is too large, no UTF-8, or holds control characters. */
export function decodeText(input: string | Uint8Array, file: string): string {
  const size = typeof input === 'string' ? Buffer.byteLength(input) : input.byteLength;
  if (size > LARGEST_FILE)
    throw new InputError(
      `the file has ${size} bytes, more than the ${LARGEST_FILE} that are read`,
      'leave out what is not part of the case, or split it into several cases',
      { file, line: 1, column: 1 },
    );
  const text = (typeof input === 'string' ? input : decodeBytes(input, file)).replace(/^\ufeff/, '');
  refuseControlCharacters(text, file);
  return text;
}

function decodeBytes(bytes: Uint8Array, file: string): string {
  if ((bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff))
    throw new InputError('the file is UTF-16 text', 'save it as UTF-8', { file, line: 1, column: 1 });
  const valid = decodedStart(bytes, bytes.length);
  if (valid !== undefined) return valid;
  // The longest start that is UTF-8, perhaps with an unfinished character at its end.
  let [good, bad] = [0, bytes.length];
  while (bad - good > 1) {
    const middle = (good + bad) >> 1;
    if (decodedStart(bytes, middle, true) === undefined) bad = middle;
    else good = middle;
  }
  const before = decodedStart(bytes, good, true) ?? '';
  throw new InputError(
    'the file is not UTF-8 text',
    'save it as plain UTF-8 text',
    new Lines(before, file).position(before.length),
  );
}

function decodedStart(bytes: Uint8Array, length: number, unfinished = false): string | undefined {
  try {
    const decoder = new TextDecoder('utf-8', { fatal: true });
    return decoder.decode(bytes.subarray(0, length), { stream: unfinished });
  } catch {
    return undefined;
  }
}

function refuseControlCharacters(text: string, file: string): void {
  const control =
    // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is looked for
    /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f-\u0084\u0086-\u009f\ufeff\ufffe\uffff]|\r(?!\n)|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/.exec(
      text,
    );
  if (!control) return;
  const code = control[0].charCodeAt(0).toString(16).toUpperCase().padStart(4, '0');
  throw new InputError(
    `the file holds the character U+${code}, which no text needs`,
    'remove it; a case is plain text with ordinary line ends',
    new Lines(text, file).position(control.index),
  );
}
