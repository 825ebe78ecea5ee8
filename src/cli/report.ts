import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { ProblemError } from '../errors/problem.ts';
import type { Findings } from '../finding/finding.ts';
import { reportPage } from '../page/document.ts';
import { pageKernels } from '../page/page-kernels.ts';
import { builtFolder } from '../run/program-files.ts';
import { settingsOf } from '../run/settings.ts';
import { openShelf } from '../shelf/shelf.ts';
import { allOf, explanationOf, findFunctional, loadConditions } from './engine.ts';
import { faultProblems } from './faults.ts';
import { outputProblems, writeOutputFile } from './output-file.ts';
import { packageRoot } from './package-root.ts';
import { provedRegions } from './page-regions.ts';
import { settle } from './problems.ts';
import { progressLine } from './progress.ts';
import { openWorkshop, runVet } from './run-vet.ts';
import { endOnSignals } from './signals.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';
import { clockDay } from './vet.ts';
import type { VetOptions } from './vet-options.ts';
import { readVetRequest, type VetRequest } from './vet-request.ts';

export type ReportOptions = Pick<
  VetOptions,
  'out' | 'domain' | 'only' | 'constraints' | 'constants' | 'set' | 'jobs' | 'cache' | 'project' | 'prove' | 'boxes'
>;

/** `rungcheck report`: vets functionals and writes a page about them. */
export async function reportCommand(
  sheets: readonly string[],
  options: ReportOptions,
  terminal: Terminal,
): Promise<number> {
  const { out } = options;
  const request = await readVetRequest(
    sheets,
    { ...options, format: 'table' },
    out === undefined ? [] : outputProblems(out),
  );
  const findings = await vetFor(request, options, terminal);
  const page = await reportOf(request, findings, commandOf(request.sheets, options), terminal);
  if (out === undefined) terminal.writeOut(page);
  else writeOutputFile(out, page);
  return exitStatus.fine;
}

async function vetFor(request: VetRequest, { cache }: ReportOptions, terminal: Terminal): Promise<Findings> {
  const workshop = await openWorkshop(request.jobs, cache);
  const progress = progressLine(terminal, Date.now);
  const release = endOnSignals(() => progress.end());
  try {
    const { findings } = await runVet(request, workshop, progress, clockDay());
    const faults = findings.faults ?? [];
    if (faults.length > 0) throw new ProblemError(faultProblems(faults));
    return findings;
  } finally {
    release();
    progress.end();
    await workshop.close();
  }
}

async function reportOf(request: VetRequest, findings: Findings, command: string, terminal: Terminal): Promise<string> {
  const shelf = openShelf(request.folders);
  const functionals = settle(allOf(request.sheets.map((sheet) => findFunctional(shelf, sheet))));
  const definitions = settle(allOf(request.constraints.map((id) => shelf.constraint(id))));
  const withMargin = definitions.filter(({ rule }) => rule === undefined).map(({ id }) => id);
  const conditions = settle(loadConditions(shelf, withMargin));
  const settings = settingsOf(request.settings);
  const regions = await provedRegions(request.settings, findings, functionals, conditions, terminal);
  const asked = { functionals, arguments: request.sheets, conditions, ...settings, regions };
  return reportPage({
    findings,
    functionals,
    conditions: definitions.map((definition) => explanationOf(definition)),
    kernels: pageKernels(asked, findings.functionals),
    script: asset('report-page.js'),
    style: asset('report-page.css'),
    command,
  });
}

/** The page's script and style, which the build makes of src/page-script. */
function asset(name: string): string {
  return readFileSync(join(builtFolder() ?? join(packageRoot(), 'dist'), name), 'utf8');
}

/** The command line that makes the page again; what is left at its default is left out. */
function commandOf(sheets: readonly string[], options: ReportOptions): string {
  const repeated = (name: string, values: readonly string[] = []) => values.flatMap((value) => [name, value]);
  const single = (name: string, value: string | undefined) => (value === undefined ? [] : [name, value]);
  return [
    'rungcheck',
    'report',
    ...sheets,
    ...single('--domain', options.domain),
    ...repeated('--only', options.only),
    ...repeated('--constraints', options.constraints),
    ...repeated('--constants', options.constants),
    ...repeated('--set', options.set),
    ...(options.prove === true ? ['--prove'] : []),
    ...single('--boxes', options.boxes),
    ...single('--out', options.out),
  ].join(' ');
}
