import { failure, type Outcome, type Problem, ProblemError, success } from '../errors/problem.ts';
import { type Findings, findingsSchema } from '../finding/finding.ts';
import { exitStatusOf } from '../finding/gate-counts.ts';
import { catalogueFolders } from './catalogue.ts';
import { formatOfFile, type VetFormat, vetFormatNames, vetFormats } from './formats.ts';
import { readInputFile } from './input-file.ts';
import { outputProblems, writeOutputFile } from './output-file.ts';
import { settle, valueOr, wrongOption } from './problems.ts';
import { exitStatus } from './status.ts';
import { conditionsOf } from './tell.ts';
import { plainWidth, type Terminal } from './terminal.ts';

export interface RenderOptions {
  readonly format?: VetFormat;
  readonly out?: string;
  readonly exitZero?: boolean;
}

/** `rungcheck render`: saved findings in another format, without computing anything again; ends with the status of their vet. */
export async function renderCommand(path: string, options: RenderOptions, terminal: Terminal): Promise<number> {
  const problems: Problem[] = [];
  const { out, exitZero = false } = options;
  if (out !== undefined) problems.push(...outputProblems(out));
  const format = options.format ?? (out === undefined ? 'table' : formatOfFile(out));
  if (format === undefined) {
    problems.push(wrongOption(`no format is known for ${out}`, `Give --format ${vetFormatNames.join(', ')}.`));
  }
  const text = path === '-' ? await terminal.readInput() : valueOr(readInputFile(path), undefined, problems);
  const file = path === '-' ? 'standard input' : path;
  const findings = text === undefined ? undefined : valueOr(parseFindings(text, file), undefined, problems);
  if (findings === undefined || format === undefined || problems.length > 0) throw new ProblemError(problems);
  const toFile = out !== undefined;
  const look = { width: toFile ? plainWidth : terminal.width, colour: !toFile && terminal.colour, exitZero };
  // Of the formats only SARIF explains the conditions.
  const conditions = format === 'sarif' ? await conditionsOf(findings, settle(catalogueFolders([]))) : new Map();
  const rendered = vetFormats[format]({ findings, comparison: null, conditions }, look);
  if (toFile) writeOutputFile(out, rendered);
  else terminal.writeOut(rendered);
  return exitZero ? exitStatus.fine : exitStatusOf(findings);
}

/** Faults of a file beyond these are left out: the first tell what kind of file it is. */
const mostFaults = 10;

function parseFindings(text: string, file: string): Outcome<Findings> {
  const remedy = 'Give a file written by rungcheck vet --format json.';
  const problem = (message: string): Problem => ({ code: 'wrong-findings', file, message, remedy });
  let data: unknown;
  try {
    data = JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch (error) {
    return failure([problem(`it is not JSON: ${(error as SyntaxError).message}`)]);
  }
  if ((data as { readonly format?: unknown } | null)?.format !== 'rungcheck findings') {
    return failure([problem('it holds no findings of rungcheck')]);
  }
  const parsed = findingsSchema.safeParse(data);
  // As it was read: the schema changes nothing but the order of the keys.
  if (parsed.success) return success(data as Findings);
  return failure(
    parsed.error.issues.slice(0, mostFaults).map(({ path, message }) => {
      const where = path
        .map((part, index) => (typeof part === 'number' ? `[${part}]` : `${index === 0 ? '' : '.'}${String(part)}`))
        .join('');
      return problem(`${where}: ${message}`);
    }),
  );
}
