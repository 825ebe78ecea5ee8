import { notApplicable } from '../constraint/applicable.ts';
import { constantValues } from '../constraint/constants.ts';
import { type Domain, domainCoordinates } from '../constraint/domain.ts';
import { failure, type Outcome, type Problem, ProblemError, success } from '../errors/problem.ts';
import { certificateOf } from '../proof/certificate.ts';
import { proveCondition } from '../proof/prove.ts';
import { jsonText } from '../report/json.ts';
import { isProved, type ProofReport, proofText } from '../report/proof-text.ts';
import { domainWords } from '../report/words.ts';
import { parseDomain } from './domain-option.ts';
import {
  constantNames,
  exactValues,
  findFunctional,
  loadConditions,
  openCatalogue,
  parameterProblems,
} from './engine.ts';
import { readInputFile } from './input-file.ts';
import { parseAssignments } from './options.ts';
import { outputProblems, writeOutputFile } from './output-file.ts';
import { packageVersion } from './package-root.ts';
import { valueOr, wrongOption } from './problems.ts';
import { progressLine } from './progress.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';
import { parseBoxes } from './vet-request.ts';

export interface ProveOptions {
  readonly domain: string;
  readonly boxes: string;
  readonly tolerance?: string;
  readonly constraints?: readonly string[];
  readonly constants?: readonly string[];
  readonly set?: readonly string[];
  readonly certificate?: string;
  readonly format: 'text' | 'json';
}

/** `rungcheck prove`: status 0 when the condition is proved, 1 when it is violated or not decided. */
export function proveCommand(sheet: string, constraint: string, options: ProveOptions, terminal: Terminal): number {
  const problems: Problem[] = [];
  const { certificate } = options;
  if (certificate !== undefined) problems.push(...outputProblems(certificate));
  const shelf = openCatalogue(options.constraints ?? []);
  const functional = valueOr(findFunctional(shelf, sheet), undefined, problems);
  const conditions = valueOr(loadConditions(shelf, [constraint]), [], problems);
  const domain = valueOr(proofDomain(options.domain), undefined, problems);
  const budget = valueOr(parseBoxes(options.boxes), 0, problems);
  const tolerance = valueOr(parseTolerance(options.tolerance), undefined, problems);
  const constants = valueOr(
    parseAssignments('--constants', options.constants ?? [], constantNames),
    new Map(),
    problems,
  );
  const parameters = valueOr(parseAssignments('--set', options.set ?? []), new Map(), problems);
  if (functional !== undefined) problems.push(...parameterProblems([functional], parameters.keys()));
  const [read] = conditions;
  if (functional !== undefined && read !== undefined) {
    const reason = notApplicable(read, functional);
    if (reason !== undefined)
      problems.push(wrongOption(`${constraint} does not apply to ${sheet}: ${reason}`, 'See rungcheck explain.'));
  }
  if (functional === undefined || read === undefined || domain === undefined || problems.length > 0)
    throw new ProblemError(problems);

  const condition = { ...read, definition: { ...read.definition, tolerance: tolerance ?? read.definition.tolerance } };
  const settings = { domain, constants: constantValues(exactValues(constants)), parameters: exactValues(parameters) };
  const progress = progressLine(terminal, Date.now, 'boxes');
  const { claim, result, record } = proveCondition(condition, functional, settings, {
    budget,
    onBoxes: (boxes) => progress.report(constraint, boxes),
    keepTree: certificate !== undefined,
  });
  progress.end();
  const report: ProofReport = {
    functional: functional.definition.id,
    constraint,
    requirement: condition.definition.requirement.text,
    tolerance: condition.definition.tolerance,
    domain: wordsOf(domain, [...(claim?.variables ?? [])]),
    proof: record,
  };
  terminal.writeOut(options.format === 'json' ? jsonText(report) : proofText(report, terminal.width));
  const proved = isProved(record);
  if (certificate !== undefined && proved && claim !== undefined && result !== undefined) {
    const text = JSON.stringify(certificateOf(condition, functional, settings, claim, result, packageVersion()));
    writeOutputFile(certificate, `${text}\n`);
  } else if (certificate !== undefined) terminal.writeErr('no certificate is written: nothing is proved\n');
  return proved ? exitStatus.fine : exitStatus.fails;
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

function wordsOf({ axes }: Domain, variables: readonly string[]): string {
  const named = domainCoordinates.filter(
    (name) => variables.includes(name) || (name === 'zeta' && variables.includes('w')),
  );
  const coordinates = named.map((name) => {
    const { lower, upper, scale } = axes[name];
    return { name, lower, upper: Number.isFinite(upper) ? upper : null, points: 0, scale };
  });
  if (coordinates.length === 0) return 'it depends on no coordinate';
  return domainWords({ name: 'custom', space: 'slice', coordinates, fixed: {} });
}

function parseTolerance(text: string | undefined): Outcome<number | undefined> {
  if (text === undefined) return success(undefined);
  const tolerance = Number(text);
  if (text.trim() !== '' && tolerance >= 0 && tolerance < 1) return success(tolerance);
  return failure([wrongOption(`--tolerance does not understand ${text}`, 'Give a number from 0 to 1, such as 1e-6.')]);
}
