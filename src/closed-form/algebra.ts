import { spawnSync } from 'node:child_process';
import { createRequire } from 'node:module';
import { dirname } from 'node:path';

/** A rational function of x and parameters, and where its value is wanted; `undefined` for one without x. */
export interface ClosedFormRequest {
  readonly text: string;
  readonly at: string | 'infinity' | undefined;
}

/** Answers each request with text, or undefined where none was found in time. */
export type ClosedFormFinder = (requests: readonly ClosedFormRequest[]) => readonly (string | undefined)[];

// Computer algebra can loop for minutes on a harmless form, so that it runs in a process of its own. One line an answer.
const program = `
const folder = process.argv[1];
const nerdamer = require(folder + '/nerdamer.core.js');
for (const part of ['Algebra', 'Calculus', 'Extra']) require(folder + '/' + part + '.js');
const requests = JSON.parse(require('node:fs').readFileSync(0, 'utf8'));
for (const { text, at } of requests) {
  let answer = '';
  try {
    const inverted = at === 'infinity' ? text.replace(/\\bx\\b/g, '(1/x)') : text;
    const simple = nerdamer('simplify(' + inverted + ')');
    const value = at === undefined ? simple : nerdamer(simple.toString(), { x: at === 'infinity' ? '0' : at });
    answer = nerdamer('simplify(' + value.toString() + ')').toString();
  } catch {}
  require('node:fs').writeSync(1, answer + '\\n');
}
`;

/**
 * Closed forms by nerdamer; they have to be checked against numbers before they are believed. After `milliseconds` the
 * other process is ended, and what it has answered by then counts.
 */
export const closedFormsWithin =
  (milliseconds: number): ClosedFormFinder =>
  (requests) => {
    if (requests.length === 0) return [];
    const require = createRequire(import.meta.url);
    const folder = dirname(require.resolve('nerdamer'));
    const { stdout } = spawnSync(process.execPath, ['-e', program, folder], {
      input: JSON.stringify(requests),
      timeout: milliseconds,
      killSignal: 'SIGKILL',
      encoding: 'utf8',
      stdio: ['pipe', 'pipe', 'ignore'],
    });
    // Only whole lines are answers.
    const lines = (stdout ?? '').split('\n').slice(0, -1);
    return requests.map((_, index) => lines[index] || undefined);
  };

export const closedFormsByAlgebra: ClosedFormFinder = closedFormsWithin(2000);
