import { type Problem, ProblemError, problemText } from '../errors/problem.ts';

/** Exit statuses; the help states them. */
export const exitStatus = { fine: 0, fails: 1, faultyRequest: 2, internalFault: 70 } as const;

/** More problems than these are only counted. */
const mostShown = 40;

/** Problems as the error stream shows them. */
export function problemsText(problems: readonly Problem[]): string {
  const more = problems.length - mostShown;
  const shown = problems.slice(0, mostShown).map((problem) => `${problemText(problem)}\n`);
  return [...shown, ...(more > 0 ? [`… and ${more} more problems\n`] : [])].join('');
}

/** What to print and which status to end with for anything that a command has thrown. */
export function faultOf(error: unknown, withTrace: boolean): { text: string; status: number } {
  if (error instanceof ProblemError) return { text: problemsText(error.problems), status: exitStatus.faultyRequest };
  const message = error instanceof Error ? error.message : String(error);
  const [line = ''] = message.split('\n');
  const trace = withTrace && error instanceof Error && error.stack !== undefined ? `${error.stack}\n` : '';
  return {
    text: `internal fault: ${line} (this is a fault of rungcheck; RUNGCHECK_TRACE=1 shows where)\n${trace}`,
    status: exitStatus.internalFault,
  };
}
