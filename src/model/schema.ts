// The shape of a case file, once: the validator, the types and the published JSON Schema all come from here. What the strings
// mean is decided afterwards (caseFile.ts).

import * as z from 'zod';
import { HIGHEST_ORDER, MOST_CLAIMS, MOST_FIELD_FACTORS, MOST_TERMS } from './limits.ts';

const identifier = z
  .string()
  .regex(/^[a-z0-9][a-z0-9-]*$/, 'an identifier of a-z, 0-9 and -')
  .max(10_000);
const expression = z
  .string()
  .min(1)
  .describe('an expression in the notation of fields, operators and parameters');
const yesNo = z.union([z.boolean(), z.enum(['yes', 'no'])]);
const exactNumber = z.union([z.number(), z.string()]).describe('an exact number: p, p/q or a decimal');
const status = z.enum(['survives', 'continuum-only', 'lattice-only', 'absent']);

const parameters = z.record(
  z.string(),
  z.union([z.strictObject({ positive: z.boolean().optional() }), z.null()]),
);

const axis = z.strictObject({
  spacing: z.string().describe('symbol of the lattice spacing; axes may share one'),
  role: z.enum(['space', 'time']).optional(),
});

const field = z.strictObject({
  values: z.string().describe('angle (period 2 pi), real, integer, or residue N'),
  at: z.array(exactNumber).optional().describe('offset inside the cell, one entry per axis'),
});

/** Keys of which a claim has exactly one: its statement. */
export const STATEMENTS = [
  'shift',
  'winding',
  'rotation',
  'boost',
  'dilatation',
  'point-group',
  'configuration',
  'duality',
  'corrections',
  'count',
] as const;

const claim = z.strictObject({
  id: z.string().min(1).max(10_000),
  shift: expression.optional(),
  winding: z.string().optional(),
  rotation: z.array(z.string()).length(2).optional(),
  boost: z.array(z.string()).length(2).optional(),
  dilatation: z.record(z.string(), exactNumber).optional(),
  'point-group': z
    .strictObject({ order: z.int().positive().optional(), name: z.string().optional() })
    .optional(),
  configuration: expression.optional(),
  duality: z.record(z.string(), expression).optional(),
  corrections: z
    .strictObject({ begin: z.union([z.int().positive(), z.record(z.string(), z.int().positive())]) })
    .optional(),
  count: expression.optional(),
  field: z.string().optional(),
  status: status.optional(),
  suppressed: z.strictObject({ continuum: yesNo.optional(), lattice: yesNo.optional() }).optional(),
  exponent: z.strictObject({ a: exactNumber, l: exactNumber }).optional(),
  truncates: yesNo.optional(),
  group: z.string().optional(),
});

const term = z.strictObject({ name: z.string().min(1).max(10_000), term: expression });

export const caseSchema = z
  .strictObject({
    case: identifier,
    title: z.string().max(100_000).optional(),
    lattice: z.strictObject({
      axes: z.record(z.string(), axis),
      vectors: z.record(z.string(), z.array(exactNumber)).optional(),
    }),
    fields: z.record(z.string(), field),
    parameters: parameters.optional(),
    parent: z.strictObject({
      action: z.array(term).min(1).max(MOST_TERMS).optional(),
      hamiltonian: z.array(term).min(1).max(MOST_TERMS).optional(),
      compactness: z.enum(['cosine', 'villain', 'villain-flat']).optional(),
    }),
    proposal: z
      .strictObject({
        parameters: parameters.optional(),
        lagrangian: expression,
        matching: z.record(z.string(), expression).optional(),
        rescaling: z.record(z.string(), expression).optional(),
      })
      .optional(),
    limits: z.array(z.string()).optional().describe('the spacings in the order in which they go to zero'),
    expand: z
      .strictObject({
        'beyond-leading': z.int().min(0).max(HIGHEST_ORDER).optional(),
        fields: z.int().min(1).max(MOST_FIELD_FACTORS).optional(),
        background: z.record(z.string(), exactNumber).optional(),
      })
      .optional(),
    claims: z.array(claim).max(MOST_CLAIMS).optional(),
  })
  .meta({
    title: 'Saltus case',
    description: 'A lattice action, a proposed continuum action and claims about them.',
  });

export type CaseData = z.infer<typeof caseSchema>;
export type ClaimData = NonNullable<CaseData['claims']>[number];

/** The published JSON Schema of case files. */
export function caseJsonSchema(): object {
  return z.toJSONSchema(caseSchema);
}
