// The shape of a case file, once: the validator, the types and the published JSON Schema all come from here. What the strings
// mean is decided afterwards (caseFile.ts).

import * as z from 'zod';
import {
  HIGHEST_ORDER,
  LONGEST_NAME,
  LONGEST_TITLE,
  MOST_AXES,
  MOST_CLAIMS,
  MOST_FIELD_FACTORS,
  MOST_TERMS,
} from './limits.ts';

const identifier = z
  .string()
  .regex(/^[a-z0-9][a-z0-9-]*$/)
  .max(2 * LONGEST_NAME)
  .describe('an identifier of a-z, 0-9 and -');
const name = z.string().min(1).max(LONGEST_NAME);
const expression = (example: string) =>
  z
    .string()
    .min(1)
    .describe('a string in the notation of fields, operators and parameters')
    .meta({ examples: [example] });
const yesNo = z.union([z.boolean(), z.enum(['yes', 'no'])]).meta({ examples: ['yes', 'no'] });
const exactNumber = z
  .union([z.number(), z.string()])
  .describe('an exact number: p, p/q or a decimal')
  .meta({ examples: [1, '1/2'] });
const status = z
  .enum(['survives', 'continuum-only', 'lattice-only', 'absent'])
  .describe('on the lattice and in the continuum, in one of them, or in neither');

const parameters = z
  .record(z.string(), z.union([z.strictObject({ positive: yesNo.optional() }), z.null()]))
  .meta({ examples: [{ beta: { positive: true } }] });

const axis = z
  .strictObject({
    spacing: name.describe('symbol of the lattice spacing; axes may share one').meta({ examples: ['a'] }),
    role: z.enum(['space', 'time']).optional(),
  })
  .meta({ examples: [{ spacing: 'a' }] });

const field = z
  .strictObject({
    values: z
      .string()
      .regex(/^(angle|real|integer|residue [1-9][0-9]*)$/)
      .describe('angle (period 2 pi), real, integer, or residue N')
      .meta({ examples: ['angle', 'real'] }),
    at: z.array(exactNumber).optional().describe('offset inside the cell, one entry per axis'),
  })
  .meta({ examples: [{ values: 'angle' }] });

const term = z
  .strictObject({
    name: z
      .string()
      .min(1)
      .max(2 * LONGEST_NAME)
      .meta({ examples: ['plaquette'] }),
    term: expression('beta*(1 - cos(Delta_x Delta_y phi))'),
  })
  .meta({ examples: [{ name: 'x-link', term: 'beta*(1 - cos(Delta_x phi))' }] });

const id = identifier.meta({ examples: ['momentum'] });
const fieldName = name.optional().describe('the field that is meant, when there are several');
const profile = expression('f(x) + g(y)').describe('a function of the coordinates');
const twoAxes = z
  .array(name)
  .length(2)
  .meta({ examples: [['x', 'y']] });

/** One kind of claim for each statement. */
const claims = {
  shift: z.strictObject({ id, shift: profile, field: fieldName, status }),
  winding: z.strictObject({ id, winding: name.describe('a field').meta({ examples: ['phi'] }), status }),
  rotation: z.strictObject({ id, rotation: twoAxes, status }),
  boost: z.strictObject({ id, boost: twoAxes, status }),
  dilatation: z.strictObject({
    id,
    dilatation: z
      .record(z.string(), exactNumber)
      .describe('weight of each axis')
      .meta({ examples: [{ tau: 2, x: 1, y: 1 }] }),
    status,
  }),
  'point-group': z.strictObject({
    id,
    'point-group': z
      .strictObject({ order: z.int().positive().optional(), name: name.optional() })
      .describe('order or name of the space part of the lattice point group')
      .meta({ examples: [{ order: 8 }] }),
    status,
  }),
  configuration: z.strictObject({
    id,
    configuration: profile,
    field: fieldName,
    suppressed: z
      .strictObject({ continuum: yesNo.optional(), lattice: yesNo.optional() })
      .optional()
      .describe('whether the action of the family diverges as the spacing goes to zero')
      .meta({ examples: [{ continuum: 'no', lattice: 'no' }] }),
    exponent: z
      .strictObject({ a: exactNumber, l: exactNumber })
      .optional()
      .describe('powers of the spacing and of the size in the lattice action')
      .meta({ examples: [{ a: -1, l: 1 }] }),
    truncates: yesNo.optional().describe('whether the series in the spacing truncates on the family'),
  }),
  duality: z.strictObject({
    id,
    duality: z
      .record(z.string(), expression('1/(4*pi^2*mu)'))
      .describe('dual value of each parameter of the proposal')
      .meta({ examples: [{ mu: '1/(4*pi^2*mu)' }] }),
    status,
  }),
  corrections: z.strictObject({
    id,
    corrections: z
      .strictObject({ begin: z.union([z.int().positive(), z.record(z.string(), z.int().positive())]) })
      .describe('lowest order beyond the leading one that does not vanish, in all space spacings or in each')
      .meta({ examples: [{ begin: 2 }] }),
  }),
  count: z.strictObject({
    id,
    count: expression('Lx + Ly - 1').describe('a formula in the sizes of a periodic lattice'),
    group: z
      .string()
      .regex(/^(U\(1\)|Z|Z_[1-9][0-9]*)$/)
      .describe('the factor that is counted')
      .meta({ examples: ['U(1)', 'Z_2'] }),
  }),
} as const;

