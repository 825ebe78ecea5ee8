import { regionsOnPlane } from '../map/regions.ts';
import type { MapPanelRecord, MapRecord, PageData } from '../page/page-data.ts';
import { axisOf, lineOf, unitAt } from './coordinate.ts';
import { type DrawnCurves, drawCurves } from './curve-figure.ts';
import { draw, make } from './dom.ts';
import { runKernel } from './kernel.ts';
import { axisRecord } from './map-state.ts';
import type { Tools, View } from './map-view.ts';
import { readingNodes, readingWords, readPoint } from './readout.ts';
import { regionLegend, regionPatterns, regionShapes } from './region-layer.ts';
import { regionWords } from './region-note.ts';

const placeCount = 257;
/** Of the strip that shows what is proved, pixels. */
const stripHeight = 12;

/** A margin that depends on one coordinate, as a curve. */
export function profileView(
  host: HTMLElement,
  data: PageData,
  record: MapRecord,
  panel: MapPanelRecord,
  name: string,
  tools: Tools,
): View {
  const coordinate = panel.variables[0] as string;
  const axis = axisRecord(record, coordinate);
  const { values: places } = lineOf(axis, placeCount, true);
  const values = new Float64Array(places.length);
  const layer = draw('svg', { 'aria-hidden': 'true' });
  const readout = make('div', { class: 'readout' });
  const label = `Margin along ${coordinate}: ${record.title}. Left and right arrow keys move the point; Home goes to the worst point.`;
  const stage = make(
    'div',
    { class: 'stage', tabindex: 0, role: 'application', 'aria-roledescription': 'curve', 'aria-label': label },
    layer,
  );
  const note = panel.regions === undefined ? [] : [regionWords(panel.regions, undefined, record.tolerance)];
  host.replaceChildren(stage, make('div', { class: 'beside' }, ...note, readout));
  let drawn: DrawnCurves | undefined;
  const worst = () => {
    const at = panel.witness?.[coordinate];
    return at === undefined ? 0 : unitAt(axis, at);
  };
  let part = worst();
  const read = (aloud: boolean) => {
    const value = places[Math.round(part * (placeCount - 1))] as number;
    const reading = readPoint(data, record, panel, new Map([[coordinate, { value, why: '' }]]));
    readout.replaceChildren(...readingNodes(reading, record.unit));
    if (aloud) tools.announce(readingWords(reading));
  };
  const moveTo = (next: number, aloud: boolean) => {
    part = Math.min(1, Math.max(0, next));
    drawn?.mark(part);
    read(aloud);
  };
  const redraw = () => {
    if (stage.clientWidth === 0 || host.dataset.state !== 'drawn') return;
    const unit = record.unit === '' ? '' : ` (${record.unit})`;
    const look = { width: Math.max(280, stage.clientWidth), height: 320, name, title: `margin${unit}` };
    drawn = drawCurves(layer, look, axis, places, [{ values, look: 0 }], [{ value: 0, label: '', hatched: 'below' }]);
    if (panel.regions !== undefined) {
      const { box } = drawn;
      const known = { ...axisOf(axis, true) };
      const regions = regionsOnPlane(panel.regions, known, { ...known, name: '' }, new Map());
      const strip = { ...box, y: box.y + box.height - stripHeight, height: stripHeight };
      const shapes = regionShapes(regions, axis, undefined, strip, name);
      const legend = regionLegend(regions, { ...box, y: box.y + box.height + 50 }, name);
      layer.append(
        draw('defs', {}, ...regionPatterns(name)),
        ...shapes,
        draw('rect', { ...strip, class: 'edge' }),
        legend.group,
      );
      layer.setAttribute('viewBox', `0 0 ${look.width} ${box.y + box.height + 50 + legend.height}`);
    }
    drawn.mark(part);
  };
  for (const kind of ['pointermove', 'pointerdown'] as const) {
    stage.addEventListener(kind, (event) => {
      if (drawn === undefined) return;
      const { box } = drawn;
      const u = (event.clientX - stage.getBoundingClientRect().left - box.x) / box.width;
      if (u >= -0.02 && u <= 1.02) moveTo(u, kind === 'pointerdown');
    });
  }
  stage.addEventListener('keydown', (event) => {
    const step = { ArrowLeft: -1, ArrowRight: 1 }[event.key];
    if (step === undefined && event.key !== 'Home') return;
    event.preventDefault();
    const at = Math.round(part * (placeCount - 1));
    moveTo(step === undefined ? worst() : (at + step * (event.shiftKey ? 10 : 1)) / (placeCount - 1), true);
  });
  return {
    redraw,
    begin() {
      if (host.dataset.state === 'drawn') return;
      const kernel = data.kernels[panel.kernel];
      if (kernel !== undefined) runKernel(panel.kernel, kernel, [places], [values]);
      host.dataset.state = 'drawn';
      redraw();
      read(false);
    },
    end() {},
  };
}
