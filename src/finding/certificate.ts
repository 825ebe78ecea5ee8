import { z } from 'zod';

const boundSchemas = {
  lower: z.number().nullable().describe('null for minus infinity'),
  upper: z.number().nullable().describe('null for infinity'),
};

/** What is claimed, of which sheets. */
const claimShape = {
  functional: z.string(),
  functionalHash: z.string().describe('SHA-256 of the sheet and of all that it uses'),
  constraint: z.string(),
  constraintHash: z.string().describe('SHA-256 of the condition sheet and of all that it uses'),
  statement: z.string().describe('the requirement that is proved'),
  tolerance: z.number().describe('the margin is at least minus this'),
  constants: z.record(z.string(), z.string()),
  parameters: z.record(z.string(), z.string()),
  domain: z.array(z.strictObject({ name: z.string(), ...boundSchemas })),
  rewrites: z.array(z.string()),
  variables: z.array(
    z.strictObject({
      name: z.string(),
      ...boundSchemas,
      scale: z.enum(['linear', 'logarithmic']),
      divisions: z.array(z.number()),
    }),
  ),
};
const claimFieldsSchema = z.strictObject(claimShape);
export type ClaimFields = z.infer<typeof claimFieldsSchema>;

/** Everything that a second evaluation needs to check a proof again. */
export const certificateSchema = z.strictObject({
  format: z.literal('rungcheck certificate'),
  formatVersion: z.literal(1),
  engineVersion: z.string(),
  ...claimShape,
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

/** Everything that a later search needs to go on from where one has ended. */
export const searchStateSchema = z.strictObject({
  format: z.literal('rungcheck search'),
  formatVersion: z.literal(1),
  engineVersion: z.string(),
  ...claimShape,
  forms: z.string().describe('SHA-256 of the formulas whose enclosures were looked at'),
  judged: z
    .string()
    .describe(
      'one letter for each box that was judged, level by level: a dot where it is proved, an exclamation mark where it is violated, a question mark where it is too small to divide, else the variable along which it is divided',
    ),
  digest: z.string().describe('SHA-256 of all the rest'),
});
export type SearchState = z.infer<typeof searchStateSchema>;
