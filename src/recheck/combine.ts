import { tenTo } from './decimal.ts';
import {
  coefficientsOf,
  nearest,
  normOf,
  putProductInterval,
  putSumInterval,
  type Row,
  settle,
  slot,
  unitFor,
} from './form.ts';

/*
 * Sums and products of forms. Products and sums of integer coefficients are doubles; of all the numbers of a result, at
 * most 10¹⁴ together, they and the change of unit lose less than 10 u·10¹⁴ = 0.12 units, and the rounding of each to an
 * integer half a unit.
 */

const arithmetic = 0.2;

/** Where coefficients of a form over some axes stand in one over more of them, and where products of linear ones do. */
export interface Embedding {
  readonly axes: number;
  readonly count: number;
  readonly places: Int32Array;
}

/** The place of qᵢⱼ in a form over so many axes. */
export function mixedPlace(axes: number, first: number, second: number): number {
  const [i, j] = first <= second ? [first, second] : [second, first];
  return 1 + axes + i * axes - (i * (i - 1)) / 2 + (j - i);
}

/** `positions`: of each axis of the smaller form among those of the larger. */
export function embedding(positions: readonly number[], axes: number): Embedding {
  const places = [0, ...positions.map((position) => 1 + position)];
  positions.forEach((first, index) => {
    for (const second of positions.slice(index)) places.push(mixedPlace(axes, first, second));
  });
  return { axes: positions.length, count: coefficientsOf(positions.length), places: Int32Array.from(places) };
}

/** Where products of the coefficients of two forms belong. */
export interface Crossing {
  /** The place of each aᵢbⱼ, row by row. */
  readonly pairs: Int32Array;
  /** Of each axis that both have: places of aᵢ, of its qᵢᵢ, of bᵢ, of its qᵢᵢ, and of the result's aᵢ. */
  readonly shared: Int32Array;
}

/** `first`, `second`: the positions of each form's axes among those of the product. */
export function crossing(first: readonly number[], second: readonly number[], axes: number): Crossing {
  const own = (positions: readonly number[], axis: number) => {
    const index = positions.indexOf(axis);
    return [1 + index, mixedPlace(positions.length, index, index)];
  };
  const both = first.filter((axis) => second.includes(axis));
  return {
    pairs: Int32Array.from(first.flatMap((i) => second.map((j) => mixedPlace(axes, i, j)))),
    shared: Int32Array.from(both.flatMap((axis) => [...own(first, axis), ...own(second, axis), 1 + axis])),
  };
}

const sums = new Float64Array(128);

/** The sums times the scale; as they are where they are integers already. */
function putSums(out: Row, at: number, count: number, scale: number, isExact: boolean): void {
  const start = at + slot.centre;
  if (isExact) for (let index = 0; index < count; index++) out[start + index] = sums[index] as number;
  else for (let index = 0; index < count; index++) out[start + index] = nearest((sums[index] as number) * scale);
}

/** a + sign·b */
export function putSum(
  out: Row,
  at: number,
  axes: number,
  a: Row,
  atA: number,
  ofA: Embedding,
  b: Row,
  atB: number,
  ofB: Embedding,
  sign: 1 | -1,
): void {
  putSumInterval(out, at, a, atA, b, atB, sign);
  const unitA = a[atA + slot.unit] as number;
  const unitB = b[atB + slot.unit] as number;
  const errorA = a[atA + slot.error] as number;
  const errorB = b[atB + slot.error] as number;
  const total = (normOf(a, atA) + errorA) * tenTo(unitA) + (normOf(b, atB) + errorB) * tenTo(unitB);
  const unit = unitFor(total, Math.min(unitA, unitB));
  out[at + slot.unit] = unit;
  const count = coefficientsOf(axes);
  const scaleA = tenTo(unitA - unit);
  const scaleB = sign * tenTo(unitB - unit);
  for (let index = 0; index < count; index++) sums[index] = 0;
  for (let index = 0; index < ofA.count; index++)
    sums[ofA.places[index] as number] = (a[atA + slot.centre + index] as number) * scaleA;
  for (let index = 0; index < ofB.count; index++) {
    const place = ofB.places[index] as number;
    sums[place] = (sums[place] as number) + (b[atB + slot.centre + index] as number) * scaleB;
  }
  const isExact = unitA >= unit && unitB >= unit;
  if (isExact) putSums(out, at, count, 1, true);
  else for (let index = 0; index < count; index++) out[at + slot.centre + index] = nearest(sums[index] as number);
  const error = errorA * scaleA + errorB * Math.abs(scaleB);
  out[at + slot.error] =
    error === 0 && isExact ? 0 : Math.ceil(error * (1 + 1e-14) + (isExact ? 0 : arithmetic + count / 2));
  settle(out, at, axes);
}

