// The shape of a rule file.

import * as z from 'zod';

const identifier = z
  .string()
  .regex(/^[a-z0-9][a-z0-9-]*$/, 'an identifier of a-z, 0-9 and -')
  .max(100);
const words = z.string().min(1).max(2000);

export const ruleSchema = z.strictObject({
  rule: identifier,
  level: z.enum(['fault', 'caution', 'note']),
  'for-each': z.string(),
  when: words,
  says: words,
  why: words,
  mend: words,
  source: words,
  examples: z.strictObject({ fires: z.array(z.string()), silent: z.array(z.string()) }),
});
