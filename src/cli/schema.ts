import { constraintSheetSchema, functionalSheetSchema } from '../definition/json-schema.ts';
import { findingsJsonSchema } from '../finding/finding.ts';
import { jsonText } from '../report/json.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

export const schemaNames = ['sheet', 'constraint', 'findings'] as const;

const schemas: Record<(typeof schemaNames)[number], () => object> = {
  sheet: functionalSheetSchema,
  constraint: constraintSheetSchema,
  findings: findingsJsonSchema,
};

/** `rungcheck schema`: a JSON Schema (draft 2020-12). */
export function schemaCommand(name: (typeof schemaNames)[number], terminal: Terminal): number {
  terminal.writeOut(jsonText(schemas[name]()));
  return exitStatus.fine;
}
