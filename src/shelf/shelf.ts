import { readFileSync, statSync } from 'node:fs';
import { dirname } from 'node:path';
import { type ConstraintDefinition, parseConstraintSheet } from '../definition/constraint.ts';
import { type FunctionalDefinition, parseFunctionalSheet } from '../definition/functional.ts';
import { failure, type Outcome, type Problem, type ProblemCode } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import type { Functional } from '../functional/functional.ts';
import { linkFunctional } from '../functional/link.ts';
import { findFile, idsIn, isSheetPath, type ShelfFolders, sheetId, shownPath } from './sheet-files.ts';

/** Larger files are refused unread. */
const largestSheet = 256 * 1024;

/** The sheets of some folders, read when first asked for. */
export interface Shelf {
  functionalIds(): string[];
  constraintIds(): string[];
  /** A functional by its id, or by the path of a sheet (a name with a slash or ending in .yaml). */
  functional(idOrPath: string): Outcome<Functional>;
  constraint(id: string): Outcome<ConstraintDefinition>;
}

export function openShelf(folders: ShelfFolders): Shelf {
  const definitions = new Map<string, Outcome<FunctionalDefinition> | undefined>();
  const constraints = new Map<string, Outcome<ConstraintDefinition> | undefined>();
  const functionalIds = () => idsIn(folders.functionals);
  const constraintIds = () => idsIn(folders.constraints);

  const definitionOf = (id: string, searched: readonly string[]) =>
    remember(definitions, `${searched[0]} ${id}`, () => {
      const path = findFile(searched, id);
      return path === undefined ? undefined : readSheet(path, parseFunctionalSheet);
    });

  return {
    functionalIds,
    constraintIds,
    functional(idOrPath) {
      const isPath = isSheetPath(idOrPath);
      // Sheets beside the given one can be imported by it.
      const searched = isPath ? [dirname(idOrPath), ...folders.functionals] : folders.functionals;
      const own = isPath ? readSheet(idOrPath, parseFunctionalSheet) : definitionOf(idOrPath, searched);
      if (own === undefined) {
        return unknown(
          'unknown-functional',
          `there is no functional ${idOrPath}`,
          idOrPath,
          functionalIds(),
          'Name a sheet file (…/name.yaml), or an id from rungcheck list functionals.',
        );
      }
      return own.ok ? linkFunctional(own.value, (id) => definitionOf(id, searched)) : own;
    },
    constraint(id) {
      const found = remember(constraints, id, () => {
        const path = findFile(folders.constraints, id);
        return path === undefined ? undefined : readSheet(path, parseConstraintSheet);
      });
      return (
        found ??
        unknown(
          'unknown-constraint',
          `there is no constraint ${id}`,
          id,
          constraintIds(),
          'See rungcheck list constraints.',
        )
      );
    },
  };
}

type ParseSheet<Definition> = (text: string, origin: { file: string; id: string }) => Outcome<Definition>;

function readSheet<Definition>(path: string, parse: ParseSheet<Definition>): Outcome<Definition> {
  const shown = shownPath(path);
  try {
    const stat = statSync(path);
    if (!stat.isFile()) return unreadable(shown, 'it is not a file');
    if (stat.size > largestSheet) {
      return failure([
        sheetProblem(
          'file-too-large',
          shown,
          `the file has ${stat.size} bytes`,
          `A sheet has at most ${largestSheet} bytes.`,
        ),
      ]);
    }
    return parse(readFileSync(path, 'utf8'), { file: shown, id: sheetId(path) });
  } catch (error) {
    return unreadable(shown, reasonOf(error));
  }
}

function unreadable(file: string, reason: string): Outcome<never> {
  return failure([
    sheetProblem('file-unreadable', file, `cannot read the file: ${reason}`, 'Check the path and its permissions.'),
  ]);
}

function sheetProblem(code: ProblemCode, file: string, message: string, remedy: string): Problem {
  return { code, file, message, remedy };
}

function reasonOf(error: unknown): string {
  const code = (error as NodeJS.ErrnoException).code;
  if (code === undefined) throw error;
  const reasons: Record<string, string> = {
    ENOENT: 'it does not exist',
    EACCES: 'permission denied',
    EISDIR: 'it is a folder',
    ENOTDIR: 'a part of the path is not a folder',
  };
  return reasons[code] ?? code;
}

function unknown(
  code: ProblemCode,
  message: string,
  id: string,
  known: readonly string[],
  remedy: string,
): Outcome<never> {
  return failure([{ code, message, remedy: suggestion(id, known, remedy) }]);
}

function remember<Key, Value>(known: Map<Key, Value>, key: Key, make: () => Value): Value {
  if (!known.has(key)) known.set(key, make());
  return known.get(key) as Value;
}
