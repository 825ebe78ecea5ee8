import { z } from 'zod';

/** Everything that a second evaluation needs to check a proof again. */
export const certificateSchema = z.strictObject({
  format: z.literal('rungcheck certificate'),
  formatVersion: z.literal(1),
  engineVersion: z.string(),
  functional: z.string(),
  functionalHash: z.string().describe('SHA-256 of the sheet and of all that it uses'),
  constraint: z.string(),
  constraintHash: z.string().describe('SHA-256 of the condition sheet and of all that it uses'),
  statement: z.string().describe('the requirement that is proved'),
  tolerance: z.number().describe('the margin is at least minus this'),
  constants: z.record(z.string(), z.string()),
  parameters: z.record(z.string(), z.string()),
  domain: z.array(
    z.strictObject({
      name: z.string(),
      lower: z.number().nullable().describe('null for minus infinity'),
      upper: z.number().nullable().describe('null for infinity'),
    }),
  ),
  rewrites: z.array(z.string()),
  variables: z.array(
    z.strictObject({
      name: z.string(),
      lower: z.number().nullable(),
      upper: z.number().nullable(),
      scale: z.enum(['linear', 'logarithmic']),
      divisions: z.array(z.number()),
    }),
  ),
  boxes: z.int(),
  deepest: z.int(),
  tree: z
    .string()
    .describe(
      'one letter a box, level by level: a dot where it is proved, else the variable along which it is divided',
    ),
  digest: z.string().describe('SHA-256 of all the rest'),
});
export type Certificate = z.infer<typeof certificateSchema>;
