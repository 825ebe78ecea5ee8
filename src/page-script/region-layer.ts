import { innerLines, regionsAbove } from '../figure/contour.ts';
import { bridged } from '../figure/gaps.ts';
import { compress, type Levels } from '../figure/levels.ts';
import { type PlaneRegions, type RegionState, regionStates } from '../finding/regions.ts';
import type { AxisRecord } from '../page/page-data.ts';
import { percentText } from '../report/number-text.ts';
import { unitAt } from './coordinate.ts';
import { draw } from './dom.ts';
import { type Box, pathOf } from './frame.ts';

/** Of the texts of a figure, in pixels, on the safe side. */
const letterWidth = 7.2;
const swatch = { width: 24, height: 14 };

const stateWords: Readonly<Record<RegionState, string>> = {
  proved: 'proved to hold',
  violated: 'proved to violate',
  undecided: 'undecided',
};

/** The patterns that tell the states apart without colours. */
export function regionPatterns(name: string): SVGPatternElement[] {
  const pattern = (state: RegionState, side: number, ...content: SVGElement[]) =>
    draw('pattern', { id: `${name}-${state}`, width: side, height: side, patternUnits: 'userSpaceOnUse' }, ...content);
  const dot = (at: number) => draw('circle', { cx: at, cy: at, r: 1, class: 'region-dot' });
  return [
    pattern('violated', 9, draw('path', { d: 'M-1 1L1 -1M0 9L9 0M8 10L10 8', class: 'region-hatch' })),
    pattern('undecided', 9, dot(2.25), dot(6.75)),
  ];
}

function filled(state: RegionState, d: string, name: string): SVGElement[] {
  if (d === '') return [];
  const fill = draw('path', { d, class: `region-${state}` });
  return state === 'proved' ? [fill] : [fill, draw('path', { d, fill: `url(#${name}-${state})` })];
}

/** The rectangles of each state in a box; without a second axis they are as high as it. */
export function regionShapes(
  regions: PlaneRegions,
  x: AxisRecord,
  y: AxisRecord | undefined,
  box: Box,
  name: string,
): SVGElement[] {
  const across = (value: number) => (box.x + unitAt(x, value) * box.width).toFixed(2);
  const up = (value: number) => (box.y + (1 - (y === undefined ? 0 : unitAt(y, value))) * box.height).toFixed(2);
  return regionStates.flatMap((state) => {
    const d = regions[state].map(([x0, x1, y0, y1]) => {
      const top = y === undefined ? box.y.toFixed(2) : up(y1);
      return `M${across(x0)} ${top}H${across(x1)}V${up(y0)}H${across(x0)}Z`;
    });
    return filled(state, d.join(''), name);
  });
}

/** The margin's levels as lines, dashed where it is negative. */
export function contourLines(
  margins: Float64Array,
  width: number,
  height: number,
  levels: Levels,
  box: Box,
): SVGElement[] {
  const finite = bridged(
    Array.from(margins, (margin) => (Number.isFinite(margin) ? margin : null)),
    width,
  );
  const field = { values: finite.map((margin) => compress(levels, margin)), width, height };
  const found = regionsAbove(field, [...levels.levels.keys()]);
  return found.flatMap((region, index) => {
    const level = levels.levels[index] as number;
    if (level === 0) return [];
    const d = innerLines(region).map((line) =>
      pathOf(line.map(([u, v]) => [box.x + u * box.width, box.y + v * box.height] as const)),
    );
    return [draw('path', { d: d.join(''), class: level < 0 ? 'level is-negative' : 'level' })];
  });
}

/** The states that are there, with their shares, in as many rows as they need. */
export function regionLegend(regions: PlaneRegions, box: Box, name: string): { group: SVGGElement; height: number } {
  const group = draw('g', { class: 'legend' });
  let [left, top] = [box.x, box.y];
  for (const state of regionStates) {
    if (regions[state].length === 0) continue;
    const text = `${stateWords[state]} ${percentText(regions.shares[state])}`;
    const width = swatch.width + 8 + text.length * letterWidth;
    if (left > box.x && left + width > box.x + box.width) [left, top] = [box.x, top + 22];
    const rectangle = `M${left} ${top}h${swatch.width}v${swatch.height}h${-swatch.width}Z`;
    group.append(
      ...filled(state, rectangle, name),
      draw('path', { d: rectangle, class: 'edge' }),
      draw('text', { x: left + swatch.width + 7, y: top + 11 }, text),
    );
    left += width + 12;
  }
  return { group, height: top + swatch.height - box.y };
}
