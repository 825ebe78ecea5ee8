import type { MapPanel, MarginMap } from '../finding/margin-map.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { ink } from './colour.ts';
import { type Box, belowFrame, centred, frame, labelsWidth, upright } from './frame.ts';
import { chooseLevels, type Levels } from './levels.ts';
import { captionOf } from './map-caption.ts';
import { mapField, type Place } from './map-panel.ts';
import { colourScale, scaleLabelsWidth } from './map-scale.ts';
import { witnessMark } from './map-witness.ts';
import { type FigureOptions, layoutSize } from './options.ts';
import { breakLines } from './paragraph.ts';
import { type RegionLegend, regionLegend } from './region-legend.ts';
import { regionField, regionPatterns } from './region-panel.ts';
import { coordinateScale, type FrameScale } from './scale.ts';
import { type Drawing, element } from './svg.ts';
import { axisTitle, listed, noBreak, parameterSymbol, setTo } from './symbols.ts';
import { lineOutlines, lineWidth, type Run } from './typeface.ts';
import { formula, plainText, words } from './typeset.ts';

const narrowestPanel = 34;
const edge = 0.8;
/** Base line of a title above its panel: a mark at the upper edge stays clear of it. */
const titleLift = 2.5;

/**
 * The panels of a map on common axes with a caption below: the margin on one scale of colour, or, where it was asked what
 * is proved, the regions of that with the margin as contour lines.
 */
export function drawMap(map: MarginMap, options: FigureOptions): Drawing {
  const { width, size, scale } = layoutSize(options);
  const name = options.name ?? 'map';
  const levels = chooseLevels(
    map.panels.flatMap(({ margins }) => margins.filter((margin) => margin !== null)),
    map.condition.tolerance,
  );
  const layout = layOut(map, levels, width, size);
  const { boxes, across, up, columns } = layout;
  const panels = map.panels.map((panel, index) => {
    const box = boxes[index] as Box;
    const last = index + columns >= map.panels.length;
    const position = (x: number, y: number): Place => [across.position(x), 1 - up.position(y)];
    const witness = witnessMark(map, panel, box, across, up, size);
    const { regions } = panel;
    return element(
      'g',
      {},
      [
        regions === undefined
          ? mapField(map, panel, levels, box, position, `${name}-${index}`)
          : regionField(map, panel, regions, levels, box, position, name, size, witness.areas),
        frame(box, across, up, { size, labelsBelow: last, labelsLeft: index % columns === 0 }),
        witness.content,
        element('g', { fill: ink.text }, titleOf(map, panel, index, box, size)),
        last
          ? element(
              'g',
              { fill: ink.text },
              centred(
                axisTitle(map.x.name, box.width, size),
                box.x + box.width / 2,
                box.y + box.height + belowFrame(size) + size * 0.95,
                size,
              ),
            )
          : '',
        index % columns === 0
          ? element(
              'g',
              { fill: ink.text },
              upright(axisTitle(map.y.name, box.height, size), edge + size * 0.8, box.y + box.height / 2, size),
            )
          : '',
      ].join(''),
    );
  });
  const legend = showsRegions(map)
    ? regionsBelow(map, layout, width, size, name)
    : { height: 0, content: colourBar(map, levels, layout.scale, width, size) };
  const caption = options.caption ? breakLines(captionOf(map, levels), width - 2 * edge, size) : [];
  const below = layout.bottom + legend.height;
  const captionTop = below + size * 1.9;
  const lines = caption.map((line, index) => lineOutlines(line, edge, captionTop + index * size * 1.3, size));
  const bottom =
    caption.length === 0 ? below + size * 0.4 : captionTop + (caption.length - 1) * size * 1.3 + size * 0.5;
  return {
    width,
    scale,
    height: Math.ceil(bottom * 10) / 10,
    title: `Margin of ${map.condition.title} for ${[...new Set(map.panels.map(({ functional }) => functional.name))].join(', ')}`,
    description: plainText(captionOf(map, levels)).replaceAll('\u00a0', ' '),
    content: [
      showsRegions(map) ? regionPatterns(name) : '',
      ...panels,
      legend.content,
      element('g', { fill: ink.text }, lines.join('')),
    ].join(''),
  };
}

function showsRegions({ panels }: MarginMap): boolean {
  return panels.some(({ regions }) => regions !== undefined);
}

function colourBar(map: MarginMap, levels: Levels, box: Box, width: number, size: number): string {
  return colourScale(levels, box, size) + element('g', { fill: ink.text }, scaleTitle(map, box, width, size));
}

function regionsBelow(map: MarginMap, { bottom }: Layout, width: number, size: number, name: string): RegionLegend {
  const gap = size * 0.9;
  const legend = regionLegend(map, edge, bottom + gap, width - 2 * edge, size, name);
  return { ...legend, height: legend.height + gap };
}

