import type { Problem } from '../errors/problem.ts';
import type { Fault } from '../finding/finding.ts';

/** The problems of the sheets that could not be vetted. A findings file keeps their codes as texts. */
export function faultProblems(faults: readonly Fault[]): Problem[] {
  return faults.flatMap(({ problems }) => problems as Problem[]);
}
