import type { AxisRecord } from '../page/page-data.ts';
import { type Axis, axisUnit, axisValue } from '../search/axis.ts';
import type { Line } from './projection.ts';

/** A coordinate's axis; as it is drawn ζ runs evenly and does not close up towards 1. */
export function axisOf({ name, lower, upper, scale }: AxisRecord, drawn: boolean): Axis {
  return {
    name,
    lower,
    upper: upper ?? Number.POSITIVE_INFINITY,
    scale: drawn && scale === 'toward-upper' ? 'linear' : scale,
  };
}

/** Four significant digits: what a readout shows is what is evaluated. */
export function tidy(value: number): number {
  return Number(value.toPrecision(4));
}

/** Values spread evenly along an axis, each of four digits but for the ends. */
export function lineOf(record: AxisRecord, count: number, drawn: boolean): Line {
  const axis = axisOf(record, drawn);
  const values = Array.from({ length: count }, (_, index) => {
    const value = axisValue(axis, index / (count - 1));
    return index === 0 || index === count - 1 ? value : tidy(value);
  });
  return { name: record.name, values: Float64Array.from(values) };
}

/** Where piecewise forms join, and the uniform gas: never passed over. */
const pinned: Readonly<Record<string, readonly number[]>> = { rs: [1], zeta: [0, 1], s: [0], alpha: [0, 1], q: [0] };

/** The values over which a margin is taken at its worst. */
export function worstLine(record: AxisRecord, count: number): Line {
  const line = lineOf(record, count, false);
  const upper = record.upper ?? Number.POSITIVE_INFINITY;
  const added = (pinned[record.name] ?? []).filter((value) => value > record.lower && value < upper);
  return { name: record.name, values: Float64Array.from(new Set([...line.values, ...added])).sort() };
}

export function unitAt(record: AxisRecord, value: number): number {
  return axisUnit(axisOf(record, true), value);
}

/** The value of a slider: four digits, and exactly a pinned value when that is near. */
export function sliderValue(record: AxisRecord, unit: number): number {
  const near = (pinned[record.name] ?? []).find((value) => Math.abs(unitAt(record, value) - unit) < 0.004);
  if (near !== undefined && near >= record.lower && near <= (record.upper ?? near)) return near;
  return tidy(axisValue(axisOf(record, true), unit));
}
