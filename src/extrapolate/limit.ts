import { Decimal, decimalContext } from '../number/decimal.ts';
import {
  allFinite,
  type DecimalFunction,
  doubling,
  geometric,
  pointNear,
  type Target,
  type Term,
  termsOf,
} from './sequence.ts';
import { type Estimate, shanks } from './shanks.ts';

/** What a function tends to. `error` bounds the error of a finite limit, from two sequences. */
export type LimitResult = { readonly terms: readonly Term[] } & (
  | { readonly kind: 'finite'; readonly value: Decimal; readonly error: Decimal; readonly second: Decimal }
  | { readonly kind: 'infinite'; readonly sign: 1 | -1; readonly growth: 'power' | 'logarithm' }
  | { readonly kind: 'unknown'; readonly reason: string }
);

/** The distances from the target that are looked at, and the working digits. */
export interface LimitSequences {
  readonly first: { readonly start: string; readonly ratio: string; readonly count: number };
  readonly second: { readonly start: string; readonly ratio: string; readonly count: number };
  /** A factor for every distance: far inside the scale of whatever else moves. */
  readonly scale: Decimal;
  readonly digits: number;
  /** Where all terms lie within this of each other, the last one is the limit to that accuracy. */
  readonly resolution: Decimal;
}

const workingDigits = 40;
const moreDigits = 120;

export const ordinarySequences: LimitSequences = {
  first: { start: '1e-4', ratio: '0.01', count: 7 },
  second: { start: '3e-5', ratio: '0.01', count: 6 },
  scale: new Decimal(1),
  digits: workingDigits,
  resolution: new Decimal(0),
};

/** For a limit of limits: so far out that those inside it can still be taken much closer. */
export const outerSequences: LimitSequences = {
  first: { start: '0.01', ratio: '0.1', count: 6 },
  second: { start: '0.007', ratio: '0.12', count: 5 },
  scale: new Decimal(1),
  // Fixed, as a look at how many are enough would go much farther out.
  digits: workingDigits + 20,
  resolution: new Decimal(0),
};

/** All distances times a small factor, for a limit far inside the scale of something else. */
export function closeSequences(scale: Decimal): LimitSequences {
  return { ...ordinarySequences, scale, digits: Math.min(300, moreDigits + 2 * Math.max(0, -scale.e)) };
}
/** Relative differences below this are round-off of the working digits. */
const noiseShare = '1e-33';

/** Ratio of successive differences: below it the terms settle geometrically, above its inverse they run away. */
const settlingRatio = 0.7;

/**
 * lim f for x → target. The terms stand at a geometric sequence of points, where an expansion in any powers and
 * logarithms of the distance is a sum of geometric sequences that Wynn's algorithm removes; a second sequence with
 * another start and ratio checks the first. Where the terms neither settle nor run away geometrically, the points are
 * squared from term to term instead, which tells a logarithmic growth from a convergence in 1/log.
 */
export function limitOf(
  f: DecimalFunction,
  target: Target,
  sequences: LimitSequences = ordinarySequences,
): LimitResult {
  const { first, second, scale } = sequences;
  const digits = sequences.digits > workingDigits ? sequences.digits : enoughDigits(f, target);
  const distances = ({ start, ratio, count }: LimitSequences['first']) =>
    geometric(start, ratio, count, digits).map((h) => h.times(scale));
  const terms = termsOf(f, target, distances(first), digits);
  const noise = noiseOf(terms, digits);
  if (!allFinite(terms))
    return { kind: 'unknown', terms, reason: 'the function has no finite value close to the limit' };
  if (settles(terms, noise)) {
    const check = termsOf(f, target, distances(second), digits);
    if (!allFinite(check)) {
      return { kind: 'unknown', terms: check, reason: 'the function has no finite value close to the limit' };
    }
    return settled(shanks(valuesOf(terms), noise), shanks(valuesOf(check), noise), terms, noise);
  }
  const spread = spreadOf(terms);
  if (spread.lessThan(sequences.resolution)) {
    const { value } = terms[terms.length - 1] as Term;
    return { kind: 'finite', value, error: Decimal.max(spread, noise), second: value, terms };
  }
  if (grows(terms, noise)) return { kind: 'infinite', growth: 'power', sign: lastSign(terms), terms };
  if (!scale.equals(1))
    return { kind: 'unknown', terms, reason: 'a limit inside another settles too slowly to be told' };
  return slowLimit(f, target);
}

