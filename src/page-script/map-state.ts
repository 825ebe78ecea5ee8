import type { PlaneRegions, RegionTree } from '../finding/regions.ts';
import { regionsOnPlane } from '../map/regions.ts';
import { inDrawnOrder } from '../page/first-plane.ts';
import type { AxisRecord, MapPanelRecord, MapRecord } from '../page/page-data.ts';
import type { Axis } from '../search/axis.ts';
import { axisOf, lineOf, worstLine } from './coordinate.ts';
import type { Line, ProjectionRequest } from './projection.ts';

/** What a map shows: two coordinates across and up; each other one held at a value, or at its worst. */
export interface MapState {
  readonly x: string;
  readonly y: string;
  readonly held: ReadonlyMap<string, number | 'worst'>;
}

/** More coordinates than these at their worst are coarse and slow; the others begin at the witness. */
const worstAtFirst = 2;

export function firstState(record: MapRecord, { variables, witness }: MapPanelRecord): MapState {
  const [x = '', y = '', ...rest] = inDrawnOrder(variables);
  const held = rest.map(
    (name) =>
      [name, rest.length <= worstAtFirst ? 'worst' : (witness?.[name] ?? axisRecord(record, name).lower)] as const,
  );
  return { x, y, held: new Map(held) };
}

export function axisRecord(record: MapRecord, name: string): AxisRecord {
  return record.axes.find((axis) => axis.name === name) as AxisRecord;
}

/** Another coordinate across or up; the one that leaves goes to where the new one was. */
export function withAxis(state: MapState, which: 'x' | 'y', name: string): MapState {
  const other = which === 'x' ? state.y : state.x;
  const left = state[which];
  if (name === left) return state;
  if (name === other) return { ...state, x: state.y, y: state.x };
  const freed = state.held.get(name) ?? 'worst';
  const order = inDrawnOrder([left, ...[...state.held.keys()].filter((candidate) => candidate !== name)]);
  const held = order.map(
    (candidate) => [candidate, candidate === left ? freed : (state.held.get(candidate) ?? 'worst')] as const,
  );
  return { ...state, [which]: name, held: new Map(held) };
}

/** Points that a picture may take: a fraction of a second for the costliest formulas. */
const budgets = { rough: 250_000, fine: 3_000_000 } as const;
export type Grain = keyof typeof budgets;

export function requestOf(record: MapRecord, kernel: number, state: MapState, grain: Grain): ProjectionRequest {
  const swept = [...state.held.values()].filter((value) => value === 'worst').length;
  const [width, height] = grain === 'rough' || swept > 3 ? [49, 37] : [129, 97];
  const per = Math.floor((budgets[grain] / (width * height)) ** (1 / Math.max(1, swept)));
  const count = Math.max(5, Math.min(65, per));
  const rest = [...state.held].map(([name, value]): Line => {
    return value === 'worst' ? worstLine(axisRecord(record, name), count) : { name, values: Float64Array.of(value) };
  });
  return {
    kernel,
    x: lineOf(axisRecord(record, state.x), width, true),
    y: lineOf(axisRecord(record, state.y), height, true),
    rest,
  };
}

/** What is proved on the plane of a state. */
export function shownRegions(record: MapRecord, tree: RegionTree, { x, y, held }: MapState): PlaneRegions {
  const fixed = [...held].filter((entry): entry is [string, number] => entry[1] !== 'worst');
  const isOnPlane = (name: string, value: number) => held.get(name) === 'worst' || held.get(name) === value;
  const examples = (tree.examples ?? [])
    .filter((example) => Object.entries(example.held).every(([name, value]) => isOnPlane(name, value)))
    .map((example) => example.tree);
  const [across, up] = [x, y].map((name) => axisOf(axisRecord(record, name), true)) as [Axis, Axis];
  return regionsOnPlane(tree, across, up, new Map(fixed), examples);
}
