/**
 * Writes src/figure/glyphs.json: the outlines of the letters in figures, so that a figure looks the same on every
 * machine and needs no font. Source: Source Sans 3 (SIL Open Font License 1.1, src/figure/glyphs-license.txt).
 */
import { copyFileSync, readFileSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { readFaces } from './read.ts';

const folder = dirname(createRequire(import.meta.url).resolve('@expo-google-fonts/source-sans-3/package.json'));
const faces = readFaces((path) => readFileSync(join(folder, path)));
writeFileSync('src/figure/glyphs.json', `${JSON.stringify(faces, null, 0).replaceAll('],"', '],\n"')}\n`);
copyFileSync(join(folder, 'LICENSE_FONT'), 'src/figure/glyphs-license.txt');
