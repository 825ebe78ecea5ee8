import type { MapPanel, MarginMap } from '../finding/margin-map.ts';
import { divergingColour, ink } from './colour.ts';
import { type Field, innerLines, type Region, regionsAbove } from './contour.ts';
import type { Box } from './frame.ts';
import { bridged, hasGaps } from './gaps.ts';
import { compress, type Levels } from './levels.ts';
import { element, number, pathData } from './svg.ts';

const hatchStep = 1.25;
const contourWidth = 0.4;

/** The filled steps, the hatching of the violated region and the contour at zero of one panel, within its box. */
export function mapField(
  map: MarginMap,
  panel: MapPanel,
  levels: Levels,
  box: Box,
  position: (x: number, y: number) => Place,
  name: string,
): string {
  const bands = stepRegions(map, panel, levels)
    .map((region, index) => ({ path: outline(region, box), fill: stepColour(levels, index + 1) }))
    .filter(({ path }) => path !== '')
    .map(({ path, fill }) =>
      element('path', { d: path, fill, stroke: fill, 'stroke-width': 0.04, 'fill-rule': 'evenodd' }),
    );
  return [
    element('rect', { ...box, fill: stepColour(levels, 0) }),
    ...bands,
    violatedRegion(panel, box, position, `${name}-violated`),
    missingCells(map, panel, box),
  ].join('');
}

/** For each level, where the margin is at least that. */
export function stepRegions(map: MarginMap, { margins }: MapPanel, levels: Levels): Region[] {
  const measured = bridged(margins, map.x.values.length).map((margin) =>
    compress(levels, settled(margin, map.condition.tolerance)),
  );
  return regionsAbove(fieldOf(map, measured), [...levels.levels.keys()]);
}

function fieldOf({ x, y }: MarginMap, values: readonly number[]): Field {
  return { values, width: x.values.length, height: y.values.length };
}

function outline({ rings }: Region, box: Box): string {
  return rings
    .map((ring) =>
      pathData(
        ring.map((place) => inBox(place, box)),
        true,
      ),
    )
    .join('');
}

/** A margin within the tolerance of zero counts as zero: round-off makes no region. */
function settled(margin: number, tolerance: number): number {
  return margin < 0 && margin >= -tolerance ? 0 : margin;
}

export type Place = readonly [x: number, y: number];

/** Hatching, and a line where the region ends inside the frame. */
function violatedRegion(panel: MapPanel, box: Box, position: (x: number, y: number) => Place, clip: string): string {
  if (panel.region.length === 0) return '';
  const rings = panel.region.map((ring) => ring.map(([x, y]) => position(x, y)));
  const lines = { stroke: ink.hatch, 'stroke-width': 0.13, fill: 'none', 'clip-path': `url(#${clip})` };
  return [
    element('clipPath', { id: clip }, element('path', { d: outline({ rings }, box), 'clip-rule': 'evenodd' })),
    element('path', { d: hatch(box), ...lines }),
    boundaryLine(panel, box, position),
  ].join('');
}

/** The line where the violated region ends inside the frame. */
export function boundaryLine(
  { region }: MapPanel,
  box: Box,
  position: (x: number, y: number) => Place,
  width = contourWidth,
): string {
  const rings = region.map((ring) => ring.map(([x, y]) => position(x, y)));
  const d = innerLines({ rings })
    .map((line) => pathData(line.map((place) => inBox(place, box))))
    .join('');
  return d === '' ? '' : element('path', { d, fill: 'none', stroke: ink.line, 'stroke-width': width });
}

/** Step 0 lies below the first level, step k between level k − 1 and level k. */
export function stepColour({ levels }: Levels, step: number): string {
  const zero = levels.indexOf(0);
  const most = Math.max(zero + 1, levels.length - zero);
  // The first steps beside zero are told apart from white.
  const size = (count: number) => 0.06 + 0.94 * (most === 1 ? 0.4 : (count - 0.5) / (most - 0.5));
  return step <= zero ? divergingColour(-size(zero + 1 - step)) : divergingColour(size(step - zero));
}

/** A place in parts of a box, y downwards, on the drawing. */
export function inBox([x, y]: readonly [number, number], box: Box): readonly [number, number] {
  return [box.x + x * box.width, box.y + y * box.height];
}

/** Lines that rise to the right, across a box. */
export function hatch({ x, y, width, height }: Box, step = hatchStep): string {
  const lines: string[] = [];
  for (let start = -height; start < width; start += step * Math.SQRT2) {
    const [from, to] = [Math.max(0, start), Math.min(width, start + height)];
    lines.push(
      `M${number(x + from)} ${number(y + height - (from - start))}L${number(x + to)} ${number(y + height - (to - start))}`,
    );
  }
  return lines.join('');
}

/** Grey with a dotted edge where the margin has no value. */
export function missingCells(map: MarginMap, { margins }: MapPanel, box: Box): string {
  if (!hasGaps(margins)) return '';
  const missing = margins.map((margin) => (margin === null ? 1 : 0));
  const d = outline(regionsAbove(fieldOf(map, missing), [0.5])[0] as Region, box);
  const dotted = { stroke: ink.line, 'stroke-width': 0.1, 'stroke-dasharray': '0.3 0.5' };
  return element('path', { d, fill: ink.missing, 'fill-rule': 'evenodd', ...dotted });
}
