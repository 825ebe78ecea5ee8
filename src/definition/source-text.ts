import type { SourcePlace } from '../errors/problem.ts';

/** The text of one value of a sheet, and where each of its characters stands in the file. */
export interface SourceText {
  readonly text: string;
  /** The line and column of the character at this offset (0 … text.length, clamped) of the text. */
  placeAt(offset: number): SourcePlace;
}

/** A text file in which offsets are turned into lines and columns (both from 1, in UTF-16 units). */
export class TextFile {
  readonly file: string;
  readonly text: string;
  readonly #lineStarts: readonly number[];

  constructor(file: string, text: string) {
    this.file = file;
    this.text = text;
    const starts = [0];
    for (let at = text.indexOf('\n'); at !== -1; at = text.indexOf('\n', at + 1)) starts.push(at + 1);
    this.#lineStarts = starts;
  }

  placeAt(offset: number): SourcePlace {
    const inside = Math.max(0, Math.min(offset, this.text.length));
    let low = 0;
    let high = this.#lineStarts.length - 1;
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if ((this.#lineStarts[middle] as number) <= inside) low = middle;
      else high = middle - 1;
    }
    return { file: this.file, line: low + 1, column: inside - (this.#lineStarts[low] as number) + 1 };
  }

  /** The line (without its end) that holds an offset. */
  lineAt(offset: number): string {
    const { line } = this.placeAt(offset);
    return this.text.slice(this.#lineStarts[line - 1], this.#lineStarts[line]).trimEnd();
  }
}

export type ScalarStyle = 'plain' | 'single-quoted' | 'double-quoted' | 'block';

/** The value of a scalar that stands in the file from offset `start` (its quote or block header included) to `end`. */
export function scalarText(file: TextFile, text: string, style: ScalarStyle, start: number, end: number): SourceText {
  return {
    text,
    placeAt(offset) {
      // Folding, indentation and chomping change white space only, so other characters correspond by their count.
      const target = Math.max(0, Math.min(offset, text.length));
      let count = 0;
      for (let at = 0; at < target; at++) if (!isWhite(text[at] as string)) count++;
      const units = unitOffsets(file.text, style, start, end);
      const here = target < text.length && !isWhite(text[target] as string) ? units[count] : undefined;
      if (here !== undefined) return file.placeAt(here);
      const before = units[count - 1];
      return file.placeAt(before === undefined ? (units[0] ?? start) : before + 1);
    },
  };
}

function isWhite(character: string): boolean {
  return character === ' ' || character === '\t' || character === '\n' || character === '\r';
}

/** The file offset of each UTF-16 unit of the value that is not white space, in order. */
function unitOffsets(source: string, style: ScalarStyle, start: number, end: number): number[] {
  const units: number[] = [];
  let at = start;
  if (style === 'block') {
    const headerEnd = source.indexOf('\n', start);
    at = headerEnd === -1 ? end : headerEnd + 1;
  }
  const quote = style === 'single-quoted' ? "'" : style === 'double-quoted' ? '"' : '';
  const last = quote === '' ? end : end - 1;
  if (quote !== '') at++;
  while (at < last) {
    const character = source[at] as string;
    let length = 1;
    let value = character;
    if (style === 'single-quoted' && character === "'") length = 2;
    if (style === 'double-quoted' && character === '\\') [length, value] = escapeAt(source, at);
    for (const unit of value.split('')) if (!isWhite(unit)) units.push(at);
    at += length;
  }
  return units;
}

const hexadecimalLength: Readonly<Record<string, number>> = { x: 2, u: 4, U: 8 };

/** Length and value of the escape at a backslash (YAML 1.2, section 5.7); the letter stands for any one character. */
function escapeAt(source: string, at: number): [length: number, value: string] {
  const letter = source[at + 1] ?? '';
  const digits = hexadecimalLength[letter];
  if (digits !== undefined) {
    const code = Number.parseInt(source.slice(at + 2, at + 2 + digits), 16);
    return [2 + digits, code <= 0x10ffff ? String.fromCodePoint(code) : '?'];
  }
  return [2, 'nrt'.includes(letter) ? ' ' : letter];
}
