import type { MapPanel, MarginMap } from '../finding/margin-map.ts';
import type { RegionState } from '../finding/regions.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { percentText } from '../report/number-text.ts';
import { ink } from './colour.ts';
import { breakLines } from './paragraph.ts';
import { presentStates, regionFill } from './region-panel.ts';
import { numberRuns } from './scale.ts';
import { element, number } from './svg.ts';
import { listed, noBreak } from './symbols.ts';
import { lineOutlines, lineWidth, type Run } from './typeface.ts';
import { formula, words } from './typeset.ts';

const swatch = { width: 3.8, height: 2.3 };
const besideSwatch = 0.8;
const betweenEntries = 1.8;

const stateWords: Readonly<Record<RegionState, string>> = {
  proved: 'proved to hold',
  violated: 'proved to violate',
  undecided: 'undecided',
};

export interface RegionLegend {
  readonly height: number;
  readonly content: string;
}

/** The states that the panels show, with the share of each, and what "proved" means here. */
export function regionLegend(
  map: MarginMap,
  x: number,
  y: number,
  width: number,
  size: number,
  name: string,
): RegionLegend {
  const step = Math.max(size * 1.45, swatch.height + 0.7);
  let [left, row] = [x, 0];
  const entries = presentStates(map.panels.map(({ regions }) => regions)).map((state) => {
    const runs = [...words(stateWords[state]), ...words('  '), ...sharesOf(map.panels, state)];
    const own = swatch.width + besideSwatch + lineWidth(runs, size);
    if (left > x && left + own > x + width) [left, row] = [x, row + 1];
    const [at, top] = [left, y + row * step];
    left += own + betweenEntries;
    const rectangle = `M${number(at)} ${number(top)}h${swatch.width}v${swatch.height}h${-swatch.width}Z`;
    return [
      regionFill(state, rectangle, name),
      element('path', { d: rectangle, fill: 'none', stroke: ink.line, 'stroke-width': 0.15 }),
      lineOutlines(runs, at + swatch.width + besideSwatch, top + swatch.height / 2 + size * 0.34, size),
    ].join('');
  });
  const small = size * 0.92;
  const first = y + (row + 1) * step + small * 0.8;
  const lines = breakLines(meaning(map), width, small);
  const text = lines.map((line, index) => lineOutlines(line, x, first + index * small * 1.25, small));
  return {
    height: first - y + (lines.length - 1) * small * 1.25 + small * 0.3,
    content: element('g', { fill: ink.text }, [...entries, ...text].join('')),
  };
}

/** `93.2 %`; of several panels `a 93.2 %, b 80.1 %`. */
function sharesOf(panels: readonly MapPanel[], state: RegionState): Run[] {
  const share = ({ regions }: MapPanel) => words(percentText(regions?.shares[state] ?? 0).replace(' ', '\u00a0'));
  if (panels.length === 1) return share(panels[0] as MapPanel);
  return listed(
    panels.map((panel, index) => [...words(`${String.fromCharCode(97 + index)}\u00a0`, 'semibold'), ...share(panel)]),
  );
}

function meaning({ panels, condition }: MarginMap): Run[] {
  const over = [...new Set(panels.flatMap(({ worstOver }) => worstOver.map((entry) => entry.name)))];
  const states = presentStates(panels.map(({ regions }) => regions));
  const claims = [
    ...(states.includes('proved') ? ['holds for every value'] : []),
    ...(states.includes('violated') ? ['violated at some value'] : []),
  ];
  const quantified =
    over.length === 0 || claims.length === 0
      ? []
      : [
          ...words('over '),
          ...listed(over.map((name) => formula(coordinateSymbol(name)))),
          ...words(`: ${claims.join(', ')}; `),
        ];
  return [
    ...words('Decided by interval arithmetic rounded outward, on '),
    ...words(panels.length > 1 ? 'these planes alone; ' : 'this plane alone; '),
    ...quantified,
    ...noBreak([...words('tolerance '), ...numberRuns(condition.tolerance), ...words('.')]),
  ];
}
