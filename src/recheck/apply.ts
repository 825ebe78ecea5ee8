import { crossing, embedding, putProductForm } from './combine.ts';
import { isLess, putDown, tenTo, toDouble } from './decimal.ts';
import { putAround } from './elementary.ts';
import type { Expansion, Place, SmoothFunction } from './expansion.ts';
import { coefficientsOf, nearest, putEntire, putLevel, type Row, rowLength, settle, slot, unitFor } from './form.ts';

/*
 * A function of a form: its image, and f(x₀) + u·(f′(x₀) + f″(x₀)/2·u) + remainder with u = x − x₀. The remainder is
 * f‴(ξ)/6·u³; and where f‴ keeps its sign it rises or falls all along the interval, so that its values at the ends
 * bound it.
 */

const ends = new Float64Array(8);
const value = new Float64Array(2);
const place: Place = { x: 0, value: 0, lower: 0, upper: 0, atLower: 0, atUpper: 0 };
const expansion: Expansion = { slope: 0, slopeError: 0, bend: 0, bendError: 0, thirdLeast: 0, thirdMost: 0 };
const own = Array.from({ length: 7 }, (_, axes) => {
  const positions = Array.from({ length: axes }, (_unused, axis) => axis);
  return {
    embedding: embedding(positions, axes),
    cross: crossing(positions, positions, axes),
    offset: new Float64Array(rowLength(axes)),
    slope: new Float64Array(rowLength(axes)),
  };
});

/** The most axes that forms may have. */
export const mostAxes = own.length - 1;

/** f of a row into another one; `touchingIsSafe`: the operand is not where the domain begins at any point that counts. */
export function putApplied(
  out: Row,
  at: number,
  axes: number,
  f: SmoothFunction,
  x: Row,
  atX: number,
  touchingIsSafe: boolean,
): void {
  const lower = x[atX + slot.lower] as number;
  const lowerPower = x[atX + slot.lower + 1] as number;
  const upper = x[atX + slot.upper] as number;
  const upperPower = x[atX + slot.upper + 1] as number;
  let defined = x[atX + slot.defined] as number;
  if (f.begins !== undefined) {
    const [begin, included] = f.begins;
    if (toOrder(lower, lowerPower, begin) < 0) {
      putEntire(out, at, axes);
      return;
    }
    if (!included && !touchingIsSafe && toOrder(lower, lowerPower, begin) === 0) defined = 0;
  }
  const direction = f.direction(lower, upper);
  putImage(out, at, f, direction, lower, lowerPower, upper, upperPower);
  out[at + slot.defined] = defined;
  const error = x[atX + slot.error] as number;
  const isLevel = (x[atX + slot.linear] as number) === 0 && (x[atX + slot.quadratic] as number) === 0;
  if (isLevel || !(error < Number.POSITIVE_INFINITY) || !expand(out, at, axes, f, x, atX, direction === 0)) {
    putLevel(out, at, axes);
    return;
  }
  settle(out, at, axes);
}

/** Whether a decimal is below, at or above one of few digits: negative, 0 or positive. */
export function toOrder(mantissa: number, exponent: number, bound: number): number {
  if (bound === 0) return mantissa;
  putDown(ends, 0, Math.round(bound * 1e14), -14);
  const b = ends[0] as number;
  const eb = ends[1] as number;
  return isLess(mantissa, exponent, b, eb) ? -1 : isLess(b, eb, mantissa, exponent) ? 1 : 0;
}

/** The interval of f; values at the ends stay in `ends` as four decimals: from and to at the lower end, then at the upper. */
function putImage(
  out: Row,
  at: number,
  f: SmoothFunction,
  direction: number,
  lower: number,
  lowerPower: number,
  upper: number,
  upperPower: number,
): void {
  const [least, most] = f.range;
  if (direction !== 0) {
    valueAtEnd(f, lower, lowerPower, -1);
    putKnown(0, least, most);
    valueAtEnd(f, upper, upperPower, 1);
    putKnown(4, least, most);
  }
  if (direction === 1) copyEnds(out, at, 0, 6);
  else if (direction === -1) copyEnds(out, at, 4, 2);
  else if (direction === 2) {
    const isFirst = isLess(ends[6] as number, ends[7] as number, ends[2] as number, ends[3] as number);
    copyEnds(out, at, 0, isFirst ? 2 : 6);
    putPlain(out, at + slot.lower, least);
  } else {
    putPlain(out, at + slot.lower, least);
    putPlain(out, at + slot.upper, most);
  }
}

