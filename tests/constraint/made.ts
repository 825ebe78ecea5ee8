import { readFileSync } from 'node:fs';
import { type Condition, readCondition } from '../../src/constraint/condition.ts';
import type { Settings } from '../../src/constraint/decide.ts';
import { vetFunctional } from '../../src/constraint/vet.ts';
import { parseConstraintSheet } from '../../src/definition/constraint.ts';
import { parseFunctionalSheet } from '../../src/definition/functional.ts';
import { type Outcome, ProblemError } from '../../src/errors/problem.ts';
import type { Finding } from '../../src/finding/finding.ts';
import type { Functional } from '../../src/functional/functional.ts';
import { linkFunctional } from '../../src/functional/link.ts';
import { conditionOf, functionalOf, shelf, standardSettings } from './catalogue.ts';

export function settled<Value>(outcome: Outcome<Value>): Value {
  if (!outcome.ok) throw new ProblemError(outcome.problems);
  return outcome.value;
}

export function sheetText(id: string): string {
  return readFileSync(`functionals/${id}.yaml`, 'utf8');
}

/** A functional from the text of a sheet; it may use the sheets of the shelf. */
export function madeFunctional(text: string): Functional {
  const parse = (sheet: string, id: string) => parseFunctionalSheet(sheet, { file: `${id}.yaml`, id });
  return settled(linkFunctional(settled(parse(text, 'made')), (id) => parse(sheetText(id), id)));
}

/** A sheet of the shelf with one text replaced by another; the text has to stand in it exactly once. */
export function mutated(id: string, from: string, to: string): Functional {
  const text = sheetText(id);
  if (text.split(from).length !== 2) throw new Error(`"${from}" does not stand once in ${id}`);
  return madeFunctional(text.replace(from, () => to));
}

/** A condition from the text of a sheet of its own, as a user writes it. */
export function madeCondition(text: string): Outcome<Condition> {
  const definition = parseConstraintSheet(text, { file: 'own.yaml', id: 'own' });
  return definition.ok ? readCondition(definition.value, (id) => shelf.functional(id)) : definition;
}

export function findingOf(
  functional: string | Functional,
  condition: string | Condition,
  settings: Partial<Settings> = {},
): Finding {
  const asked = typeof condition === 'string' ? conditionOf(condition) : condition;
  const vetted = typeof functional === 'string' ? functionalOf(functional) : functional;
  const [finding] = vetFunctional(vetted, [asked], { ...standardSettings, ...settings }).findings;
  if (finding === undefined) throw new Error('no finding');
  return finding;
}
