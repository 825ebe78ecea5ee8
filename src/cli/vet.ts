import { type Problem, ProblemError } from '../errors/problem.ts';
import { exitStatusOf } from '../finding/gate-counts.ts';
import { findingsJson } from '../report/json.ts';
import { vetTable } from '../report/vet-table.ts';
import { parseDomain } from './domain-option.ts';
import { constantNames, findFunctional, loadConditions, openCatalogue, parameterProblems, vetAll } from './engine.ts';
import { readInputFile } from './input-file.ts';
import { parseAssignments, parseIds } from './options.ts';
import { outputProblems, writeOutputFile } from './output-file.ts';
import { valueOr } from './problems.ts';
import { progressLine } from './progress.ts';
import { exitStatus } from './status.ts';
import { plainWidth, type Terminal } from './terminal.ts';

export interface VetOptions {
  readonly format: 'table' | 'json';
  readonly domain: string;
  readonly only?: readonly string[];
  readonly constraints?: readonly string[];
  readonly constants?: readonly string[];
  readonly set?: readonly string[];
  readonly exitZero?: boolean;
  readonly out?: string;
}

/** `rungcheck vet`: the findings as a table or JSON; answers the exit status. All faults of the request at once. */
export function vetCommand(sheets: readonly string[], options: VetOptions, terminal: Terminal): number {
  const problems: Problem[] = [];
  const shelf = openCatalogue(options.constraints ?? []);
  const { exitZero = false, format, out } = options;
  if (out !== undefined) problems.push(...outputProblems(out));
  const domain = valueOr(parseDomain(options.domain, readInputFile), undefined, problems);
  const constants = valueOr(
    parseAssignments('--constants', options.constants ?? [], constantNames),
    new Map(),
    problems,
  );
  const parameters = valueOr(parseAssignments('--set', options.set ?? []), new Map(), problems);
  const known = shelf.constraintIds();
  const ids = options.only === undefined ? known : valueOr(parseIds('--only', options.only, known), [], problems);
  const functionals = sheets.flatMap((sheet) => {
    const functional = valueOr(findFunctional(shelf, sheet), undefined, problems);
    return functional === undefined ? [] : [functional];
  });
  problems.push(...parameterProblems(functionals, parameters.keys()));
  const conditions = valueOr(loadConditions(shelf, ids), [], problems);
  if (domain === undefined || problems.length > 0) throw new ProblemError(problems);

  const progress = progressLine(terminal, Date.now);
  const findings = vetAll({ functionals, conditions, domain, constants, parameters }, progress.report);
  progress.end();
  const toFile = out !== undefined;
  const look = { width: toFile ? plainWidth : terminal.width, colour: !toFile && terminal.colour, exitZero };
  const text = format === 'json' ? findingsJson(findings) : vetTable(findings, look);
  if (toFile) writeOutputFile(out, text);
  else terminal.writeOut(text);
  return exitZero ? exitStatus.fine : exitStatusOf(findings);
}
