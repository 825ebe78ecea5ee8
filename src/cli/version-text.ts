import { readFileSync } from 'node:fs';
import { catalogueVersion } from '../run/catalogue-version.ts';
import { findFile, idsIn } from '../shelf/sheet-files.ts';
import { catalogueFolders } from './catalogue.ts';
import { packageVersion } from './package-root.ts';
import { settle } from './problems.ts';

/** `0.1.0 (catalogue 3f2a90b1c4de: 80 functionals, 36 conditions)`; the catalogue's version is that of its conditions. */
export function versionText(): string {
  const { functionals, constraints } = settle(catalogueFolders([]));
  const ids = idsIn(constraints);
  const texts = ids.map((id) => readFileSync(findFile(constraints, id) as string, 'utf8'));
  const version = catalogueVersion(ids.map((id, index) => ({ id, text: texts[index] as string })));
  return `${packageVersion()} (catalogue ${version}: ${idsIn(functionals).length} functionals, ${ids.length} conditions)`;
}
