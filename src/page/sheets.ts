import type { FunctionalDefinition } from '../definition/functional.ts';
import type { Functional } from '../functional/functional.ts';

/** The sheets of functionals and of all that they use, each once, those named first. */
export function linkedSheets(functionals: readonly Functional[]): Functional[] {
  const found = new Map<string, Functional>();
  const visit = (functional: Functional): void => {
    const key = `${functional.definition.file} ${functional.definition.id}`;
    if (found.has(key)) return;
    found.set(key, functional);
    for (const { functional: used } of functional.imports.values()) visit(used);
  };
  for (const functional of functionals)
    found.set(`${functional.definition.file} ${functional.definition.id}`, functional);
  for (const functional of functionals) for (const { functional: used } of functional.imports.values()) visit(used);
  return [...found.values()];
}

export function sheetsOf(functionals: readonly Functional[]): FunctionalDefinition[] {
  return linkedSheets(functionals).map(({ definition }) => definition);
}
