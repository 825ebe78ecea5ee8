import { scaleLinear } from 'd3-scale';
import type { PictureAxis } from '../finding/margin-map.ts';
import { lineWidth, type Run } from './typeface.ts';
import { formula, words } from './typeset.ts';

export interface Tick {
  /** 0 … 1 along the axis. */
  readonly at: number;
  /** Empty for a minor tick. */
  readonly label: readonly Run[];
}

/** A coordinate along an edge of a frame. */
export interface FrameScale {
  /** 0 … 1 for values of the axis. */
  readonly position: (value: number) => number;
  readonly ticks: readonly Tick[];
}

interface Room {
  /** Of the axis, in millimetres. */
  readonly length: number;
  /** Of the letters, in millimetres. */
  readonly size: number;
  readonly direction: 'across' | 'up';
}

export function coordinateScale({ scale, values }: PictureAxis, room: Room): FrameScale {
  const [lower, upper] = [values[0] as number, values.at(-1) as number];
  if (scale === 'logarithmic') return logarithmicScale(lower, upper, room);
  if (scale === 'compact') return compactScale(lower, upper, room);
  return linearScale(lower, upper, room);
}

export function linearScale(lower: number, upper: number, room: Room): FrameScale {
  const position = (value: number) => (value - lower) / (upper - lower);
  const scale = scaleLinear([lower, upper], [0, room.length]);
  const wanted = Math.max(2, Math.floor(room.length / (room.size * (room.direction === 'up' ? 3.2 : 4))));
  const values = scale.ticks(wanted);
  const step = values.length > 1 ? (values[1] as number) - (values[0] as number) : 1;
  const digits = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const text = (value: number) => decimalText(value, digits, Math.max(Math.abs(lower), Math.abs(upper)));
  return {
    position,
    ticks: thinned(
      values.map((value) => ({ at: position(value), label: text(value) })),
      room,
    ),
  };
}

function logarithmicScale(lower: number, upper: number, room: Room): FrameScale {
  const position = (value: number) => Math.log(value / lower) / Math.log(upper / lower);
  const [first, last] = [Math.ceil(Math.log10(lower) - 1e-9), Math.floor(Math.log10(upper) + 1e-9)];
  const exponents = Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => first + k);
  // Within a decade the ticks are those of a linear axis, in their places on the logarithmic one.
  if (upper / lower < 10) {
    const { ticks } = linearScale(lower, upper, room);
    const valueAt = (at: number) => lower + at * (upper - lower);
    return {
      position,
      ticks: thinned(
        ticks.map(({ at, label }) => ({ at: position(valueAt(at)), label })),
        room,
      ),
    };
  }
  const majors = exponents.map((exponent) => ({ at: position(10 ** exponent), label: powerText(exponent) }));
  const between = Array.from({ length: last - first + 3 }, (_, k) => first - 1 + k).flatMap((exponent) =>
    [2, 3, 4, 5, 6, 7, 8, 9]
      .map((digit) => Number(`${digit}e${exponent}`))
      .filter((value) => value >= lower * (1 - 1e-9) && value <= upper * (1 + 1e-9)),
  );
  // Over two decades or fewer, 2 and 5 are labelled too.
  const isLabelled = (value: number) => exponents.length <= 2 && /^[25]/.test(value.toExponential());
  const minors = between.map((value) => ({
    at: position(value),
    label: isLabelled(value) ? words(String(value)) : [],
  }));
  const labelled = thinned(
    [...majors, ...minors.filter(({ label }) => label.length > 0)].sort((a, b) => a.at - b.at),
    room,
  );
  const decade = room.length / Math.log10(upper / lower);
  return { position, ticks: [...labelled, ...(decade < 5 ? [] : minors.filter(({ label }) => label.length === 0))] };
}

/** x/(1 + x), with the field's round numbers marked where there is room. */
function compactScale(lower: number, upper: number, room: Room): FrameScale {
  const compact = (value: number) => (value === Number.POSITIVE_INFINITY ? 1 : value / (1 + value));
  const position = (value: number) => (compact(value) - compact(lower)) / (compact(upper) - compact(lower));
  const values = [0, 1, 3, 10, upper, 0.3, 2, 5, 30, 100].filter((value) => value >= lower && value <= upper);
  const ticks: Tick[] = [];
  for (const value of new Set(values)) {
    const tick = { at: position(value), label: value >= 1e4 ? powerLabel(value) : words(shortNumber(value)) };
    if (ticks.every((other) => apart(other, tick, room))) ticks.push(tick);
  }
  return { position, ticks: ticks.sort((a, b) => a.at - b.at) };
}

function powerLabel(value: number): Run[] {
  if (value === Number.POSITIVE_INFINITY) return words('∞');
  const exponent = Math.log10(value);
  return Number.isInteger(exponent) ? powerText(exponent) : numberRuns(value);
}

/** Drops labels that would touch the one before; the ticks stay. */
function thinned(ticks: readonly Tick[], room: Room): Tick[] {
  let last: Tick | undefined;
  return ticks.map((tick) => {
    if (tick.label.length === 0 || last === undefined || apart(last, tick, room)) {
      if (tick.label.length > 0) last = tick;
      return tick;
    }
    return { ...tick, label: [] };
  });
}

function apart(a: Tick, b: Tick, { length, size, direction }: Room): boolean {
  const distance = Math.abs(b.at - a.at) * length;
  if (direction === 'up') return distance > size * 1.15;
  return distance > (lineWidth(a.label, size) + lineWidth(b.label, size)) / 2 + size * 0.5;
}

/** 0.01, 0.1, 1, 10, 100 as they are; beyond, powers of ten. */
export function powerText(exponent: number): Run[] {
  if (exponent >= -2 && exponent <= 3) return words(shortNumber(10 ** exponent));
  return formula(`10^${exponent}`);
}

function decimalText(value: number, digits: number, largest: number): Run[] {
  if (value === 0) return words('0');
  if (largest < 1e-3 || largest >= 1e5) return numberRuns(value);
  return words(value.toFixed(Math.min(digits, 8)).replace('-', '−'));
}

/** A number as a reader writes it: −0.0123, 2.5 × 10^−7. */
export function numberRuns(value: number, digits = 3): Run[] {
  if (value === 0) return words('0');
  const rounded = Number(value.toPrecision(digits));
  const size = Math.abs(rounded);
  if (size >= 1e-3 && size < 1e5) return words(shortNumber(rounded));
  const [mantissa = '', exponent = ''] = rounded.toExponential().split('e');
  const power = formula(`10^${exponent.replace('+', '')}`);
  if (mantissa === '1') return power;
  if (mantissa === '-1') return [...words('−'), ...power];
  return [...words(`${mantissa.replace('-', '−')} × `), ...power];
}

function shortNumber(value: number): string {
  return String(Number(value.toPrecision(6))).replace('-', '−');
}
