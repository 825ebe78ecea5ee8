import { line } from 'd3-shape';
import type { Bound } from '../finding/curves.ts';
import { curveColours, dashPatterns, ink } from './colour.ts';
import type { Box } from './frame.ts';
import { placeLabels } from './labels.ts';
import { numberRuns } from './scale.ts';
import { element, number, pathData } from './svg.ts';
import { lineOutlines, lineWidth, type Run } from './typeface.ts';
import { words } from './typeset.ts';

export type Place = readonly [x: number, y: number];

const curveWidth = 0.42;
/** From the frame to the labels: room for a piece of the curve. */
export const leader = 4.2;

/** Hue, lightness and dash pattern of the k-th curve. */
export function curveStyle(index: number): Readonly<Record<string, string | number | undefined>> {
  // The two cycles have no common factor but differ in length after the first round.
  const round = Math.floor(index / curveColours.length);
  const dashes = dashPatterns[(index + round) % dashPatterns.length] as readonly number[];
  return {
    fill: 'none',
    stroke: curveColours[index % curveColours.length] as string,
    'stroke-width': curveWidth,
    'stroke-dasharray': dashes.length === 0 ? undefined : dashes.map(number).join(' '),
  };
}

/** One curve, broken where there is no value. */
export function curvePath(places: readonly (Place | null)[], index: number): string {
  const path = line<Place | null>()
    .defined((place) => place !== null)
    .x((place) => Math.round((place as Place)[0] * 1000) / 1000)
    .y((place) => Math.round((place as Place)[1] * 1000) / 1000)(places);
  return path === null ? '' : element('path', { d: path, ...curveStyle(index) });
}

/** Labels right of the frame, each led to by a piece of its curve. */
export function endLabels(
  curves: readonly (readonly (Place | null)[])[],
  labels: readonly (readonly Run[])[],
  box: Box,
  size: number,
): string {
  const right = box.x + box.width;
  const ends = curves.map((places) =>
    Math.max(box.y, Math.min(box.y + box.height, places.findLast((place) => place !== null)?.[1] ?? box.y)),
  );
  const heights = placeLabels(ends, size * 1.18, box.y + size * 0.2, box.y + box.height - size * 0.1);
  return labels
    .map((label, index) => {
      const [end, height] = [ends[index] as number, heights[index] as number];
      const led = pathData([
        [right, end],
        [right + leader * 0.3, height],
        [right + leader * 0.85, height],
      ]);
      const text = element('g', { fill: ink.text }, lineOutlines(label, right + leader, height + size * 0.33, size));
      return element('path', { d: led, ...curveStyle(index) }) + text;
    })
    .join('');
}

/** A thin line at the level of a bound, with short strokes on the forbidden side. */
export function boundLine({ relation }: Bound, y: number, box: Box): string {
  const side = relation === '<=' ? -1 : 1;
  const strokes: string[] = [];
  for (let x = box.x + 0.6; x < box.x + box.width; x += 1.5) {
    strokes.push(`M${number(x)} ${number(y)}L${number(x + 0.7)} ${number(y + side * 0.7)}`);
  }
  const stroke = { fill: 'none', stroke: ink.faint };
  return (
    element('path', {
      d: pathData([
        [box.x, y],
        [box.x + box.width, y],
      ]),
      ...stroke,
      'stroke-width': 0.22,
    }) + element('path', { d: strokes.join(''), ...stroke, 'stroke-width': 0.12 })
  );
}

/** The values of bounds beside their lines, where no curve and no other label is in the way. */
export function boundLabels(
  bounds: readonly { readonly bound: Bound; readonly y: number }[],
  curves: readonly (readonly (Place | null)[])[],
  box: Box,
  size: number,
): string {
  const small = size * 0.9;
  const taken: Box[] = [];
  return bounds
    .map(({ bound, y }) => {
      const full = [...numberRuns(bound.value, 4), ...words(`  ${bound.title}`)];
      const candidates = [full, numberRuns(bound.value, 4)].flatMap((runs) =>
        candidatesFor(runs, bound, y, box, small),
      );
      const clear = ({ place }: (typeof candidates)[number]) =>
        inside(place, box) &&
        !taken.some((other) => overlap(place, other)) &&
        !curves.some((curve) => crosses(curve, place)) &&
        !bounds.some((other) => other.y !== y && other.y > place.y - 0.2 && other.y < place.y + place.height + 0.2);
      const chosen = candidates.find(clear) ?? candidates.at(-1);
      if (chosen === undefined) return '';
      taken.push(chosen.place);
      const { place, runs } = chosen;
      return element('g', { fill: ink.faint }, lineOutlines(runs, place.x, place.y + small * 0.95, small));
    })
    .join('');
}

function candidatesFor(runs: readonly Run[], { relation }: Bound, y: number, box: Box, size: number) {
  const width = lineWidth(runs, size);
  const height = size * 1.25;
  // The allowed side first: the other one carries the strokes.
  const tops = relation === '<=' ? [y + 0.25, y - 0.9 - height] : [y - 0.25 - height, y + 0.9];
  return tops.flatMap((top) =>
    [0.98, 0.5, 0.02].map((part) => ({
      runs,
      place: { x: box.x + (box.width - width) * part, y: top, width, height },
    })),
  );
}

function inside(place: Box, box: Box): boolean {
  return (
    place.x >= box.x &&
    place.x + place.width <= box.x + box.width &&
    place.y >= box.y &&
    place.y + place.height <= box.y + box.height
  );
}

function overlap(a: Box, b: Box): boolean {
  return a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height;
}

function crosses(curve: readonly (Place | null)[], { x, y, width, height }: Box): boolean {
  const space = 0.4;
  return curve.some(
    (place) =>
      place !== null &&
      place[0] > x - space &&
      place[0] < x + width + space &&
      place[1] > y - space &&
      place[1] < y + height + space,
  );
}