interface Layout {
  readonly boxes: readonly Box[];
  readonly columns: number;
  readonly across: FrameScale;
  readonly up: FrameScale;
  readonly scale: Box;
  readonly bottom: number;
}

function layOut(map: MarginMap, levels: Levels, width: number, size: number): Layout {
  const count = map.panels.length;
  const most = Math.max(1, Math.floor((width - 20) / narrowestPanel));
  const rows = Math.ceil(count / Math.min(most, count));
  const columns = Math.ceil(count / rows);
  const between = size * 1.5;
  const rough = coordinateScale(map.y, { length: width / columns, size, direction: 'up' });
  const left = edge + size * 1.25 + labelsWidth(rough, size) + 0.9 + size * 0.3;
  // Beside regions there is no scale, only half of the last label below.
  const right = showsRegions(map) ? edge + size : edge + size * 0.9 + 2.6 + scaleLabelsWidth(levels, size);
  const panelWidth = (width - left - right - between * (columns - 1)) / columns;
  const panelHeight = panelWidth * (columns === 1 ? (width > 120 ? 0.6 : 0.8) : 0.95);
  const top = size * 1.3 + titleLift;
  const foot = belowFrame(size) + size * 1.25;
  const boxes = map.panels.map((_, index): Box => {
    const row = Math.floor(index / columns);
    return {
      x: left + (index % columns) * (panelWidth + between),
      y: edge + top + row * (panelHeight + top + size * 0.4),
      width: panelWidth,
      height: panelHeight,
    };
  });
  const first = boxes[0] as Box;
  const lastBox = boxes.at(-1) as Box;
  const bottom = lastBox.y + panelHeight;
  // One scale for all rows, not higher than two of them.
  const scaleHeight = Math.min(bottom - first.y, panelHeight * 1.6);
  const scale = { x: width - right + size * 0.9, y: first.y, width: 2.6, height: scaleHeight };
  return {
    boxes,
    columns,
    across: coordinateScale(map.x, { length: panelWidth, size, direction: 'across' }),
    up: coordinateScale(map.y, { length: panelHeight, size, direction: 'up' }),
    scale,
    bottom: bottom + foot,
  };
}

function titleOf(map: MarginMap, panel: MapPanel, index: number, box: Box, size: number): string {
  const letter = map.panels.length > 1 ? words(`${String.fromCharCode(97 + index)} `, 'semibold') : [];
  const runs = [...letter, ...words(panel.functional.name, 'semibold'), ...sliceRuns(map, panel)];
  return lineOutlines(fitted(runs, box.width, size), box.x, box.y - titleLift, size);
}

/** What sets a panel apart from its neighbours: trial parameters and the slice. */
function sliceRuns(map: MarginMap, panel: MapPanel): Run[] {
  const differs = (name: string) =>
    map.panels.length === 1 ||
    map.panels.some((other) => other.fixed[name] !== panel.fixed[name]) ||
    map.panels.every(({ functional }) => functional.id === panel.functional.id);
  const items = [
    ...Object.entries(panel.parameters).map(([name, value]) => [...parameterSymbol(name), ...words(` = ${value}`)]),
    ...Object.entries(panel.fixed)
      .filter(([name]) => differs(name))
      .map(([name, value]) => setTo(name, value)),
    ...(panel.worstOver.length > 0
      ? [
          [
            ...words('worst over\u00a0'),
            ...noBreak(listed(panel.worstOver.map((over) => formula(coordinateSymbol(over.name))))),
          ],
        ]
      : []),
  ];
  return items.length === 0 ? [] : [...words('  '), ...listed(items)];
}

/** Cut with an ellipsis where there is no room. */
function fitted(runs: readonly Run[], width: number, size: number): Run[] {
  if (lineWidth(runs, size) <= width) return [...runs];
  const kept: Run[] = [];
  let room = width - lineWidth(words('…'), size);
  for (const run of runs) {
    const letters = [...run.text];
    let count = letters.length;
    while (count > 0 && lineWidth([{ ...run, text: letters.slice(0, count).join('') }], size) > room) count--;
    if (count > 0) kept.push({ ...run, text: letters.slice(0, count).join('') });
    room -= lineWidth([{ ...run, text: letters.slice(0, count).join('') }], size);
    if (count < letters.length) break;
  }
  return [...kept, ...words('…')];
}

function scaleTitle({ condition }: MarginMap, box: Box, width: number, size: number): string {
  const unit =
    condition.unit === null || condition.unit === '' ? [] : [...words(' ('), ...formula(condition.unit), ...words(')')];
  const runs = [...words('margin'), ...unit];
  const start = Math.min(box.x, width - edge - lineWidth(runs, size));
  return lineOutlines(runs, start, box.y - titleLift, size);
}
