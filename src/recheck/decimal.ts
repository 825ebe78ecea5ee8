import { type Decimal, exactDecimal } from '../number/decimal.ts';
import type { Rational } from '../number/rational.ts';

/*
 * Decimal floating point with directed rounding: mantissa·10^exponent, the mantissa an integer of 14 digits, 0 or ±∞.
 * Every intermediate integer stays below 2⁵³, so that a double holds it exactly: a product is right to its last digit, a
 * sum to a unit of it. A number is two neighbours in an array: mantissa, exponent. Only rounding down is written out; up is
 * −down(−x).
 */

const ten13 = 1e13;
const ten14 = 1e14;
const half = 1e7;

/** 10^0 … 10^22 and 2^0 … 2^22, exact in double precision. */
const exactTens = Float64Array.from({ length: 23 }, (_, power) => Number(`1e${power}`));
const exactTwos = Float64Array.from({ length: 23 }, (_, power) => 1 << power);

/** Stores an integer below 2⁵³ in magnitude times 10^exponent, rounded down to 14 digits. */
export function putDown(out: Float64Array, at: number, integer: number, exponent: number): void {
  let mantissa = integer;
  let power = exponent;
  if (mantissa === 0) power = 0;
  else {
    let size = Math.abs(mantissa);
    // The quotient of an integer below 2⁵³ by 10 is off by at most 1/16, and at least 1/10 from the next integer.
    while (size >= ten14) {
      mantissa = Math.floor(mantissa / 10);
      size = Math.abs(mantissa);
      power++;
    }
    while (size < ten13) {
      mantissa *= 10;
      size *= 10;
      power--;
    }
  }
  out[at] = mantissa;
  out[at + 1] = power;
}

export function putUp(out: Float64Array, at: number, integer: number, exponent: number): void {
  putDown(out, at, -integer, exponent);
  out[at] = -(out[at] as number);
}

export function putInfinity(out: Float64Array, at: number, sign: 1 | -1): void {
  out[at] = sign * Number.POSITIVE_INFINITY;
  out[at + 1] = 0;
}

export function addDown(out: Float64Array, at: number, a: number, ea: number, b: number, eb: number): void {
  const sum = a + b;
  // Covers ∞ − ∞ also, of which nothing is known.
  if (!(Math.abs(sum) < Number.POSITIVE_INFINITY)) {
    out[at] = sum === Number.POSITIVE_INFINITY ? sum : Number.NEGATIVE_INFINITY;
    out[at + 1] = 0;
    return;
  }
  if (a === 0) {
    out[at] = b;
    out[at + 1] = eb;
    return;
  }
  if (b === 0) {
    out[at] = a;
    out[at + 1] = ea;
    return;
  }
  const shift = ea - eb;
  if (shift === 0) putDown(out, at, sum, ea);
  else if (shift > 0) addShifted(out, at, a, ea, b, shift);
  else addShifted(out, at, b, eb, a, -shift);
}

/** a + b/10^shift at the exponent of a. */
function addShifted(out: Float64Array, at: number, a: number, ea: number, b: number, shift: number): void {
  // With one place between them no digit is lost, however much cancels.
  if (shift === 1) putDown(out, at, a * 10 + b, ea - 1);
  // The fraction of b/10^shift is a multiple of 10^−shift, far above what the quotient can be off by.
  else putDown(out, at, a + Math.floor(b / (exactTens[Math.min(shift, 22)] as number)), ea);
}

export function addUp(out: Float64Array, at: number, a: number, ea: number, b: number, eb: number): void {
  addDown(out, at, -a, ea, -b, eb);
  out[at] = -(out[at] as number);
}

/** An infinite end is a bound and no value, so that with 0 it gives 0. */
export function multiplyDown(out: Float64Array, at: number, a: number, ea: number, b: number, eb: number): void {
  if (a === 0 || b === 0) {
    out[at] = 0;
    out[at + 1] = 0;
    return;
  }
  const sizeA = a < 0 ? -a : a;
  const sizeB = b < 0 ? -b : b;
  const isNegative = a < 0 !== b < 0;
  if (sizeA === Number.POSITIVE_INFINITY || sizeB === Number.POSITIVE_INFINITY) {
    out[at] = isNegative ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
    out[at + 1] = 0;
    return;
  }
  // Mantissas in two halves of 7 digits: a·b = high·10¹⁴ + middle·10⁷ + low, all of it exact.
  const highA = Math.floor(sizeA / half);
  const lowA = sizeA - highA * half;
  const highB = Math.floor(sizeB / half);
  const lowB = sizeB - highB * half;
  const lowest = lowA * lowB;
  const carry = Math.floor(lowest / half);
  const cross = highA * lowB + lowA * highB + carry;
  const upper = Math.floor(cross / half);
  const middle = cross - upper * half;
  let mantissa = highA * highB + upper;
  let exponent = ea + eb + 14;
  let rest = lowest - carry * half;
  if (mantissa < ten13) {
    const digit = Math.floor(middle / 1e6);
    mantissa = mantissa * 10 + digit;
    exponent--;
    rest += middle - digit * 1e6;
  } else rest += middle;
  if (!isNegative) {
    out[at] = mantissa;
    out[at + 1] = exponent;
  } else if (rest === 0) {
    out[at] = -mantissa;
    out[at + 1] = exponent;
  } else putDown(out, at, -mantissa - 1, exponent);
}

