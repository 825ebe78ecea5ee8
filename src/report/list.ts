import type { Finding } from '../finding/finding.ts';
import { padEnd, setColumns, textWidth, wrap } from './layout.ts';
import { makePaint } from './paint.ts';
import { forceNames } from './words.ts';

export interface ListedFunctional {
  readonly id: string;
  readonly name: string;
  readonly rung: string;
  readonly year: number | null;
  readonly parts: readonly string[];
  readonly parameters: number;
  /** The share of exact exchange as the sheet gives it. */
  readonly exactExchange: string | null;
  readonly summary: string | null;
}

export interface ListedConstraint {
  readonly id: string;
  readonly title: string;
  readonly part: Finding['part'];
  readonly force: Finding['force'];
  readonly status: Finding['status'];
}

interface ListOptions {
  readonly width: number;
  readonly colour: boolean;
}

/** The functionals by rung, those with exact exchange after those without. */
export function functionalList(functionals: readonly ListedFunctional[], options: ListOptions): string {
  const columns = [
    { heading: 'id', align: 'left' as const },
    { heading: 'name', align: 'left' as const },
    { heading: 'year', align: 'right' as const },
    { heading: 'parameters', align: 'right' as const },
    { heading: 'gives', align: 'left' as const },
    { heading: 'exact exchange', align: 'left' as const },
  ];
  const groups = groupOrder
    .map((name) => ({ name, members: functionals.filter((functional) => groupOf(functional) === name) }))
    .filter(({ members }) => members.length > 0);
  const rows = groups.flatMap(({ members }) =>
    members.map(({ id, name, year, parameters, parts, exactExchange }) => [
      id,
      name,
      year === null ? '' : String(year),
      parameters === 0 ? '·' : String(parameters),
      partsText(parts),
      exactExchange ?? '',
    ]),
  );
  const starts = new Map<number, string>();
  let row = 0;
  for (const { name, members } of groups) {
    starts.set(row, name);
    row += members.length;
  }
  return listText(columns, rows, options, `${functionals.length} functionals`, undefined, starts);
}

const groupOrder = ['lda', 'gga', 'hybrid gga', 'meta-gga', 'hybrid meta-gga', 'hybrid lda'];

function groupOf({ rung, exactExchange }: ListedFunctional): string {
  return exactExchange === null ? rung : `hybrid ${rung}`;
}

export function constraintList(constraints: readonly ListedConstraint[], options: ListOptions): string {
  const columns = [
    { heading: 'id', align: 'left' as const },
    { heading: 'part', align: 'left' as const },
    { heading: 'status', align: 'left' as const },
    { heading: 'local form is', align: 'left' as const },
  ];
  const rows = constraints.map(({ id, part, status, force, title }) => [
    id,
    partsText([part]),
    status,
    forceNames[force],
    title,
  ]);
  return listText(
    columns,
    rows,
    options,
    `${constraints.length} conditions; rungcheck explain <condition> tells more of one`,
    'what it says',
  );
}

const partLetters: Readonly<Record<string, string>> = { exchange: 'x', correlation: 'c', 'exchange-correlation': 'xc' };

function partsText(parts: readonly string[]): string {
  return parts.map((part) => partLetters[part] ?? part).join(' + ');
}

/** A table with a faint heading; a text column at its end is wrapped, or left out when there is no room for it. */
function listText(
  columns: readonly { heading: string; align: 'left' | 'right' }[],
  rows: readonly (readonly string[])[],
  { width, colour }: ListOptions,
  closing: string,
  textHeading?: string,
  /** Headings of groups, by the row that each stands above. */
  groups: ReadonlyMap<number, string> = new Map(),
): string {
  const paint = makePaint(colour);
  const [heading = [], ...lines] = setColumns(
    [...columns, { heading: '', align: 'left' }],
    rows.map((row) => [...row]),
  );
  const line = (cells: readonly string[]) => cells.slice(0, columns.length).join('  ');
  const used = textWidth(line(heading));
  const room = width - used - 2;
  const withText = textHeading !== undefined && room >= 44;
  const body = lines.flatMap((cells, index) => {
    const group = groups.get(index);
    if (group !== undefined) return [...(index === 0 ? [] : ['']), paint('strong', group), line(cells).trimEnd()];
    if (!withText) return [line(cells).trimEnd()];
    const [first = '', ...more] = wrap(rows[index]?.[columns.length] ?? '', room);
    return [`${padEnd(line(cells), used)}  ${first}`, ...more.map((text) => `${' '.repeat(used)}  ${text}`)];
  });
  const head = withText ? `${line(heading)}  ${textHeading}` : line(heading).trimEnd();
  return `${[paint('faint', head), ...body, '', ...wrap(closing, width)].join('\n')}\n`;
}
