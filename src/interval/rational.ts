import { type Rational, toNumber } from '../number/rational.ts';

const exactIntegers = 2n ** 53n;

/** The tightest two doubles found around an exact rational; equal where it is a double. */
export function encloseRational(value: Rational): [number, number] {
  const nearest = toNumber(value);
  const isDouble = value.n < exactIntegers && value.d < 2n ** 60n && (value.d & (value.d - 1n)) === 0n;
  if (isDouble) return [nearest, nearest];
  const step = Math.abs(nearest) * 2 ** -52 + Number.MIN_VALUE;
  if (!Number.isFinite(nearest)) {
    return nearest > 0 ? [Number.MAX_VALUE, nearest] : [nearest, -Number.MAX_VALUE];
  }
  return [nearest - step, nearest + step];
}

/** π between two neighbouring doubles: it is 1.2·10⁻¹⁶ above the nearest. */
export const piInterval: readonly [number, number] = [Math.PI, Math.PI + 2 ** -51];
