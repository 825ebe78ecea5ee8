import { failure, type Outcome, success } from '../errors/problem.ts';
import { findingsSchema } from '../finding/finding.ts';
import { type State, stateOf, stateSchema, stateVersion } from '../finding/state.ts';
import { readInputFile } from './input-file.ts';

/** The state in a state file, or in a findings file. */
export function readState(path: string): Outcome<State> {
  const text = readInputFile(path);
  if (!text.ok) {
    const remedy = `Record one first: rungcheck vet … --record ${path}`;
    return failure(text.problems.map((problem) => ({ ...problem, remedy })));
  }
  const data = parseJson(text.value);
  const { format, formatVersion } = (data ?? {}) as { readonly format?: unknown; readonly formatVersion?: unknown };
  const isState = format === 'rungcheck state';
  if (!isState && format !== 'rungcheck findings') {
    return wrong(path, 'the file is neither a state nor findings of rungcheck', `Write it with --record ${path}.`);
  }
  if (typeof formatVersion === 'number' && formatVersion > stateVersion) {
    const message = `the file has format version ${formatVersion}; this rungcheck reads up to ${stateVersion}`;
    const remedy = 'Use the rungcheck that wrote it, or a later one.';
    return failure([{ code: 'newer-format', file: path, message, remedy }]);
  }
  const read = isState ? stateSchema.safeParse(data) : findingsSchema.safeParse(data);
  if (!read.success) {
    const [issue] = read.error.issues;
    const at = issue?.path.join('.') ?? '';
    return wrong(path, `the file is damaged at ${at === '' ? 'its root' : at}: ${issue?.message}`, 'Record it again.');
  }
  return success(read.data.format === 'rungcheck state' ? read.data : stateOf(read.data));
}

export function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}

function wrong(file: string, message: string, remedy: string): Outcome<never> {
  return failure([{ code: 'wrong-state', file, message, remedy }]);
}
