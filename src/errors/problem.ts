/** The closed list of faults a user can make; each keeps its code for ever. */
export const problemCodes = [
  'file-unreadable',
  'file-too-large',
  'yaml-syntax',
  'yaml-alias',
  'yaml-depth',
  'duplicate-key',
  'unknown-key',
  'missing-key',
  'wrong-value',
  'expression-syntax',
  'expression-form',
  'expression-size',
  'unknown-name',
  'wrong-arguments',
  'cyclic-definition',
  'unused-parameter',
  'unused-definition',
  'above-rung',
  'channel-outside-sum',
  'reserved-name',
  'missing-import',
  'cyclic-import',
  'unknown-functional',
  'unknown-constraint',
  'wrong-option',
  'wrong-points',
  'wrong-findings',
  'output-unwritable',
  'wrong-state',
  'newer-format',
  'changed-meanwhile',
] as const;

export type ProblemCode = (typeof problemCodes)[number];

/** A place in a text file; line and column count from 1. */
export interface SourcePlace {
  readonly file: string;
  readonly line: number;
  readonly column: number;
}

/** One fault of the user: what is wrong, where, and what to do about it. */
export interface Problem {
  readonly code: ProblemCode;
  readonly message: string;
  readonly remedy: string;
  readonly file?: string;
  readonly line?: number;
  readonly column?: number;
}

/** Either a value or every problem found on the way to it. */
export type Outcome<Value> =
  | { readonly ok: true; readonly value: Value }
  | { readonly ok: false; readonly problems: readonly Problem[] };

export function success<Value>(value: Value): Outcome<Value> {
  return { ok: true, value };
}

export function failure(problems: readonly Problem[]): Outcome<never> {
  return { ok: false, problems };
}

/** Thrown at a boundary (the library surface, the command line) where problems end the request. */
export class ProblemError extends Error {
  readonly problems: readonly Problem[];

  constructor(problems: readonly Problem[]) {
    super(problems.map(problemText).join('\n'));
    this.name = 'ProblemError';
    this.problems = problems;
  }
}

/** One problem as `file:line:column: message [code]` with its remedy on a second line. */
export function problemText(problem: Problem): string {
  const place = [problem.file, problem.line, problem.column].filter((part) => part !== undefined).join(':');
  const head = place === '' ? problem.message : `${place}: ${problem.message}`;
  return `${head} [${problem.code}]\n    ${problem.remedy}`;
}