/** The value at an end; where that is not computed, at an argument further out, on the side of the end. */
function valueAtEnd(f: SmoothFunction, mantissa: number, exponent: number, side: 1 | -1): void {
  const { farthest } = f;
  if (farthest === undefined || Math.abs(toDouble(mantissa, exponent)) <= farthest) f.value(value, mantissa, exponent);
  else if (mantissa > 0 === side > 0) f.value(value, side * Number.POSITIVE_INFINITY, 0);
  else {
    putDown(value, 0, -side * farthest, 0);
    f.value(value, value[0] as number, value[1] as number);
  }
}

function putKnown(to: number, least: number, most: number): void {
  if (Number.isNaN(value[0])) {
    putPlain(ends, to, least);
    putPlain(ends, to + 2, most);
  } else putAround(ends, to, value[0] as number, value[1] as number);
}

/** A whole number or an infinity. */
function putPlain(out: Row, at: number, plain: number): void {
  if (Number.isFinite(plain)) putDown(out, at, plain, 0);
  else {
    out[at] = plain;
    out[at + 1] = 0;
  }
}

function copyEnds(out: Row, at: number, from: number, to: number): void {
  out[at + slot.lower] = ends[from] as number;
  out[at + slot.lower + 1] = ends[from + 1] as number;
  out[at + slot.upper] = ends[to] as number;
  out[at + slot.upper + 1] = ends[to + 1] as number;
}

/** Doubles as large as 10^40 and as small as 10^−40, or 0: of them products of a few neither over- nor underflow. */
const isModerate = (x: number) => x === 0 || (Math.abs(x) < 1e40 && Math.abs(x) > 1e-40);

/** Puts unit, coefficients and error; answers whether there is an expansion. */
function expand(
  out: Row,
  at: number,
  axes: number,
  f: SmoothFunction,
  x: Row,
  atX: number,
  endsUnknown: boolean,
): boolean {
  const unit = x[atX + slot.unit] as number;
  const scale = tenTo(unit);
  // The ends in units of the form: off by 3 u of them, with an own centre of at most 10¹⁴ by less than 1.
  const from = (x[atX + slot.lower] as number) * tenTo((x[atX + slot.lower + 1] as number) - unit);
  const to = (x[atX + slot.upper] as number) * tenTo((x[atX + slot.upper + 1] as number) - unit);
  if (!(to - from < 1e15)) return false;
  const centre = x[atX + slot.centre] as number;
  const middle = centre >= from && centre <= to ? centre : nearest((from + to) / 2);
  const reach = (Math.max(to - middle, middle - from) + 1) * scale;
  // Such that the middle is a decimal of 14 digits, and cubes do not underflow.
  if (!(Math.abs(middle) < 1e14 && reach > 1e-80)) return false;
  putDown(value, 0, middle, unit);
  const mantissa = value[0] as number;
  const exponent = value[1] as number;
  f.value(value, mantissa, exponent);
  if (!isModerate(value[0] as number) || !(Math.abs(value[1] as number) < 40)) return false;
  place.x = toDouble(mantissa, exponent);
  place.value = (value[0] as number) * tenTo(value[1] as number);
  place.lower = from * scale - Math.abs(from * scale) * 1e-14;
  place.upper = to * scale + Math.abs(to * scale) * 1e-14;
  if (!isModerate(place.x) || !isModerate(place.lower) || !isModerate(place.upper) || !isModerate(place.value))
    return false;
  const [low, high] = endsUnknown ? [f.range[0], f.range[1]] : [sizeOfEnd(0), sizeOfEnd(4)];
  place.atLower = low;
  place.atUpper = high;
  f.expand(place, expansion);
  const { slope, slopeError, bend, bendError, thirdLeast, thirdMost } = expansion;
  if (!isModerate(slope) || !isModerate(bend)) return false;
  // u³ times κ ± half of the width of the bounds; and u³ = ¾r²u ± r³/4 for |u| ≤ r, Chebyshev's polynomial.
  const kappa = (thirdLeast + thirdMost) / 2;
  const cube = reach * reach * reach;
  let tilt = 0.75 * kappa * reach * reach;
  let offset = 0;
  let spread = (Math.abs(kappa) / 4 + (thirdMost - thirdLeast) / 2) * cube * (1 + 1e-12);
  const sign = f.third(x[atX + slot.lower] as number, x[atX + slot.upper] as number);
  if (sign !== 0 && !endsUnknown && Math.abs(low) < 1e80 && Math.abs(high) < 1e80) {
    const toLower = (from - middle) * scale;
    const toUpper = (to - middle) * scale;
    const first = low - (place.value + toLower * (slope + bend * toLower));
    const last = high - (place.value + toUpper * (slope + bend * toUpper));
    // What is off: each end by 10⁻¹³ of itself, the rest by as much of what it is made of, the distances by a unit.
    const size =
      Math.abs(low) + Math.abs(high) + Math.abs(place.value) + reach * (Math.abs(slope) + Math.abs(bend) * reach);
    const slip =
      4e-13 * size + reach * (slopeError + bendError * reach) + (Math.abs(slope) + 2 * Math.abs(bend) * reach) * scale;
    const half = Math.abs(last - first) / 2 + slip;
    if (!(spread <= half)) {
      tilt = 0;
      offset = (first + last) / 2;
      spread = half;
    }
  }
  const constant = place.value + offset;
  const total = Math.abs(place.value) + Math.abs(offset);
  const constantError = total * 2e-14 + spread * (1 + 1e-9);
  if (!(constantError < 1e100) || !isModerate(slope + tilt)) return false;
  expansion.slope = slope + tilt;
  expansion.slopeError = slopeError + Math.abs(tilt) * 1e-14;
  return putTaylor(out, at, axes, x, atX, middle, constant, constantError);
}

