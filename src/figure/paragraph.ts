import { lineWidth, type Run } from './typeface.ts';

/** Breaks runs at spaces into lines of at most `width`; a longer word keeps a line of its own. */
export function breakLines(runs: readonly Run[], width: number, size: number): Run[][] {
  const lines: Run[][] = [];
  let line: Run[] = [];
  let used = 0;
  for (const word of wordsOf(runs)) {
    const space = line.length === 0 ? 0 : lineWidth([{ text: ' ', face: 'regular' }], size);
    const own = lineWidth(word, size);
    if (line.length > 0 && used + space + own > width) {
      lines.push(line);
      line = [];
      used = 0;
    }
    if (line.length > 0) {
      line.push({ text: ' ', face: 'regular' });
      used += space;
    }
    line.push(...word);
    used += own;
  }
  return line.length === 0 ? lines : [...lines, line];
}

/** Pieces between spaces, each of one or more runs; a no-break space holds words together. */
function wordsOf(runs: readonly Run[]): Run[][] {
  const words: Run[][] = [[]];
  for (const run of runs) {
    run.text.split(' ').forEach((piece, index) => {
      if (index > 0) words.push([]);
      if (piece !== '') words.at(-1)?.push({ ...run, text: piece });
    });
  }
  return words.filter((word) => word.length > 0);
}
