import type { MapPanel, MarginMap } from '../finding/margin-map.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { forceNames } from '../report/words.ts';
import { hasGaps } from './gaps.ts';
import type { Levels } from './levels.ts';
import { numberRuns } from './scale.ts';
import { listed, noBreak, setTo } from './symbols.ts';
import type { Run } from './typeface.ts';
import { formula, words } from './typeset.ts';

/** What the figure shows, for below it: functional, condition, slice, domain, and how to read the colours. */
export function captionOf(map: MarginMap, levels: Levels): Run[] {
  const names = [...new Set(map.panels.map(({ functional }) => functional.name))];
  const { condition } = map;
  const anyViolated = map.panels.some(({ violatedCells }) => violatedCells > 0);
  return [
    ...words(condition.title, 'semibold'),
    ...words(', '),
    ...formula(condition.requirement),
    ...words(` (${condition.status}; local form ${forceNames[condition.force]}), for ${names.join(', ')}. `),
    ...words(
      anyViolated
        ? `Signed margin; hatched, and below zero, where the condition is violated; ${boundaryWords(condition.tolerance)}. `
        : 'Signed margin; the condition is violated at no point shown. ',
    ),
    ...words(levels.kind === 'compressed' ? 'Colour steps are compressed, alike on either side of zero. ' : ''),
    ...constantsWords(map),
    ...sliceWords(map),
    ...words(' Domain: '),
    ...listed(
      [map.x, map.y].map(({ name, values, scale }) =>
        rangeWords(
          name,
          values[0] as number,
          values.at(-1) as number,
          scale === 'compact' ? ' (axis linear in u/(1 + u))' : '',
        ),
      ),
    ),
    ...words('. Diamond: lowest margin.'),
    ...(map.panels.some(({ margins }) => hasGaps(margins)) ? words(' Grey: no finite value.') : []),
  ];
}

/** A tolerance that the eye could see is told. */
function boundaryWords(tolerance: number): string {
  return tolerance < 1e-6
    ? 'the black line is at zero'
    : `the black line is at −${tolerance}, the tolerance, within which a margin counts as zero`;
}

function rangeWords(name: string, lower: number, upper: number | null, note = ''): Run[] {
  const end = upper === null ? words('∞') : numberRuns(upper, 6);
  return noBreak([
    ...formula(coordinateSymbol(name)),
    ...words(' '),
    ...numberRuns(lower, 6),
    ...words(' to '),
    ...end,
    ...words(note),
  ]);
}

/** Slices that all panels share, and what was left at its worst. */
function sliceWords({ panels }: MarginMap): Run[] {
  const shared = sharedFixed(panels);
  const over = new Map(panels.flatMap(({ worstOver }) => worstOver.map((entry) => [entry.name, entry] as const)));
  return [
    ...(shared.length === 0
      ? []
      : [...words('At '), ...listed(shared.map(([name, value]) => setTo(name, value))), ...words('. ')]),
    ...(over.size === 0
      ? []
      : [
          ...words('Each point shows the smallest margin over '),
          ...listed([...over.values()].map(({ name, lower, upper }) => rangeWords(name, lower, upper))),
          ...words('.'),
        ]),
  ];
}

function sharedFixed(panels: readonly MapPanel[]): [string, number][] {
  return Object.entries(panels[0]?.fixed ?? {}).filter(([name, value]) =>
    panels.every(({ fixed }) => fixed[name] === value),
  );
}

function constantsWords({ condition: { constants } }: MarginMap): Run[] {
  const items = Object.entries(constants).map(([name, value]) => `${name}\u00a0${value}`);
  return items.length === 0 ? [] : words(`Constants: ${items.join(', ')}. `);
}
