import { z } from 'zod';
import { constraintSheet } from './constraint-sheet.ts';
import { functionalSheet } from './functional-sheet.ts';
import { projectSheet } from './project-sheet.ts';

/** A JSON Schema (draft 2020-12), for editors: completion, help and early errors in a functional sheet. */
export function functionalSheetSchema(): Readonly<Record<string, unknown>> {
  return z.toJSONSchema(functionalSheet);
}

/** A JSON Schema (draft 2020-12), for editors: completion, help and early errors in a constraint sheet. */
export function constraintSheetSchema(): Readonly<Record<string, unknown>> {
  return z.toJSONSchema(constraintSheet);
}

/** A JSON Schema (draft 2020-12), for editors: completion, help and early errors in a project file. */
export function projectFileSchema(): Readonly<Record<string, unknown>> {
  return z.toJSONSchema(projectSheet);
}
