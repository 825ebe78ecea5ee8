import { isAskedAtPoints } from '../constraint/calls.ts';
import { type Condition, readCondition } from '../constraint/condition.ts';
import { selectableConstants } from '../constraint/constants.ts';
import { axesOf, standardDomain } from '../constraint/domain.ts';
import type { ConstraintDefinition } from '../definition/constraint.ts';
import type { FunctionalDefinition } from '../definition/functional.ts';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import type { Functional } from '../functional/functional.ts';
import type { Rational } from '../number/rational.ts';
import type { Explanation } from '../report/explain.ts';
import type { ListedConstraint, ListedFunctional } from '../report/list.ts';
import { shortText } from '../report/number-text.ts';
import { domainWords } from '../report/words.ts';
import { unknownParameters } from '../run/vetter.ts';
import { openShelf, type Shelf } from '../shelf/shelf.ts';
import { catalogueFolders, hintAtOwnSheet } from './catalogue.ts';
import type { GivenValue } from './options.ts';
import { settle } from './problems.ts';

/** The sheets that come with the program, behind those of the user's own constraint folders. */
export function openCatalogue(constraintFolders: readonly string[]): Shelf {
  return openShelf(settle(catalogueFolders(constraintFolders)));
}

/** A functional by id or path. An unknown id that is a sheet in the current folder gets a hint. */
export function findFunctional(shelf: Shelf, idOrPath: string): Outcome<Functional> {
  const found = shelf.functional(idOrPath);
  return found.ok ? found : failure(found.problems.map((problem) => hintAtOwnSheet(problem, idOrPath)));
}

/** The constraints that have a margin; rules of numerical quality have none. */
export function conditionIds(shelf: Shelf): string[] {
  return shelf.constraintIds().filter((id) => {
    const definition = shelf.constraint(id);
    return !definition.ok || definition.value.rule === undefined;
  });
}

/** Conditions with their requirements read. */
export function loadConditions(shelf: Shelf, ids: readonly string[]): Outcome<Condition[]> {
  return allOf(
    ids.map((id) => {
      const definition = shelf.constraint(id);
      return definition.ok ? readCondition(definition.value, (sheet) => shelf.functional(sheet)) : definition;
    }),
  );
}

export function allOf<Value>(outcomes: readonly Outcome<Value>[]): Outcome<Value[]> {
  const problems = outcomes.flatMap((outcome) => (outcome.ok ? [] : outcome.problems));
  if (problems.length > 0) return failure(problems);
  return success(outcomes.flatMap((outcome) => (outcome.ok ? [outcome.value] : [])));
}

export const constantNames: readonly string[] = selectableConstants.map(({ name }) => name);

/** The parameters that no one of the functionals has, as problems of --set. */
export function parameterProblems(functionals: readonly Functional[], names: Iterable<string>): Problem[] {
  return functionals.flatMap((functional) => unknownParameters(functional, [...names]));
}

export function exactValues(given: ReadonlyMap<string, GivenValue>): Map<string, Rational> {
  return new Map([...given].map(([name, { value }]) => [name, value]));
}

export function listedFunctional({ definition, parameters }: Functional): ListedFunctional {
  return {
    id: definition.id,
    name: definition.name,
    rung: definition.rung,
    year: definition.year ?? null,
    parts: definition.parts.map(({ name }) => name),
    parameters: parameters.size,
    exactExchange: exactExchangeText(definition),
    summary: definition.summary ?? null,
  };
}

/** The share of exact exchange as the sheet gives it; a parameter's name is replaced by its value. */
function exactExchangeText({ exactExchange, parameters }: FunctionalDefinition): string | null {
  const textOf = ({ text }: { readonly text: string }) =>
    parameters.find(({ name }) => name === text.trim())?.value.text ?? text;
  if (exactExchange === undefined) return null;
  if (exactExchange.kind === 'global') return textOf(exactExchange.fraction);
  const { shortRange, longRange, omega } = exactExchange;
  return `${textOf(shortRange)} short, ${textOf(longRange)} long range, ω ${textOf(omega)}`;
}

export function listedConstraint({ id, title, part, force, status }: ConstraintDefinition): ListedConstraint {
  return { id, title, part, force, status };
}

/** What a condition's sheet says of it; `margins` has those of the functionals known to hold or to break it. */
export function explanationOf(
  definition: ConstraintDefinition,
  margins: ReadonlyMap<string, string> = new Map(),
): Explanation {
  const known = (id: string) => (margins.has(id) ? `${id} (${margins.get(id)})` : id);
  const relative = definition.relative ? ', relative to the right-hand side' : '';
  return {
    id: definition.id,
    title: definition.title,
    statement: definition.statement,
    localForm: definition.localForm ?? null,
    requirement:
      definition.rule === undefined ? definition.requirement.text : 'by code of its own, not by a comparison',
    derivation: definition.derivation ?? null,
    force: definition.force,
    status: definition.status,
    gate: definition.gate ?? null,
    part: definition.part,
    rungs: definition.rungs,
    domain: triedOn(definition),
    constants: definition.constants.flatMap(({ constant }) =>
      selectableConstants
        .filter(({ name }) => name === constant)
        .map(({ name, default: value, meaning, published }) => ({ name, value, meaning, published })),
    ),
    tolerance: `${shortText(definition.tolerance)}${relative}`,
    toleranceReason: definition.toleranceReason ?? null,
    conflicts: definition.cannotMeet.map((conflict) => ({
      rungs: conflict.rungs,
      with: conflict.with ?? null,
      reason: conflict.reason,
    })),
    holds: definition.holds.map(({ id }) => known(id)),
    breaks: definition.breaks.map(({ id, where, source }) => ({
      id: known(id),
      where: where ?? null,
      source: source ?? null,
    })),
    traps: definition.traps,
    sources: definition.sources,
  };
}

/** The standard domain, less the coordinates that the condition fixes; or the points that it is asked at. */
function triedOn(definition: ConstraintDefinition): string {
  const { space, at } = definition;
  const fixed = at.map(({ name, value }) => `${coordinateSymbol(name)} = ${value.text}`);
  if (isAskedAtPoints(definition)) return askedAt(definition, fixed);
  const axes = axesOf(standardDomain, space).filter(
    ({ name }) => name !== 'q' && !at.some((step) => step.name === name),
  );
  const coordinates = axes.map((axis) => ({ ...axis, points: 0 }));
  const words = domainWords({ name: 'standard', space, coordinates, fixed: {} });
  const held = fixed.length === 0 ? '' : `${fixed.join(', ')}; `;
  return `${held}${words}; of these the coordinates that the functional has (standard domain)`;
}

function askedAt({ sweep, table }: ConstraintDefinition, fixed: readonly string[]): string {
  const swept = sweep.map(
    ({ name, values }) => `${coordinateSymbol(name)} = ${values.map(({ text }) => text.trim()).join(' | ')}`,
  );
  const rows = table === undefined ? [] : [`${table.rows.length} rows of a table`];
  return `${[...fixed, ...swept, ...rows].join(', ')}; in high precision, limits by two sequences`;
}
