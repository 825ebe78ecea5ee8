import { createHash } from 'node:crypto';
import { existsSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { type Condition, readCondition } from '../constraint/condition.ts';
import { constantValues, selectableConstants } from '../constraint/constants.ts';
import { axesOf, type Domain, standardDomain } from '../constraint/domain.ts';
import { vetFunctional } from '../constraint/vet.ts';
import type { ConstraintDefinition } from '../definition/constraint.ts';
import type { FunctionalDefinition } from '../definition/functional.ts';
import { failure, type Outcome, type Problem, ProblemError, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import type { Findings } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import type { Rational } from '../number/rational.ts';
import type { Explanation } from '../report/explain.ts';
import type { ListedConstraint, ListedFunctional } from '../report/list.ts';
import { shortText } from '../report/number-text.ts';
import { coordinateSymbol } from '../report/symbols.ts';
import { domainWords } from '../report/words.ts';
import { openShelf, type Shelf } from '../shelf/shelf.ts';
import type { GivenValue } from './options.ts';
import { packageRoot, packageVersion } from './package-root.ts';

/** The sheets that come with the program, behind those of the user's own constraint folders. */
export function openCatalogue(constraintFolders: readonly string[]): Shelf {
  const problems = constraintFolders.flatMap((folder): Problem[] => {
    if (statSync(folder, { throwIfNoEntry: false })?.isDirectory() === true) return [];
    const remedy = 'Name a folder that holds constraint sheets, one a file.';
    return [{ code: 'file-unreadable', file: folder, message: 'there is no such folder', remedy }];
  });
  if (problems.length > 0) throw new ProblemError(problems);
  const root = packageRoot();
  return openShelf({
    functionals: [join(root, 'functionals')],
    constraints: [...constraintFolders, join(root, 'constraints')],
  });
}

/** A functional by id or path. An unknown id that is a sheet in the current folder gets a hint. */
export function findFunctional(shelf: Shelf, idOrPath: string): Outcome<Functional> {
  const found = shelf.functional(idOrPath);
  if (found.ok) return found;
  const file = `${idOrPath}.yaml`;
  return failure(
    found.problems.map((problem) =>
      problem.code === 'unknown-functional' && problem.file === undefined && existsSync(file)
        ? { ...problem, remedy: `For the sheet in this folder write ./${file}.` }
        : problem,
    ),
  );
}

/** Conditions with their requirements read; all of the catalogue when no ids are given. */
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

export interface VetRequest {
  readonly functionals: readonly Functional[];
  readonly conditions: readonly Condition[];
  readonly domain: Domain;
  readonly constants: ReadonlyMap<string, GivenValue>;
  readonly parameters: ReadonlyMap<string, GivenValue>;
}

export function vetAll(request: VetRequest, onProgress: (subject: string, points: number) => void): Findings {
  const settings = {
    domain: request.domain,
    constants: constantValues(exactValues(request.constants)),
    parameters: exactValues(request.parameters),
  };
  const trial = Object.fromEntries([...request.parameters].map(([name, { text }]) => [name, text]));
  return {
    format: 'rungcheck findings',
    formatVersion: 1,
    engineVersion: packageVersion(),
    catalogueVersion: catalogueVersion(request.conditions),
    functionals: request.functionals.map((functional) => ({
      ...vetFunctional(functional, request.conditions, settings, onProgress),
      parameters: trial,
    })),
  };
}

/** The parameters that no one of the functionals has, as problems of --set. */
export function parameterProblems(functionals: readonly Functional[], names: Iterable<string>): Problem[] {
  return functionals.flatMap(({ definition, parameters }) =>
    [...names].flatMap((name): Problem[] => {
      if (parameters.has(name)) return [];
      const known = [...parameters.keys()];
      const otherwise = known.length === 0 ? 'It has none.' : `It has ${known.join(', ')}.`;
      const remedy = suggestion(name, known, otherwise);
      return [{ code: 'wrong-option', message: `--set: ${definition.id} has no parameter ${name}`, remedy }];
    }),
  );
}

export function exactValues(given: ReadonlyMap<string, GivenValue>): Map<string, Rational> {
  return new Map([...given].map(([name, { value }]) => [name, value]));
}

/** Changes whenever a sheet of the conditions does. */
function catalogueVersion(conditions: readonly Condition[]): string {
  const hash = createHash('sha256');
  const sheets = conditions.map(({ definition }) => `${definition.id}\n${definition.text}\n`);
  for (const sheet of sheets.sort()) hash.update(sheet);
  return hash.digest('hex').slice(0, 12);
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

export function explanationOf(definition: ConstraintDefinition): Explanation {
  const relative = definition.relative ? ', relative to the right-hand side' : '';
  return {
    id: definition.id,
    title: definition.title,
    statement: definition.statement,
    localForm: definition.localForm ?? null,
    requirement: definition.requirement.text,
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
    holds: definition.holds.map(({ id }) => id),
    breaks: definition.breaks.map(({ id, where, source }) => ({ id, where: where ?? null, source: source ?? null })),
    traps: definition.traps,
    sources: definition.sources,
  };
}

/** The standard domain, less the coordinates that the condition fixes. */
function triedOn({ space, at }: ConstraintDefinition): string {
  const fixed = at.map(({ name, value }) => `${coordinateSymbol(name)} = ${value.text}`);
  const axes = axesOf(standardDomain, space).filter(
    ({ name }) => name !== 'q' && !at.some((step) => step.name === name),
  );
  const coordinates = axes.map((axis) => ({ ...axis, points: 0 }));
  const words = domainWords({ name: 'standard', space, coordinates, fixed: {} });
  const held = fixed.length === 0 ? '' : `${fixed.join(', ')}; `;
  return `${held}${words}; of these the coordinates that the functional has (standard domain)`;
}