/** Keys of which a claim has exactly one: its statement. In the order of the alternatives of the schema. */
export const STATEMENTS = Object.keys(claims) as readonly (keyof typeof claims)[];

const claim = z.union([
  claims.shift,
  claims.winding,
  claims.rotation,
  claims.boost,
  claims.dilatation,
  claims['point-group'],
  claims.configuration,
  claims.duality,
  claims.corrections,
  claims.count,
]);

export const caseSchema = z
  .strictObject({
    case: identifier.meta({ examples: ['ring-exchange-sheet'] }),
    title: z
      .string()
      .max(LONGEST_TITLE)
      .optional()
      .meta({ examples: ['Ring exchange on a square sheet of rotors'] }),
    lattice: z
      .strictObject({
        axes: z
          .record(z.string(), axis)
          .describe(`1 to ${MOST_AXES} axes; their order fixes the order of coordinates`)
          .meta({ examples: [{ tau: { spacing: 'b', role: 'time' }, x: { spacing: 'a' } }] }),
        vectors: z.record(z.string(), z.array(exactNumber)).optional(),
      })
      .meta({ examples: [{ axes: { x: { spacing: 'a' } } }] }),
    fields: z.record(z.string(), field).meta({ examples: [{ phi: { values: 'angle' } }] }),
    parameters: parameters.optional(),
    parent: z
      .strictObject({
        action: z
          .array(term)
          .min(1)
          .max(MOST_TERMS)
          .optional()
          .describe('terms that are summed over the cells of the lattice'),
        hamiltonian: z.union([expression('J/2 pi_phi^2'), z.array(term)]).optional(),
        compactness: z.enum(['cosine', 'villain', 'villain-flat']).optional(),
      })
      .meta({ examples: [{ action: [{ name: 'x-link', term: 'beta*(1 - cos(Delta_x phi))' }] }] }),
    proposal: z
      .strictObject({
        parameters: parameters.optional(),
        lagrangian: expression('mu0/2 (d_tau phi)^2 + mu/2 (d_x phi)^2'),
        matching: z
          .record(z.string(), expression('beta*a^2/b'))
          .optional()
          .describe('parameters of the proposal in those of the parent; solved when absent')
          .meta({ examples: [{ mu: 'beta*a^2/b' }] }),
        rescaling: z
          .record(z.string(), expression('1/sqrt(a)'))
          .optional()
          .describe('factors Z of declared rescalings phi -> Z phi')
          .meta({ examples: [{ phi: '1/sqrt(a)' }] }),
      })
      .optional()
      .meta({ examples: [{ lagrangian: 'mu/2 (d_x phi)^2', parameters: { mu: { positive: true } } }] }),
    limits: z
      .array(name)
      .optional()
      .describe('the spacings in the order in which they go to zero; by default that of time first')
      .meta({ examples: [['b', 'a']] }),
    expand: z
      .strictObject({
        'beyond-leading': z
          .int()
          .min(0)
          .max(HIGHEST_ORDER)
          .optional()
          .describe('orders beyond the leading one'),
        fields: z
          .int()
          .min(1)
          .max(MOST_FIELD_FACTORS)
          .optional()
          .describe('most field factors of a monomial'),
        background: z
          .record(z.string(), exactNumber)
          .optional()
          .describe('constant values of the fields to expand about; by default 0')
          .meta({ examples: [{ phi: 0 }] }),
      })
      .optional()
      .meta({ examples: [{ 'beyond-leading': 4 }] }),
    claims: z
      .array(claim)
      .max(MOST_CLAIMS)
      .optional()
      .meta({ examples: [[{ id: 'momentum', shift: 'f(x) + g(y)', status: 'survives' }]] }),
  })
  .meta({
    title: 'Saltus case',
    description: 'A lattice action, a proposed continuum action and claims about them.',
  });

export type CaseData = z.infer<typeof caseSchema>;
export type ClaimData = NonNullable<CaseData['claims']>[number];

/** The published JSON Schema of case files. */
export function caseJsonSchema(): object {
  return z.toJSONSchema(caseSchema, { io: 'input' });
}
