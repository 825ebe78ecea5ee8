import { existsSync, readdirSync, statSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { type PlacedName, type ProjectDefinition, parseProjectFile } from '../definition/project.ts';
import { failure, type Outcome, type Problem, type SourcePlace, success } from '../errors/problem.ts';
import { isSheetPath } from '../shelf/sheet-files.ts';
import { readInputFile } from './input-file.ts';

const usualName = 'rungcheck.yaml';

/** A project file that was read, its paths from the current folder. */
export interface Project {
  readonly file: string;
  readonly definition: ProjectDefinition;
  /** Sheet files and ids. */
  readonly sheets: readonly string[];
  readonly constraintFolders: readonly string[];
}

/** The project file that is named, or the one in the current folder; undefined when there is none. */
export function readProject(named: string | false | undefined): Outcome<Project | undefined> {
  if (named === false || (named === undefined && !existsSync(usualName))) return success(undefined);
  const file = named ?? usualName;
  const text = readInputFile(file);
  if (!text.ok) return text;
  const definition = parseProjectFile(text.value, file);
  if (!definition.ok) return definition;
  const problems: Problem[] = [];
  const sheets = definition.value.sheets.flatMap((name) => sheetsOf(file, name, problems));
  const constraintFolders = definition.value.constraints.map(({ text: folder, place }) => {
    const path = join(dirname(file), folder);
    if (!isFolder(path)) problems.push(missing(place, `there is no folder ${folder}`));
    return path;
  });
  if (problems.length > 0) return failure(problems);
  return success({ file, definition: definition.value, sheets: [...new Set(sheets)], constraintFolders });
}

/** The sheets that an entry names: all of a folder, a file, or an id. */
function sheetsOf(file: string, { text, place }: PlacedName, problems: Problem[]): string[] {
  const path = join(dirname(file), text);
  if (isFolder(path)) {
    const found = readdirSync(path)
      .filter((name) => /\.ya?ml$/.test(name) && name !== usualName)
      .sort();
    if (found.length === 0) problems.push(missing(place, `the folder ${text} has no sheets`));
    return found.map((name) => pathOf(join(path, name)));
  }
  if (!isSheetPath(text)) return [text];
  if (!existsSync(path)) problems.push(missing(place, `there is no sheet ${text}`));
  return [pathOf(path)];
}

/** A path that is never taken for an id. */
function pathOf(path: string): string {
  return isSheetPath(path) ? path : `./${path}`;
}

function isFolder(path: string): boolean {
  return statSync(path, { throwIfNoEntry: false })?.isDirectory() === true;
}

function missing(place: SourcePlace, message: string): Problem {
  return { code: 'file-unreadable', message, remedy: 'Name it from the folder of the project file.', ...place };
}
