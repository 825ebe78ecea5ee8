import { availableParallelism } from 'node:os';
import { dirname, join } from 'node:path';
import { selectableConstants } from '../constraint/constants.ts';
import type { Domain } from '../constraint/domain.ts';
import { domainCoordinates } from '../constraint/domain.ts';
import { failure, type Outcome, type Problem, ProblemError, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import type { Acceptance } from '../finding/acceptance.ts';
import { type CompareTolerances, usualTolerances } from '../finding/compare.ts';
import type { RunSettings } from '../run/settings.ts';
import { idsIn, type ShelfFolders } from '../shelf/sheet-files.ts';
import { catalogueFolders } from './catalogue.ts';
import { parseDomain } from './domain-option.ts';
import { readInputFile } from './input-file.ts';
import { type GivenValue, parseAssignments, parseIds } from './options.ts';
import { valueOr, wrongOption } from './problems.ts';
import { type Project, readProject } from './project-file.ts';
import type { VetOptions } from './vet-options.ts';

/** What is to be vetted, and how: options and project file put together and checked. */
export interface VetRequest {
  readonly project: Project | undefined;
  readonly sheets: readonly string[];
  readonly shard: { readonly index: number; readonly count: number } | undefined;
  readonly constraints: readonly string[];
  readonly folders: ShelfFolders;
  readonly settings: RunSettings;
  readonly acceptances: readonly Acceptance[];
  /** Whether all of the project is vetted, so that an acceptance of anything else is stray. */
  readonly complete: boolean;
  readonly tolerances: CompareTolerances;
  readonly jobs: number;
}

/** The request, or all of its faults at once, those of the sheets it names included. */
export async function readVetRequest(
  sheets: readonly string[],
  options: VetOptions,
  otherProblems: readonly Problem[],
): Promise<VetRequest> {
  const problems: Problem[] = [...otherProblems];
  const project = valueOr(readProject(options.project), undefined, problems);
  const definition = project?.definition;
  const folders = valueOr(
    catalogueFolders([...(options.constraints ?? []), ...(project?.constraintFolders ?? [])]),
    undefined,
    problems,
  );
  const known = folders === undefined ? [] : idsIn(folders.constraints);
  const request: VetRequest = {
    project,
    sheets: [...new Set(sheets.length > 0 ? sheets : (project?.sheets ?? []))],
    shard: valueOr(parseShard(options.shard), undefined, problems),
    constraints: constraintIds(options, project, known, problems),
    folders: folders ?? { functionals: [], constraints: [] },
    settings: {
      domain: valueOr(domainOf(options.domain, project), undefined as unknown as Domain, problems),
      constants: constantsOf(options, project, problems),
      parameters: textsOf(valueOr(parseAssignments('--set', options.set ?? []), new Map(), problems)),
      tolerances: tolerancesOf(project, known, problems),
      ...proofBoxes(options, problems),
    },
    acceptances: acceptancesOf(project, known, problems),
    complete: project !== undefined && sheets.length === 0 && options.only === undefined,
    tolerances: { ...usualTolerances, ...definition?.compare },
    jobs: valueOr(parseJobs(options.jobs), 1, problems),
  };
  if (request.sheets.length === 0 && problems.length === 0) {
    const remedy = 'Name sheet files or ids, or write a project file rungcheck.yaml.';
    problems.push(wrongOption('no sheet is named', remedy));
  }
  if (problems.length > 0) throw new ProblemError([...problems, ...(await sheetProblems(request))]);
  return request;
}

/** Of a request that is faulty anyway: what is wrong with its sheets. */
async function sheetProblems({ sheets, folders, settings }: VetRequest): Promise<Problem[]> {
  if (folders.functionals.length === 0) return [];
  const { findFunctional, parameterProblems } = await import('./engine.ts');
  const { openShelf } = await import('../shelf/shelf.ts');
  const shelf = openShelf(folders);
  return sheets.flatMap((sheet) => {
    const found = findFunctional(shelf, sheet);
    return found.ok ? parameterProblems([found.value], Object.keys(settings.parameters)) : [...found.problems];
  });
}

function constraintIds(
  { only }: VetOptions,
  project: Project | undefined,
  known: readonly string[],
  problems: Problem[],
): readonly string[] {
  if (only !== undefined) return valueOr(parseIds('--only', only, known), [], problems);
  const { only: chosen, except = [] } = project?.definition ?? {};
  for (const { text, place } of [...(chosen ?? []), ...except]) {
    if (!known.includes(text)) problems.push({ ...unknownConstraint(text, known), ...place });
  }
  const left = chosen?.map(({ text }) => text) ?? known;
  return left.filter((id) => !except.some(({ text }) => text === id));
}

function unknownConstraint(id: string, known: readonly string[]): Problem {
  const remedy = suggestion(id, known, 'See rungcheck list constraints.');
  return { code: 'unknown-constraint', message: `there is no condition ${id}`, remedy };
}

function domainOf(option: string | undefined, project: Project | undefined): Outcome<Domain> {
  const own = project?.definition.domain;
  if (option !== undefined || project === undefined || own === undefined) {
    return parseDomain(option ?? 'standard', readInputFile);
  }
  const read = parseDomain(own.text, (path) => readInputFile(join(dirname(project.file), path)));
  return read.ok ? read : failure(read.problems.map((problem) => ({ ...own.place, ...problem })));
}

const constantNames = selectableConstants.map(({ name }) => name);

function constantsOf({ constants }: VetOptions, project: Project | undefined, problems: Problem[]) {
  const given = valueOr(parseAssignments('--constants', constants ?? [], constantNames), new Map(), problems);
  const own = project?.definition.constants ?? [];
  for (const { name, place } of own.filter((constant) => !constantNames.includes(constant.name))) {
    const remedy = suggestion(name, constantNames, `There are ${constantNames.join(', ')}.`);
    problems.push({ ...wrongOption(`there is no constant ${name}`, remedy), ...place });
  }
  return { ...Object.fromEntries(own.map(({ name, text }) => [name, text])), ...textsOf(given) };
}

export function textsOf(values: ReadonlyMap<string, GivenValue>): Record<string, string> {
  return Object.fromEntries([...values].map(([name, { text }]) => [name, text]));
}

function tolerancesOf(project: Project | undefined, known: readonly string[], problems: Problem[]) {
  const own = project?.definition.tolerances ?? [];
  for (const { name, place } of own) {
    if (!known.includes(name)) problems.push({ ...unknownConstraint(name, known), ...place });
  }
  return Object.fromEntries(own.map(({ name, text }) => [name, Number(text)]));
}

function acceptancesOf(project: Project | undefined, known: readonly string[], problems: Problem[]) {
  const accept = project?.definition.accept ?? [];
  const coordinates = [...domainCoordinates, 's_up', 's_dn', 'cosine', 'alpha_up', 'alpha_dn'];
  for (const { constraint, region, place } of accept) {
    if (!known.includes(constraint)) problems.push({ ...unknownConstraint(constraint, known), ...place });
    for (const name of region?.keys() ?? []) {
      if (coordinates.includes(name)) continue;
      const remedy = suggestion(name, coordinates, `The coordinates are ${coordinates.join(', ')}.`);
      problems.push({ ...wrongOption(`the region has no coordinate ${name}`, remedy), ...place });
    }
  }
  return accept;
}

const usualBoxes = '100000';

function proofBoxes(options: VetOptions, problems: Problem[]): { readonly proofBoxes?: number } {
  const budget = valueOr(proofBudget(options), undefined, problems);
  return budget === undefined ? {} : { proofBoxes: budget };
}

/** Boxes to spend on each proof; undefined where none is asked for. */
export function proofBudget({ prove, boxes }: Pick<VetOptions, 'prove' | 'boxes'>): Outcome<number | undefined> {
  if (prove === true) return parseBoxes(boxes ?? usualBoxes);
  if (boxes === undefined) return success(undefined);
  return failure([wrongOption('--boxes is given without --prove', 'Add --prove.')]);
}

/** Boxes to spend on one proof. */
export function parseBoxes(text: string): Outcome<number> {
  const boxes = Number(text);
  if (Number.isInteger(boxes) && boxes >= 1 && boxes <= 1e9) return success(boxes);
  return failure([wrongOption(`--boxes does not understand ${text}`, 'Give a whole number, such as 1000000 or 1e6.')]);
}

/** `2/4`: the second of four shards. */
function parseShard(text: string | undefined): Outcome<VetRequest['shard']> {
  if (text === undefined) return success(undefined);
  const [, index = 0, count = 0] = (/^(\d{1,4})\/(\d{1,4})$/.exec(text) ?? []).map(Number);
  if (index >= 1 && index <= count) return success({ index, count });
  return failure([wrongOption(`--shard does not understand ${text}`, 'Write i/n, as in --shard 1/4.')]);
}

export function parseJobs(text: string | undefined): Outcome<number> {
  if (text === undefined) return success(availableParallelism());
  const jobs = /^\d{1,3}$/.test(text) ? Number(text) : 0;
  if (jobs >= 1) return success(jobs);
  return failure([wrongOption(`--jobs does not understand ${text}`, 'Give a whole number of at least 1.')]);
}
