/** Columns that a text takes in a terminal; combining marks take none. */
export function textWidth(text: string): number {
  return [...text.replace(/\p{Mark}/gu, '')].length;
}

export function padEnd(text: string, width: number): string {
  return text + ' '.repeat(Math.max(0, width - textWidth(text)));
}

export function padStart(text: string, width: number): string {
  return ' '.repeat(Math.max(0, width - textWidth(text))) + text;
}

/** Binds the words of a phrase, so that `wrap` does not part them. */
export function bound(phrase: string): string {
  return phrase.replaceAll(' ', '\u00a0');
}

/**
 * Breaks a text at spaces into lines of at most `width` columns; a longer word keeps a line of its own. Bound words
 * stay together and are parted by plain spaces in the result.
 */
export function wrap(text: string, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(/[ \n\t]+/).filter((part) => part !== '')) {
    if (line === '') line = word;
    else if (textWidth(line) + 1 + textWidth(word) <= width) line += ` ${word}`;
    else {
      lines.push(line);
      line = word;
    }
  }
  if (line !== '') lines.push(line);
  return lines.map((finished) => finished.replaceAll('\u00a0', ' '));
}

/** A label and a text beside it, wrapped so that its further lines stand under its first. */
export function labelled(label: string, text: string, labelWidth: number, width: number): string[] {
  const lines = wrap(text, Math.max(20, width - labelWidth));
  return lines.map((line, index) => padEnd(index === 0 ? label : '', labelWidth) + line);
}

export interface Column {
  readonly heading: string;
  readonly align: 'left' | 'right';
}

/**
 * Rows set in columns two spaces apart; every line is a list of padded cells, so that the caller can colour them.
 * The last column is not padded.
 */
export function setColumns(columns: readonly Column[], rows: readonly (readonly string[])[]): string[][] {
  const widths = columns.map(({ heading }, index) =>
    Math.max(textWidth(heading), ...rows.map((row) => textWidth(row[index] ?? ''))),
  );
  return [columns.map(({ heading }) => heading), ...rows].map((row) =>
    columns.map(({ align }, index) => {
      const cell = row[index] ?? '';
      const width = widths[index] as number;
      if (align === 'right') return padStart(cell, width);
      return index === columns.length - 1 ? cell : padEnd(cell, width);
    }),
  );
}
