import type { MapPanel, MarginMap } from '../finding/margin-map.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { countText } from '../report/number-text.ts';
import { forceNames } from '../report/words.ts';
import { hasGaps } from './gaps.ts';
import type { Levels } from './levels.ts';
import { presentStates } from './region-panel.ts';
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
    ...(map.panels.some(({ regions }) => regions !== undefined)
      ? regionWords(map, anyViolated)
      : words(marginWords(anyViolated, condition.tolerance, levels))),
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

function marginWords(anyViolated: boolean, tolerance: number, { kind }: Levels): string {
  const margin = anyViolated
    ? `Signed margin; hatched, and below zero, where the condition is violated; ${boundaryWords(tolerance)}. `
    : 'Signed margin; the condition is violated at no point shown. ';
  return `${margin}${kind === 'compressed' ? 'Colour steps are compressed, alike on either side of zero. ' : ''}`;
}

/** What the regions and the lines of a proof are. */
function regionWords({ panels, condition: { tolerance, unit } }: MarginMap, anyViolated: boolean): Run[] {
  const boxes = panels.reduce((sum, { regions }) => sum + (regions?.boxes ?? 0), 0);
  const stops = panels.map(({ regions }) => regions?.stop);
  const rewritten = panels.some(({ regions }) => (regions?.rewrites.length ?? 0) > 0);
  const left = stops.includes('budget') ? 'when the budget of boxes ended' : 'down to the smallest boxes';
  const states = presentStates(panels.map(({ regions }) => regions));
  return [
    ...words('Regions, from '),
    ...noBreak(words(`${countText(boxes)} ${boxes === 1 ? 'box' : 'boxes'}`)),
    ...words(` of interval arithmetic${rewritten ? ' after exact rewrites of the formula' : ''}: margin at least −`),
    ...numberRuns(tolerance),
    ...words(' wherever the formula has a value'),
    ...words(states.includes('violated') ? '; margin below that' : ''),
    ...words(states.includes('undecided') ? `; undecided: neither, ${left}` : ''),
    ...words('. Shares are of the area as drawn. Lines: signed margin'),
    ...(unit === null || unit === '' ? [] : [...words(' in '), ...formula(unit)]),
    ...words(', in double precision and no proof'),
    ...words(anyViolated ? `, dashed below zero; ${boundaryWords(tolerance)}. ` : '. '),
  ];
}

/** A tolerance that the eye could see is told. */
function boundaryWords(tolerance: number): string {
  return tolerance < 1e-6
    ? 'the heavy line is at zero'
    : `the heavy line is at −${tolerance}, the tolerance, within which a margin counts as zero`;
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
