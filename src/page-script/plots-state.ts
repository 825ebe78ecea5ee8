import { coordinateSymbol } from '../finding/symbols.ts';
import type { AxisRecord, BoundRecord, PageData, PageFunctional } from '../page/page-data.ts';
import { shortText } from '../report/number-text.ts';

/** The coordinate along which curves run, the values of the others, and the one that tells the curves apart. */
export interface PlotState {
  readonly along: string;
  readonly held: Readonly<Record<string, number>>;
  readonly family: string;
}

export interface PlotCurve {
  readonly label: string;
  readonly functional: PageFunctional;
  readonly held: Readonly<Record<string, number>>;
}

/** Values that a family of curves takes, within the domain. */
const familyValues: Readonly<Record<string, readonly number[]>> = {
  rs: [0.1, 1, 10, 100],
  zeta: [0, 0.5, 0.8, 1],
  s: [0, 1, 2, 3],
  alpha: [0, 0.5, 1, 5],
  q: [-1, 0, 1],
};

export const firstHeld: Readonly<Record<string, number>> = { rs: 2, zeta: 0, s: 0, alpha: 1, q: 0 };

/** The coordinates of all functionals of the page, in order. */
export function plotCoordinates(data: PageData): readonly AxisRecord[] {
  return data.axes.filter(({ name }) => data.functionals.some(({ coordinates }) => coordinates.includes(name)));
}

/** One curve a functional; of one functional alone, one for each value of the family. */
export function curvesOf(data: PageData, state: PlotState): PlotCurve[] {
  if (state.family === '')
    return data.functionals.map((functional) => ({ label: functional.name, functional, held: state.held }));
  const axis = data.axes.find(({ name }) => name === state.family);
  const values = (familyValues[state.family] ?? []).filter(
    (value) => axis !== undefined && value >= axis.lower && value <= (axis.upper ?? value),
  );
  return data.functionals.flatMap((functional) =>
    values.map((value) => ({
      label: `${data.functionals.length > 1 ? `${functional.name}, ` : ''}${coordinateSymbol(state.family)} = ${shortText(value)}`,
      functional,
      held: { ...state.held, [state.family]: value },
    })),
  );
}

/** Levels that apply to every curve: a coordinate that the condition holds must be held at that value. */
export function boundsOf(data: PageData, state: PlotState, quantity: string): BoundRecord[] {
  const suited = data.bounds.filter(
    (bound) =>
      bound.quantity === quantity &&
      Object.entries(bound.fixed).every(
        ([name, value]) => name !== state.along && name !== state.family && state.held[name] === value,
      ),
  );
  // Of two conditions with one value the first is named.
  return suited.filter((bound, index) => suited.findIndex(({ value }) => value === bound.value) === index);
}
