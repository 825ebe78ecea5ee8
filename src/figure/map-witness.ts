import type { MapPanel, MarginMap } from '../finding/margin-map.ts';
import { ink } from './colour.ts';
import type { Box } from './frame.ts';
import { breakLines } from './paragraph.ts';
import { type FrameScale, numberRuns } from './scale.ts';
import { element, pathData } from './svg.ts';
import { listed, noBreak, setTo } from './symbols.ts';
import { lineOutlines, lineWidth } from './typeface.ts';
import { words } from './typeset.ts';

const markSize = 1.5;

export interface WitnessMark {
  readonly content: string;
  /** What it covers. */
  readonly areas: readonly Box[];
}

/** The lowest point: a diamond, filled where it violates the condition, with its coordinates beside it. */
export function witnessMark(
  map: MarginMap,
  panel: MapPanel,
  box: Box,
  across: FrameScale,
  up: FrameScale,
  size: number,
): WitnessMark {
  const { lowest } = panel;
  if (lowest === null) return { content: '', areas: [] };
  const { margin, point } = lowest;
  const [atX, atY] = [point[map.x.name], point[map.y.name]];
  // A margin that does not depend on a coordinate is lowest along a whole line.
  const x = box.x + (atX === undefined ? 0.5 : across.position(atX)) * box.width;
  const y = box.y + box.height - (atY === undefined ? 0.5 : up.position(atY)) * box.height;
  const violated = margin < -map.condition.tolerance;
  const diamond = pathData(
    [
      [x, y - markSize],
      [x + markSize * 0.8, y],
      [x, y + markSize],
      [x - markSize * 0.8, y],
    ],
    true,
  );
  const mark =
    element('path', { d: diamond, fill: 'none', stroke: '#ffffff', 'stroke-width': 0.9 }) +
    element('path', { d: diamond, fill: violated ? ink.line : '#ffffff', stroke: ink.line, 'stroke-width': 0.3 });
  const small = size * 0.92;
  const value = noBreak(numberRuns(margin));
  const runs = [...value, ...words(' at '), ...listed(Object.entries(point).map(([name, at]) => setTo(name, at, 3)))];
  const lines = breakLines(runs, box.width * 0.8, small);
  const label = {
    width: Math.max(...lines.map((line) => lineWidth(line, small))) + small * 0.7,
    height: lines.length * small * 1.22 + small * 0.45,
  };
  const contour = panel.region
    .flat()
    .map(([cx, cy]): Place => [box.x + across.position(cx) * box.width, box.y + (1 - up.position(cy)) * box.height]);
  const { x: left, y: top } = labelPlace([x, y], label, box, contour);
  const ground = element('rect', { x: left, y: top, ...label, rx: 0.5, fill: '#ffffff', 'fill-opacity': '0.88' });
  const text = lines.map((line, index) =>
    lineOutlines(line, left + small * 0.35, top + small * (1.02 + index * 1.22), small),
  );
  return {
    content: ground + mark + element('g', { fill: ink.text }, text.join('')),
    areas: [
      { x: left, y: top, ...label },
      { x: x - markSize, y: y - markSize, width: 2 * markSize, height: 2 * markSize },
    ],
  };
}

type Place = readonly [x: number, y: number];

/** Beside, above or below the mark, inside the frame: where the label covers least of the contour. */
function labelPlace(
  [x, y]: Place,
  { width, height }: { readonly width: number; readonly height: number },
  box: Box,
  contour: readonly Place[],
): { readonly x: number; readonly y: number } {
  const away = markSize + 0.9;
  const clamp = (at: number, from: number, to: number) => Math.max(from, Math.min(to, at));
  const candidates = [
    [x + away, y - height / 2],
    [x - away - width, y - height / 2],
    [x - width / 2, y - away - height],
    [x - width / 2, y + away],
    [x + away, y - away - height],
    [x - away - width, y - away - height],
    [x + away, y + away],
    [x - away - width, y + away],
  ].map(([left = 0, top = 0]) => ({
    x: clamp(left, box.x + 0.6, box.x + box.width - width - 0.6),
    y: clamp(top, box.y + 0.6, box.y + box.height - height - 0.6),
  }));
  const covers = (place: { readonly x: number; readonly y: number }, [px, py]: Place, space: number) =>
    px > place.x - space && px < place.x + width + space && py > place.y - space && py < place.y + height + space;
  const cost = (place: { readonly x: number; readonly y: number }) =>
    (covers(place, [x, y], markSize * 0.9) ? 1e6 : 0) + contour.filter((point) => covers(place, point, 0.3)).length;
  return candidates.reduce((best, candidate) => (cost(candidate) < cost(best) ? candidate : best));
}
