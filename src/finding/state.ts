import { z } from 'zod';
import { type Finding, type Findings, gateSchema, verdictSchema } from './finding.ts';

/** One finding as a state file keeps it. */
export const stateLineSchema = z.strictObject({
  functional: z.string(),
  constraint: z.string(),
  verdict: verdictSchema,
  gate: gateSchema,
  margin: z.number().nullable().describe('to nine digits, in the units of the condition; negative where violated'),
  share: z.number().nullable().describe('violated share of the domain, to four digits'),
  tolerance: z.number().describe('margins that differ by less are equal'),
});
export type StateLine = z.infer<typeof stateLineSchema>;

export const stateVersion = 1;

/** What was found at one time, small enough to keep in version control. */
export const stateSchema = z.strictObject({
  format: z.literal('rungcheck state'),
  formatVersion: z.literal(stateVersion),
  engineVersion: z.string(),
  catalogueVersion: z.string().describe('changes with the condition sheets'),
  domain: z.string(),
  constants: z.record(z.string(), z.number()),
  parameters: z.record(z.string(), z.string()).describe('trial values'),
  findings: z.array(stateLineSchema),
});
export type State = z.infer<typeof stateSchema>;

/** The JSON Schema of a state file. */
export function stateJsonSchema(): object {
  return z.toJSONSchema(stateSchema);
}

/** The state that findings amount to: sorted by functional and condition, numbers rounded. */
export function stateOf(findings: Findings): State {
  const { functionals, engineVersion, catalogueVersion } = findings;
  const all = functionals.flatMap((functional) => functional.findings);
  const lines = functionals.flatMap((functional) => functional.findings.map((found) => lineOf(functional.id, found)));
  return {
    format: 'rungcheck state',
    formatVersion: stateVersion,
    engineVersion,
    catalogueVersion,
    domain: functionals[0] === undefined ? '' : boundsText(functionals[0].domain.coordinates),
    constants: sortedByName(all.flatMap(({ constants }) => Object.entries(constants))),
    parameters: sortedByName(functionals.flatMap(({ parameters }) => Object.entries(parameters))),
    findings: lines.sort((a, b) => byText(a.functional, b.functional) || byText(a.constraint, b.constraint)),
  };
}

function lineOf(functional: string, finding: Finding): StateLine {
  const { constraint, verdict, gate, margin, violatedShare, tolerance } = finding;
  return {
    functional,
    constraint,
    verdict,
    gate,
    margin: margin === null ? null : rounded(margin, 9),
    share: violatedShare === null ? null : rounded(violatedShare, 4),
    tolerance,
  };
}

/** `rs=0.01:100,zeta=0:1`: the form of the --domain option. */
function boundsText(coordinates: readonly { name: string; lower: number; upper: number | null }[]): string {
  return coordinates.map(({ name, lower, upper }) => `${name}=${lower}:${upper ?? 'inf'}`).join(',');
}

function rounded(value: number, digits: number): number {
  return Number(value.toPrecision(digits));
}

function sortedByName<Value>(entries: readonly (readonly [string, Value])[]): Record<string, Value> {
  return Object.fromEntries([...entries].sort(([a], [b]) => byText(a, b)));
}

/** By code units: the same order on every machine. */
function byText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
