import type { PlaneRegions } from '../finding/regions.ts';
import type { MapPanelRecord, MapRecord, PageData } from '../page/page-data.ts';
import { unitAt } from './coordinate.ts';
import { draw, make } from './dom.ts';
import { mapControls } from './map-controls.ts';
import { type DrawnMap, drawMap } from './map-figure.ts';
import { axisRecord, firstState, type Grain, type MapState, requestOf, shownRegions } from './map-state.ts';
import type { ProjectionRequest, ProjectionResult } from './projection.ts';
import { readingNodes, readingWords, readPoint } from './readout.ts';
import { regionSwitch, regionWords } from './region-note.ts';
import type { Office } from './work.ts';

export interface View {
  /** Lays the picture out anew: another width, another colour scheme. */
  redraw(): void;
  /** Sees to it that the picture is computed; a lower rank comes first. */
  begin(rank: number): void;
  /** The host is given to another view. */
  end(): void;
}

export interface Tools {
  readonly office: Office;
  /** Says something to a screen reader. */
  readonly announce: (text: string) => void;
  readonly isDark: () => boolean;
}

interface Picture {
  readonly state: MapState;
  readonly request: ProjectionRequest;
  readonly result: ProjectionResult;
}

/** A place in parts of the picture, from its left and from its bottom: it stays where it is on another grid. */
interface Spot {
  readonly u: number;
  readonly v: number;
}

const help = 'Arrow keys move the point, with Shift by ten; Home goes to the worst point.';
const steps: Readonly<Record<string, readonly [across: number, up: number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};

