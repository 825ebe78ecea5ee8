import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import { parseDecimal } from '../number/rational.ts';

/** Points as they were given: decimal text by column name. */
export interface GivenPoints {
  readonly columns: readonly string[];
  readonly points: readonly Readonly<Record<string, string>>[];
  /** Line of each point. */
  readonly lines: readonly number[];
}

interface Cell {
  readonly text: string;
  /** Counts from 1. */
  readonly column: number;
}

interface Line {
  readonly number: number;
  readonly cells: readonly Cell[];
}

/** After so many problems a file is not read further. */
const mostProblems = 40;

/**
 * Points from comma-separated text: a header with known names in any order, then one point a line, every cell a
 * decimal number. Blank lines and lines that begin with # are passed over. Every problem has line and column.
 */
export function parsePoints(text: string, file: string, known: readonly string[]): Outcome<GivenPoints> {
  const [header, ...rows] = linesOf(text);
  if (header === undefined) {
    return failure([
      {
        code: 'wrong-points',
        file,
        message: 'there are no points',
        remedy: 'Begin with a header such as rs,zeta,s,alpha.',
      },
    ]);
  }
  const headerProblems = headerFaults(header, file, known);
  if (headerProblems.length > 0) return failure(headerProblems);
  const columns = header.cells.map((cell) => cell.text);
  const problems: Problem[] = [];
  const points: Record<string, string>[] = [];
  for (const row of rows) {
    const faults = rowFaults(row, columns, file);
    problems.push(...faults);
    if (problems.length >= mostProblems) break;
    points.push(Object.fromEntries(columns.map((name, index) => [name, row.cells[index]?.text ?? ''])));
  }
  if (rows.length === 0) {
    problems.push({
      ...placed(file, header, header.cells[0]),
      message: 'there is a header and no points',
      remedy: 'Add one point a line below the header.',
    });
  }
  return problems.length > 0
    ? failure(problems)
    : success({ columns, points, lines: rows.map(({ number }) => number) });
}

function linesOf(text: string): Line[] {
  return text
    .replace(/^\uFEFF/, '')
    .split(/\r\n|\n|\r/)
    .map((line, index) => ({ line, number: index + 1 }))
    .filter(({ line }) => line.trim() !== '' && !line.trimStart().startsWith('#'))
    .map(({ line, number }) => ({ number, cells: cellsOf(line) }));
}

function cellsOf(line: string): Cell[] {
  let start = 0;
  return line.split(',').map((raw) => {
    const leading = raw.length - raw.trimStart().length;
    const column = start + leading + 1;
    start += raw.length + 1;
    // Spreadsheets may put numbers and names in quotes.
    return { text: raw.trim().replace(/^"(.*)"$/, '$1'), column };
  });
}

function headerFaults(header: Line, file: string, known: readonly string[]): Problem[] {
  const names = header.cells.map(({ text }) => text);
  if (names.length === 1 && /[;\t]/.test(names[0] ?? '')) {
    const message = 'the columns are not separated by commas';
    return [
      {
        ...placed(file, header, header.cells[0]),
        message,
        remedy: 'Separate them by commas; a point is the decimal mark.',
      },
    ];
  }
  return header.cells.flatMap((cell, index) => {
    const place = placed(file, header, cell);
    if (parseDecimal(cell.text) !== undefined) {
      const remedy = `Begin with a header that names the columns: ${known.join(', ')}.`;
      return [{ ...place, message: `the header has the number ${cell.text} in place of a name`, remedy }];
    }
    if (!known.includes(cell.text)) {
      const remedy = suggestion(cell.text, known, `The columns are ${known.join(', ')}.`);
      return [
        { ...place, message: `unknown column ${cell.text === '' ? 'without a name' : shown(cell.text)}`, remedy },
      ];
    }
    if (names.indexOf(cell.text) !== index) {
      return [{ ...place, message: `the column ${cell.text} is there twice`, remedy: 'Remove one of them.' }];
    }
    return [];
  });
}

function rowFaults(row: Line, columns: readonly string[], file: string): Problem[] {
  if (row.cells.length !== columns.length) {
    const message = `the line has ${row.cells.length} cells, the header ${columns.length}`;
    return [{ ...placed(file, row, row.cells[0]), message, remedy: `Give ${columns.join(', ')} on every line.` }];
  }
  return row.cells.flatMap((cell, index) => {
    if (parseDecimal(cell.text) !== undefined) return [];
    const message =
      cell.text === ''
        ? `${columns[index]} is empty`
        : `${columns[index]} is not a decimal number: ${shown(cell.text)}`;
    return [{ ...placed(file, row, cell), message, remedy: 'Write a finite decimal number such as 0.5 or 1e-3.' }];
  });
}

function placed(file: string, line: Line, cell: Cell | undefined): Pick<Problem, 'code' | 'file' | 'line' | 'column'> {
  return { code: 'wrong-points', file, line: line.number, column: cell?.column ?? 1 };
}

function shown(text: string): string {
  return text.length <= 40 ? text : `${text.slice(0, 40)}…`;
}
