import { z } from 'zod';

/** One of a closed set, never a boolean. */
export const verdictSchema = z.enum(['proved', 'holds', 'violated', 'undecided', 'not-applicable']);
export type Verdict = z.infer<typeof verdictSchema>;

/** What a finding means for the exit status: only `fail` fails. */
export const gateSchema = z.enum(['fail', 'warn', 'note', 'score', 'pass']);
export type Gate = z.infer<typeof gateSchema>;

export const forceSchema = z.enum(['necessary-and-sufficient', 'sufficient', 'definition']);
export const statusSchema = z.enum(['theorem', 'conjecture', 'estimate', 'norm', 'rule']);
export const partSchema = z.enum(['exchange', 'correlation', 'exchange-correlation']);

/** A point of the uniform-polarisation slice; for a condition on the general spin space with its own coordinates too. */
export const witnessSchema = z.strictObject({
  rs: z.number(),
  zeta: z.number(),
  s: z.number(),
  alpha: z.number(),
  q: z.number().optional(),
  s_up: z.number().optional(),
  s_dn: z.number().optional(),
  cosine: z.number().optional(),
  alpha_up: z.number().optional(),
  alpha_dn: z.number().optional(),
});
export type Witness = z.infer<typeof witnessSchema>;

export const domainSchema = z.strictObject({
  name: z.enum(['standard', 'wide', 'custom']),
  space: z.enum(['slice', 'spin']),
  coordinates: z.array(
    z.strictObject({
      name: z.string(),
      lower: z.number(),
      upper: z.number().nullable().describe('null for infinity'),
      points: z.int().describe('grid values on this axis; 0 where points are sampled'),
      scale: z.enum(['linear', 'logarithmic', 'toward-upper', 'compact']),
    }),
  ),
  fixed: z.record(z.string(), z.number()),
});
export type DomainRecord = z.infer<typeof domainSchema>;

export const regionSchema = z.strictObject({
  share: z.number().describe('share of the domain'),
  bounds: z.array(z.strictObject({ coordinate: z.string(), lower: z.number(), upper: z.number(), whole: z.boolean() })),
  words: z.string(),
});
export type RegionRecord = z.infer<typeof regionSchema>;

export const findingSchema = z.strictObject({
  constraint: z.string(),
  title: z.string(),
  part: partSchema,
  force: forceSchema,
  status: statusSchema,
  verdict: verdictSchema,
  gate: gateSchema,
  gateReason: z.string(),
  requirement: z.string().describe('the local form'),
  margin: z.number().nullable().describe('signed, in the units of the condition; negative where violated'),
  confirmed: z.string().nullable().describe('the margin at the witness in high precision'),
  confirmedDigits: z.int().describe('digits of it that are sure; 0 when not confirmed'),
  witness: witnessSchema.nullable(),
  irrelevant: z.array(z.string()).describe('coordinates that the condition does not depend on here'),
  violatedShare: z.number().nullable(),
  regions: z.array(regionSchema),
  moreRegions: z.int(),
  through: z.array(
    z.strictObject({
      coordinate: z.string(),
      lower: z.number(),
      upper: z.number(),
      lowerIsEdge: z.boolean(),
      upperIsEdge: z.boolean(),
    }),
  ),
  cause: z.strictObject({ kind: z.enum(['formula', 'printed-digits']), text: z.string() }).nullable(),
  tolerance: z.number(),
  relative: z.boolean(),
  points: z.int(),
  withoutValue: z.int(),
  domain: domainSchema,
  constants: z.record(z.string(), z.number()),
  reason: z.string(),
});
export type Finding = z.infer<typeof findingSchema>;

export const functionalFindingsSchema = z.strictObject({
  id: z.string(),
  name: z.string(),
  rung: z.string(),
  exactExchange: z
    .strictObject({ shortRange: z.number(), longRange: z.number(), omega: z.number().nullable() })
    .nullable(),
  nonLocal: z.string().nullable(),
  parameters: z.record(z.string(), z.string()).describe('trial values given for this run'),
  sheetHash: z.string().describe('SHA-256 of the sheet'),
  domain: domainSchema,
  findings: z.array(findingSchema),
});
export type FunctionalFindings = z.infer<typeof functionalFindingsSchema>;

export const findingsSchema = z.strictObject({
  format: z.literal('rungcheck findings'),
  formatVersion: z.literal(1),
  engineVersion: z.string(),
  catalogueVersion: z.string(),
  functionals: z.array(functionalFindingsSchema),
});
export type Findings = z.infer<typeof findingsSchema>;

/** The JSON Schema of the findings file. */
export function findingsJsonSchema(): object {
  return z.toJSONSchema(findingsSchema);
}
