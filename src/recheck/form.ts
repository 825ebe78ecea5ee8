import { addDown, addUp, isLess, multiplyDown, multiplyUp, putDown, putUp, roughLog, tenTo } from './decimal.ts';

/*
 * What is known of a node on a box, as a row of numbers: an interval of decimals (see decimal.ts), and a second-order form
 *   (centre + Σ aᵢεᵢ + Σ qᵢⱼεᵢεⱼ ± error)·10^unit,  each εᵢ between −1 and 1 along one axis of the box,
 * whose numbers all are integers; |centre| + Σ|aᵢ| + Σ|qᵢⱼ| is at most 10¹⁴. Each tightens the other. An error of ∞: no form.
 */

export const slot = {
  /** 1 where the node has a value at every point at which it counts. */
  defined: 0,
  /** Mantissa and exponent of the lower end, then of the upper. */
  lower: 1,
  upper: 3,
  unit: 5,
  error: 6,
  /** Σ|aᵢ| and Σ|qᵢⱼ| */
  linear: 7,
  quadratic: 8,
  centre: 9,
} as const;

export type Row = Float64Array;

/** Number of coefficients, the centre among them, over so many axes: then all aᵢ, then qᵢⱼ in the order 00, 01, … 11, 12, … */
export const coefficientsOf = (axes: number): number => 1 + axes + (axes * (axes + 1)) / 2;
export const rowLength = (axes: number): number => slot.centre + coefficientsOf(axes);

/** At most 10¹⁴, less what a sum of doubles is off by. */
const mostNorm = 9.99e13;
/** Units of forms lie between 10^±120, so that no double over- or underflows. */
const mostUnit = 120;
const magic = 6755399441055744;

/** The nearest integer of a number below 2⁵¹. */
export const nearest = (x: number): number => x + magic - magic;

/** The smallest unit, though not below `finest`, in which numbers of that total are not too long; NaN if none is allowed. */
export function unitFor(total: number, finest: number): number {
  if (!(total < 1e133)) return Number.NaN;
  let unit = total > 1e-106 ? roughLog(total) - 14 : -mostUnit;
  if (unit < finest) unit = finest;
  if (unit < -mostUnit) unit = -mostUnit;
  while (total > mostNorm * tenTo(unit)) unit++;
  return unit <= mostUnit ? unit : Number.NaN;
}

export const normOf = (row: Row, at: number): number =>
  Math.abs(row[at + slot.centre] as number) + (row[at + slot.linear] as number) + (row[at + slot.quadratic] as number);

/** Nothing is known. */
export function putEntire(row: Row, at: number, axes: number): void {
  const end = at + rowLength(axes);
  for (let index = at; index < end; index++) row[index] = 0;
  row[at + slot.lower] = Number.NEGATIVE_INFINITY;
  row[at + slot.upper] = Number.POSITIVE_INFINITY;
  row[at + slot.error] = Number.POSITIVE_INFINITY;
}

/** The form that is the middle of the interval. */
export function putLevel(row: Row, at: number, axes: number): void {
  const lower = row[at + slot.lower] as number;
  const lowerPower = row[at + slot.lower + 1] as number;
  const upper = row[at + slot.upper] as number;
  const upperPower = row[at + slot.upper + 1] as number;
  const end = at + rowLength(axes);
  for (let index = at + slot.linear; index < end; index++) row[index] = 0;
  let unit = lower === 0 ? upperPower : upper === 0 ? lowerPower : Math.max(lowerPower, upperPower);
  if (unit < -mostUnit) unit = -mostUnit;
  row[at + slot.unit] = unit;
  if (!(upper - lower < Number.POSITIVE_INFINITY) || unit > mostUnit) {
    row[at + slot.error] = Number.POSITIVE_INFINITY;
    return;
  }
  // Scaled ends are off by 3 u of 10¹⁴ at most: 0.04.
  const from = lower * tenTo(lowerPower - unit);
  const to = upper * tenTo(upperPower - unit);
  const centre = nearest((from + to) / 2);
  row[at + slot.centre] = centre;
  const error = Math.max(to - centre, centre - from);
  row[at + slot.error] = lower === upper && unit === lowerPower && unit === upperPower ? 0 : Math.ceil(error + 0.1);
}

const range = new Float64Array(4);

/**
 * Completes a row whose interval, unit, error and coefficients are there: sums of the coefficients, and interval and form
 * each tightened by the other.
 */
