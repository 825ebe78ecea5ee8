import { randomBytes } from 'node:crypto';
import { realpathSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { fileFaults } from '../errors/file-fault.ts';
import { type Problem, ProblemError } from '../errors/problem.ts';

/**
 * Writes a file whole or not at all: under a temporary name beside it, then renamed. A target that is no regular file
 * (a device, a pipe) is written to directly. Throws a ProblemError when it cannot be written.
 */
export function writeOutputFile(path: string, text: string | Uint8Array): void {
  try {
    const existing = statSync(path, { throwIfNoEntry: false });
    if (existing !== undefined && !existing.isFile()) {
      writeFileSync(path, text);
      return;
    }
    const target = existing === undefined ? path : realpathSync(path);
    const temporary = `${target}.${randomBytes(6).toString('hex')}.tmp`;
    try {
      writeFileSync(temporary, text, { flag: 'wx', mode: existing?.mode ?? 0o666 });
      renameSync(temporary, target);
    } catch (error) {
      rmSync(temporary, { force: true });
      throw error;
    }
  } catch (error) {
    throw unwritable(path, error);
  }
}

/** What is seen to be wrong with a target before the work for it is done. */
export function outputProblems(path: string): Problem[] {
  const problem = (code: string): Problem[] => [unwritableProblem(path, code)];
  if (statSync(path, { throwIfNoEntry: false })?.isDirectory() === true) return problem('EISDIR');
  const folder = statSync(dirname(path), { throwIfNoEntry: false });
  if (folder === undefined) return problem('ENOENT');
  return folder.isDirectory() ? [] : problem('ENOTDIR');
}

/** Writes a new file; a ProblemError when there is one of that name already. */
export function writeNewFile(path: string, text: string): void {
  try {
    writeFileSync(path, text, { flag: 'wx' });
  } catch (error) {
    throw unwritable(path, error);
  }
}

function unwritable(path: string, error: unknown): unknown {
  const code = (error as NodeJS.ErrnoException).code;
  return code === undefined ? error : new ProblemError([unwritableProblem(path, code)]);
}

function unwritableProblem(path: string, code: string): Problem {
  const remedy =
    code === 'EEXIST' ? 'Choose another id, or remove the file first.' : 'Check the path and its permissions.';
  const message = `cannot write the file: ${fileFaults[code] ?? code}`;
  return { code: 'output-unwritable', file: path, message, remedy };
}
