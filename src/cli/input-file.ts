import { readFileSync, statSync } from 'node:fs';
import { fileFault } from '../errors/file-fault.ts';
import { failure, type Outcome, success } from '../errors/problem.ts';

/** Larger input is refused unread. */
const largestInput = 256 * 1024 * 1024;

/** The text of a file, or the problem that it cannot be read. */
export function readInputFile(path: string): Outcome<string> {
  const unreadable = (reason: string) =>
    failure([
      {
        code: 'file-unreadable',
        file: path,
        message: `cannot read the file: ${reason}`,
        remedy: 'Check the path and its permissions.',
      },
    ]);
  try {
    const { size } = statSync(path);
    if (size > largestInput) {
      return failure([
        {
          code: 'file-too-large',
          file: path,
          message: `the file has ${size} bytes`,
          remedy: `At most ${largestInput} are read; split it.`,
        },
      ]);
    }
    return success(readFileSync(path, 'utf8'));
  } catch (error) {
    return unreadable(fileFault(error));
  }
}
