import glyphs from './glyphs.json' with { type: 'json' };
import { escapeXml, number } from './svg.ts';

export type Face = 'regular' | 'italic' | 'semibold';

/** Letters of one face and height. */
export interface Run {
  readonly text: string;
  readonly face: Face;
  readonly script?: 'sub' | 'super';
}

type GlyphRow = readonly [advance: number, x: number, y: number, commands: string];

const faces = glyphs as unknown as Readonly<Record<Face, Readonly<Record<string, GlyphRow>>>>;
/** Subscripts and superscripts: their size and where their base line lies, both in parts of the size. */
const scriptSize = 0.72;
const scriptShift = { sub: 0.16, super: -0.33 } as const;
/** What a letter without an outline is taken to be wide. */
const unknownAdvance = 700;

/** The width of a line, in the unit of `size` (the em). */
export function lineWidth(runs: readonly Run[], size: number): number {
  return runs.reduce((sum, run) => sum + runWidth(run, size), 0);
}

function runWidth({ text, face, script }: Run, size: number): number {
  const scale = (script === undefined ? size : size * scriptSize) / 1000;
  return [...text].reduce((sum, letter) => sum + (faces[face][letter]?.[0] ?? unknownAdvance) * scale, 0);
}

/** A line as SVG outlines, its base line beginning at x, y. Runs with letters that have no outline stay text. */
export function lineOutlines(runs: readonly Run[], x: number, y: number, size: number): string {
  let at = x;
  return runs
    .map((run) => {
      const drawn = runOutlines(run, at, y, size);
      at += runWidth(run, size);
      return drawn;
    })
    .join('');
}

function runOutlines({ text, face, script }: Run, x: number, y: number, size: number): string {
  const own = script === undefined ? size : size * scriptSize;
  const base = script === undefined ? y : y + size * scriptShift[script];
  const rows = [...text].map((letter) => faces[face][letter]);
  if (rows.some((row) => row === undefined)) return plainText(text, face, x, base, own);
  let at = 0;
  let data = '';
  for (const [advance, startX, startY, commands] of rows as readonly GlyphRow[]) {
    if (commands !== '') data += `M${at + startX} ${startY}${commands}z`;
    at += advance;
  }
  const scale = Number((own / 1000).toPrecision(5));
  return data === '' ? '' : `<path transform="translate(${number(x)} ${number(base)})scale(${scale})" d="${data}"/>`;
}

function plainText(text: string, face: Face, x: number, y: number, size: number): string {
  const style = `${face === 'italic' ? ' font-style="italic"' : ''}${face === 'semibold' ? ' font-weight="600"' : ''}`;
  const family = 'font-family="Helvetica, Arial, sans-serif"';
  return `<text x="${number(x)}" y="${number(y)}" font-size="${number(size)}" ${family}${style} xml:space="preserve">${escapeXml(text)}</text>`;
}
