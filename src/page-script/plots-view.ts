import { coordinateSymbol } from '../finding/symbols.ts';
import type { AxisRecord, KernelRecord, PageData } from '../page/page-data.ts';
import { shortText } from '../report/number-text.ts';
import { answerSymbol } from '../report/symbols.ts';
import { lineOf, sliderValue, unitAt } from './coordinate.ts';
import { type DrawnCurves, drawCurves } from './curve-figure.ts';
import { draw, make, notationNodes } from './dom.ts';
import { runKernel } from './kernel.ts';
import { choice } from './map-controls.ts';
import { coordinateWords, numberNotation } from './number.ts';
import { boundsOf, curvesOf, firstHeld, type PlotCurve, type PlotState, plotCoordinates } from './plots-state.ts';
import { shownDigits } from './readout.ts';

const placeCount = 241;
const quantities = ['Fx', 'Fc', 'Fxc'] as const;

/** The enhancement factors of the page's functionals along one coordinate. */
export function plotsView(host: HTMLElement, data: PageData, announce: (text: string) => void): { redraw(): void } {
  const axes = plotCoordinates(data);
  const shown = quantities.filter((name) =>
    data.functionals.some(({ energies }) => data.kernels[energies]?.outputs.includes(name)),
  );
  const isAlone = data.functionals.length === 1;
  const startAlong = axes.some(({ name }) => name === 's') ? 's' : 'rs';
  let state: PlotState = {
    along: startAlong,
    held: firstHeld,
    family: isAlone ? (startAlong === 's' ? 'rs' : 'zeta') : '',
  };
  let part = 0.5;
  let drawn: readonly DrawnCurves[] = [];
  let curves: readonly PlotCurve[] = [];
  let values: readonly (readonly Float64Array[])[] = [];
  let places: Float64Array = new Float64Array(0);

  const controls = make('div', { class: 'controls' });
  const key = make('ul', { class: 'key' });
  const layers = shown.map(() => draw('svg', { 'aria-hidden': 'true' }));
  const panels = layers.map((layer, index) => {
    const name = answerSymbol(shown[index] as string).replace('_', ' ');
    const label = `${name} along a coordinate. Left and right arrow keys move the point.`;
    return make(
      'div',
      { class: 'stage', tabindex: 0, role: 'application', 'aria-roledescription': 'plot', 'aria-label': label },
      layer,
    );
  });
  const table = make('div', {
    class: 'values scroller',
    tabindex: 0,
    role: 'region',
    'aria-label': 'Values at the point',
  });
  host.replaceChildren(controls, key, make('div', { class: 'panels' }, ...panels), table);

  const axis = () => axes.find(({ name }) => name === state.along) as AxisRecord;

  const compute = () => {
    curves = curvesOf(data, state);
    ({ values: places } = lineOf(axis(), placeCount, true));
    values = curves.map(({ functional, held }) => {
      const record = data.kernels[functional.energies] as KernelRecord;
      const columns = record.variables.map((name) =>
        name === state.along ? places : new Float64Array(placeCount).fill(held[name] ?? 0),
      );
      const out = record.outputs.map(() => new Float64Array(placeCount));
      runKernel(functional.energies, record, columns, out);
      return shown.map((name) => out[record.outputs.indexOf(name)] ?? new Float64Array(placeCount).fill(Number.NaN));
    });
    key.replaceChildren(
      ...curves.map(({ label }, index) => make('li', {}, sample(index), make('span', {}, ...notationNodes(label)))),
    );
    redraw();
  };

  const redraw = () => {
    if (host.clientWidth === 0) return;
    drawn = layers.map((layer, index) => {
      const quantity = shown[index] as string;
      const width = Math.max(280, (panels[index] as HTMLElement).clientWidth);
      const look = {
        width,
        height: Math.round(Math.min(380, Math.max(260, width * 0.72))),
        name: `plot-${quantity}`,
        title: answerSymbol(quantity),
      };
      const levels = boundsOf(data, state, quantity).map(({ value, title }) => ({
        value,
        label: width > 320 ? `${shorter(title)}: ${shortText(value, 4)}` : shortText(value, 4),
        hatched: 'none' as const,
      }));
      const lines = values.map((of, look) => ({ values: of[index] as Float64Array, look }));
      return drawCurves(layer, look, axis(), places, lines, levels);
    });
    for (const one of drawn) one.mark(part);
    read(false);
  };

  const read = (aloud: boolean) => {
    const index = Math.round(part * (placeCount - 1));
    const place = places[index] as number;
    const others = axes
      .filter(({ name }) => name !== state.along && name !== state.family)
      .map(({ name }) => `${coordinateSymbol(name)} = ${shortText(state.held[name] ?? 0, 4)}`);
    const caption = [`${coordinateSymbol(state.along)} = ${numberNotation(place)}`, ...others].join(', ');
    const head = make(
      'tr',
      {},
      make('th', { scope: 'col' }, 'curve'),
      ...shown.map((name) => make('th', { scope: 'col' }, ...notationNodes(answerSymbol(name)))),
    );
    const rows = curves.map(({ label }, curve) =>
      make(
        'tr',
        {},
        make('th', { scope: 'row' }, sample(curve), ...notationNodes(label)),
        ...shown.map((name, quantity) => {
          const value = values[curve]?.[quantity]?.[index] as number;
          return make(
            'td',
            { 'data-name': name, 'data-value': shortText(value, shownDigits) },
            ...notationNodes(Number.isFinite(value) ? numberNotation(value, shownDigits) : '–'),
          );
        }),
      ),
    );
    table.replaceChildren(
      make(
        'table',
        {},
        make('caption', {}, ...notationNodes(`At ${caption}`)),
        make('thead', {}, head),
        make('tbody', {}, ...rows),
      ),
    );
    if (!aloud) return;
    const spoken = curves.map(
      ({ label }, curve) =>
        `${label}: ${shown.map((name, quantity) => `${answerSymbol(name)} ${shortText(values[curve]?.[quantity]?.[index] as number, 4)}`).join(', ')}`,
    );
    announce(`${caption}. ${spoken.join('. ')}`.replaceAll('_', ' '));
  };

  const moveTo = (next: number, aloud: boolean) => {
    part = Math.min(1, Math.max(0, next));
    for (const one of drawn) one.mark(part);
    read(aloud);
  };
  panels.forEach((panel, index) => {
    for (const kind of ['pointermove', 'pointerdown'] as const) {
      panel.addEventListener(kind, (event) => {
        const box = drawn[index]?.box;
        if (box === undefined) return;
        const u = (event.clientX - panel.getBoundingClientRect().left - box.x) / box.width;
        if (u >= -0.02 && u <= 1.02) moveTo(u, kind === 'pointerdown');
      });
    }
    panel.addEventListener('keydown', (event) => {
      const step = { ArrowLeft: -1, ArrowRight: 1 }[event.key];
      if (step === undefined) return;
      event.preventDefault();
      moveTo((Math.round(part * (placeCount - 1)) + step * (event.shiftKey ? 10 : 1)) / (placeCount - 1), true);
    });
  });

  const showControls = () => {
    const options = axes.map(({ name }) => [name, coordinateWords(name)] as const);
    const families = axes
      .filter(({ name }) => name !== state.along)
      .map(({ name }) => [name, coordinateWords(name)] as const);
    const change = (next: Partial<PlotState>) => {
      state = { ...state, ...next };
      if (state.family === state.along) state = { ...state, family: '' };
      const focused = document.activeElement?.id ?? '';
      showControls();
      if (focused !== '') document.getElementById(focused)?.focus();
      compute();
    };
    controls.replaceChildren(
      choice('along', 'plot-along', options, state.along, (along) => change({ along })),
      choice('a curve for each', 'plot-family', [['', 'functional'], ...families], state.family, (family) =>
        change({ family }),
      ),
      ...axes.filter(({ name }) => name !== state.along && name !== state.family).map((record) => slider(record)),
    );
  };

  const slider = (record: AxisRecord): HTMLElement => {
    const id = `plot-${record.name}`;
    const value = state.held[record.name] ?? 0;
    const input = make('input', { type: 'range', id, min: 0, max: 1000, step: 1 });
    input.value = String(Math.round(unitAt(record, value) * 1000));
    const output = make('output', { for: id });
    const show = (at: number) => {
      output.replaceChildren(...notationNodes(`= ${numberNotation(at)}`));
      input.setAttribute('aria-valuetext', String(at));
    };
    show(value);
    input.addEventListener('input', () => {
      const at = sliderValue(record, Number(input.value) / 1000);
      show(at);
      state = { ...state, held: { ...state.held, [record.name]: at } };
      compute();
    });
    return make(
      'div',
      { class: 'control slice' },
      make('label', { for: id }, ...notationNodes(coordinateSymbol(record.name)), ' ', output),
      input,
    );
  };
  showControls();
  compute();
  return { redraw };
}

function sample(index: number): SVGSVGElement {
  const line = draw('path', { d: 'M1 5h28', class: `curve curve-${index % 7}` });
  return draw('svg', { class: 'sample', width: 30, height: 10, viewBox: '0 0 30 10', 'aria-hidden': 'true' }, line);
}

function shorter(title: string): string {
  return title.length > 34 ? `${title.slice(0, 32).trimEnd()}…` : title;
}
