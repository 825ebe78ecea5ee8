import { ink } from './colour.ts';
import type { Box } from './frame.ts';
import type { Levels } from './levels.ts';
import { hatch, stepColour } from './map-panel.ts';
import { numberRuns } from './scale.ts';
import { element, pathData } from './svg.ts';
import { lineOutlines, lineWidth, type Run } from './typeface.ts';

const gap = 0.9;

/** The texts beside the colour steps. */
export function scaleLabels({ ticks }: Levels): { value: number; label: Run[] }[] {
  return ticks.map((value) => ({ value, label: numberRuns(value) }));
}

export function scaleLabelsWidth(levels: Levels, size: number): number {
  return gap + Math.max(...scaleLabels(levels).map(({ label }) => lineWidth(label, size)));
}

/** The colour steps from the lowest (below) to the highest, the violated ones hatched as in the panels. */
export function colourScale(levels: Levels, box: Box, size: number): string {
  const first = levels.below ? 0 : 1;
  const steps = levels.levels.length + (levels.above ? 1 : 0) - first;
  const height = box.height / steps;
  const bottom = box.y + box.height;
  const level = (index: number) => bottom - (index + 1 - first) * height;
  const zero = levels.levels.indexOf(0);
  const fills = Array.from({ length: steps }, (_, step) =>
    element('rect', {
      x: box.x,
      y: bottom - (step + 1) * height,
      width: box.width,
      height: height + (step === 0 ? 0 : 0.02),
      fill: stepColour(levels, step + first),
    }),
  );
  const violated = { x: box.x, y: level(zero), width: box.width, height: bottom - level(zero) };
  const lines = { stroke: ink.hatch, 'stroke-width': 0.13, fill: 'none' };
  let last = Number.POSITIVE_INFINITY;
  const labels = scaleLabels(levels).map(({ value, label }) => {
    const y = level(levels.levels.indexOf(value));
    const mark = pathData([
      [box.x + box.width, y],
      [box.x + box.width + gap * 0.55, y],
    ]);
    const tick = element('path', { d: mark, stroke: ink.line, 'stroke-width': 0.18, fill: 'none' });
    // From below upwards; zero is never left out.
    const fits = last - y > size * 1.1 || value === 0;
    if (!fits) return tick;
    last = y;
    return tick + lineOutlines(label, box.x + box.width + gap, y + size * 0.33, size);
  });
  return [
    ...fills,
    violated.height > 0.01 ? element('path', { d: hatch(violated), ...lines }) : '',
    element('rect', { ...box, fill: 'none', stroke: ink.line, 'stroke-width': 0.18 }),
    element('path', {
      d: pathData([
        [box.x, level(zero)],
        [box.x + box.width, level(zero)],
      ]),
      stroke: ink.line,
      'stroke-width': 0.4,
      fill: 'none',
    }),
    element('g', { fill: ink.text }, labels.join('')),
  ].join('');
}
