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

const workingDigits = 50;
const moreDigits = 120;
/** Relative differences below this are round-off of the working digits. */
const noiseShare = '1e-40';

/** Ratio of successive differences: below it the terms settle geometrically, above its inverse they run away. */
const settles = 0.7;

/**
 * lim f for x → target. The terms stand at a geometric sequence of points, where an expansion in any powers and
 * logarithms of the distance is a sum of geometric sequences that Wynn's algorithm removes; a second sequence with
 * another start and ratio checks the first. Where the terms neither settle nor run away geometrically, the points are
 * squared from term to term instead, which tells a logarithmic growth from a convergence in 1/log.
 */
export function limitOf(f: DecimalFunction, target: Target): LimitResult {
  const digits = enoughDigits(f, target);
  const terms = termsOf(f, target, geometric('1e-4', '0.01', 8, digits), digits);
  const noise = noiseOf(terms, digits);
  if (!allFinite(terms)) return { kind: 'unknown', terms, reason: 'the function has no finite value close to the limit' };
  const ratio = lastRatio(terms, noise);
  if (ratio < settles) {
    const check = termsOf(f, target, geometric('3e-5', '0.02', 7, digits), digits);
    if (!allFinite(check)) {
      return { kind: 'unknown', terms: check, reason: 'the function has no finite value close to the limit' };
    }
    const first = shanks(valuesOf(terms), noise);
    return settled(first, shanks(valuesOf(check), noise), terms, noise);
  }
  if (ratio > 1 / settles) return { kind: 'infinite', growth: 'power', sign: lastSign(terms), terms };
  return slowLimit(f, target);
}

/** Where neighbouring terms of a geometric sequence differ by about the same: log growth, or convergence in 1/log. */
function slowLimit(f: DecimalFunction, target: Target): LimitResult {
  const isFar = target.kind === 'infinity' || target.value.isZero();
  // Beside a point other than zero the working digits do not reach so close.
  const count = isFar ? 8 : 6;
  const digits = isFar ? workingDigits : moreDigits;
  const terms = termsOf(f, target, doubling('0.1', count, digits), digits);
  if (!allFinite(terms)) return { kind: 'unknown', terms, reason: 'the function has no finite value close to the limit' };
  const noise = noiseOf(terms, digits);
  const ratio = lastRatio(terms, noise);
  if (ratio > 1 / settles) return { kind: 'infinite', growth: 'logarithm', sign: lastSign(terms), terms };
  if (ratio < settles) {
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
  const x = pointNear(target, from('1e-18'), workingDigits);
  const [coarse, fine] = [f(x, workingDigits), f(x, workingDigits + 30)];
  const difference = coarse.minus(fine).abs();
  return difference.lessThanOrEqualTo(fine.abs().times('1e-25')) || fine.isZero() ? workingDigits : moreDigits;
}

function noiseOf(terms: readonly Term[], digits: number): Decimal {
  const { from } = decimalContext(digits);
  const largest = terms.reduce((most, { value }) => (value.abs().greaterThan(most) ? value.abs() : most), from(0));
  return largest.times(noiseShare);
}

/** |last difference / the one before|; 0 once the terms no longer change. */
function lastRatio(terms: readonly Term[], noise: Decimal): number {
  const [a, b, c] = terms.slice(-3).map(({ value }) => value) as [Decimal, Decimal, Decimal];
  const last = c.minus(b).abs();
  if (last.lessThanOrEqualTo(noise)) return 0;
  return last.div(b.minus(a).abs()).toNumber();
}

function lastSign(terms: readonly Term[]): 1 | -1 {
  return (terms[terms.length - 1] as Term).value.isNegative() ? -1 : 1;
}

function valuesOf(terms: readonly Term[]): Decimal[] {
  return terms.map(({ value }) => value);
}