/** An interactive map in its host element. */
export function mapView(
  host: HTMLElement,
  data: PageData,
  record: MapRecord,
  panel: MapPanelRecord,
  name: string,
  tools: Tools,
): View {
  let state = firstState(record, panel);
  let picture: Picture | undefined;
  let drawn: DrawnMap | undefined;
  let spot: Spot | undefined;
  let pending: { readonly id: number; readonly rank: number } | undefined;

  const canvas = make('canvas', { 'aria-hidden': 'true' });
  const layer = draw('svg', { 'aria-hidden': 'true' });
  const readout = make('div', { class: 'readout' });
  const controls = make('div', { class: 'controls' });
  const label = `Map of the margin: ${record.title}. ${help}`;
  const stage = make('div', {
    class: 'stage',
    tabindex: 0,
    role: 'application',
    'aria-roledescription': 'map',
    'aria-label': label,
  });
  stage.append(canvas, layer);
  const proof = make('div', { class: 'controls' });
  host.replaceChildren(stage, make('div', { class: 'beside' }, ...(panel.regions ? [proof] : []), controls, readout));
  let showsProof = panel.regions !== undefined;
  let known: { readonly state: MapState; readonly regions: PlaneRegions } | undefined;

  /** What is proved on the plane of the picture. */
  const regionsOf = ({ state: shown }: Picture): PlaneRegions | undefined => {
    if (panel.regions === undefined || !showsProof) return undefined;
    if (known?.state !== shown) known = { state: shown, regions: shownRegions(record, panel.regions, shown) };
    return known.regions;
  };
  const tellProof = (shown: MapState) => {
    if (panel.regions === undefined) return;
    const toggle = (isOn: boolean) => {
      showsProof = isOn;
      redraw();
      tellProof(shown);
      document.getElementById(`${name}-proof`)?.focus();
    };
    proof.replaceChildren(
      regionSwitch(name, showsProof, toggle),
      ...(showsProof ? [regionWords(panel.regions, shown.held, record.tolerance)] : []),
    );
  };
  tellProof(state);

  const compute = (grain: Grain, rank: number) => {
    if (pending !== undefined) tools.office.forget(pending.id);
    const asked = state;
    const request = requestOf(record, panel.kernel, asked, grain);
    host.dataset.state = 'waiting';
    const id = tools.office.ask(rank, request, (result) => {
      pending = undefined;
      picture = { state: asked, request, result };
      spot ??= worstSpot(picture);
      redraw();
      read(false);
      if (grain === 'rough') compute('fine', rank + 1);
      else host.dataset.state = 'drawn';
    });
    pending = { id, rank };
  };

  const redraw = () => {
    if (picture === undefined || stage.clientWidth === 0) return;
    const figure = { canvas, layer, width: stage.clientWidth, name, regions: regionsOf(picture) };
    drawn = drawMap(figure, record, panel, picture.state, picture.request, picture.result, tools.isDark());
    drawn.mark(spot);
  };

  const read = (aloud: boolean) => {
    if (picture === undefined || spot === undefined) return;
    const { x, y, rest } = picture.request;
    const [column, row] = [Math.round(spot.u * (x.values.length - 1)), Math.round(spot.v * (y.values.length - 1))];
    const cell = row * x.values.length + column;
    const point = new Map([
      [x.name, { value: x.values[column] as number, why: '' }],
      [y.name, { value: y.values[row] as number, why: '' }],
      ...rest.map((line, index) => {
        const value = picture?.result.worstAt[index]?.[cell] as number;
        return [line.name, { value, why: line.values.length > 1 ? 'at its worst' : 'held' }] as const;
      }),
    ]);
    const reading = readPoint(data, record, panel, point);
    readout.replaceChildren(...readingNodes(reading, record.unit));
    if (aloud) tools.announce(readingWords(reading));
  };

  /** The witness, where the picture has its coordinates; else the lowest cell. */
  const worstSpot = ({ request: { x, y }, result: { margins } }: Picture): Spot => {
    let lowest = margins.findIndex((value) => Number.isFinite(value));
    margins.forEach((value, cell) => {
      if (value < (margins[lowest] as number)) lowest = cell;
    });
    const cell = {
      u: (lowest % x.values.length) / (x.values.length - 1),
      v: Math.floor(lowest / x.values.length) / (y.values.length - 1),
    };
    const { witness } = panel;
    const [across, up] = [witness?.[x.name], witness?.[y.name]];
    if (across === undefined || up === undefined) return cell;
    return { u: unitAt(axisRecord(record, x.name), across), v: unitAt(axisRecord(record, y.name), up) };
  };

  const moveTo = ({ u, v }: Spot, aloud: boolean) => {
    spot = { u: Math.min(1, Math.max(0, u)), v: Math.min(1, Math.max(0, v)) };
    drawn?.mark(spot);
    read(aloud);
  };

  const showControls = () => {
    controls.replaceChildren(
      ...mapControls(record, panel, state, name, (next, whileMoving) => {
        const before = state;
        state = next(before);
        tellProof(state);
        if (state.x !== before.x || state.y !== before.y) {
          const focused = document.activeElement?.id ?? '';
          spot = undefined;
          showControls();
          if (focused !== '') document.getElementById(focused)?.focus();
        }
        compute('rough', whileMoving ? 0 : 1);
      }),
    );
  };
  showControls();

  for (const kind of ['pointermove', 'pointerdown'] as const) {
    stage.addEventListener(kind, (event) => {
      if (drawn === undefined) return;
      const bounds = stage.getBoundingClientRect();
      const { box } = drawn;
      const [u, v] = [
        (event.clientX - bounds.left - box.x) / box.width,
        1 - (event.clientY - bounds.top - box.y) / box.height,
      ];
      const isInside = u >= -0.02 && u <= 1.02 && v >= -0.03 && v <= 1.03;
      if (isInside) moveTo({ u, v }, kind === 'pointerdown');
    });
  }
  stage.addEventListener('keydown', (event) => {
    const step = steps[event.key];
    if (picture === undefined || (step === undefined && event.key !== 'Home')) return;
    event.preventDefault();
    if (step === undefined || spot === undefined) {
      moveTo(worstSpot(picture), true);
      return;
    }
    const size = event.shiftKey ? 10 : 1;
    const [columns, rows] = [picture.request.x.values.length - 1, picture.request.y.values.length - 1];
    // Whole cells, so that each press reads another one.
    const moved = (part: number, count: number, by: number) => (Math.round(part * count) + by * size) / count;
    moveTo({ u: moved(spot.u, columns, step[0]), v: moved(spot.v, rows, step[1]) }, true);
  });

  return {
    redraw,
    begin(rank) {
      if (pending === undefined ? picture !== undefined : pending.rank <= rank) return;
      compute(rank < 10 && picture === undefined ? 'rough' : 'fine', rank);
    },
    end() {
      if (pending !== undefined) tools.office.forget(pending.id);
    },
  };
}
