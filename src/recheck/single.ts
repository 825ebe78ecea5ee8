import type { Node } from '../graph/graph.ts';
import { decimalContext } from '../number/decimal.ts';
import { type Rational, rational } from '../number/rational.ts';
import { putApplied, putNegated, putTurned, toOrder } from './apply.ts';
import { isLess, putDecimal, putExactDouble, putRational, tenTo, toDouble } from './decimal.ts';
import type { Inverse } from './domain.ts';
import { nearest, putEntire, putLevel, type Row, rowLength, settle, slot, unitFor } from './form.ts';
import { powerAcrossZero, powerFunction } from './power.ts';
import { smoothFunctions } from './smooth.ts';
import { putCut } from './tighten.ts';

/* Nodes without operands, and with one. */

const pi = decimalContext(30).pi;
// π to 30 digits lies above or below the true one by less than 10⁻²⁸ of it.
const piBelow = pi.minus('1e-27');
const piAbove = pi.plus('1e-27');

export function putConstant(out: Row, at: number, node: Extract<Node, { kind: 'rational' | 'pi' }>): void {
  if (node.kind === 'rational') putRational(out, at + slot.lower, node.value);
  else {
    putDecimal(out, at + slot.lower, piAbove);
    const upper = out[at + slot.upper] as number;
    const power = out[at + slot.upper + 1] as number;
    putDecimal(out, at + slot.lower, piBelow);
    out[at + slot.upper] = upper;
    out[at + slot.upper + 1] = power;
  }
  out[at] = 1;
  putLevel(out, at, 0);
}

const ends = new Float64Array(4);

export function putVariable(out: Row, at: number, lower: number, upper: number): void {
  putExactDouble(ends, 0, upper);
  const top = ends[2] as number;
  const topPower = ends[3] as number;
  putExactDouble(ends, 0, lower);
  out[at] = 1;
  out[at + slot.lower] = ends[0] as number;
  out[at + slot.lower + 1] = ends[1] as number;
  out[at + slot.upper] = top;
  out[at + slot.upper + 1] = topPower;
  putLevel(out, at, 1);
  runAlong(out, at);
}

/** Makes the form of one axis run from end to end of the interval: centre + half·ε holds every number in it, exactly. */
export function runAlong(out: Row, at: number): void {
  const lower = toDouble(out[at + slot.lower] as number, out[at + slot.lower + 1] as number);
  const upper = toDouble(out[at + slot.upper] as number, out[at + slot.upper + 1] as number);
  if (!(upper > lower) || !Number.isFinite(upper - lower)) return;
  const unit = unitFor(2 * Math.max(Math.abs(lower), Math.abs(upper)), -120);
  // Off by 3 u of 10¹⁴ at most.
  const from = (out[at + slot.lower] as number) * tenTo((out[at + slot.lower + 1] as number) - unit);
  const to = (out[at + slot.upper] as number) * tenTo((out[at + slot.upper + 1] as number) - unit);
  if (!(from <= to)) return;
  const centre = nearest((from + to) / 2);
  out[at + slot.unit] = unit;
  out[at + slot.error] = 0;
  out[at + slot.centre] = centre;
  out[at + slot.centre + 1] = Math.ceil(Math.max(to - centre, centre - from) + 0.1);
  out[at + slot.centre + 2] = 0;
  settle(out, at, 1);
}

export type UnaryWriter = (out: Row, at: number, x: Row, from: number) => void;

/** `least`: a whole number that the operand is never below, where one is known at which the domain begins. */
export function unaryWriter(
  node: Extract<Node, { kind: 'unary' | 'power' }> | Inverse,
  count: number,
  safe: boolean,
  least?: number,
): UnaryWriter {
  const apply = plainWriter(node, count, safe);
  if (least === undefined) return apply;
  const cut = new Float64Array(rowLength(count));
  return (out, at, x, from) => {
    const reaches = (end: number) => toOrder(x[from + end] as number, x[from + end + 1] as number, least);
    // An operand that is below throughout has no value on the box.
    if (reaches(slot.lower) >= 0 || reaches(slot.upper) < 0) apply(out, at, x, from);
    else {
      putCut(cut, count, x, from, least);
      apply(out, at, cut, 0);
    }
  };
}

function plainWriter(
  node: Extract<Node, { kind: 'unary' | 'power' }> | Inverse,
  count: number,
  safe: boolean,
): UnaryWriter {
  if (node.kind === 'inverse') return powerWriter(rational(-1), count, safe);
  if (node.kind === 'power') return powerWriter(node.exponent, count, safe);
  if (node.op === 'neg') return (out, at, x, from) => putNegated(out, at, count, x, from);
  if (node.op === 'abs') return (out, at, x, from) => putAbsolute(out, at, count, x, from);
  const f = smoothFunctions[node.op];
  return (out, at, x, from) => putApplied(out, at, count, f, x, from, safe);
}

function putAbsolute(out: Row, at: number, count: number, x: Row, from: number): void {
  const lower = x[from + slot.lower] as number;
  const lowerPower = x[from + slot.lower + 1] as number;
  const upper = x[from + slot.upper] as number;
  const upperPower = x[from + slot.upper + 1] as number;
  if (lower >= 0) {
    out.set(x.subarray(from, from + rowLength(count)), at);
    return;
  }
  if (upper <= 0) {
    putNegated(out, at, count, x, from);
    return;
  }
  const isLarger = isLess(upper, upperPower, -lower, lowerPower);
  out[at] = x[from] as number;
  out[at + slot.lower] = 0;
  out[at + slot.lower + 1] = 0;
  out[at + slot.upper] = isLarger ? -lower : upper;
  out[at + slot.upper + 1] = isLarger ? lowerPower : upperPower;
  putLevel(out, at, count);
}

/** x^(p/q): the real root for odd q. */
function powerWriter(exponent: Rational, count: number, safe: boolean): UnaryWriter {
  const onPositive = powerFunction(exponent);
  const isRoot = exponent.d % 2n === 0n;
  const isOdd = exponent.n % 2n === 1n;
  const across = isRoot || exponent.s < 0n ? undefined : powerAcrossZero(exponent);
  return (out, at, x, from) => {
    const lower = x[from + slot.lower] as number;
    const upper = x[from + slot.upper] as number;
    if (lower >= 0) putApplied(out, at, count, onPositive, x, from, safe);
    else if (upper <= 0 && !isRoot) putTurned(out, at, count, onPositive, x, from, safe, isOdd);
    else if (across !== undefined) putApplied(out, at, count, across, x, from, safe);
    else putEntire(out, at, count);
  };
}
