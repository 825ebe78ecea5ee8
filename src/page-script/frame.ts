import { draw, notationSpans } from './dom.ts';
import type { Tick } from './ticks.ts';

export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Outline, ticks and titles of a figure around its box. */
export function frameOf(
  box: Box,
  x: { ticks: readonly Tick[]; title: string },
  y: { ticks: readonly Tick[]; title: string },
): SVGGElement {
  const group = draw('g', { class: 'frame' });
  group.append(draw('rect', { ...box, class: 'edge' }));
  const bottom = box.y + box.height;
  for (const { at, label } of x.ticks) {
    const left = box.x + at * box.width;
    group.append(draw('path', { d: `M${left} ${bottom}v${label === '' ? 3 : 5}`, class: 'tick' }));
    if (label !== '')
      group.append(draw('text', { x: left, y: bottom + 18, 'text-anchor': 'middle' }, ...notationSpans(label)));
  }
  for (const { at, label } of y.ticks) {
    const level = bottom - at * box.height;
    group.append(draw('path', { d: `M${box.x} ${level}h${label === '' ? -3 : -5}`, class: 'tick' }));
    if (label !== '')
      group.append(draw('text', { x: box.x - 8, y: level + 4, 'text-anchor': 'end' }, ...notationSpans(label)));
  }
  group.append(
    draw(
      'text',
      { x: box.x + box.width / 2, y: bottom + 37, 'text-anchor': 'middle', class: 'title' },
      ...notationSpans(x.title),
    ),
  );
  const middle = box.y + box.height / 2;
  const turned = { transform: `translate(13 ${middle}) rotate(-90)`, 'text-anchor': 'middle', class: 'title' };
  if (y.title !== '') group.append(draw('text', turned, ...notationSpans(y.title)));
  return group;
}

export function pathOf(points: readonly (readonly [x: number, y: number])[], closed = false): string {
  return (
    points.map(([x, y], index) => `${index === 0 ? 'M' : 'L'}${x.toFixed(2)} ${y.toFixed(2)}`).join('') +
    (closed ? 'Z' : '')
  );
}
