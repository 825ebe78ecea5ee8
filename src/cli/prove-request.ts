import { notApplicable } from '../constraint/applicable.ts';
import type { Condition } from '../constraint/condition.ts';
import type { Domain } from '../constraint/domain.ts';
import { failure, type Outcome, type Problem, ProblemError, success } from '../errors/problem.ts';
import type { Functional } from '../functional/functional.ts';
import type { RunSettings } from '../run/settings.ts';
import type { ShelfFolders } from '../shelf/sheet-files.ts';
import { openShelf } from '../shelf/shelf.ts';
import { catalogueFolders } from './catalogue.ts';
import { parseDomain } from './domain-option.ts';
import { constantNames, findFunctional, loadConditions, parameterProblems } from './engine.ts';
import { readInputFile } from './input-file.ts';
import { parseAssignments } from './options.ts';
import { outputProblems } from './output-file.ts';
import { settle, valueOr, wrongOption } from './problems.ts';
import { parseBoxes, parseJobs, textsOf } from './vet-request.ts';

export interface ProveOptions {
  readonly domain: string;
  readonly boxes: string;
  readonly jobs?: string;
  readonly tolerance?: string;
  readonly constraints?: readonly string[];
  readonly constants?: readonly string[];
  readonly set?: readonly string[];
  readonly certificate?: string;
  readonly state?: string;
  readonly format: 'text' | 'json';
}

/** What is to be proved, and how: the options checked. */
export interface ProveRequest {
  /** As it was given: an id or a path. */
  readonly sheet: string;
  readonly functional: Functional;
  /** With the tolerance that is asked for. */
  readonly condition: Condition;
  readonly folders: ShelfFolders;
  readonly settings: RunSettings;
  readonly budget: number;
  readonly jobs: number;
}

/** The request; a ProblemError with all of its faults at once. */
export function readProveRequest(sheet: string, constraint: string, options: ProveOptions): ProveRequest {
  const problems: Problem[] = [];
  for (const file of [options.certificate, options.state]) {
    if (file !== undefined) problems.push(...outputProblems(file));
  }
  const folders = settle(catalogueFolders(options.constraints ?? []));
  const shelf = openShelf(folders);
  const functional = valueOr(findFunctional(shelf, sheet), undefined, problems);
  const [read] = valueOr(loadConditions(shelf, [constraint]), [], problems);
  const domain = valueOr(proofDomain(options.domain), undefined, problems);
  const budget = valueOr(parseBoxes(options.boxes), 0, problems);
  const jobs = valueOr(parseJobs(options.jobs), 1, problems);
  const tolerance = valueOr(parseTolerance(options.tolerance), undefined, problems);
  const constants = valueOr(
    parseAssignments('--constants', options.constants ?? [], constantNames),
    new Map(),
    problems,
  );
  const parameters = valueOr(parseAssignments('--set', options.set ?? []), new Map(), problems);
  if (functional !== undefined) problems.push(...parameterProblems([functional], parameters.keys()));
  if (functional !== undefined && read !== undefined) {
    const reason = notApplicable(read, functional);
    if (reason !== undefined)
      problems.push(wrongOption(`${constraint} does not apply to ${sheet}: ${reason}`, 'See rungcheck explain.'));
  }
  if (functional === undefined || read === undefined || domain === undefined || problems.length > 0)
    throw new ProblemError(problems);
  return {
    sheet,
    functional,
    condition: { ...read, definition: { ...read.definition, tolerance: tolerance ?? read.definition.tolerance } },
    folders,
    settings: {
      domain,
      constants: textsOf(constants),
      parameters: textsOf(parameters),
      tolerances: tolerance === undefined ? {} : { [constraint]: tolerance },
    },
    budget,
    jobs,
  };
}

/** A domain as vet knows it, or `unbounded`: every r_s > 0, ζ 0…1, every s and α ≥ 0, every q. */
function proofDomain(text: string): Outcome<Domain> {
  if (text !== 'unbounded') return parseDomain(text, readInputFile);
  const infinity = Number.POSITIVE_INFINITY;
  return success({
    name: 'custom',
    axes: {
      rs: { name: 'rs', lower: 0, upper: infinity, scale: 'logarithmic' },
      zeta: { name: 'zeta', lower: 0, upper: 1, scale: 'linear' },
      s: { name: 's', lower: 0, upper: infinity, scale: 'compact' },
      alpha: { name: 'alpha', lower: 0, upper: infinity, scale: 'compact' },
      q: { name: 'q', lower: -infinity, upper: infinity, scale: 'linear' },
    },
  });
}

function parseTolerance(text: string | undefined): Outcome<number | undefined> {
  if (text === undefined) return success(undefined);
  const tolerance = Number(text);
  if (text.trim() !== '' && tolerance >= 0 && tolerance < 1) return success(tolerance);
  return failure([wrongOption(`--tolerance does not understand ${text}`, 'Give a number from 0 to 1, such as 1e-6.')]);
}
