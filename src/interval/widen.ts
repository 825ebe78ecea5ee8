/*
 * Outward rounding. u = 2⁻⁵³ is the rounding unit: IEEE 754, which JavaScript prescribes for + − × ÷, gives each of
 * these with a relative error of at most u where the result is normal. Widening is relative only, so that an exact
 * zero stays zero: 1 − α at α = 1 does not become negative.
 */

/** 2u: |x|·2u is at least one unit in the last place of a normal x, so x ± it crosses to the next double. */
export const oneStep = 2 ** -52;

/** Below this a product or quotient may have lost bits to underflow; sums never do. */
export const tiny = 2 ** -960;

/** At most the true value of something whose double is x within one rounding. */
export function down(x: number): number {
  return x - Math.abs(x) * oneStep;
}

/** At least the true value of something whose double is x within one rounding. */
export function up(x: number): number {
  return x + Math.abs(x) * oneStep;
}

/** At most a·b. A zero factor gives an exact zero whatever the other is: an infinite end is never a value. */
export function productDown(a: number, b: number): number {
  if (a === 0 || b === 0) return 0;
  const product = a * b;
  if (product === Number.POSITIVE_INFINITY) {
    return Number.isFinite(a) && Number.isFinite(b) ? Number.MAX_VALUE : product;
  }
  if (Math.abs(product) < tiny) return a > 0 === b > 0 ? 0 : -tiny;
  return down(product);
}

/** At least a·b. */
export function productUp(a: number, b: number): number {
  return -productDown(-a, b);
}

/** At most a/b for b ≠ 0; infinite ends as limits, 0 for the ratio of two of them (it has any size). */
export function quotientDown(a: number, b: number): number {
  if (a === 0) return 0;
  if (!Number.isFinite(b)) return a > 0 === b > 0 ? 0 : Number.isFinite(a) ? -tiny : Number.NEGATIVE_INFINITY;
  const quotient = a / b;
  if (quotient === Number.POSITIVE_INFINITY) return Number.isFinite(a) ? Number.MAX_VALUE : quotient;
  if (Math.abs(quotient) < tiny) return a > 0 === b > 0 ? 0 : -tiny;
  return down(quotient);
}

/** At least a/b for b ≠ 0. */
export function quotientUp(a: number, b: number): number {
  if (!Number.isFinite(a) && !Number.isFinite(b)) return a > 0 === b > 0 ? Number.POSITIVE_INFINITY : 0;
  return -quotientDown(-a, b);
}

/** Two doubles that enclose a value, out[0] ≤ value ≤ out[1]. */
export type Pair = Float64Array;

/** Encloses the value whose approximation is x with a relative error of at most `bound` (much larger than u²). */
export function enclose(x: number, bound: number, out: Pair): void {
  const margin = Math.abs(x) * (bound + oneStep);
  out[0] = x - margin;
  out[1] = x + margin;
}