/** The value at an end, off by 10⁻¹³ of itself. */
function sizeOfEnd(from: number): number {
  const a = toDouble(ends[from] as number, ends[from + 1] as number);
  const b = toDouble(ends[from + 2] as number, ends[from + 3] as number);
  return Math.abs(a) > Math.abs(b) ? a : b;
}

/** constant ± error + u·(slope + bend·u), u = x − middle, of the expansion at hand. */
function putTaylor(
  out: Row,
  at: number,
  axes: number,
  x: Row,
  atX: number,
  middle: number,
  constant: number,
  constantError: number,
): boolean {
  const { embedding: identity, cross, offset: u, slope: v } = own[axes] as (typeof own)[number];
  const count = coefficientsOf(axes);
  const xUnit = x[atX + slot.unit] as number;
  const error = x[atX + slot.error] as number;
  u[slot.unit] = xUnit;
  u[slot.error] = error;
  u[slot.linear] = x[atX + slot.linear] as number;
  u[slot.quadratic] = x[atX + slot.quadratic] as number;
  for (let index = 0; index < count; index++) u[slot.centre + index] = x[atX + slot.centre + index] as number;
  u[slot.centre] = (x[atX + slot.centre] as number) - middle;
  const norm = Math.abs(u[slot.centre] as number) + (u[slot.linear] as number) + (u[slot.quadratic] as number);
  const { slope, slopeError, bend, bendError } = expansion;
  const total = Math.abs(slope) + slopeError + (Math.abs(bend) + bendError) * (norm + error) * tenTo(xUnit);
  const unit = unitFor(total, -120);
  if (!(unit <= 120)) return false;
  const factor = bend * tenTo(xUnit - unit);
  v[slot.unit] = unit;
  let linear = 0;
  let quadratic = 0;
  for (let index = 1; index < count; index++) {
    const scaled = nearest(factor * (u[slot.centre + index] as number));
    v[slot.centre + index] = scaled;
    if (index <= axes) linear += Math.abs(scaled);
    else quadratic += Math.abs(scaled);
  }
  v[slot.centre] = nearest(slope * tenTo(-unit) + factor * (u[slot.centre] as number));
  v[slot.linear] = linear;
  v[slot.quadratic] = quadratic;
  const slack = slopeError * tenTo(-unit) + bendError * tenTo(xUnit - unit) * (norm + error) + Math.abs(factor) * error;
  v[slot.error] = Math.ceil(slack * (1 + 1e-12) + 0.2 + count / 2);
  putProductForm(out, at, axes, u, 0, identity, v, 0, identity, cross, constant, constantError);
  return true;
}

const turned = new Float64Array(rowLength(mostAxes));

/** −x. */
export function putNegated(out: Row, at: number, axes: number, x: Row, atX: number): void {
  for (let index = 0; index < rowLength(axes); index++) out[at + index] = x[atX + index] as number;
  for (let index = slot.centre; index < rowLength(axes); index++) out[at + index] = -(x[atX + index] as number);
  out[at + slot.lower] = -(x[atX + slot.upper] as number);
  out[at + slot.lower + 1] = x[atX + slot.upper + 1] as number;
  out[at + slot.upper] = -(x[atX + slot.lower] as number);
  out[at + slot.upper + 1] = x[atX + slot.lower + 1] as number;
}

/** f(−x), or −f(−x). */
export function putTurned(
  out: Row,
  at: number,
  axes: number,
  f: SmoothFunction,
  x: Row,
  atX: number,
  touchingIsSafe: boolean,
  isOdd: boolean,
): void {
  putNegated(turned, 0, axes, x, atX);
  if (!isOdd) {
    putApplied(out, at, axes, f, turned, 0, touchingIsSafe);
    return;
  }
  const image = new Float64Array(rowLength(axes));
  putApplied(image, 0, axes, f, turned, 0, touchingIsSafe);
  putNegated(out, at, axes, image, 0);
}
