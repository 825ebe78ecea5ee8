import { ink } from './colour.ts';
import type { FrameScale } from './scale.ts';
import { element, pathData } from './svg.ts';
import { lineOutlines, lineWidth, type Run } from './typeface.ts';

/** A rectangle of a drawing, millimetres. */
export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** One point of type is 0.3528 mm. */
export const millimetresPerPoint = 25.4 / 72;
const tickLength = 0.9;
const lineWidthOfFrame = 0.18;

export interface FrameStyle {
  /** Height of the letters, mm. */
  readonly size: number;
  readonly labelsBelow: boolean;
  readonly labelsLeft: boolean;
}

/** The width that the labels of an upright axis take. */
export function labelsWidth({ ticks }: FrameScale, size: number): number {
  return Math.max(0, ...ticks.map(({ label }) => lineWidth(label, size)));
}

/** Border, ticks (outwards) and their labels. */
export function frame(box: Box, across: FrameScale, up: FrameScale, style: FrameStyle): string {
  const { x, y, width, height } = box;
  const { size } = style;
  const bottom = y + height;
  const lines: string[] = [];
  const labels: string[] = [];
  for (const { at, label } of across.ticks) {
    const place = x + at * width;
    const length = label.length > 0 ? tickLength : tickLength * 0.55;
    lines.push(
      pathData([
        [place, bottom],
        [place, bottom + length],
      ]),
    );
    if (style.labelsBelow && label.length > 0) {
      labels.push(lineOutlines(label, place - lineWidth(label, size) / 2, bottom + tickLength + size * 1.0, size));
    }
  }
  for (const { at, label } of up.ticks) {
    const place = bottom - at * height;
    const length = label.length > 0 ? tickLength : tickLength * 0.55;
    lines.push(
      pathData([
        [x, place],
        [x - length, place],
      ]),
    );
    if (style.labelsLeft && label.length > 0) {
      labels.push(lineOutlines(label, x - tickLength - size * 0.3 - lineWidth(label, size), place + size * 0.33, size));
    }
  }
  const stroke = { fill: 'none', stroke: ink.line, 'stroke-width': lineWidthOfFrame };
  return [
    element('rect', { x, y, width, height, ...stroke }),
    element('path', { d: lines.join(''), ...stroke }),
    element('g', { fill: ink.text }, labels.join('')),
  ].join('');
}

/** How much the ticks and labels below a frame take. */
export function belowFrame(size: number): number {
  return tickLength + size * 1.35;
}

/** A line centred on x. */
export function centred(runs: readonly Run[], x: number, baseline: number, size: number): string {
  return lineOutlines(runs, x - lineWidth(runs, size) / 2, baseline, size);
}

/** A line that runs upwards, centred on y, its base line at x. */
export function upright(runs: readonly Run[], x: number, y: number, size: number): string {
  const start = lineWidth(runs, size) / 2;
  return element(
    'g',
    { transform: `translate(${x.toFixed(3)} ${(y + start).toFixed(3)})rotate(-90)` },
    lineOutlines(runs, 0, 0, size),
  );
}
