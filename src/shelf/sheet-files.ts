import { readdirSync, statSync } from 'node:fs';
import { basename, join, relative } from 'node:path';

/** Folders that hold one sheet per file; earlier folders win over later ones. */
export interface ShelfFolders {
  readonly functionals: readonly string[];
  readonly constraints: readonly string[];
}

/** The ids of all sheets in some folders, sorted. */
export function idsIn(folders: readonly string[]): string[] {
  const ids = folders.flatMap((folder) =>
    listFolder(folder).flatMap((file) => (/\.ya?ml$/.test(file) ? [file.replace(/\.ya?ml$/, '')] : [])),
  );
  return [...new Set(ids)].sort();
}

function listFolder(folder: string): string[] {
  try {
    return readdirSync(folder);
  } catch {
    return [];
  }
}

/** The sheet of an id: the first that the folders hold. */
export function findFile(folders: readonly string[], id: string): string | undefined {
  if (!/^[a-z0-9][a-z0-9-]*$/.test(id)) return undefined;
  const candidates = folders.flatMap((folder) => [join(folder, `${id}.yaml`), join(folder, `${id}.yml`)]);
  return candidates.find((path) => statSync(path, { throwIfNoEntry: false }) !== undefined);
}

/** A path from the current folder where it lies below it. */
export function shownPath(path: string): string {
  const file = relative(process.cwd(), path);
  return file === '' || file.startsWith('..') ? path : file;
}

/** Whether a sheet is named by its path and not by its id. */
export function isSheetPath(idOrPath: string): boolean {
  return /[/\\]|\.ya?ml$/.test(idOrPath);
}

/** The id of a sheet: its file name without .yaml. */
export function sheetId(idOrPath: string): string {
  return basename(idOrPath).replace(/\.ya?ml$/, '');
}
