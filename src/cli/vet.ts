import { ProblemError } from '../errors/problem.ts';
import { faultProblems } from './faults.ts';
import { progressLine } from './progress.ts';
import { openWorkshop, runVet } from './run-vet.ts';
import { endOnSignals } from './signals.ts';
import { checkTelling, tellFindings } from './tell.ts';
import type { Terminal } from './terminal.ts';
import type { VetOptions } from './vet-options.ts';
import { readVetRequest } from './vet-request.ts';

/** The day of the clock here, year-month-day. */
export function clockDay(now = new Date()): string {
  const two = (value: number) => String(value).padStart(2, '0');
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}

/** `rungcheck vet`: answers the exit status. All faults of the request at once; a faulty sheet ends with status 2. */
export async function vetCommand(
  sheets: readonly string[],
  options: VetOptions,
  terminal: Terminal,
  today = clockDay(),
): Promise<number> {
  if (options.watch === true) {
    const { watchCommand } = await import('./watch.ts');
    return watchCommand(sheets, options, terminal, today);
  }
  const request = await readVetRequest(sheets, options, checkTelling(options));
  const workshop = await openWorkshop(request.jobs, options.cache);
  const progress = progressLine(terminal, Date.now);
  const release = endOnSignals(() => progress.end());
  try {
    const { findings } = await runVet(request, workshop, progress, today);
    const faults = findings.faults ?? [];
    if (findings.functionals.length === 0 && faults.length > 0 && faults.every(({ internal }) => !internal)) {
      throw new ProblemError(faultProblems(faults));
    }
    const fault = workshop.cache.fault();
    if (fault !== undefined) terminal.writeErr(`warning: the cache cannot be written: ${fault}\n`);
    return await tellFindings(findings, options, request.tolerances, request.folders, terminal);
  } finally {
    release();
    progress.end();
    await workshop.close();
  }
}
