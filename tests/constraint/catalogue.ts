import { constantValues } from '../../src/constraint/constants.ts';
import { type Constraint, readConstraint } from '../../src/constraint/constraint.ts';
import type { Settings } from '../../src/constraint/decide.ts';
import { standardDomain } from '../../src/constraint/domain.ts';
import type { Functional } from '../../src/functional/functional.ts';
import { openShelf } from '../../src/shelf/shelf.ts';

export const shelf = openShelf({ functionals: ['functionals'], constraints: ['constraints'] });

export const standardSettings: Settings = {
  domain: standardDomain,
  constants: constantValues(new Map()),
  parameters: new Map(),
};

/** A functional of the shelf, or the sheet at a path. */
export function functionalOf(idOrPath: string): Functional {
  const outcome = shelf.functional(idOrPath);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems, null, 1));
  return outcome.value;
}

export function conditionOf(id: string): Constraint {
  const definition = shelf.constraint(id);
  if (!definition.ok) throw new Error(JSON.stringify(definition.problems, null, 1));
  const condition = readConstraint(definition.value, (sheet) => shelf.functional(sheet));
  if (!condition.ok) throw new Error(JSON.stringify(condition.problems, null, 1));
  return condition.value;
}
