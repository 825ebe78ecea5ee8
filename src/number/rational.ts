import Fraction from 'fraction.js';

/** An exact rational number; numerator and denominator are integers of any size. */
export type Rational = Fraction;

/** Decimal text longer than this, or with an exponent beyond it, is refused rather than expanded. */
const decimalLimit = 400;

export function rational(numerator: number | bigint, denominator: number | bigint = 1): Rational {
  return new Fraction(BigInt(numerator), BigInt(denominator));
}

/**
 * The exact value of decimal text such as `-0.0667`, `10` or `7.389e-6`.
 * Undefined when the text is not a decimal or its exponent exceeds the limit of ±400.
 */
export function parseDecimal(text: string): Rational | undefined {
  const match = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,6}))?$/.exec(text.trim());
  if (match === null) return undefined;
  const [, sign, whole = '', fraction = '', exponentText = '0'] = match;
  const digits = whole + fraction;
  const exponent = Number(exponentText) - fraction.length;
  if (digits === '' || digits.length > decimalLimit || Math.abs(exponent) > decimalLimit) return undefined;
  const integer = BigInt(digits) * (sign === '-' ? -1n : 1n);
  const scale = 10n ** BigInt(Math.abs(exponent));
  return exponent < 0 ? new Fraction(integer, scale) : new Fraction(integer * scale, 1n);
}

/** The double nearest to a rational, ties to even. */
export function toNumber(value: Rational): number {
  const negative = value.s < 0n;
  const magnitude = roundToDouble(value.n, value.d);
  return negative ? -magnitude : magnitude;
}

function roundToDouble(numerator: bigint, denominator: bigint): number {
  if (numerator === 0n) return 0;
  // Scale so that the quotient has at least 55 bits and at most 1 074 binary places, then round once.
  const quotientBits = bitLength(numerator) - bitLength(denominator);
  const shift = Math.min(55 - quotientBits, 1074);
  const scaled = shift >= 0 ? numerator << BigInt(shift) : numerator;
  const divisor = shift >= 0 ? denominator : denominator << BigInt(-shift);
  const quotient = scaled / divisor;
  const sticky = scaled % divisor === 0n ? 0n : 1n;
  // Number(bigint) rounds to nearest even; the sticky bit below the last place breaks false ties.
  const rounded =
    shift === 1074 ? halfEven(quotient, scaled % divisor, divisor) : Number((quotient << 2n) | sticky) / 4;
  return shift > 1000 ? rounded * 2 ** -1000 * 2 ** (1000 - shift) : rounded * 2 ** -shift;
}

function halfEven(quotient: bigint, remainder: bigint, divisor: bigint): number {
  const twice = remainder * 2n;
  const up = twice > divisor || (twice === divisor && (quotient & 1n) === 1n);
  return Number(up ? quotient + 1n : quotient);
}

function bitLength(value: bigint): number {
  const hexadecimal = value.toString(16);
  return (hexadecimal.length - 1) * 4 + (32 - Math.clz32(Number.parseInt(hexadecimal[0] as string, 16)));
}

/** `3`, `-1/2`: the shortest exact text. */
export function rationalText(value: Rational): string {
  const numerator = `${value.s < 0n ? '-' : ''}${value.n}`;
  return value.d === 1n ? numerator : `${numerator}/${value.d}`;
}
