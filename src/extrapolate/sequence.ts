import { type Decimal, decimalContext } from '../number/decimal.ts';

/** A function of one variable, evaluated with so many working digits; NaN where it has no value. */
export type DecimalFunction = (x: Decimal, digits: number) => Decimal;

/** What a variable tends to. A finite value is approached from one side. */
export type Target =
  | { readonly kind: 'infinity' }
  | { readonly kind: 'value'; readonly value: Decimal; readonly side: 'above' | 'below' };

/** A point of a sequence and the value there. */
export interface Term {
  readonly x: Decimal;
  readonly value: Decimal;
}

/** The point at distance h > 0 from the target; 1/h where the target is infinity. */
export function pointNear(target: Target, h: Decimal, digits: number): Decimal {
  const { from } = decimalContext(digits);
  if (target.kind === 'infinity') return from(1).div(h);
  const value = from(target.value);
  return target.side === 'above' ? value.plus(h) : value.minus(h);
}

/** The terms of f at the distances given. */
export function termsOf(f: DecimalFunction, target: Target, distances: readonly Decimal[], digits: number): Term[] {
  return distances.map((h) => {
    const x = pointNear(target, h, digits);
    return { x, value: f(x, digits) };
  });
}

/** start·ratio^k, k = 0 … count − 1 */
export function geometric(start: string, ratio: string, count: number, digits: number): Decimal[] {
  const { from } = decimalContext(digits);
  return Array.from({ length: count }, (_, k) => from(start).times(from(ratio).pow(k)));
}

/** base^(2^k), k = 0 … count − 1: the logarithm doubles from point to point. */
export function doubling(base: string, count: number, digits: number): Decimal[] {
  const { from } = decimalContext(digits);
  return Array.from({ length: count }, (_, k) => from(base).pow(2 ** k));
}

export function allFinite(terms: readonly Term[]): boolean {
  return terms.every(({ value }) => value.isFinite());
}
