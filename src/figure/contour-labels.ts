import { ink } from './colour.ts';
import type { Box } from './frame.ts';
import type { Levels } from './levels.ts';
import { numberRuns } from './scale.ts';
import { element } from './svg.ts';
import { lineOutlines, lineWidth } from './typeface.ts';

type Place = readonly [x: number, y: number];

/** One piece of a contour on the drawing. */
export interface ContourLine {
  readonly level: number;
  readonly places: readonly Place[];
}

/** Of places that are tried, and of those that are looked at to be left free, mm. */
const spacing = 0.5;
/** Room around a label, in parts of its height. */
const margin = 0.35;

/** The values of contours, each on its longest piece where it covers no other contour, label or edge; else it has none. */
export function contourLabels(
  lines: readonly ContourLine[],
  { ticks, levels }: Levels,
  box: Box,
  size: number,
  covered: readonly Box[],
): string {
  const small = size * 0.86;
  const taken: Box[] = [...covered];
  const labels: string[] = [];
  // Round values before those between them, and from zero outwards.
  const rank = (level: number) => (ticks.includes(level) ? 0 : 1);
  const order = levels.filter((level) => level !== 0).sort((a, b) => rank(a) - rank(b) || Math.abs(a) - Math.abs(b));
  for (const level of order) {
    const runs = numberRuns(level);
    const width = lineWidth(runs, small);
    const area = ([x, y]: Place): Box => ({
      x: x - width / 2 - small * margin,
      y: y - small * (0.5 + margin / 2),
      width: width + 2 * small * margin,
      height: small * (1 + margin),
    });
    const others = lines.filter((line) => line.level !== level).flatMap(({ places }) => closely(places));
    const isFree = (ground: Box) =>
      isInside(ground, box) &&
      taken.every((other) => !meet(ground, other)) &&
      others.every((place) => !covers(ground, place));
    const place = lines
      .filter((line) => line.level === level && lengthOf(line.places) > 2.5 * width)
      .sort((a, b) => lengthOf(b.places) - lengthOf(a.places))
      .flatMap(({ places }) => fromTheMiddle(closely(places)))
      .find((candidate) => isFree(area(candidate)));
    if (place === undefined) continue;
    const ground = area(place);
    taken.push(ground);
    labels.push(
      element('rect', { ...ground, rx: 0.4, fill: '#ffffff', 'fill-opacity': '0.82' }) +
        element('g', { fill: ink.text }, lineOutlines(runs, place[0] - width / 2, place[1] + small * 0.34, small)),
    );
  }
  return labels.join('');
}

function lengthOf(places: readonly Place[]): number {
  return places.reduce((sum, place, index) => sum + distance(places[Math.max(0, index - 1)] as Place, place), 0);
}

function distance([ax, ay]: Place, [bx, by]: Place): number {
  return Math.hypot(bx - ax, by - ay);
}

/** Places on a line that are at most `spacing` apart. */
function closely(places: readonly Place[]): Place[] {
  return places.flatMap((place, index) => {
    const next = places[index + 1];
    if (next === undefined) return [place];
    const count = Math.max(1, Math.ceil(distance(place, next) / spacing));
    return Array.from({ length: count }, (_, step): Place => {
      const part = step / count;
      return [place[0] + part * (next[0] - place[0]), place[1] + part * (next[1] - place[1])];
    });
  });
}

function fromTheMiddle<Item>(items: readonly Item[]): Item[] {
  const middle = (items.length - 1) / 2;
  return [...items.keys()]
    .sort((a, b) => Math.abs(a - middle) - Math.abs(b - middle))
    .map((index) => items[index] as Item);
}

function isInside(area: Box, box: Box): boolean {
  const right = box.x + box.width - (area.x + area.width);
  const below = box.y + box.height - (area.y + area.height);
  return [area.x - box.x, area.y - box.y, right, below].every((distance) => distance > 0.5);
}

function covers(area: Box, [x, y]: Place): boolean {
  return x > area.x && x < area.x + area.width && y > area.y && y < area.y + area.height;
}

function meet(a: Box, b: Box): boolean {
  return a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height;
}
