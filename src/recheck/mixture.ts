import type { Embedding } from './combine.ts';
import { isLess, tenTo, toDouble } from './decimal.ts';
import { coefficientsOf, nearest, normOf, type Row, rowLength, settle, slot, unitFor } from './form.ts';

/* The smaller or the larger of two nodes, and one of two nodes of which it is not known which. */

export interface Source {
  readonly row: Row;
  readonly at: number;
  readonly embedding: Embedding;
}

const left = new Float64Array(64);
const right = new Float64Array(64);

/** The smaller or the larger of two nodes where either may be. */
export function putExtreme(out: Row, at: number, axes: number, a: Source, b: Source, isLeast: boolean): void {
  putEnds(out, at, a, b, isLeast, isLeast);
  // d = a − b runs from `least` < 0 to `most` > 0. For 0 ≤ σ ≤ 1 the convex max(0, d) − σd is between 0, at d = 0, and the
  // larger of its values at the ends. So max(a, b) = b + max(0, d) is σa + (1 − σ)b + half ± half, and
  // min(a, b) = a + b − max(a, b).
  const top = [endOf(a, slot.upper), endOf(b, slot.lower)] as const;
  const bottom = [endOf(a, slot.lower), endOf(b, slot.upper)] as const;
  const slack = [top, bottom].map(([x, y]) => (Math.abs(x) + Math.abs(y)) * 1e-15) as [number, number];
  const most = top[0] - top[1] + slack[0];
  const least = bottom[0] - bottom[1] - slack[1];
  const share = Math.min(1, Math.max(0, most / (most - least)));
  const half = (Math.max(-share * least, (1 - share) * most) / 2) * (1 + 1e-14);
  if (isLeast) putWeighted(out, at, axes, a, b, 1 - share, share, -half, half, false);
  else putWeighted(out, at, axes, a, b, share, 1 - share, half, half, false);
}

/** Whatever is one of two nodes: the middle of both forms, and half of how far their coefficients are apart. */
export function putEither(out: Row, at: number, axes: number, a: Source, b: Source): void {
  putEnds(out, at, a, b, true, false);
  putWeighted(out, at, axes, a, b, 0.5, 0.5, 0, 0, true);
}

function endOf({ row, at }: Source, end: number): number {
  return toDouble(row[at + end] as number, row[at + end + 1] as number);
}

/** From the smaller or the larger lower end to the smaller or the larger upper end. */
function putEnds(out: Row, at: number, a: Source, b: Source, smallerLower: boolean, smallerUpper: boolean): void {
  out[at] = (a.row[a.at] as number) * (b.row[b.at] as number);
  putEnd(out, at + slot.lower, a, b, slot.lower, smallerLower);
  putEnd(out, at + slot.upper, a, b, slot.upper, smallerUpper);
}

function putEnd(out: Row, at: number, a: Source, b: Source, end: number, smaller: boolean): void {
  const [m, e] = [a.row[a.at + end] as number, a.row[a.at + end + 1] as number];
  const [n, f] = [b.row[b.at + end] as number, b.row[b.at + end + 1] as number];
  const takesFirst = isLess(m, e, n, f) === smaller;
  out[at] = takesFirst ? m : n;
  out[at + 1] = takesFirst ? e : f;
}

/**
 * weightA·a + weightB·b + shift ± spread. Weights and shift are doubles of a few roundings each: with the products and the
 * change of unit, all numbers together lose less than 0.2 units, and each half a unit when it becomes an integer.
 */
function putWeighted(
  out: Row,
  at: number,
  axes: number,
  a: Source,
  b: Source,
  weightA: number,
  weightB: number,
  shift: number,
  spread: number,
  isEither: boolean,
): void {
  const [unitA, unitB] = [a.row[a.at + slot.unit] as number, b.row[b.at + slot.unit] as number];
  const [errorA, errorB] = [a.row[a.at + slot.error] as number, b.row[b.at + slot.error] as number];
  const sizeA = (normOf(a.row, a.at) + errorA) * tenTo(unitA);
  const sizeB = (normOf(b.row, b.at) + errorB) * tenTo(unitB);
  const unit = unitFor(sizeA + sizeB + Math.abs(shift) + spread, -120);
  out[at + slot.unit] = unit;
  const count = coefficientsOf(axes);
  spreadOut(left, count, a, tenTo(unitA - unit));
  spreadOut(right, count, b, tenTo(unitB - unit));
  let apart = 0;
  for (let index = 0; index < count; index++) {
    const [x, y] = [left[index] as number, right[index] as number];
    apart += Math.abs(x - y);
    out[at + slot.centre + index] = nearest(weightA * x + weightB * y + (index === 0 ? shift * tenTo(-unit) : 0));
  }
  const [ownA, ownB] = [errorA * tenTo(unitA - unit), errorB * tenTo(unitB - unit)];
  const own = isEither ? apart / 2 + Math.max(ownA, ownB) : weightA * ownA + weightB * ownB;
  out[at + slot.error] = Math.ceil((own + spread * tenTo(-unit)) * (1 + 1e-12) + 0.2 + count / 2);
  settle(out, at, axes);
}

/** The coefficients of a form at their places among those over more axes. */
function spreadOut(into: Float64Array, count: number, { row, at, embedding }: Source, scale: number): void {
  for (let index = 0; index < count; index++) into[index] = 0;
  for (let index = 0; index < embedding.count; index++)
    into[embedding.places[index] as number] = (row[at + slot.centre + index] as number) * scale;
}

/** A row over more axes: its interval and form stay. */
export function putCopy(out: Row, at: number, axes: number, { row, at: from, embedding }: Source): void {
  for (let index = 0; index < slot.centre; index++) out[at + index] = row[from + index] as number;
  for (let index = slot.centre; index < rowLength(axes); index++) out[at + index] = 0;
  for (let index = 0; index < embedding.count; index++)
    out[at + slot.centre + (embedding.places[index] as number)] = row[from + slot.centre + index] as number;
}
