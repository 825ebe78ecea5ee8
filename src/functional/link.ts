import type { FunctionalDefinition } from '../definition/functional.ts';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import { checkNames } from './check.ts';
import type { Functional, Import } from './functional.ts';
import { readSheet } from './read.ts';
import { trialProblems } from './trial.ts';

/** Finds the definition of a sheet by its id; undefined when there is none. */
export type FindSheet = (id: string) => Outcome<FunctionalDefinition> | undefined;

const deepestImport = 12;

/**
 * Joins a definition to the sheets that it uses, parses every expression and checks every name. All problems
 * of the sheet are returned at once; those of an imported sheet only when the sheet has none of its own.
 */
export function linkFunctional(definition: FunctionalDefinition, find: FindSheet): Outcome<Functional> {
  return link(definition, find, [definition.id], new Map());
}

function link(
  definition: FunctionalDefinition,
  find: FindSheet,
  chain: readonly string[],
  linked: Map<string, Outcome<Functional>>,
): Outcome<Functional> {
  const known = linked.get(definition.id);
  if (known !== undefined) return known;
  const { sheet, readings, problems } = readSheet(definition);
  const complete = problems.length === 0;
  const importedProblems: Problem[] = [];
  const imports = new Map<string, Import>();
  for (const used of definition.uses) {
    const found = find(used.sheet);
    if (chain.includes(used.sheet)) {
      problems.push({
        code: 'cyclic-import',
        message: `${used.sheet} is imported in a circle: ${[...chain, used.sheet].join(' → ')}`,
        remedy: 'Move what both sheets need into a third.',
        ...used.place,
      });
    } else if (found === undefined || chain.length > deepestImport) {
      problems.push({
        code: 'missing-import',
        message: found === undefined ? `there is no sheet ${used.sheet}` : 'sheets are imported too deeply',
        remedy: 'Name a sheet of the shelf (rungcheck list functionals), or put its file beside this one.',
        ...used.place,
      });
    } else {
      const outcome = found.ok ? link(found.value, find, [...chain, used.sheet], linked) : found;
      if (outcome.ok) {
        imports.set(used.alias, {
          functional: outcome.value,
          parameters: sheet.importParameters.get(used.alias) ?? new Map(),
        });
        problems.push(...parameterProblems(used, outcome.value));
      } else {
        importedProblems.push(...outcome.problems);
      }
    }
  }
  const functional: Functional = { definition, imports, ...sheet };
  problems.push(...checkNames(functional, readings, complete));
  if (problems.length === 0 && importedProblems.length === 0) problems.push(...trialProblems(functional));
  const all = problems.length > 0 ? problems : importedProblems;
  const outcome = all.length > 0 ? failure(all) : success(functional);
  linked.set(definition.id, outcome);
  return outcome;
}

function parameterProblems(used: FunctionalDefinition['uses'][number], imported: Functional): Problem[] {
  return used.parameters
    .filter(({ name }) => !imported.parameters.has(name))
    .map(({ name, place }) => ({
      code: 'unknown-name',
      message: `${used.sheet} has no parameter ${name}`,
      remedy: suggestion(name, imported.parameters.keys(), `See the sheet ${used.sheet}.`),
      ...place,
    }));
}
