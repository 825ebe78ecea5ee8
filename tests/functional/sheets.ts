import { type FunctionalDefinition, parseFunctionalSheet } from '../../src/definition/functional.ts';
import type { Outcome } from '../../src/errors/problem.ts';
import type { Functional } from '../../src/functional/functional.ts';
import { linkFunctional } from '../../src/functional/link.ts';

/** Sheets written in a test, by id; the file of each is `<id>.yaml`. */
export function link(id: string, sheets: Record<string, string>): Outcome<Functional> {
  const find = (name: string): Outcome<FunctionalDefinition> | undefined => {
    const text = sheets[name];
    return text === undefined ? undefined : parseFunctionalSheet(text, { file: `${name}.yaml`, id: name });
  };
  const own = find(id);
  if (own === undefined) throw new Error(`no sheet ${id}`);
  return own.ok ? linkFunctional(own.value, find) : own;
}

export function linked(id: string, sheets: Record<string, string>): Functional {
  const outcome = link(id, sheets);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems, null, 1));
  return outcome.value;
}

/** A sheet with the given lines after a valid head. */
export function sheet(rung: string, ...lines: string[]): string {
  return [`name: Test`, `rung: ${rung}`, 'citations: [invented for a test]', ...lines].join('\n');
}
