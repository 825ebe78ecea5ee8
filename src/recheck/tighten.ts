import { addDown, addUp, divideDown, divideUp, isLess, putDown } from './decimal.ts';
import { putLevel, type Row, rowLength, settle, slot } from './form.ts';

/* Intervals of rows made narrower by what is known of a node besides its operation. */

/** Completes a row whose interval was made narrower: its form may be too wide for it now. */
function settleNarrowed(row: Row, at: number, axes: number): void {
  if (row[at + slot.linear] === 0 && row[at + slot.quadratic] === 0) putLevel(row, at, axes);
  else settle(row, at, axes);
}

/**
 * A copy of a row without what is below a whole number, since no value is: the node's values lie in the interval and at or
 * above that number, and its form, which holds at every point, is left as it is.
 */
export function putCut(out: Row, axes: number, x: Row, from: number, least: number): void {
  for (let index = 0; index < rowLength(axes); index++) out[index] = x[from + index] as number;
  putDown(out, slot.lower, least, 0);
  settleNarrowed(out, 0, axes);
}

const ends = new Float64Array(4);
const sum = new Float64Array(2);

/**
 * Tightens the row of a/(a + b), where neither a nor b is negative. With a + b > 0 the quotient rises with a and falls with
 * b, so that it lies between its values at (least a, most b) and (most a, least b), each rounded outward; and always
 * between 0 and 1, which stand in where a corner is 0/0 or infinite. Where a + b = 0 it has no value.
 */
export function tightenShare(out: Row, at: number, axes: number, a: Row, atA: number, b: Row, atB: number): void {
  const leastA = a[atA + slot.lower] as number;
  const leastB = b[atB + slot.lower] as number;
  if (!(leastA >= 0 && leastB >= 0)) return;
  shareEnds.put(ends, a, atA, b, atB);
  const lower = at + slot.lower;
  const upper = at + slot.upper;
  const low = ends[0] as number;
  const lowPower = ends[1] as number;
  const high = ends[2] as number;
  const highPower = ends[3] as number;
  const raises = isLess(out[lower] as number, out[lower + 1] as number, low, lowPower);
  const lowers = isLess(high, highPower, out[upper] as number, out[upper + 1] as number);
  if (!raises && !lowers) return;
  const l = raises ? low : (out[lower] as number);
  const el = raises ? lowPower : (out[lower + 1] as number);
  const u = lowers ? high : (out[upper] as number);
  const eu = lowers ? highPower : (out[upper + 1] as number);
  // Where the node has no value the two need not meet.
  if (isLess(u, eu, l, el)) return;
  out[lower] = l;
  out[lower + 1] = el;
  out[upper] = u;
  out[upper + 1] = eu;
  settleNarrowed(out, at, axes);
}

/** Puts the least and the greatest value of a/(a + b) for a, b ≥ 0; an object so that tests can put a wrong rule in its place. */
export const shareEnds = {
  put(out: Float64Array, a: Row, atA: number, b: Row, atB: number): void {
    const leastA = a[atA + slot.lower] as number;
    const leastB = b[atB + slot.lower] as number;
    const mostA = a[atA + slot.upper] as number;
    const leastPowerA = a[atA + slot.lower + 1] as number;
    const mostPowerA = a[atA + slot.upper + 1] as number;
    putDown(out, 0, 0, 0);
    if (leastA > 0 && leastA < Number.POSITIVE_INFINITY) {
      addUp(sum, 0, leastA, leastPowerA, b[atB + slot.upper] as number, b[atB + slot.upper + 1] as number);
      divideDown(out, 0, leastA, leastPowerA, sum[0] as number, sum[1] as number);
    }
    putDown(out, 2, 1, 0);
    if (leastB > 0 && leastB < Number.POSITIVE_INFINITY && mostA < Number.POSITIVE_INFINITY) {
      addDown(sum, 0, mostA, mostPowerA, leastB, b[atB + slot.lower + 1] as number);
      divideUp(out, 2, mostA, mostPowerA, sum[0] as number, sum[1] as number);
    }
  },
};
