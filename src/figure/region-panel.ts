import type { MapPanel, MarginMap } from '../finding/margin-map.ts';
import { type PlaneRegions, type Rectangle, type RegionState, regionStates } from '../finding/regions.ts';
import { ink, regionColours } from './colour.ts';
import { innerLines } from './contour.ts';
import { type ContourLine, contourLabels } from './contour-labels.ts';
import type { Box } from './frame.ts';
import type { Levels } from './levels.ts';
import { boundaryLine, inBox, missingCells, type Place, stepRegions } from './map-panel.ts';
import { element, number, pathData } from './svg.ts';

const zeroWidth = 0.28;
const levelWidth = 0.13;
const dashes = '1 0.7';

/** The regions of one panel, filled and patterned, with the margin as contour lines above them. */
export function regionField(
  map: MarginMap,
  panel: MapPanel,
  regions: PlaneRegions,
  levels: Levels,
  box: Box,
  position: (x: number, y: number) => Place,
  name: string,
  size: number,
  covered: readonly Box[],
): string {
  const fills = presentStates([regions]).map((state) =>
    regionFill(state, rectanglesPath(regions[state], box, position), name),
  );
  const contours = stepRegions(map, panel, levels).flatMap((region, index): ContourLine[] => {
    const level = levels.levels[index] as number;
    return innerLines(region).map((line) => ({ level, places: line.map((place) => inBox(place, box)) }));
  });
  const drawn = (sign: 1 | -1) => contours.filter(({ level }) => Math.sign(level) === sign);
  const lines = (some: readonly ContourLine[], dash?: string) => {
    const d = some.map(({ places }) => pathData(places)).join('');
    const stroke = { fill: 'none', stroke: ink.line, 'stroke-width': levelWidth, 'stroke-dasharray': dash };
    return d === '' ? '' : element('path', { d, ...stroke });
  };
  return [
    ...fills,
    lines(drawn(1)),
    lines(drawn(-1), dashes),
    boundaryLine(panel, box, position, zeroWidth),
    contourLabels(contours, levels, box, size, covered),
    missingCells(map, panel, box),
  ].join('');
}

export function presentStates(panels: readonly (PlaneRegions | undefined)[]): RegionState[] {
  return regionStates.filter((state) => panels.some((regions) => (regions?.[state].length ?? 0) > 0));
}

/** A shape in the colour of a state and, but for what is proved, in its pattern: told apart in black and white too. */
export function regionFill(state: RegionState, d: string, name: string): string {
  const fill = element('path', { d, fill: regionColours[state] });
  return state === 'proved' ? fill : fill + element('path', { d, fill: `url(#${name}-${state})` });
}

/** The patterns that region fills refer to: hatching for what violates, dots for what is undecided. */
export function regionPatterns(name: string): string {
  const pattern = (state: RegionState, side: number, content: string, transform?: string) =>
    element(
      'pattern',
      {
        id: `${name}-${state}`,
        width: side,
        height: side,
        patternUnits: 'userSpaceOnUse',
        patternTransform: transform,
      },
      content,
    );
  const line = element('path', { d: 'M0.6 0V1.3', stroke: ink.regionHatch, 'stroke-width': 0.2, fill: 'none' });
  const dots = [
    [0.4, 0.4],
    [1.2, 1.2],
  ].map(([cx = 0, cy = 0]) => element('circle', { cx, cy, r: 0.17, fill: ink.dot }));
  return element('defs', {}, pattern('violated', 1.3, line, 'rotate(45)') + pattern('undecided', 1.6, dots.join('')));
}

function rectanglesPath(rectangles: readonly Rectangle[], box: Box, position: (x: number, y: number) => Place): string {
  return rectangles
    .map(([x0, x1, y0, y1]) => {
      const [left, bottom] = inBox(position(x0, y0), box);
      const [right, top] = inBox(position(x1, y1), box);
      return `M${number(left)} ${number(top)}H${number(right)}V${number(bottom)}H${number(left)}Z`;
    })
    .join('');
}
