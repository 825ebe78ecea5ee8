import type { Domain, DomainCoordinate } from '../constraint/domain.ts';
import type { Problem } from '../errors/problem.ts';
import type { Functional } from '../functional/functional.ts';
import type { Rational } from '../number/rational.ts';
import type { Shelf } from '../shelf/shelf.ts';
import { parseDomain } from './domain-option.ts';
import { constantNames, exactValues, findFunctional, openCatalogue, parameterProblems } from './engine.ts';
import { type FigureFlags, type FigureTarget, figureTarget } from './figure-file.ts';
import { readInputFile } from './input-file.ts';
import { parseAssignments } from './options.ts';
import { valueOr } from './problems.ts';
import { parseSlices } from './slice-option.ts';

/** The options that all figures have. */
export interface FigureCommandOptions extends FigureFlags {
  readonly at?: readonly string[];
  readonly domain: string;
  readonly constraints?: readonly string[];
  readonly constants?: readonly string[];
  readonly set?: readonly string[];
}

export interface FigureRequest {
  readonly shelf: Shelf;
  /** Undefined with a problem. */
  readonly target: FigureTarget | undefined;
  readonly domain: Domain | undefined;
  readonly constants: ReadonlyMap<string, Rational>;
  readonly parameters: ReadonlyMap<string, Rational>;
  readonly slices: readonly ReadonlyMap<DomainCoordinate, number>[];
  readonly functionals: readonly Functional[];
}

/** What all figures are asked for; problems are added to those given. */
export function readFigureRequest(
  sheets: readonly string[],
  options: FigureCommandOptions,
  problems: Problem[],
): FigureRequest {
  const shelf = openCatalogue(options.constraints ?? []);
  const target = valueOr(figureTarget(options), undefined, problems);
  const domain = valueOr(parseDomain(options.domain, readInputFile), undefined, problems);
  const given = parseAssignments('--constants', options.constants ?? [], constantNames);
  const constants = exactValues(valueOr(given, new Map(), problems));
  const parameters = exactValues(valueOr(parseAssignments('--set', options.set ?? []), new Map(), problems));
  const slices = valueOr(parseSlices(options.at ?? []), [], problems);
  const functionals = sheets.flatMap((sheet) => {
    const functional = valueOr(findFunctional(shelf, sheet), undefined, problems);
    return functional === undefined ? [] : [functional];
  });
  problems.push(...parameterProblems(functionals, parameters.keys()));
  return { shelf, target, domain, constants, parameters, slices, functionals };
}
