import { coordinateSymbol } from '../finding/symbols.ts';
import type { MapPanelRecord, MapRecord, PageData, PageFunctional } from '../page/page-data.ts';
import { shortText } from '../report/number-text.ts';
import { answerSymbol } from '../report/symbols.ts';
import { make, notationNodes } from './dom.ts';
import { evaluateAt } from './kernel.ts';
import { numberNotation } from './number.ts';

/** Significant digits of the values at a point. */
export const shownDigits = 6;

/** One point of a map: where, and why each coordinate has its value. */
export interface PointReading {
  readonly coordinates: readonly { readonly name: string; readonly value: number; readonly why: string }[];
  readonly margin: number;
  readonly isViolated: boolean;
  readonly energies: Readonly<Record<string, number>>;
  /** What gives the same values on a command line; undefined off the slice. */
  readonly command: string | undefined;
}

/** Coordinates without a say have a value all the same where the energies are evaluated. */
const neutral: Readonly<Record<string, number>> = { rs: 1, zeta: 0, s: 0, alpha: 1, q: 0 };

/** Evaluates margin and energies at a point given by the coordinates that the margin depends on. */
export function readPoint(
  data: PageData,
  record: MapRecord,
  panel: MapPanelRecord,
  point: ReadonlyMap<string, { readonly value: number; readonly why: string }>,
): PointReading {
  const functional = data.functionals[panel.functional] as PageFunctional;
  const values = Object.fromEntries([...point].map(([name, { value }]) => [name, value]));
  const kernel = data.kernels[panel.kernel];
  if (kernel === undefined) throw new RangeError(`there is no kernel ${panel.kernel}`);
  const margin = evaluateAt(panel.kernel, kernel, values).margin ?? Number.NaN;
  const coordinates = [...point].map(([name, { value, why }]) => ({ name, value, why }));
  const isViolated = margin < -record.tolerance;
  if (record.space !== 'slice') return { coordinates, margin, isViolated, energies: {}, command: undefined };
  for (const name of functional.coordinates) {
    if (point.has(name)) continue;
    const fixed = panel.fixed[name];
    coordinates.push(
      fixed === undefined
        ? { name, value: neutral[name] as number, why: 'margin does not depend on it' }
        : { name, value: fixed, why: 'held by the condition' },
    );
  }
  const order = Object.keys(neutral);
  coordinates.sort((a, b) => order.indexOf(a.name) - order.indexOf(b.name));
  const place = Object.fromEntries(coordinates.map(({ name, value }) => [name, value]));
  const energies = evaluateAt(
    functional.energies,
    data.kernels[functional.energies] as (typeof data.kernels)[number],
    place,
  );
  const flags = coordinates.map(({ name, value }) => `--${name} ${value}`).join(' ');
  return { coordinates, margin, isViolated, energies, command: `rungcheck at ${functional.argument} ${flags}` };
}

/** A reading as the readout beside a map shows it. */
export function readingNodes(reading: PointReading, unit: string): HTMLElement[] {
  const line = (term: string, value: number, note: string, key: string) => [
    make('dt', {}, ...notationNodes(term)),
    make(
      'dd',
      { 'data-name': key, 'data-value': shortText(value, shownDigits) },
      make('span', {}, ...notationNodes(Number.isFinite(value) ? numberNotation(value, shownDigits) : 'no value')),
      ...(note === '' ? [] : [make('small', {}, ...notationNodes(note))]),
    ),
  ];
  const state = !Number.isFinite(reading.margin) ? 'no value here' : reading.isViolated ? 'violated here' : 'kept here';
  return [
    make('p', { class: `state ${reading.isViolated ? 'is-violated' : 'is-kept'}` }, make('strong', {}, state)),
    make(
      'dl',
      { class: 'reading' },
      ...line('margin', reading.margin, unit, 'margin'),
      ...reading.coordinates.flatMap(({ name, value, why }) => line(coordinateSymbol(name), value, why, name)),
    ),
    make(
      'dl',
      { class: 'reading energies' },
      ...Object.entries(reading.energies)
        .filter(([name]) => name.startsWith('F'))
        .flatMap(([name, value]) => line(answerSymbol(name), value, '', name)),
    ),
    ...(reading.command === undefined
      ? []
      : [make('p', { class: 'command' }, make('code', {}, ...commandParts(reading.command)))]),
  ];
}

/** The command, broken between its options only. */
function commandParts(command: string): (HTMLElement | string)[] {
  return command.split(/ (?=--)/).flatMap((part, index) => [...(index === 0 ? [part] : [' ', make('span', {}, part)])]);
}

/** The same in one sentence, for a screen reader. */
export function readingWords({ coordinates, margin, isViolated }: PointReading): string {
  const place = coordinates
    .filter(({ why }) => why !== 'margin does not depend on it')
    .map(({ name, value }) => `${coordinateSymbol(name).replace('_', ' ')} ${shortText(value, 4)}`);
  const value = Number.isFinite(margin) ? `margin ${shortText(margin, shownDigits)}` : 'no value';
  return `${place.join(', ')}: ${value}${isViolated ? ', violated' : ''}`;
}
