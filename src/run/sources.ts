import { readFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { findFile, isSheetPath, type ShelfFolders, sheetId } from '../shelf/sheet-files.ts';
import { type Cache, keyOf } from './cache.ts';

/** Tells which sheets a text uses; undefined when it cannot be read. */
export type ReadUses = (
  kind: SheetKind,
  text: string,
  origin: { readonly id: string; readonly file: string },
) => Promise<readonly string[] | undefined>;
export type SheetKind = 'functional' | 'constraint';

/** Hashes of sheets with everything that they use, from the texts of the files alone. */
export interface Sources {
  /** Undefined when the sheet, or one that it uses, cannot be read: then it has to be looked at in full. */
  functionalHash(idOrPath: string): Promise<string | undefined>;
  constraintHash(id: string): Promise<string | undefined>;
  /** The text of a condition sheet. */
  constraintText(id: string): string | undefined;
  /** All files that have been asked for. */
  readonly files: ReadonlySet<string>;
}

export function openSources(folders: ShelfFolders, cache: Cache, readUses: ReadUses): Sources {
  const hashes = new Map<string, Promise<string | undefined>>();
  const files = new Set<string>();
  const remember = (key: string, make: () => Promise<string | undefined>) => {
    const known = hashes.get(key) ?? make();
    hashes.set(key, known);
    return known;
  };

  function textOf(path: string | undefined): string | undefined {
    if (path === undefined) return undefined;
    files.add(path);
    try {
      return readFileSync(path, 'utf8');
    } catch {
      return undefined;
    }
  }

  async function closure(
    kind: SheetKind,
    path: string | undefined,
    searched: readonly string[],
    above: readonly string[],
  ): Promise<string | undefined> {
    const text = textOf(path);
    if (path === undefined || text === undefined) return undefined;
    const id = sheetId(path);
    const uses = await usesOf(kind, text, { id, file: path });
    if (uses === undefined) return undefined;
    const chain = [...above, path];
    const used: string[] = [];
    for (const other of uses) {
      const found = findFile(searched, other);
      // A sheet that uses itself has no hash; it is reported when it is read.
      if (found !== undefined && chain.includes(found)) return undefined;
      const hash = await remember(`${searched[0]} ${found ?? other}`, () =>
        closure('functional', found, searched, chain),
      );
      if (hash === undefined) return undefined;
      used.push(hash);
    }
    return sheetHash(id, text, used);
  }

  async function usesOf(
    kind: SheetKind,
    text: string,
    origin: { readonly id: string; readonly file: string },
  ): Promise<readonly string[] | undefined> {
    const key = keyOf('uses', kind, text);
    const known = cache.read(key) as string[] | undefined;
    if (known !== undefined) return known;
    const uses = await readUses(kind, text, origin);
    if (uses !== undefined) cache.write(key, uses);
    return uses;
  }

  return {
    files,
    functionalHash(idOrPath) {
      const isPath = isSheetPath(idOrPath);
      const searched = isPath ? [dirname(idOrPath), ...folders.functionals] : folders.functionals;
      const path = isPath ? idOrPath : findFile(searched, idOrPath);
      return remember(`${searched[0]} ${path}`, () => closure('functional', path, searched, []));
    },
    constraintHash(id) {
      const path = findFile(folders.constraints, id);
      return remember(`constraint ${path}`, () => closure('constraint', path, folders.functionals, []));
    },
    constraintText: (id) => textOf(findFile(folders.constraints, id)),
  };
}

/** The hash of a sheet from its id, its text and the hashes of the sheets that it uses, in their order. */
export function sheetHash(id: string, text: string, used: readonly string[]): string {
  return keyOf('sheet', id, text, ...used);
}
