import { chooseLevels } from '../figure/levels.ts';
import type { PlaneRegions } from '../finding/regions.ts';
import type { MapPanelRecord, MapRecord } from '../page/page-data.ts';
import { unitAt } from './coordinate.ts';
import { draw } from './dom.ts';
import { type Box, frameOf, pathOf } from './frame.ts';
import { legendOf } from './legend.ts';
import { measure, paintField, violatedOutline } from './map-paint.ts';
import { axisRecord, type MapState } from './map-state.ts';
import { coordinateTitle } from './number.ts';
import type { ProjectionRequest, ProjectionResult } from './projection.ts';
import { contourLines, regionLegend, regionPatterns, regionShapes } from './region-layer.ts';
import { coordinateTicks } from './ticks.ts';

export interface DrawnMap {
  readonly box: Box;
  /** Puts the cross at a place in parts of the box, from its left and bottom, or takes it away. */
  mark(spot: { readonly u: number; readonly v: number } | undefined): void;
}

/** Draws a computed map into its figure: colour steps on the canvas, everything else as lines and text above it. */
export function drawMap(
  figure: {
    readonly canvas: HTMLCanvasElement;
    readonly layer: SVGSVGElement;
    readonly width: number;
    readonly name: string;
    /** What is proved on the plane; its regions then stand in place of the margin's colours. */
    readonly regions: PlaneRegions | undefined;
  },
  record: MapRecord,
  panel: MapPanelRecord,
  state: MapState,
  { x, y }: ProjectionRequest,
  { margins }: ProjectionResult,
  isDark: boolean,
): DrawnMap {
  const { canvas, layer, name, regions } = figure;
  const width = Math.max(280, figure.width);
  const left = 62;
  const box: Box = {
    x: left,
    y: 12,
    width: width - left - 14,
    height: Math.round(Math.min(460, Math.max(230, (width - left) * 0.62))),
  };
  const legend: Box = { x: left, y: box.y + box.height + 72, width: box.width, height: 14 };
  const proof = regions && regionLegend(regions, { ...legend, y: legend.y - 14 }, name);
  const height = legend.y + (proof === undefined ? legend.height + 26 : proof.height);
  const [w, h] = [x.values.length, y.values.length];
  const levels = chooseLevels([...margins], record.tolerance);
  const field = measure(margins, w, h, levels, record.tolerance);
  placeCanvas(canvas, box, width, height);
  paintField(field, canvas, isDark);

  const hatch = `hatch-${name}`;
  const outline = violatedOutline(margins, w, h, record.tolerance);
  const inBox = ([u, v]: readonly [number, number]) => [box.x + u * box.width, box.y + v * box.height] as const;
  const everything = `M${box.x} ${box.y}h${box.width}v${box.height}h${-box.width}Z`;
  const kept = outline.kept.rings.map((ring) => pathOf(ring.map(inBox), true)).join('');
  const [across, up] = [axisRecord(record, state.x), axisRecord(record, state.y)];
  layer.setAttribute('viewBox', `0 0 ${width} ${height}`);
  const cross = draw('g', { class: 'cross' });
  const shapes =
    regions === undefined
      ? outline.any
        ? [draw('path', { d: everything + kept, fill: `url(#${hatch})`, 'fill-rule': 'evenodd' })]
        : []
      : [...regionShapes(regions, across, up, box, name), ...contourLines(margins, w, h, levels, box)];
  layer.replaceChildren(
    draw('defs', {}, hatchPattern(hatch), ...(regions === undefined ? [] : regionPatterns(name))),
    ...shapes,
    ...outline.boundary.map((line) => draw('path', { d: pathOf(line.map(inBox)), class: 'zero' })),
    frameOf(
      box,
      { ticks: coordinateTicks(across, box.width / 48), title: coordinateTitle(state.x, width > 420) },
      { ticks: coordinateTicks(up, box.height / 40), title: coordinateTitle(state.y, true) },
    ),
    ...witnessMark(record, panel, state, box),
    proof?.group ?? legendOf(levels, legend, hatch, isDark, record.unit),
    cross,
  );
  return {
    box,
    mark(spot) {
      if (spot === undefined) {
        cross.replaceChildren();
        return;
      }
      // On the grid point that is read.
      const u = box.x + (Math.round(spot.u * (w - 1)) / (w - 1)) * box.width;
      const v = box.y + (1 - Math.round(spot.v * (h - 1)) / (h - 1)) * box.height;
      const lines = `M${u} ${box.y}V${box.y + box.height}M${box.x} ${v}H${box.x + box.width}`;
      cross.replaceChildren(
        draw('path', { d: lines, class: 'halo' }),
        draw('path', { d: lines, class: 'hair' }),
        draw('circle', { cx: u, cy: v, r: 4.5, class: 'dot' }),
      );
    },
  };
}

/** In parts of the figure, so that both are scaled alike where it is printed. */
function placeCanvas(canvas: HTMLCanvasElement, box: Box, width: number, height: number): void {
  const density = Math.min(2, Math.max(1, window.devicePixelRatio));
  canvas.width = Math.round(box.width * density);
  canvas.height = Math.round(box.height * density);
  canvas.style.left = `${(box.x / width) * 100}%`;
  canvas.style.top = `${(box.y / height) * 100}%`;
  canvas.style.width = `${(box.width / width) * 100}%`;
  canvas.style.height = `${(box.height / height) * 100}%`;
}

export function hatchPattern(id: string): SVGPatternElement {
  return draw(
    'pattern',
    { id, width: 7, height: 7, patternUnits: 'userSpaceOnUse', patternTransform: 'rotate(45)' },
    draw('path', { d: 'M0 0V7', class: 'hatch' }),
  );
}

/** A ring with a dot at the worst point, in its place on the two drawn coordinates. */
function witnessMark(record: MapRecord, { witness }: MapPanelRecord, state: MapState, box: Box): SVGElement[] {
  const [px, py] = [witness?.[state.x], witness?.[state.y]];
  if (px === undefined || py === undefined) return [];
  const u = box.x + unitAt(axisRecord(record, state.x), px) * box.width;
  const v = box.y + (1 - unitAt(axisRecord(record, state.y), py)) * box.height;
  const ring = (radius: number, kind: string) => draw('circle', { cx: u, cy: v, r: radius, class: kind });
  return [ring(7, 'ring-halo'), ring(7, 'ring'), ring(1.8, 'ring-dot')];
}
