import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import { parseDecimal, type Rational } from '../number/rational.ts';
import { wrongOption } from './problems.ts';

/** A value given on the command line: its exact value and the text as it was typed. */
export interface GivenValue {
  readonly value: Rational;
  readonly text: string;
}

/** `10/81`, `0.804`, `-1e-3`; undefined for anything else. */
export function parseExact(text: string): Rational | undefined {
  const [numerator = '', denominator, ...rest] = text.split('/');
  if (rest.length > 0) return undefined;
  const top = parseDecimal(numerator);
  if (top === undefined || denominator === undefined) return top;
  const bottom = parseDecimal(denominator);
  return bottom === undefined || bottom.n === 0n ? undefined : top.div(bottom);
}

/** `name=value,name=value` as exact values; `known` gives the names there are, undefined for any. */
export function parseAssignments(
  option: string,
  texts: readonly string[],
  known?: readonly string[],
): Outcome<Map<string, GivenValue>> {
  const problems: Problem[] = [];
  const values = new Map<string, GivenValue>();
  for (const item of splitList(texts)) {
    const match = /^([^=\s]+)\s*=\s*(\S+)$/.exec(item);
    const value = match === null ? undefined : parseExact(match[2] as string);
    const [, name = '', text = ''] = match ?? [];
    if (value === undefined) {
      problems.push(
        wrongOption(`${option} does not understand ${item}`, `Write name=number, as in ${option} kappa=0.9.`),
      );
    } else if (known !== undefined && !known.includes(name)) {
      const remedy = suggestion(name, known, `There are ${known.join(', ')}.`);
      problems.push(wrongOption(`${option} does not know ${name}`, remedy));
    } else if (values.has(name)) {
      problems.push(wrongOption(`${option} gives ${name} twice`, 'Give it once.'));
    } else values.set(name, { value, text });
  }
  return problems.length > 0 ? failure(problems) : success(values);
}

/** Ids separated by commas, each of them known. */
export function parseIds(option: string, texts: readonly string[], known: readonly string[]): Outcome<string[]> {
  const ids = splitList(texts);
  const problems = ids
    .filter((id) => !known.includes(id))
    .map(
      (id): Problem => ({
        code: 'unknown-constraint',
        message: `${option}: there is no condition ${id}`,
        remedy: suggestion(id, known, 'See rungcheck list constraints.'),
      }),
    );
  if (ids.length === 0) problems.push(wrongOption(`${option} names no condition`, 'Give ids separated by commas.'));
  return problems.length > 0 ? failure(problems) : success([...new Set(ids)]);
}

/** Significant digits of an answer. */
export function parseDigits(text: string): Outcome<number> {
  const digits = /^\d{1,4}$/.test(text) ? Number(text) : Number.NaN;
  if (digits >= 1 && digits <= mostDigits) return success(digits);
  return failure([wrongOption(`--digits does not understand ${text}`, `Give a whole number from 1 to ${mostDigits}.`)]);
}

export const mostDigits = 100;

export function splitList(texts: readonly string[]): string[] {
  return texts
    .flatMap((text) => text.split(','))
    .map((item) => item.trim())
    .filter((item) => item !== '');
}
