import type { Levels } from '../figure/levels.ts';
import { draw, notationSpans } from './dom.ts';
import type { Box } from './frame.ts';
import { numberNotation } from './number.ts';
import { colourOfStep } from './palette.ts';

/** Of the texts of a figure, in pixels, on the safe side. */
const letterWidth = 7.2;

/** The colour steps from the lowest to the highest, the violated ones hatched as in the map, with their limits below. */
export function legendOf(levels: Levels, box: Box, hatch: string, isDark: boolean, unit: string): SVGGElement {
  const group = draw('g', { class: 'legend' });
  const first = levels.below ? 0 : 1;
  const count = levels.levels.length + (levels.above ? 1 : 0) - first;
  const step = box.width / count;
  const place = (index: number) => box.x + (index + 1 - first) * step;
  for (let index = 0; index < count; index++) {
    const fill = colourOfStep(levels, index + first, isDark);
    group.append(draw('rect', { x: box.x + index * step, y: box.y, width: step + 0.5, height: box.height, fill }));
  }
  const zero = place(levels.levels.indexOf(0));
  if (zero > box.x)
    group.append(draw('rect', { x: box.x, y: box.y, width: zero - box.x, height: box.height, fill: `url(#${hatch})` }));
  group.append(draw('rect', { ...box, class: 'edge' }));
  group.append(draw('path', { d: `M${zero} ${box.y - 4}v${box.height + 8}`, class: 'zero' }));
  let last = Number.NEGATIVE_INFINITY;
  const width = (label: string) => label.replace(/10\^/, '10').length * letterWidth;
  const labels = levels.ticks.map((value) => ({
    value,
    at: place(levels.levels.indexOf(value)),
    label: numberNotation(value, 3),
  }));
  const zeroLabel = { start: zero - 6, end: zero + 6 };
  for (const { value, at, label } of labels) {
    group.append(draw('path', { d: `M${at} ${box.y + box.height}v4`, class: 'tick' }));
    const [start, end] = [at - width(label) / 2, at + width(label) / 2];
    const meetsZero = value !== 0 && start < zeroLabel.end + 4 && end > zeroLabel.start - 4;
    if (meetsZero || (value !== 0 && start < last + 4) || start < 0) continue;
    last = end;
    group.append(draw('text', { x: at, y: box.y + box.height + 17, 'text-anchor': 'middle' }, ...notationSpans(label)));
  }
  const side = levels.below ? 'hatched: violated' : 'nowhere violated here';
  const named = `margin${unit === '' ? '' : ` (${unit})`}`;
  const scale = levels.kind === 'compressed' ? 'compressed: steps in powers of ten' : 'even steps';
  const isWide = (named.length + scale.length + side.length + 6) * letterWidth < box.width;
  const title = `${named}, ${isWide ? scale : levels.kind === 'compressed' ? 'compressed' : 'even'}`;
  group.append(draw('text', { x: box.x, y: box.y - 8, class: 'title' }, ...notationSpans(title)));
  // The hatching speaks for itself where there is no room to say so.
  if ((title.length + side.length) * letterWidth < box.width) {
    group.append(draw('text', { x: box.x + box.width, y: box.y - 8, 'text-anchor': 'end', class: 'faint' }, side));
  }
  return group;
}
