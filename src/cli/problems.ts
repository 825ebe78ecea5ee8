import { type Outcome, type Problem, ProblemError } from '../errors/problem.ts';

/** The value, or the problems gathered and something to go on with, so that a request is read to its end. */
export function valueOr<Value, Other>(outcome: Outcome<Value>, other: Other, problems: Problem[]): Value | Other {
  if (outcome.ok) return outcome.value;
  problems.push(...outcome.problems);
  return other;
}

/** The value; a ProblemError when there is none. */
export function settle<Value>(outcome: Outcome<Value>): Value {
  if (outcome.ok) return outcome.value;
  throw new ProblemError(outcome.problems);
}

export function wrongOption(message: string, remedy: string): Problem {
  return { code: 'wrong-option', message, remedy };
}
