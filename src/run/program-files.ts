import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder of the built program; undefined when it runs from its source. */
export function builtFolder(): string | undefined {
  let folder = dirname(fileURLToPath(import.meta.url));
  for (let steps = 0; steps < 2; steps++) {
    if (existsSync(join(folder, 'cli.js')) && existsSync(join(folder, 'worker.js'))) return folder;
    folder = dirname(folder);
  }
  return undefined;
}

/** Changes with every change of the built program: the names of its parts hold the hashes of their contents. */
export function programHash(folder: string): string {
  const hash = createHash('sha256');
  for (const file of ['cli.js', 'worker.js']) hash.update(readFileSync(join(folder, file)));
  for (const part of readdirSync(join(folder, 'parts')).sort()) hash.update(`${part}\n`);
  return hash.digest('hex');
}
