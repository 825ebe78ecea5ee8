import { coordinateSymbol } from '../finding/symbols.ts';
import { jsonText } from './json.ts';
import { padEnd, padStart, setColumns, textWidth, wrap } from './layout.ts';
import { roundTripText, shortText } from './number-text.ts';
import { makePaint } from './paint.ts';
import { answerSymbol } from './symbols.ts';

/** Values of a functional at points, ready to be written. */
export interface PointsReport {
  readonly functional: string;
  /** Trial values of parameters. */
  readonly parameters: Readonly<Record<string, string>>;
  readonly inputColumns: readonly string[];
  /** The coordinates as they were given: decimal text. */
  readonly inputs: readonly Readonly<Record<string, string>>[];
  readonly columns: readonly string[];
  /** A number, decimal text of the digits asked for, or null where there is no value. */
  readonly rows: readonly (readonly (number | string | null)[])[];
  /** Columns of parts that the functional does not have: empty without being a gap. */
  readonly absent: readonly string[];
  readonly notes: readonly string[];
}

/** Input columns first, then the answers; an empty cell where there is no value. Lines end with a line feed. */
export function pointsCsv(report: PointsReport): string {
  const lines = report.rows.map((row, index) => [
    ...report.inputColumns.map((name) => report.inputs[index]?.[name] ?? ''),
    ...row.map(cellText),
  ]);
  return [[...report.inputColumns, ...report.columns], ...lines].map((cells) => `${cells.join(',')}\n`).join('');
}

/**
 * { functional, points: [{ … }] } with the names of the columns; null where there is no value, and then a note.
 * Inputs are numbers, or the text given when the answers are decimal text.
 */
export function pointsJson(report: PointsReport): string {
  const asText = report.rows.some((row) => row.some((value) => typeof value === 'string'));
  const points = report.rows.map((row, index) => {
    const inputs = report.inputColumns.map((name) => {
      const text = report.inputs[index]?.[name] ?? '';
      return [name, asText ? text : Number(text)] as const;
    });
    const gaps = gapsIn(report, row);
    return {
      ...Object.fromEntries(inputs),
      ...Object.fromEntries(report.columns.map((name, column) => [name, row[column] ?? null])),
      ...(gaps.length === 0 ? {} : { note: `no value: ${gaps.join(', ')}` }),
    };
  });
  return jsonText({
    functional: report.functional,
    ...(Object.keys(report.parameters).length === 0 ? {} : { parameters: report.parameters }),
    points,
    ...(report.notes.length === 0 ? {} : { notes: report.notes }),
  });
}

/** One point as a list, several as a table that is cut into as many as the width needs. */
export function pointsText(
  report: PointsReport,
  options: { readonly width: number; readonly colour: boolean },
): string {
  const paint = makePaint(options.colour);
  const trial = Object.entries(report.parameters).map(([name, value]) => `${name} = ${value}`);
  const marks = trial.length === 0 ? '' : ` · TRIAL, not the sheet as written: ${trial.join(', ')}`;
  const heading = wrap(`${report.functional}${marks}`, options.width).map((line) => paint('strong', line));
  const body = report.rows.length === 1 ? onePoint(report) : manyPoints(report, options.width);
  const notes = report.notes.flatMap((note) => wrap(note, options.width));
  const closing = [unitsText(report), ...notes].flatMap((line) => wrap(line, options.width));
  return `${[...heading, ...body, '', ...closing.map((line) => paint('faint', line))].join('\n')}\n`;
}

function onePoint(report: PointsReport): string[] {
  const [row = []] = report.rows;
  const inputs = report.inputColumns.map((name) => [coordinateSymbol(name), report.inputs[0]?.[name] ?? ''] as const);
  const answers = report.columns.flatMap((name, index) =>
    report.absent.includes(name)
      ? []
      : [[answerSymbol(name), aligned(cellText(row[index] ?? null) || 'no value')] as const],
  );
  const width = Math.max(...[...inputs, ...answers].map(([symbol]) => textWidth(symbol)));
  return [
    inputs.map(([symbol, text]) => `${symbol} = ${text}`).join(', '),
    '',
    ...answers.map(([symbol, text]) => `  ${padEnd(symbol, width)}  ${text}`),
  ];
}

/** Room for a sign, so that digits stand under digits. */
function aligned(text: string): string {
  return /^[\d]/.test(text) ? ` ${text}` : text;
}

/** Significant digits in a table of several points; csv and json have all. */
const tableDigits = 9;

function manyPoints(report: PointsReport, width: number): string[] {
  const shown = report.columns.flatMap((name, index) => (report.absent.includes(name) ? [] : [{ name, index }]));
  const right = (heading: string) => ({ heading, align: 'right' as const });
  const columns = [
    right('point'),
    ...report.inputColumns.map((name) => right(coordinateSymbol(name))),
    ...shown.map(({ name }) => right(answerSymbol(name))),
  ];
  const rows = report.rows.map((row, point) => [
    String(point + 1),
    ...report.inputColumns.map((name) => report.inputs[point]?.[name] ?? ''),
    ...shown.map(({ index }) => tableCell(row[index] ?? null)),
  ]);
  const cells = setColumns(columns, rows);
  const widths = columns.map((_, column) => Math.max(...cells.map((line) => textWidth(line[column] ?? ''))));
  return columnGroups(widths, width).flatMap((group, index) => [
    ...(index === 0 ? [] : ['']),
    ...cells.map((line) => group.map((column) => padStart(line[column] ?? '', widths[column] as number)).join('  ')),
  ]);
}

/** Columns that fit beside each other; every group begins with the number of the point. */
function columnGroups(widths: readonly number[], width: number): number[][] {
  const groups: number[][] = [];
  let group: number[] = [0];
  let used = widths[0] as number;
  for (let column = 1; column < widths.length; column++) {
    const needed = 2 + (widths[column] as number);
    if (used + needed > width && group.length > 1) {
      groups.push(group);
      group = [0];
      used = widths[0] as number;
    }
    group.push(column);
    used += needed;
  }
  return [...groups, group];
}

function tableCell(value: number | string | null): string {
  if (value === null) return 'no value';
  return typeof value === 'number' ? shortText(value, tableDigits) : value;
}

function cellText(value: number | string | null): string {
  if (value === null) return '';
  return typeof value === 'number' ? roundTripText(value) : value;
}

/** Names of the answers that a point should have and has not. */
export function gapsIn(report: Pick<PointsReport, 'columns' | 'absent'>, row: PointsReport['rows'][number]): string[] {
  return report.columns.filter((name, index) => row[index] === null && !report.absent.includes(name));
}

function unitsText({ columns }: PointsReport): string {
  const perVolume = columns.some((name) => name.startsWith('d_'));
  const energy = 'Hartree atomic units; ε per particle, F = ε/ε_x^unif of the unpolarised density';
  return perVolume ? `${energy}; e = nε per volume` : energy;
}
