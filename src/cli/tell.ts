import type { Problem } from '../errors/problem.ts';
import { type CompareTolerances, type Comparison, compareStates, isWorse } from '../finding/compare.ts';
import type { Findings } from '../finding/finding.ts';
import { exitStatusOf } from '../finding/gate-counts.ts';
import { type State, stateOf } from '../finding/state.ts';
import { comparisonText } from '../report/compare-text.ts';
import type { RunReport } from '../report/run-report.ts';
import { stateText } from '../report/state-text.ts';
import type { ShelfFolders } from '../shelf/sheet-files.ts';
import { faultProblems } from './faults.ts';
import { type VetFormat, vetFormatNames, vetFormats } from './formats.ts';
import { outputProblems, writeOutputFile } from './output-file.ts';
import { settle, valueOr, wrongOption } from './problems.ts';
import { readState } from './state-file.ts';
import { exitStatus, problemsText } from './status.ts';
import { plainWidth, type Terminal } from './terminal.ts';
import type { TellOptions, VetOptions } from './vet-options.ts';

/** What can be seen to be wrong with the targets before the work for them is done. */
export function checkTelling(options: TellOptions & Pick<VetOptions, 'shard' | 'watch'>): Problem[] {
  const { out, record, against, shard, watch, write } = options;
  const problems: Problem[] = [];
  const writes = valueOr(parseWrites(options.write ?? []), [], problems);
  const targets = [...(out === undefined ? [] : [out]), ...(record === undefined ? [] : [record])];
  const all = [...targets, ...writes.map(({ file }) => file)];
  for (const file of new Set(all)) problems.push(...outputProblems(file));
  const twice = all.find((file, place) => all.indexOf(file) !== place);
  if (twice !== undefined) problems.push(wrongOption(`${twice} is to be written twice`, 'Name different files.'));
  if (against !== undefined) valueOr(readState(against), undefined, problems);
  if (shard !== undefined && (record ?? against) !== undefined) {
    const remedy = 'Write --format json, and give --record or --against to rungcheck merge.';
    problems.push(wrongOption('a shard has no state of its own', remedy));
  }
  if (watch === true && (out ?? record ?? against ?? shard ?? write) !== undefined) {
    problems.push(
      wrongOption('--watch shows a table, and writes and compares nothing', 'Leave out the other options.'),
    );
  }
  return problems;
}

interface Write {
  readonly format: VetFormat;
  readonly file: string;
}

/** `junit=out.xml`. */
function parseWrites(texts: readonly string[]) {
  const problems: Problem[] = [];
  const value = texts.flatMap((text): Write[] => {
    const [, format = '', file = ''] = /^([a-z-]+)=(.+)$/.exec(text) ?? [];
    if (file !== '' && vetFormatNames.includes(format as VetFormat)) return [{ format: format as VetFormat, file }];
    const remedy = `Write format=file, the format one of ${vetFormatNames.join(', ')}.`;
    problems.push(wrongOption(`--write does not understand ${text}`, remedy));
    return [];
  });
  return problems.length > 0 ? ({ ok: false, problems } as const) : ({ ok: true, value } as const);
}

/** Writes what the options ask for and answers the exit status. */
export async function tellFindings(
  findings: Findings,
  options: TellOptions,
  tolerances: CompareTolerances,
  folders: ShelfFolders,
  terminal: Terminal,
): Promise<number> {
  const { format, out, against, record } = options;
  const state = stateOf(findings);
  const comparison = against === undefined ? null : compareStates(settle(readState(against)), state, tolerances);
  const writes = settle(parseWrites(options.write ?? []));
  const needsHelp = [format, ...writes.map((write) => write.format)].includes('sarif');
  const report: RunReport = {
    findings,
    comparison,
    conditions: needsHelp ? await conditionsOf(findings, folders) : new Map(),
  };
  const status = statusOf(findings, comparison, options);
  const exitZero = options.exitZero === true;
  const plain = { width: plainWidth, colour: false, exitZero, closing: closingWords(status, report, options) };
  const texts = writes.map((write) => ({ file: write.file, text: vetFormats[write.format](report, plain) }));
  const look = out === undefined ? { ...plain, width: terminal.width, colour: terminal.colour } : plain;
  const differences = comparison === null ? '' : comparisonText(comparison, look);
  // Quiet where nothing has changed: against a record, only the differences are told.
  const isQuiet = comparison !== null && format === 'table';
  const main = isQuiet ? `${differences}${look.closing}\n` : vetFormats[format](report, look);
  for (const { file, text } of texts) writeOutputFile(file, text);
  if (out === undefined) terminal.writeOut(main);
  else writeOutputFile(out, main);
  if (!isQuiet) terminal.writeErr(differences);
  if (record !== undefined) recordState(record, state, comparison, findings, terminal);
  terminal.writeErr(problemsText(faultProblems(findings.faults ?? [])));
  return status;
}

/** A worse state does not replace the record that it was held against; nor does an incomplete one. */
function recordState(
  path: string,
  state: State,
  comparison: Comparison | null,
  findings: Findings,
  terminal: Terminal,
): void {
  if (comparison !== null && isWorse(comparison)) terminal.writeErr(`${path} is left as it was: the state is worse\n`);
  else if (findings.faults !== undefined) terminal.writeErr(`${path} is left as it was: not every sheet was vetted\n`);
  else writeOutputFile(path, stateText(state));
}

function statusOf(findings: Findings, comparison: Comparison | null, { exitZero, record }: TellOptions): number {
  const faults = findings.faults ?? [];
  if (faults.some(({ internal }) => internal)) return exitStatus.internalFault;
  if (faults.length > 0) return exitStatus.faultyRequest;
  if (exitZero === true) return exitStatus.fine;
  if (comparison !== null) return isWorse(comparison) ? exitStatus.fails : exitStatus.fine;
  return record === undefined ? exitStatusOf(findings) : exitStatus.fine;
}

/** The last line of a table, where the status does not follow from the findings alone. */
function closingWords(status: number, { findings, comparison }: RunReport, options: TellOptions): string | undefined {
  const fails = exitStatusOf(findings) === 1;
  if (findings.faults !== undefined)
    return `Exit status ${status}: ${findings.faults.length} of the sheets could not be vetted.`;
  if (options.exitZero === true) return comparison === null ? undefined : 'Exit status 0, as asked.';
  if (comparison !== null) {
    return isWorse(comparison)
      ? `Exit status 1: worse than ${options.against}.`
      : `Exit status 0: nothing is worse than ${options.against}.`;
  }
  if (options.record === undefined) return undefined;
  return `Exit status 0: recorded in ${options.record}${fails ? '; a condition fails' : ''}.`;
}

/** The conditions of the findings, explained; those that are nowhere to be found are left out. */
export async function conditionsOf({ functionals }: Findings, folders: ShelfFolders): Promise<RunReport['conditions']> {
  const { explanationOf } = await import('./engine.ts');
  const { openShelf } = await import('../shelf/shelf.ts');
  const shelf = openShelf(folders);
  const ids = new Set(functionals.flatMap(({ findings }) => findings.map(({ constraint }) => constraint)));
  const known = [...ids].flatMap((id) => {
    const definition = shelf.constraint(id);
    return definition.ok ? [[id, explanationOf(definition.value)] as const] : [];
  });
  return new Map(known);
}