/** a·b */
export function putProduct(
  out: Row,
  at: number,
  axes: number,
  a: Row,
  atA: number,
  ofA: Embedding,
  b: Row,
  atB: number,
  ofB: Embedding,
  cross: Crossing,
): void {
  putProductInterval(out, at, a, atA, b, atB);
  putProductForm(out, at, axes, a, atA, ofA, b, atB, ofB, cross, 0, 0);
  settle(out, at, axes);
}

/** The unit, coefficients and error of a·b + constant ± error; the constant in a double. */
export function putProductForm(
  out: Row,
  at: number,
  axes: number,
  a: Row,
  atA: number,
  ofA: Embedding,
  b: Row,
  atB: number,
  ofB: Embedding,
  cross: Crossing,
  constant: number,
  constantError: number,
): void {
  const errorA = a[atA + slot.error] as number;
  const errorB = b[atB + slot.error] as number;
  const ownUnit = (a[atA + slot.unit] as number) + (b[atB + slot.unit] as number);
  const normA = normOf(a, atA);
  const normB = normOf(b, atB);
  const linearA = a[atA + slot.linear] as number;
  const linearB = b[atB + slot.linear] as number;
  const quadraticA = a[atA + slot.quadratic] as number;
  const quadraticB = b[atB + slot.quadratic] as number;
  // What is of third and fourth order, and what the errors make of it.
  let rest = (linearA + quadraticA) * quadraticB + quadraticA * linearB + normA * errorB + errorA * (normB + errorB);
  const total = (normA * normB + 2 * rest) * tenTo(ownUnit) + Math.abs(constant) + constantError;
  const unit = unitFor(total, constant === 0 ? ownUnit : -120);
  out[at + slot.unit] = unit;
  if (!(total < Number.POSITIVE_INFINITY)) {
    out[at + slot.error] = Number.POSITIVE_INFINITY;
    return;
  }
  const scale = tenTo(ownUnit - unit);
  const count = coefficientsOf(axes);
  for (let index = 0; index < count; index++) sums[index] = 0;
  const centreA = a[atA + slot.centre] as number;
  const centreB = b[atB + slot.centre] as number;
  if (centreA !== 0)
    for (let index = 0; index < ofB.count; index++)
      sums[ofB.places[index] as number] = centreA * (b[atB + slot.centre + index] as number);
  if (centreB !== 0)
    for (let index = 1; index < ofA.count; index++) {
      const place = ofA.places[index] as number;
      sums[place] = (sums[place] as number) + centreB * (a[atA + slot.centre + index] as number);
    }
  if (linearA !== 0 && linearB !== 0) {
    const { pairs } = cross;
    const start = atB + slot.centre + 1;
    for (let index = 0, first = 0; index < pairs.length; first++) {
      const factor = a[atA + slot.centre + 1 + first] as number;
      for (let second = start; second < start + ofB.axes; second++, index++) {
        const place = pairs[index] as number;
        sums[place] = (sums[place] as number) + factor * (b[second] as number);
      }
    }
  }
  let isExact = scale === 1 && constant === 0;
  if ((linearA !== 0 && quadraticB !== 0) || (linearB !== 0 && quadraticA !== 0)) {
    const { shared } = cross;
    const fromA = atA + slot.centre;
    const fromB = atB + slot.centre;
    for (let index = 0; index < shared.length; index += 5) {
      const s = (a[fromA + (shared[index] as number)] as number) * (b[fromB + (shared[index + 3] as number)] as number);
      const t =
        (a[fromA + (shared[index + 1] as number)] as number) * (b[fromB + (shared[index + 2] as number)] as number);
      if (s === 0 && t === 0) continue;
      // kε³ = ¾kε ± |k|/4, Chebyshev's polynomial of third order
      const k = s + t;
      const place = shared[index + 4] as number;
      sums[place] = (sums[place] as number) + 0.75 * k;
      rest += 0.25 * Math.abs(k) - Math.abs(s) - Math.abs(t);
      isExact = false;
    }
  }
  putSums(out, at, count, scale, isExact);
  if (constant !== 0) out[at + slot.centre] = (out[at + slot.centre] as number) + nearest(constant * tenTo(-unit));
  const rounding = isExact ? 0 : arithmetic + (count + 1) / 2;
  out[at + slot.error] = Math.ceil((Math.max(rest, 0) * scale + constantError * tenTo(-unit)) * (1 + 1e-12) + rounding);
}