export function settle(row: Row, at: number, axes: number): void {
  const error = row[at + slot.error] as number;
  const unit = row[at + slot.unit] as number;
  if (!(error < 1e15) || !(unit >= -mostUnit && unit <= mostUnit)) {
    putLevel(row, at, axes);
    return;
  }
  let linear = 0;
  let quadratic = 0;
  let low = 0;
  let high = 0;
  let index = at + slot.centre + 1 + axes;
  for (let axis = 0; axis < axes; axis++) {
    const a = Math.abs(row[at + slot.centre + 1 + axis] as number);
    const q = row[index++] as number;
    linear += a;
    // aε + qε² on −1…1: at the ends a ± … and, where the vertex is between them, −a²/(4q).
    if (q >= 0) {
      quadratic += q;
      high += a + q;
      low += a < 2 * q ? (-a * a) / (4 * q) : q - a;
    } else {
      quadratic -= q;
      low += q - a;
      high += a < -2 * q ? (-a * a) / (4 * q) : a + q;
    }
    for (let other = axis + 1; other < axes; other++) {
      const mixed = Math.abs(row[index++] as number);
      quadratic += mixed;
      high += mixed;
      low -= mixed;
    }
  }
  row[at + slot.linear] = linear;
  row[at + slot.quadratic] = quadratic;
  const centre = row[at + slot.centre] as number;
  // Only the vertices are rounded, each off by 3 u of 10¹⁴.
  putDown(range, 0, Math.floor(centre + low - error - 0.5), unit);
  putUp(range, 2, Math.ceil(centre + high + error + 0.5), unit);
  const l = row[at + 1] as number;
  const el = row[at + 2] as number;
  const u = row[at + 3] as number;
  const eu = row[at + 4] as number;
  const raises = isLess(l, el, range[0] as number, range[1] as number);
  const lowers = isLess(range[2] as number, range[3] as number, u, eu);
  const l2 = raises ? (range[0] as number) : l;
  const el2 = raises ? (range[1] as number) : el;
  const u2 = lowers ? (range[2] as number) : u;
  const eu2 = lowers ? (range[3] as number) : eu;
  if (isLess(u2, eu2, l2, el2)) {
    // Where the node has no value the two need not meet.
    putLevel(row, at, axes);
    return;
  }
  row[at + 1] = l2;
  row[at + 2] = el2;
  row[at + 3] = u2;
  row[at + 4] = eu2;
  if ((linear > 0 || quadratic > 0) && 2 * error > u2 * tenTo(eu2 - unit) - l2 * tenTo(el2 - unit))
    putLevel(row, at, axes);
}

export function putProductInterval(out: Row, at: number, a: Row, atA: number, b: Row, atB: number): void {
  const al = a[atA + 1] as number;
  const ael = a[atA + 2] as number;
  const au = a[atA + 3] as number;
  const aeu = a[atA + 4] as number;
  const bl = b[atB + 1] as number;
  const bel = b[atB + 2] as number;
  const bu = b[atB + 3] as number;
  const beu = b[atB + 4] as number;
  if (al >= 0) {
    if (bl >= 0) {
      multiplyDown(out, at + 1, al, ael, bl, bel);
      multiplyUp(out, at + 3, au, aeu, bu, beu);
    } else if (bu <= 0) {
      multiplyDown(out, at + 1, au, aeu, bl, bel);
      multiplyUp(out, at + 3, al, ael, bu, beu);
    } else {
      multiplyDown(out, at + 1, au, aeu, bl, bel);
      multiplyUp(out, at + 3, au, aeu, bu, beu);
    }
  } else if (au <= 0) {
    if (bl >= 0) {
      multiplyDown(out, at + 1, al, ael, bu, beu);
      multiplyUp(out, at + 3, au, aeu, bl, bel);
    } else if (bu <= 0) {
      multiplyDown(out, at + 1, au, aeu, bu, beu);
      multiplyUp(out, at + 3, al, ael, bl, bel);
    } else {
      multiplyDown(out, at + 1, al, ael, bu, beu);
      multiplyUp(out, at + 3, al, ael, bl, bel);
    }
  } else if (bl >= 0) {
    multiplyDown(out, at + 1, al, ael, bu, beu);
    multiplyUp(out, at + 3, au, aeu, bu, beu);
  } else if (bu <= 0) {
    multiplyDown(out, at + 1, au, aeu, bl, bel);
    multiplyUp(out, at + 3, al, ael, bl, bel);
  } else {
    multiplyDown(out, at + 1, al, ael, bu, beu);
    multiplyDown(range, 0, au, aeu, bl, bel);
    if (isLess(range[0] as number, range[1] as number, out[at + 1] as number, out[at + 2] as number)) {
      out[at + 1] = range[0] as number;
      out[at + 2] = range[1] as number;
    }
    multiplyUp(out, at + 3, al, ael, bl, bel);
    multiplyUp(range, 0, au, aeu, bu, beu);
    if (isLess(out[at + 3] as number, out[at + 4] as number, range[0] as number, range[1] as number)) {
      out[at + 3] = range[0] as number;
      out[at + 4] = range[1] as number;
    }
  }
}

export function putSumInterval(out: Row, at: number, a: Row, atA: number, b: Row, atB: number, sign: 1 | -1): void {
  const [bl, bu] = sign === 1 ? [slot.lower, slot.upper] : [slot.upper, slot.lower];
  addDown(
    out,
    at + 1,
    a[atA + 1] as number,
    a[atA + 2] as number,
    sign * (b[atB + bl] as number),
    b[atB + bl + 1] as number,
  );
  addUp(
    out,
    at + 3,
    a[atA + 3] as number,
    a[atA + 4] as number,
    sign * (b[atB + bu] as number),
    b[atB + bu + 1] as number,
  );
}
