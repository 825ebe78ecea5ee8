import { down, type Pair, productDown, productUp, up } from './widen.ts';

/*
 * Interval operations for code that goes node by node; generated code has them in line. An infinite end is a bound and
 * never a value, so that 0·∞ is 0; the empty or undefined result is the whole line, and whether the argument left a
 * domain is told beside it.
 */

export function addIntervals(a: Pair, b: Pair, out: Pair): void {
  const lower = down((a[0] as number) + (b[0] as number));
  const upper = up((a[1] as number) + (b[1] as number));
  setOrWhole(lower, upper, out);
}

export function subtractIntervals(a: Pair, b: Pair, out: Pair): void {
  const lower = down((a[0] as number) - (b[1] as number));
  const upper = up((a[1] as number) - (b[0] as number));
  setOrWhole(lower, upper, out);
}

export function multiplyIntervals(a: Pair, b: Pair, out: Pair): void {
  const [al, au, bl, bu] = [a[0] as number, a[1] as number, b[0] as number, b[1] as number];
  const lower = Math.min(productDown(al, bl), productDown(al, bu), productDown(au, bl), productDown(au, bu));
  const upper = Math.max(productUp(al, bl), productUp(al, bu), productUp(au, bl), productUp(au, bu));
  setOrWhole(lower, upper, out);
}

function setOrWhole(lower: number, upper: number, out: Pair): void {
  // False for NaN too.
  const valid = lower <= upper;
  out[0] = valid ? lower : Number.NEGATIVE_INFINITY;
  out[1] = valid ? upper : Number.POSITIVE_INFINITY;
}
