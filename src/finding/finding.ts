import { z } from 'zod';

/** One of a closed set, never a boolean. */
export const verdictSchema = z.enum(['proved', 'holds', 'violated', 'undecided', 'not-applicable']);
export type Verdict = z.infer<typeof verdictSchema>;

/** What a finding means for the exit status: only `fail` fails. */
export const gateSchema = z.enum(['fail', 'warn', 'note', 'score', 'accepted', 'pass']);
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
      scale: z.enum(['linear', 'logarithmic', 'toward-upper', 'compact', 'listed']),
      values: z.array(z.number()).optional().describe('all values, where the condition is asked at listed points'),
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

/** What was looked at to find a limit, an order of growth or a coefficient that is not pointwise. */
export const sequenceSchema = z.strictObject({
  quantity: z.string().describe('as the requirement writes it'),
  kind: z.enum(['limit', 'order', 'logOrder', 'coefficient']),
  along: z.string().describe('the variable that moves, or that is expanded in'),
  toward: z.string().describe('inf or a number; of a coefficient its order'),
  at: z.record(z.string(), z.number()).describe('the other coordinates'),
  terms: z.array(z.strictObject({ x: z.string(), value: z.string() })),
  value: z.string().nullable().describe('extrapolated; null where it could not be told'),
  error: z.string().nullable().describe('estimate, from the two sequences'),
  second: z.string().nullable().describe('what a second sequence gives'),
  closedForm: z.string().nullable().describe('in the parameters of the sheet, where it agrees with the value'),
  note: z.string(),
});
export type SequenceRecord = z.infer<typeof sequenceSchema>;

/** What branch and bound with interval arithmetic could decide. */
export const proofSchema = z.strictObject({
  boxes: z.int().describe('boxes looked at'),
  deepest: z.int().describe('halvings that led to the smallest box'),
  stop: z
    .enum(['decided', 'budget', 'resolution', 'interrupted', 'not-provable'])
    .describe(
      'why it ended: all decided, the budget of boxes spent, boxes too small to divide, interrupted by the user, or no claim about boxes',
    ),
  provedShare: z.number().describe('share of the domain on which it is proved to hold'),
  violatedShare: z.number().describe('share on which it is proved to be violated'),
  undecidedShare: z.number(),
  undecidedWords: z.string().describe('where the undecided boxes lie; empty when there are none'),
  violatedWords: z.string().describe('where the boxes proved to violate lie'),
  certifiedAtWitness: z
    .boolean()
    .describe('of a violation: an interval evaluation at the witness lies wholly below minus the tolerance'),
  rewrites: z.array(z.string()).describe('exact rewrites of the formula that were used'),
  reason: z.string(),
});
export type ProofRecord = z.infer<typeof proofSchema>;

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
  cause: z
    .strictObject({
      kind: z.enum(['formula', 'printed-digits']),
      text: z.string(),
      parameter: z.strictObject({ sheet: z.string(), name: z.string() }).optional().describe('the one to blame most'),
    })
    .nullable(),
  tolerance: z.number(),
  relative: z.boolean(),
  points: z.int(),
  withoutValue: z.int(),
  domain: domainSchema,
  constants: z.record(z.string(), z.number()),
  neighbourhood: z
    .array(
      z.strictObject({
        coordinate: z.string(),
        values: z.array(z.strictObject({ at: z.number(), margin: z.number().nullable() })),
      }),
    )
    .optional()
    .describe('the margin along each coordinate through the witness, where it was asked for'),
  asked: z
    .array(z.strictObject({ at: z.record(z.string(), z.number()), margin: z.number().nullable() }))
    .optional()
    .describe('of a condition asked at points: the margin at each, where it was asked for'),
  sequences: z
    .array(sequenceSchema)
    .optional()
    .describe('of a condition asked at points: how it was found at the worst one'),
  proof: proofSchema.optional().describe('where a proof was asked for'),
  rule: z.literal(true).optional().describe('decided by a rule of numerical quality; reason tells what was found'),
  reason: z.string(),
});
export type Finding = z.infer<typeof findingSchema>;

const lineSchema = z.strictObject({ line: z.int(), column: z.int() });

/** Where a sheet and what matters in it stands, for reports that point into files. */
export const sheetPlacesSchema = z.strictObject({
  file: z.string().describe('from the current folder'),
  catalogue: z.boolean().describe('of the catalogue: no file of the user'),
  parts: z.partialRecord(partSchema, lineSchema),
  parameters: z.record(z.string(), lineSchema),
});
export type SheetPlaces = z.infer<typeof sheetPlacesSchema>;

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
  places: sheetPlacesSchema.optional(),
});
export type FunctionalFindings = z.infer<typeof functionalFindingsSchema>;

/** Something to be told that is no finding: an acceptance of the project file that does not fit, or is due for review. */
export const remarkSchema = z.strictObject({
  kind: z.enum(['acceptance-unused', 'acceptance-exceeded', 'review-due']),
  constraint: z.string(),
  functional: z.string(),
  text: z.string(),
  file: z.string(),
  line: z.int(),
  column: z.int(),
});
export type Remark = z.infer<typeof remarkSchema>;

/** A sheet that could not be vetted; the others were. */
export const faultSchema = z.strictObject({
  sheet: z.string().describe('as it was named'),
  internal: z.boolean().describe('a fault of rungcheck itself'),
  problems: z.array(
    z.strictObject({
      code: z.string(),
      message: z.string(),
      remedy: z.string(),
      file: z.string().optional(),
      line: z.int().optional(),
      column: z.int().optional(),
    }),
  ),
});
export type Fault = z.infer<typeof faultSchema>;

export const findingsSchema = z.strictObject({
  format: z.literal('rungcheck findings'),
  formatVersion: z.literal(1),
  engineVersion: z.string(),
  catalogueVersion: z.string(),
  functionals: z.array(functionalFindingsSchema),
  remarks: z.array(remarkSchema).optional(),
  faults: z.array(faultSchema).optional(),
  shard: z
    .strictObject({
      index: z.int(),
      count: z.int(),
      sheets: z.array(z.string()).describe('all sheets of the run, in its order'),
    })
    .optional()
    .describe('only with --shard: these are the sheets number index, index + count, …'),
});
export type Findings = z.infer<typeof findingsSchema>;

/** The JSON Schema of the findings file. */
export function findingsJsonSchema(): object {
  return z.toJSONSchema(findingsSchema);
}
