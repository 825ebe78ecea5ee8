import { constraintSheetSchema, functionalSheetSchema, projectFileSchema } from '../definition/json-schema.ts';
import { findingsJsonSchema } from '../finding/finding.ts';
import { stateJsonSchema } from '../finding/state.ts';
import { jsonText } from '../report/json.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

export const schemaNames = ['sheet', 'constraint', 'project', 'findings', 'state'] as const;

const schemas: Record<(typeof schemaNames)[number], () => object> = {
  sheet: functionalSheetSchema,
  constraint: constraintSheetSchema,
  project: projectFileSchema,
  findings: findingsJsonSchema,
  state: stateJsonSchema,
};

/** `rungcheck schema`: a JSON Schema (draft 2020-12). */
export function schemaCommand(name: (typeof schemaNames)[number], terminal: Terminal): number {
  terminal.writeOut(jsonText(schemas[name]()));
  return exitStatus.fine;
}