export function multiplyUp(out: Float64Array, at: number, a: number, ea: number, b: number, eb: number): void {
  multiplyDown(out, at, -a, ea, b, eb);
  out[at] = -(out[at] as number);
}

/** a/b rounded down, of finite a ≥ 0 and b > 0; an infinite b gives 0. */
export function divideDown(out: Float64Array, at: number, a: number, ea: number, b: number, eb: number): void {
  const scaled = (a / b) * ten14;
  // Below 10¹⁵, and off by two roundings of 1.2·10⁻¹⁶; the difference by a third.
  putDown(out, at, Math.floor(scaled - scaled * 4e-16), ea - eb - 14);
}

export function divideUp(out: Float64Array, at: number, a: number, ea: number, b: number, eb: number): void {
  const scaled = (a / b) * ten14;
  putUp(out, at, Math.ceil(scaled + scaled * 4e-16), ea - eb - 14);
}

/** Whether a < b. */
export function isLess(a: number, ea: number, b: number, eb: number): boolean {
  if (a <= 0) {
    if (b > 0) return true;
    if (b === 0 || a === 0) return a < b;
    return isLess(-b, eb, -a, ea);
  }
  if (b <= 0 || a === Number.POSITIVE_INFINITY) return false;
  if (b === Number.POSITIVE_INFINITY) return true;
  return ea === eb ? a < b : ea < eb;
}

const tens = Float64Array.from({ length: 617 }, (_, index) => Number(`1e${index - 308}`));

/** The double nearest to 10^power, 0 or ∞ where there is none; within one part in 2⁵³. */
export function tenTo(power: number): number {
  if (power < -308) return 0;
  return power > 308 ? Number.POSITIVE_INFINITY : (tens[power + 308] as number);
}

/** About mantissa·10^exponent: off by at most three parts in 2⁵³ while it is between 10^−200 and 10^200. */
export function toDouble(mantissa: number, exponent: number): number {
  if (mantissa === 0) return 0;
  if (exponent < 0 && exponent >= -22) return mantissa / (exactTens[-exponent] as number);
  return mantissa * tenTo(exponent);
}

const bits = new Float64Array(1);
const words = new Uint32Array(bits.buffer);
const highWord = new Uint8Array(Uint32Array.of(1).buffer)[0] === 1 ? 1 : 0;

/** log₁₀ of a positive double rounded down, or one less: from its binary exponent. */
export function roughLog(x: number): number {
  bits[0] = x;
  return Math.floor((((words[highWord] as number) >>> 20) - 1023) * 0.301029995);
}

/** Stores a decimal rounded down and, two places on, up. */
export function putDecimal(out: Float64Array, at: number, value: Decimal): void {
  if (!value.isFinite()) {
    putInfinity(out, at, value.isNegative() ? -1 : 1);
    putInfinity(out, at + 2, value.isNegative() ? -1 : 1);
    return;
  }
  // The exponents of decimals as decimal.js keeps them: value = c·10^exponent with c of 14 digits before the point.
  const exponent = value.isZero() ? 0 : value.e - 13;
  const shifted = shiftedText(value, exponent);
  putDown(out, at, Number(shifted.floor().toFixed()), exponent);
  putUp(out, at + 2, Number(shifted.ceil().toFixed()), exponent);
}

/** value/10^exponent, exactly: the digits stay. */
function shiftedText(value: Decimal, exponent: number): Decimal {
  const [digits = '0', power = '0'] = value.toExponential().split('e');
  return exactCopy(value, `${digits}e${Number(power) - exponent}`);
}

function exactCopy(value: Decimal, text: string): Decimal {
  return new (value.constructor as Decimal.Constructor)(text);
}

/** Stores the binary value of a double, rounded down and up. */
export function putExactDouble(out: Float64Array, at: number, value: number): void {
  const places = 13 - roughLog(Math.abs(value));
  // 10^places is exact, and so is the product where it is an integer, which it is where value·2^places is one.
  if (value === 0 || !(places >= 0 && places <= 22)) {
    putDecimal(out, at, exactDecimal(value));
    return;
  }
  const scaled = value * tenTo(places);
  const slack = Number.isInteger(value * (exactTwos[places] as number)) ? 0 : Math.abs(scaled) * 3e-16;
  putDown(out, at, Math.floor(scaled - slack), -places);
  putUp(out, at + 2, Math.ceil(scaled + slack), -places);
}

/** Stores a rational, rounded down and up. */
export function putRational(out: Float64Array, at: number, value: Rational): void {
  const [numerator, denominator] = [value.s * value.n, value.d];
  let exponent = value.n.toString().length - denominator.toString().length - 14;
  if (value.n === 0n) exponent = 0;
  const [top, bottom] =
    exponent < 0
      ? [numerator * 10n ** BigInt(-exponent), denominator]
      : [numerator, denominator * 10n ** BigInt(exponent)];
  // At most 15 digits, so below 2⁵³.
  const quotient = top / bottom;
  const rest = top % bottom;
  putDown(out, at, Number(quotient) - (rest < 0n ? 1 : 0), exponent);
  putUp(out, at + 2, Number(quotient) + (rest > 0n ? 1 : 0), exponent);
}
