import { coordinateSymbol } from '../finding/symbols.ts';
import type { MapPanelRecord, MapRecord } from '../page/page-data.ts';
import { sliderValue, unitAt } from './coordinate.ts';
import { make, notationNodes } from './dom.ts';
import { axisRecord, type MapState, withAxis } from './map-state.ts';
import { coordinateWords, numberNotation } from './number.ts';

/** What a control makes of the state that the map has by then. */
export type Change = (next: (state: MapState) => MapState, whileMoving: boolean) => void;

const sliderSteps = 1000;

/** The controls of a map: axes, and for each other coordinate a value or its worst. */
export function mapControls(
  record: MapRecord,
  panel: MapPanelRecord,
  state: MapState,
  name: string,
  change: Change,
): HTMLElement[] {
  const variables = [...new Set([state.x, state.y, ...state.held.keys()])];
  const parts: HTMLElement[] = [];
  if (variables.length > 1) {
    const options = variables.map((variable) => [variable, coordinateWords(variable)] as const);
    parts.push(
      choice('across', `${name}-x`, options, state.x, (value) => change((now) => withAxis(now, 'x', value), false)),
      choice('up', `${name}-y`, options, state.y, (value) => change((now) => withAxis(now, 'y', value), false)),
    );
  }
  for (const [coordinate, value] of state.held) parts.push(slice(record, panel, coordinate, value, name, change));
  return parts;
}

export function choice(
  label: string,
  id: string,
  options: readonly (readonly [value: string, text: string])[],
  chosen: string,
  onChange: (value: string) => void,
): HTMLElement {
  const select = make('select', { id }, ...options.map(([value, text]) => make('option', { value }, text)));
  select.value = chosen;
  select.addEventListener('change', () => onChange(select.value));
  return make('div', { class: 'control' }, make('label', { for: id }, label), select);
}

/** A coordinate off the picture: at its worst, or where its slider stands. */
function slice(
  record: MapRecord,
  { witness: worstPoint }: MapPanelRecord,
  coordinate: string,
  value: number | 'worst',
  name: string,
  change: Change,
): HTMLElement {
  const axis = axisRecord(record, coordinate);
  const id = `${name}-${coordinate}`;
  const witness = worstPoint?.[coordinate];
  const shown = value === 'worst' ? (witness ?? axis.lower) : value;
  const slider = make('input', { type: 'range', id, min: 0, max: sliderSteps, step: 1 });
  slider.value = String(Math.round(unitAt(axis, shown) * sliderSteps));
  const output = make('output', { for: id });
  const worst = make('input', { type: 'checkbox', id: `${id}-worst` });
  worst.checked = value === 'worst';
  const show = (at: number | 'worst') => {
    output.replaceChildren(
      ...(at === 'worst' ? ['each point at its worst'] : notationNodes(`= ${numberNotation(at)}`)),
    );
    slider.setAttribute('aria-valuetext', at === 'worst' ? 'at its worst' : String(at));
    slider.classList.toggle('is-idle', at === 'worst');
  };
  show(value);
  const set = (at: number | 'worst', whileMoving: boolean) => {
    show(at);
    change(
      (now) => ({ ...now, held: new Map([...now.held].map(([key, old]) => [key, key === coordinate ? at : old])) }),
      whileMoving,
    );
  };
  slider.addEventListener('input', () => {
    worst.checked = false;
    set(sliderValue(axis, Number(slider.value) / sliderSteps), true);
  });
  worst.addEventListener('change', () => {
    set(worst.checked ? 'worst' : sliderValue(axis, Number(slider.value) / sliderSteps), false);
  });
  return make(
    'div',
    { class: 'control slice', role: 'group', 'aria-label': coordinateWords(coordinate) },
    make('label', { for: id }, ...notationNodes(coordinateSymbol(coordinate)), ' ', output),
    slider,
    make('label', { class: 'tick', for: `${id}-worst` }, worst, ' worst'),
  );
}
