import { type Problem, ProblemError } from '../errors/problem.ts';
import { type CompareTolerances, compareStates, isWorse, usualTolerances } from '../finding/compare.ts';
import { type State, stateOf } from '../finding/state.ts';
import { comparisonText } from '../report/compare-text.ts';
import { jsonText } from '../report/json.ts';
import { faultProblems } from './faults.ts';
import { wrongOption } from './problems.ts';
import { progressLine } from './progress.ts';
import { openWorkshop, runVet } from './run-vet.ts';
import { endOnSignals } from './signals.ts';
import { readState } from './state-file.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';
import { clockDay } from './vet.ts';
import type { VetOptions } from './vet-options.ts';
import { readVetRequest } from './vet-request.ts';

export interface CompareOptions
  extends Pick<VetOptions, 'domain' | 'only' | 'constraints' | 'constants' | 'cache' | 'jobs'> {
  readonly format: 'text' | 'json';
  readonly margin?: string;
  readonly share?: string;
}

/** `rungcheck compare`: what the second of two states, or of two sheets, has worse or better than the first. */
export async function compareCommand(
  before: string,
  after: string,
  options: CompareOptions,
  terminal: Terminal,
): Promise<number> {
  const problems: Problem[] = [];
  const tolerances = tolerancesOf(options, problems);
  const kinds = [before, after].map((name) => /\.json$/.test(name));
  if (kinds[0] !== kinds[1]) {
    problems.push(wrongOption('a state and a sheet cannot be compared', 'Name two states (….json) or two sheets.'));
  }
  const files = kinds[0] === true ? [before, after].map(readState) : [];
  problems.push(...files.flatMap((file) => (file.ok ? [] : file.problems)));
  if (problems.length > 0) throw new ProblemError(problems);
  const read = files.flatMap((file) => (file.ok ? [file.value] : []));
  const [first, second] = (read.length === 2 ? read : await vetBoth(before, after, options, terminal)) as [
    State,
    State,
  ];
  const comparison = compareStates(first, second, tolerances);
  terminal.writeOut(options.format === 'json' ? jsonText(comparison) : comparisonText(comparison, terminal));
  return isWorse(comparison) ? exitStatus.fails : exitStatus.fine;
}

/** The states of two sheets, under one name, so that their findings meet. */
async function vetBoth(before: string, after: string, options: CompareOptions, terminal: Terminal): Promise<State[]> {
  const { domain, only, constraints, constants, cache, jobs } = options;
  const chosen = {
    domain,
    only,
    constraints,
    constants,
    cache,
    jobs,
    format: 'table' as const,
    project: false as const,
  };
  const given = Object.fromEntries(Object.entries(chosen).filter(([, value]) => value !== undefined));
  const request = await readVetRequest([before, after], given as unknown as VetOptions, []);
  const workshop = await openWorkshop(request.jobs, cache);
  const progress = progressLine(terminal, Date.now);
  const release = endOnSignals(() => progress.end());
  try {
    const { findings } = await runVet(request, workshop, progress, clockDay());
    if (findings.faults !== undefined) throw new ProblemError(faultProblems(findings.faults));
    const [first, second = first] = findings.functionals;
    return [first, second].map((functional) => {
      const functionals = functional === undefined ? [] : [{ ...functional, id: `${before} → ${after}` }];
      return stateOf({ ...findings, functionals });
    });
  } finally {
    release();
    progress.end();
    await workshop.close();
  }
}

function tolerancesOf({ margin, share }: CompareOptions, problems: Problem[]): CompareTolerances {
  const read = (option: string, text: string | undefined, usual: number) => {
    const value = text === undefined ? usual : Number(text === '' ? Number.NaN : text);
    if (value >= 0 && value < Number.POSITIVE_INFINITY) return value;
    problems.push(wrongOption(`${option} does not understand ${text}`, 'Give a number that is not negative.'));
    return usual;
  };
  return {
    margin: read('--margin', margin, usualTolerances.margin),
    share: read('--share', share, usualTolerances.share),
  };
}
