import type { Problem, ProblemCode, SourcePlace } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';

/** A hostile file could have a problem in every character; a reader needs the first ones. */
const mostProblems = 100;
const longestShown = 60;

/** Collects the problems of one file, at most 100 of them. */
export class ProblemCollector {
  readonly #problems: Problem[] = [];

  /** Records a problem; the remedy may be a function, so that it is only made when it is wanted. */
  add(code: ProblemCode, place: SourcePlace, message: string, remedy: string | (() => string)): void {
    if (this.#problems.length >= mostProblems) return;
    this.#problems.push({ code, message, remedy: typeof remedy === 'string' ? remedy : remedy(), ...place });
  }

  get empty(): boolean {
    return this.#problems.length === 0;
  }

  /** The problems in the order of the file. */
  sorted(): readonly Problem[] {
    return this.#problems.toSorted(
      (left, right) => (left.line ?? 0) - (right.line ?? 0) || (left.column ?? 0) - (right.column ?? 0),
    );
  }
}

/** Text of a sheet as a message may show it: short, and without characters that steer a terminal. */
export function shown(text: string, longest = longestShown): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is removed
  const plain = text.slice(0, longest + 1).replace(/[\u0000-\u001f\u007f-\u009f\u2028\u2029\u202a-\u202e]+/g, ' ');
  return plain.length > longest ? `${plain.slice(0, longest)}…` : plain;
}

/** "Did you mean …?" among known words of reasonable length, or the list of them, or the given advice. */
export function advice(word: string, known: readonly string[], otherwise: string): string {
  const considered = known.filter((candidate) => candidate.length <= longestShown).slice(0, 200);
  return word.length > longestShown ? otherwise : suggestion(word, considered, otherwise);
}
