import { existsSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import type { ShelfFolders } from '../shelf/sheet-files.ts';
import { packageRoot } from './package-root.ts';

/** The folders of the catalogue, behind the user's own constraint folders, all of which have to exist. */
export function catalogueFolders(constraintFolders: readonly string[]): Outcome<ShelfFolders> {
  const problems = constraintFolders.flatMap((folder): Problem[] => {
    if (statSync(folder, { throwIfNoEntry: false })?.isDirectory() === true) return [];
    const remedy = 'Name a folder that holds constraint sheets, one a file.';
    return [{ code: 'file-unreadable', file: folder, message: 'there is no such folder', remedy }];
  });
  if (problems.length > 0) return failure(problems);
  const root = packageRoot();
  return success({
    functionals: [join(root, 'functionals')],
    constraints: [...constraintFolders, join(root, 'constraints')],
  });
}

/** For an id that nobody knows, when a sheet of that name lies in the current folder. */
export function hintAtOwnSheet<
  Known extends { readonly code: string; readonly file?: string | undefined; readonly remedy: string },
>(problem: Known, idOrPath: string): Known {
  const file = `${idOrPath}.yaml`;
  const isHint = problem.code === 'unknown-functional' && problem.file === undefined && existsSync(file);
  return isHint ? { ...problem, remedy: `For the sheet in this folder write ./${file}.` } : problem;
}
