import type { CurvePanel, CurveSet } from '../finding/curves.ts';
import { ink } from './colour.ts';
import { type Box, belowFrame, centred, frame, labelsWidth, upright } from './frame.ts';
import { type FigureOptions, layoutSize } from './options.ts';
import { breakLines } from './paragraph.ts';
import { boundLabels, boundLine, curvePath, endLabels, leader, type Place } from './plot-panel.ts';
import { drawnBounds, valueRange } from './plot-range.ts';
import { curveLabel, plotCaption, quantityTitle } from './plot-words.ts';
import { coordinateScale, linearScale } from './scale.ts';
import { type Drawing, element } from './svg.ts';
import { axisTitle } from './symbols.ts';
import { lineOutlines, lineWidth } from './typeface.ts';
import { plainText, words } from './typeset.ts';

const edge = 0.8;
const narrowestPanel = 56;

/** Curves of each quantity in a panel of its own, labelled at their ends, with the bounds that apply. */
export function drawPlot(set: CurveSet, options: FigureOptions): Drawing {
  const { width, size, scale } = layoutSize(options);
  const several = set.panels.length > 1;
  const columns = Math.max(1, Math.min(set.panels.length, Math.floor(width / narrowestPanel)));
  const between = size * 1.2;
  const slotWidth = (width - 2 * edge - (columns - 1) * between) / columns;
  const rows = Math.ceil(set.panels.length / columns);
  const plotHeight = slotWidth * (slotWidth > 110 ? 0.5 : 0.66);
  const slotHeight = (several ? size * 1.8 : size * 0.4) + plotHeight + belowFrame(size) + size * 1.3;
  const drawn = set.panels.map((panel, index) => {
    const slot = {
      x: edge + (index % columns) * (slotWidth + between),
      y: edge + Math.floor(index / columns) * (slotHeight + size * 0.6),
      width: slotWidth,
      height: slotHeight,
    };
    const letter = several ? String.fromCharCode(97 + index) : '';
    return drawPanel(set, panel, slot, plotHeight, { letter, size, name: `${options.name ?? 'plot'}-${index}` });
  });
  const text = plotCaption(set);
  const caption = options.caption ? breakLines(text, width - 2 * edge, size) : [];
  const foot = edge + rows * slotHeight + (rows - 1) * size * 0.6;
  const captionTop = foot + size * 1.6;
  const lines = caption.map((runs, index) => lineOutlines(runs, edge, captionTop + index * size * 1.3, size));
  const bottom = caption.length === 0 ? foot + edge : captionTop + (caption.length - 1) * size * 1.3 + size * 0.5;
  return {
    width,
    scale,
    height: Math.ceil(bottom * 10) / 10,
    title: `${set.panels.map(({ quantity }) => quantity).join(', ')} along ${set.along.name}`,
    description: plainText(text).replaceAll('\u00a0', ' '),
    content: [...drawn, element('g', { fill: ink.text }, lines.join(''))].join(''),
  };
}

function drawPanel(
  set: CurveSet,
  panel: CurvePanel,
  slot: Box,
  height: number,
  { letter, size, name }: { readonly letter: string; readonly size: number; readonly name: string },
): string {
  const [lower, upper] = valueRange(panel);
  const up = linearScale(lower, upper, { length: height, size, direction: 'up' });
  const labels = panel.curves.map((curve) => curveLabel(curve, panel.curves));
  const left = size * 1.4 + labelsWidth(up, size) + 0.9 + size * 0.3;
  const right = leader + Math.max(...labels.map((label) => lineWidth(label, size)));
  const top = slot.height - height - belowFrame(size) - size * 1.3;
  const box = { x: slot.x + left, y: slot.y + top, width: slot.width - left - right, height };
  const across = coordinateScale(set.along, { length: box.width, size, direction: 'across' });
  const heightOf = (value: number) => box.y + box.height * (1 - up.position(value));
  const places = panel.curves.map(({ values }) =>
    values.map((value, index): Place | null =>
      value === null ? null : [box.x + across.position(set.along.values[index] as number) * box.width, heightOf(value)],
    ),
  );
  const bounds = drawnBounds(panel).map((bound) => ({ bound, y: heightOf(bound.value) }));
  const titles = [
    letter === '' ? '' : lineOutlines(words(letter, 'semibold'), box.x, box.y - size * 0.55, size),
    centred(
      axisTitle(set.along.name, box.width, size),
      box.x + box.width / 2,
      box.y + height + belowFrame(size) + size * 0.95,
      size,
    ),
    upright(quantityTitle(panel.quantity), slot.x + size * 0.85, box.y + height / 2, size),
  ];
  return [
    element('clipPath', { id: name }, element('rect', { ...box })),
    ...bounds.map(({ bound, y }) => boundLine(bound, y, box)),
    element('g', { 'clip-path': `url(#${name})` }, places.map((curve, index) => curvePath(curve, index)).join('')),
    frame(box, across, up, { size, labelsBelow: true, labelsLeft: true }),
    boundLabels(bounds, places, box, size),
    endLabels(places, labels, box, size),
    element('g', { fill: ink.text }, titles.join('')),
  ].join('');
}
