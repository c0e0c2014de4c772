// `saltus new NAME`: a starter case that checks as it stands and is meant to be edited.

import { starterCase } from '../model/starter.ts';
import { EXIT, UsageError } from './exitCodes.ts';
import { deliver } from './output.ts';

/** Prints a starter case of that name. Throws UsageError for a name that is no case identifier. */
export async function newCase(name: string, options: { readonly out?: string }): Promise<number> {
  if (!/^[a-z0-9][a-z0-9-]*$/.test(name))
    throw new UsageError(`"${name}" is no name for a case — use a-z, 0-9 and -, e.g. sheet-of-rotors`);
  deliver(starterCase(name), options.out);
  return EXIT.ok;
}