/** Where neighbouring terms of a geometric sequence differ by about the same: log growth, or convergence in 1/log. */
function slowLimit(f: DecimalFunction, target: Target): LimitResult {
  const isFar = target.kind === 'infinity' || target.value.isZero();
  // Beside a point other than zero the working digits do not reach so close.
  const count = isFar ? 8 : 6;
  const digits = isFar ? workingDigits : moreDigits;
  const terms = termsOf(f, target, doubling('0.1', count, digits), digits);
  if (!allFinite(terms))
    return { kind: 'unknown', terms, reason: 'the function has no finite value close to the limit' };
  const noise = noiseOf(terms, digits);
  if (grows(terms, noise)) return { kind: 'infinite', growth: 'logarithm', sign: lastSign(terms), terms };
  if (settles(terms, noise)) {
    const check = termsOf(f, target, doubling('0.07', count, digits), digits);
    if (allFinite(check)) return settled(shanks(valuesOf(terms), noise), shanks(valuesOf(check), noise), terms, noise);
  }
  return { kind: 'unknown', terms, reason: 'the terms neither settle nor grow in a way that can be told' };
}

function settled(first: Estimate, second: Estimate, terms: readonly Term[], noise: Decimal): LimitResult {
  const apart = first.value.minus(second.value).abs();
  const error = Decimal.max(apart, Decimal.min(first.error, second.error), noise);
  return { kind: 'finite', value: first.value, error, second: second.value, terms };
}

/** More digits where the function loses those of the ordinary working precision close to its limit. */
function enoughDigits(f: DecimalFunction, target: Target): number {
  const { from } = decimalContext(workingDigits);
  const x = pointNear(target, from('1e-16'), workingDigits);
  const [coarse, fine] = [f(x, workingDigits), f(x, workingDigits + 30)];
  const difference = coarse.minus(fine).abs();
  return difference.lessThanOrEqualTo(fine.abs().times('1e-25')) || fine.isZero() ? workingDigits : moreDigits;
}

function noiseOf(terms: readonly Term[], digits: number): Decimal {
  const { from } = decimalContext(digits);
  const largest = terms.reduce((most, { value }) => (value.abs().greaterThan(most) ? value.abs() : most), from(0));
  return largest.times(noiseShare);
}

function spreadOf(terms: readonly Term[]): Decimal {
  const values = valuesOf(terms);
  return Decimal.max(...values).minus(Decimal.min(...values));
}

/** |last difference / the one before|; 0 once the terms no longer change. */
function lastRatio(terms: readonly Term[], noise: Decimal): number {
  const [a, b, c] = terms.slice(-3).map(({ value }) => value) as [Decimal, Decimal, Decimal];
  const last = c.minus(b).abs();
  if (last.lessThanOrEqualTo(noise)) return 0;
  return last.div(b.minus(a).abs()).toNumber();
}

/** Ratios of successive differences of the last terms, the latest first. */
function lastRatios(terms: readonly Term[], noise: Decimal): number[] {
  return [0, 1, 2].map((back) => lastRatio(terms.slice(0, terms.length - back), noise));
}

/** Whether the differences of the last terms become smaller geometrically. */
function settles(terms: readonly Term[], noise: Decimal): boolean {
  return lastRatios(terms, noise).every((ratio) => ratio < settlingRatio);
}

/** Whether the terms run away at a steady rate; an oscillation does not. */
function grows(terms: readonly Term[], noise: Decimal): boolean {
  const ratios = lastRatios(terms, noise);
  return Math.min(...ratios) > 1 / settlingRatio && Math.max(...ratios) < 2 * Math.min(...ratios);
}

function lastSign(terms: readonly Term[]): 1 | -1 {
  return (terms[terms.length - 1] as Term).value.isNegative() ? -1 : 1;
}

function valuesOf(terms: readonly Term[]): Decimal[] {
  return terms.map(({ value }) => value);
}
