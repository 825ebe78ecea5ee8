import opentype from 'opentype.js';

/** A glyph: its advance, and its outline as the first point and relative commands; y downwards, 1000 units to the em. */
type GlyphRow = readonly [advance: number, x: number, y: number, commands: string];

const files = {
  regular: '400Regular/SourceSans3_400Regular.ttf',
  italic: '400Regular_Italic/SourceSans3_400Regular_Italic.ttf',
  semibold: '600SemiBold/SourceSans3_600SemiBold.ttf',
} as const;

const range = (from: number, to: number) =>
  Array.from({ length: to - from + 1 }, (_, k) => String.fromCodePoint(from + k));
const ascii = range(0x20, 0x7e);
const letters = [...range(0xa0, 0x17f), ...range(0x391, 0x3a9), ...range(0x3b1, 0x3c9), 'ϕ', 'ϑ', 'ϵ'];
const signs = [...'–—‘’“”†‡•…′″‹›€∂∆∏∑−∕√∞∫≈≠≤≥←↑→↓↔⁰⁴⁵⁶⁷⁸⁹₀₁₂₃₄₅₆₇₈₉'];
// A title or a variable is seldom beyond Latin-1.
const fewer = [...ascii, ...letters.filter((letter) => letter <= 'ÿ' || letter >= 'Α'), ...signs];
const characters = { regular: [...ascii, ...letters, ...signs], italic: fewer, semibold: fewer };

/** The outlines of the characters that a face has, from the font files. */
export function readFaces(readFile: (path: string) => Buffer): Record<string, Record<string, GlyphRow>> {
  return Object.fromEntries(
    (Object.keys(files) as (keyof typeof files)[]).map((face) => {
      const bytes = readFile(files[face]);
      const font = opentype.parse(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength));
      const rows = characters[face].flatMap((character): [string, GlyphRow][] => {
        const glyph = font.charToGlyph(character);
        if (glyph.index === 0) return [];
        const scale = 1000 / font.unitsPerEm;
        return [
          [character, [Math.round((glyph.advanceWidth ?? 0) * scale), ...outline(glyph.getPath(0, 0, 1000).commands)]],
        ];
      });
      return [face, Object.fromEntries(rows)];
    }),
  );
}

type Command = {
  readonly type: string;
  readonly x?: number;
  readonly y?: number;
  readonly x1?: number;
  readonly y1?: number;
  readonly x2?: number;
  readonly y2?: number;
};

function outline(commands: readonly Command[]): [number, number, string] {
  const first = commands[0];
  if (first === undefined) return [0, 0, ''];
  let here: readonly [number, number] = [Math.round(first.x as number), Math.round(first.y as number)];
  let start = here;
  const from = here;
  let text = '';
  for (const [index, command] of commands.entries()) {
    if (index === 0) continue;
    if (command.type === 'Z') {
      text += 'z';
      here = start;
      continue;
    }
    const points = [
      [command.x1, command.y1],
      [command.x2, command.y2],
      [command.x, command.y],
    ].filter(([x]) => x !== undefined) as [number, number][];
    const numbers = points.flatMap(([x, y]) => [Math.round(x) - here[0], Math.round(y) - here[1]]);
    if (command.type === 'L' && numbers.every((number) => number === 0)) continue;
    text += `${command.type.toLowerCase()}${numbers.join(' ').replaceAll(' -', '-')}`;
    const [x, y] = points.at(-1) as [number, number];
    here = [Math.round(x), Math.round(y)];
    if (command.type === 'M') start = here;
  }
  return [...from, text];
}
