import { createHash } from 'node:crypto';

/** Changes whenever the sheet of a condition does. */
export function catalogueVersion(conditions: readonly { readonly id: string; readonly text: string }[]): string {
  const hash = createHash('sha256');
  for (const sheet of conditions.map(({ id, text }) => `${id}\n${text}\n`).sort()) hash.update(sheet);
  return hash.digest('hex').slice(0, 12);
}
