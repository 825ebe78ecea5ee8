import { existsSync } from 'node:fs';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { type ClaimFields, searchStateSchema } from '../finding/certificate.ts';
import { digestOf } from '../proof/certificate.ts';
import type { Claim } from '../proof/claim.ts';
import { searchStateOf, stateDifference } from '../proof/search-state.ts';
import { readInputFile } from './input-file.ts';
import { writeOutputFile } from './output-file.ts';
import { packageVersion } from './package-root.ts';
import { parseJson } from './state-file.ts';

/** What an earlier search for the same claim has judged (see BoxSearch); nothing when there is no such file yet. */
export function readSearchState(path: string, fields: ClaimFields, claim: Claim): Outcome<string> {
  if (!existsSync(path)) return success('');
  const text = readInputFile(path);
  if (!text.ok) return text;
  const data = parseJson(text.value);
  const { format, formatVersion } = (data ?? {}) as { readonly format?: unknown; readonly formatVersion?: unknown };
  if (format !== 'rungcheck search') return wrong(path, 'the file is no state of a search of rungcheck prove');
  if (typeof formatVersion === 'number' && formatVersion > 1) {
    const message = `the file has format version ${formatVersion}; this rungcheck reads version 1`;
    const remedy = 'Use the rungcheck that wrote it, or a later one.';
    return failure([{ code: 'newer-format', file: path, message, remedy }]);
  }
  const read = searchStateSchema.safeParse(data);
  if (!read.success) {
    const [issue] = read.error.issues;
    return wrong(path, `the state is damaged at ${issue?.path.join('.') || 'its root'}: ${issue?.message}`);
  }
  const { engineVersion, digest } = read.data;
  if (digestOf(read.data) !== digest) return wrong(path, 'the state does not match its digest: it was changed');
  if (engineVersion !== packageVersion())
    return wrong(path, `the state is of rungcheck ${engineVersion}, and this is ${packageVersion()}`);
  const difference = stateDifference(read.data, fields, claim);
  return difference === undefined ? success(read.data.judged) : wrong(path, `the state is of ${difference}`);
}

/** Writes the state of a search, whole or not at all. Throws a ProblemError when it cannot. */
export function writeSearchState(path: string, fields: ClaimFields, claim: Claim, judged: string): void {
  writeOutputFile(path, `${JSON.stringify(searchStateOf(fields, claim, judged, packageVersion()))}\n`);
}

function wrong(file: string, message: string): Outcome<never> {
  return failure([wrongState(file, message)]);
}

export function wrongState(file: string, message: string): Problem {
  return { code: 'wrong-state', file, message, remedy: 'Name another file, or remove this one to begin anew.' };
}
