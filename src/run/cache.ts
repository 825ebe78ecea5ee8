import { createHash, randomBytes } from 'node:crypto';
import { mkdirSync, readdirSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileFault } from '../errors/file-fault.ts';

/** Answers kept by the hash of everything that they depend on. */
export interface Cache {
  /** Undefined when there is no entry, or a damaged one. */
  read(key: string): unknown;
  write(key: string, value: unknown): void;
  /** Why an entry could not be written, once that has happened. */
  fault(): string | undefined;
}

export const noCache: Cache = { read: () => undefined, write: () => {}, fault: () => undefined };

/**
 * A cache in a folder, made when first written to. An entry appears whole or not at all (written under another name,
 * then renamed) and begins with the hash of its text, so that runs side by side and killed ones leave it sound.
 * A folder that cannot be written to is no reason to stop.
 */
export function openCache(folder: string): Cache {
  const pathOf = (key: string) => join(folder, key.slice(0, 2), `${key.slice(2)}.json`);
  let fault: string | undefined;
  return {
    read(key) {
      try {
        return parseEntry(readFileSync(pathOf(key), 'utf8'));
      } catch {
        return undefined;
      }
    },
    write(key, value) {
      if (fault !== undefined) return;
      const path = pathOf(key);
      const temporary = `${path}.${randomBytes(6).toString('hex')}.tmp`;
      try {
        mkdirSync(dirname(path), { recursive: true });
        writeFileSync(temporary, entryText(value), { flag: 'wx' });
        renameSync(temporary, path);
      } catch (error) {
        fault = fileFault(error);
        removeIfThere(temporary);
      }
    },
    fault: () => fault,
  };
}

/** Removes entries that nobody has written for that many days, and what killed runs have left half written. */
export function pruneCache(folder: string, days: number, now: number): void {
  const day = 86_400_000;
  for (const part of foldersIn(folder)) {
    for (const file of readdirSync(join(folder, part))) {
      const path = join(folder, part, file);
      const limit = file.endsWith('.tmp') ? day / 24 : days * day;
      const written = statSync(path, { throwIfNoEntry: false })?.mtimeMs ?? now;
      if (now - written > limit) rmSync(path, { force: true });
    }
  }
}

function removeIfThere(path: string): void {
  try {
    rmSync(path, { force: true });
  } catch {
    // Its folder does not exist.
  }
}

function foldersIn(folder: string): string[] {
  try {
    return readdirSync(folder).filter((name) => /^[0-9a-f]{2}$/.test(name));
  } catch {
    return [];
  }
}

/** The key of anything that depends on these texts alone. */
export function keyOf(...texts: readonly string[]): string {
  const hash = createHash('sha256');
  for (const text of texts) hash.update(`${Buffer.byteLength(text)}:${text}`);
  return hash.digest('hex');
}

function entryText(value: unknown): string {
  const text = JSON.stringify(value);
  return `${keyOf(text)}\n${text}\n`;
}

function parseEntry(entry: string): unknown {
  const end = entry.indexOf('\n');
  const text = entry.slice(end + 1, -1);
  return entry.slice(0, end) === keyOf(text) ? JSON.parse(text) : undefined;
}
