// `saltus schema`: the JSON Schema of case files, for editors and other programs.

import { caseJsonSchema } from '../model/schema.ts';
import { safeJson } from '../report/escape.ts';
import { EXIT } from './exitCodes.ts';
import { deliver } from './output.ts';

/** Prints the JSON Schema that case files are validated against. */
export async function schema(options: { readonly out?: string }): Promise<number> {
  deliver(safeJson(caseJsonSchema()), options.out);
  return EXIT.ok;
}
