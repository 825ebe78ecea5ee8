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
  const field = (values: readonly number[]): Field => ({
    values,
    width: map.x.values.length,
    height: map.y.values.length,
  });
  const d = ({ rings }: Region) =>
    rings
      .map((ring) =>
        pathData(
          ring.map(([x, y]) => [box.x + x * box.width, box.y + y * box.height]),
          true,
        ),
      )
      .join('');
  const measured = bridged(panel.margins, map.x.values.length).map((margin) =>
    compress(levels, settled(margin, map.condition.tolerance)),
  );
  const bands = regionsAbove(field(measured), [...levels.levels.keys()])
    .map((region, index) => ({ path: d(region), fill: stepColour(levels, index + 1) }))
    .filter(({ path }) => path !== '')
    .map(({ path, fill }) =>
      element('path', { d: path, fill, stroke: fill, 'stroke-width': 0.04, 'fill-rule': 'evenodd' }),
    );
  const missing = hasGaps(panel.margins)
    ? missingCells(d(regionsAbove(field(panel.margins.map((margin) => (margin === null ? 1 : 0))), [0.5])[0] as Region))
    : '';
  return [
    element('rect', { ...box, fill: stepColour(levels, 0) }),
    ...bands,
    violatedRegion(panel, box, position, `${name}-violated`),
    missing,
  ].join('');
}

/** A margin within the tolerance of zero counts as zero: round-off makes no region. */
function settled(margin: number, tolerance: number): number {
  return margin < 0 && margin >= -tolerance ? 0 : margin;
}

type Place = readonly [x: number, y: number];

/** Hatching, and a line where the region ends inside the frame. */
function violatedRegion(
  { region }: MapPanel,
  box: Box,
  position: (x: number, y: number) => Place,
  clip: string,
): string {
  if (region.length === 0) return '';
  const rings = region.map((ring) => ring.map(([x, y]) => position(x, y)));
  const outline = rings
    .map((ring) =>
      pathData(
        ring.map((place) => inBox(place, box)),
        true,
      ),
    )
    .join('');
  const contour = innerLines({ rings })
    .map((line) => pathData(line.map((place) => inBox(place, box))))
    .join('');
  const lines = { stroke: ink.hatch, 'stroke-width': 0.13, fill: 'none', 'clip-path': `url(#${clip})` };
  return [
    element('clipPath', { id: clip }, element('path', { d: outline, 'clip-rule': 'evenodd' })),
    element('path', { d: hatch(box), ...lines }),
    contour === '' ? '' : element('path', { d: contour, fill: 'none', stroke: ink.line, 'stroke-width': contourWidth }),
  ].join('');
}

/** Step 0 lies below the first level, step k between level k − 1 and level k. */
export function stepColour({ levels }: Levels, step: number): string {
  const zero = levels.indexOf(0);
  const most = Math.max(zero + 1, levels.length - zero);
  // The first steps beside zero are told apart from white.
  const size = (count: number) => 0.06 + 0.94 * (most === 1 ? 0.4 : (count - 0.5) / (most - 0.5));
  return step <= zero ? divergingColour(-size(zero + 1 - step)) : divergingColour(size(step - zero));
}

function inBox([x, y]: readonly [number, number], box: Box): readonly [number, number] {
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
function missingCells(d: string): string {
  const dotted = { stroke: ink.line, 'stroke-width': 0.1, 'stroke-dasharray': '0.3 0.5' };
  return element('path', { d, fill: ink.missing, 'fill-rule': 'evenodd', ...dotted });
}
