import type { AxisRecord } from '../page/page-data.ts';
import { unitAt } from './coordinate.ts';
import { draw, notationSpans } from './dom.ts';
import { type Box, frameOf, pathOf } from './frame.ts';
import { hatchPattern } from './map-figure.ts';
import { coordinateTitle } from './number.ts';
import { coordinateTicks, linearTicks } from './ticks.ts';

/** A curve over the values of one coordinate; NaN where there is none. */
export interface CurveLine {
  readonly values: Float64Array;
  /** Number of the colour and the dash pattern. */
  readonly look: number;
}

/** A level drawn across; what lies beyond it, on the side that `hatched` names, is hatched. */
export interface Level {
  readonly value: number;
  readonly label: string;
  readonly hatched: 'below' | 'above' | 'none';
}

export interface DrawnCurves {
  readonly box: Box;
  mark(part: number): void;
}

/** Draws curves over a coordinate, with levels across. */
export function drawCurves(
  layer: SVGSVGElement,
  look: { readonly width: number; readonly height: number; readonly name: string; readonly title: string },
  axis: AxisRecord,
  places: Float64Array,
  curves: readonly CurveLine[],
  levels: readonly Level[],
): DrawnCurves {
  const { width, height } = look;
  const left = 66;
  const box: Box = { x: left, y: 14, width: width - left - 14, height: height - 14 - 46 };
  const [low, high] = rangeOf(curves, levels, 24 / box.height);
  const across = (value: number) => box.x + unitAt(axis, value) * box.width;
  const up = (value: number) => box.y + (1 - (value - low) / (high - low)) * box.height;
  layer.setAttribute('viewBox', `0 0 ${width} ${height}`);
  const clip = `clip-${look.name}`;
  const hatch = `hatch-${look.name}`;
  const cross = draw('g', { class: 'cross' });
  const inside = draw('g', { 'clip-path': `url(#${clip})` });
  const labels = draw('g');
  const taken: number[] = [];
  for (const { value, label, hatched } of [...levels].sort((a, b) => a.value - b.value)) {
    if (!(value >= low && value <= high)) continue;
    const level = up(value);
    if (hatched !== 'none') {
      const [from, to] = hatched === 'below' ? [level, box.y + box.height] : [box.y, level];
      inside.append(
        draw('rect', {
          x: box.x,
          y: from,
          width: box.width,
          height: Math.max(0, to - from),
          fill: `url(#${hatch})`,
          class: 'beyond',
        }),
      );
    }
    inside.append(draw('path', { d: `M${box.x} ${level}h${box.width}`, class: 'bound' }));
    // A lower bound is told below its line, where nothing is.
    const isLow = curves.every(({ values }) => values.every((one) => !(one < value)));
    const y = isLow && level + 20 < box.y + box.height ? level + 15 : level - 6;
    if (label === '' || taken.some((other) => Math.abs(other - y) < 14)) continue;
    taken.push(y);
    labels.append(
      draw(
        'text',
        { x: box.x + box.width - 6, y, 'text-anchor': 'end', class: 'bound-label' },
        ...notationSpans(label),
      ),
    );
  }
  for (const { values, look: kind } of curves) {
    inside.append(draw('path', { d: lineOf(values, places, across, up), class: `curve curve-${kind % 7}` }));
  }
  layer.replaceChildren(
    draw('defs', {}, hatchPattern(hatch), draw('clipPath', { id: clip }, draw('rect', { ...box }))),
    inside,
    frameOf(
      box,
      { ticks: coordinateTicks(axis, box.width / 40), title: coordinateTitle(axis.name, width > 380) },
      { ticks: linearTicks(low, high, box.height / 44), title: look.title },
    ),
    labels,
    cross,
  );
  return {
    box,
    mark(part) {
      const index = Math.round(part * (places.length - 1));
      const x = across(places[index] as number);
      const dots = curves.flatMap(({ values, look: kind }) => {
        const y = up(values[index] as number);
        return y >= box.y && y <= box.y + box.height
          ? [draw('circle', { cx: x, cy: y, r: 3.5, class: `mark mark-${kind % 7}` })]
          : [];
      });
      cross.replaceChildren(draw('path', { d: `M${x} ${box.y}v${box.height}`, class: 'hair' }), ...dots);
    },
  };
}

/** All of the curves and the levels near them, with some air. */
function rangeOf(curves: readonly CurveLine[], levels: readonly Level[], room: number): [number, number] {
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const { values } of curves) {
    for (const value of values) {
      if (!Number.isFinite(value)) continue;
      low = Math.min(low, value);
      high = Math.max(high, value);
    }
  }
  if (!(low <= high)) return [0, 1];
  const reach = Math.max(high - low, 0.02 * Math.max(Math.abs(low), Math.abs(high)), 1e-12);
  for (const { value } of levels) {
    if (value > high && value < high + reach) high = value;
    if (value < low && value > low - reach) low = value;
  }
  const air = 0.05 * Math.max(high - low, reach);
  const labelled = (value: number) =>
    levels.some((level) => level.label !== '' && level.value === value) ? room * (high - low) : 0;
  return [low - Math.max(air, labelled(low)), high + Math.max(air, labelled(high))];
}

function lineOf(
  values: Float64Array,
  places: Float64Array,
  across: (value: number) => number,
  up: (value: number) => number,
): string {
  const runs: (readonly [number, number])[][] = [[]];
  values.forEach((value, index) => {
    if (Number.isFinite(value))
      runs.at(-1)?.push([across(places[index] as number), Math.min(1e5, Math.max(-1e5, up(value)))]);
    else if ((runs.at(-1)?.length ?? 0) > 0) runs.push([]);
  });
  return runs.map((run) => pathOf(run)).join('');
}
