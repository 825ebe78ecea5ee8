import type { AxisRecord } from '../page/page-data.ts';
import { unitAt } from './coordinate.ts';
import { numberNotation } from './number.ts';

export interface Tick {
  /** 0 … 1 along the axis. */
  readonly at: number;
  /** Empty for a minor tick. */
  readonly label: string;
}

/** Ticks of a coordinate with room for about that many labels. */
export function coordinateTicks(record: AxisRecord, most: number): Tick[] {
  const upper = record.upper ?? Number.POSITIVE_INFINITY;
  const tick = (value: number, label: string): Tick => ({ at: unitAt(record, value), label });
  if (record.scale === 'logarithmic') return logarithmicTicks(record.lower, upper, tick, most);
  if (record.scale === 'compact') {
    const values = [0, 1, 3, 10, 100, upper].filter((value) => value >= record.lower && value <= upper);
    const spaced: Tick[] = [];
    for (const value of values) {
      const next = tick(value, value === Number.POSITIVE_INFINITY ? '∞' : numberNotation(value));
      const isLast = value === upper;
      while (isLast && spaced.length > 0 && next.at - (spaced.at(-1) as Tick).at < 0.6 / most) spaced.pop();
      if (spaced.length === 0 || next.at - (spaced.at(-1) as Tick).at >= 0.6 / most) spaced.push(next);
    }
    return spaced;
  }
  return linearTicks(record.lower, upper, most);
}

export function linearTicks(lower: number, upper: number, most: number): Tick[] {
  const span = upper - lower;
  if (!(span > 0)) return [];
  const step = niceStep(span / Math.max(1, most));
  const first = Math.ceil(lower / step - 1e-9);
  const last = Math.floor(upper / step + 1e-9);
  const digits = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const plain = Math.max(Math.abs(lower), Math.abs(upper)) < 1e5 && digits <= 5;
  return Array.from({ length: last - first + 1 }, (_, index) => {
    const value = (first + index) * step;
    const isZero = first + index === 0;
    const label = isZero ? '0' : plain ? value.toFixed(digits).replace('-', '−') : numberNotation(value, 3);
    return { at: (value - lower) / span, label };
  });
}

function niceStep(size: number): number {
  const power = 10 ** Math.floor(Math.log10(size));
  const mantissa = [1, 2, 5, 10].find((candidate) => candidate * power >= size * (1 - 1e-9)) ?? 10;
  return Number((mantissa * power).toPrecision(12));
}

function logarithmicTicks(
  lower: number,
  upper: number,
  tick: (value: number, label: string) => Tick,
  most: number,
): Tick[] {
  const [first, last] = [Math.ceil(Math.log10(lower) - 1e-9), Math.floor(Math.log10(upper) + 1e-9)];
  const every = Math.max(1, Math.ceil((last - first + 1) / Math.max(2, most)));
  const ticks: Tick[] = [];
  for (let exponent = first - 1; exponent <= last; exponent++) {
    const power = Number(`1e${exponent}`);
    for (let digit = 1; digit <= 9; digit++) {
      const value = digit * power;
      if (!(value >= lower * (1 - 1e-9) && value <= upper * (1 + 1e-9))) continue;
      const named = digit === 1 ? (exponent - first) % every === 0 : last - first < 2 && (digit === 2 || digit === 5);
      ticks.push(tick(value, named ? powerNotation(value, exponent, digit) : ''));
    }
  }
  return ticks;
}

function powerNotation(value: number, exponent: number, digit: number): string {
  if (exponent >= -3 && exponent <= 3) return String(Number(value.toPrecision(3)));
  return `${digit === 1 ? '' : `${digit} × `}10^${exponent}`;
}
