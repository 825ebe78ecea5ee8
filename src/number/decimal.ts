import { Decimal } from 'decimal.js';
import { type ElementaryFunctions, elementary, lambertW, rationalPower } from './decimal-functions.ts';
import { type Rational, rationalText } from './rational.ts';

export { Decimal };

/** decimal.js carries π and log 10 to 1 025 digits; beyond this the functions would lose their guard digits. */
export const maximumDigits = 400;

/** Digits carried inside a function beyond those of its result. */
const guardDigits = 12;

/**
 * Decimal arithmetic at a fixed number of significant digits. Infinity, NaN and division by zero
 * behave as in IEEE 754; exponents reach ±9·10¹⁵, so nothing a double could hold over- or underflows.
 */
export interface DecimalContext extends ElementaryFunctions {
  readonly digits: number;
  readonly pi: Decimal;
  /** The value as a Decimal of this context, not rounded; a number stands for its shortest decimal text. */
  readonly from: (value: Decimal.Value) => Decimal;
  /** The rational rounded to the context's digits. */
  readonly fromRational: (value: Rational) => Decimal;
  /** x^(p/q): the real root for odd q, NaN on negative x for even q, an infinity at 0 for p < 0. */
  readonly power: (base: Decimal, exponent: Rational) => Decimal;
  /** The principal branch W₀ of w·eʷ = x; NaN below −1/e. */
  readonly lambertW: (x: Decimal) => Decimal;
}

/** The binary value of a double with all its digits (0.1 is 0.1000000000000000055511151231257827…). */
export function exactDecimal(value: number): Decimal {
  if (!Number.isFinite(value) || Number.isInteger(value)) return new Decimal(value);
  let shift = 0;
  let scaled = value;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    shift++;
  }
  // m/2^k = m·5^k/10^k
  return new Decimal(`${BigInt(scaled) * 5n ** BigInt(shift)}e-${shift}`);
}

const contexts = new Map<number, DecimalContext>();

/** The context of that many significant digits, 1 to 400; the same object for the same digits. */
export function decimalContext(digits: number): DecimalContext {
  if (!(Number.isInteger(digits) && digits >= 1 && digits <= maximumDigits)) {
    throw new RangeError(`digits must be an integer from 1 to ${maximumDigits}, not ${digits}`);
  }
  const known = contexts.get(digits);
  if (known) return known;
  const made = makeContext(digits);
  contexts.set(digits, made);
  return made;
}

function makeContext(digits: number): DecimalContext {
  const Result = constructorOf(digits);
  const guarded = elementary(constructorOf(digits + guardDigits));
  const from = (value: Decimal.Value): Decimal => new Result(value);
  const round = (value: Decimal): Decimal => new Result(value).toSignificantDigits(digits);
  const rounded =
    (f: (x: Decimal) => Decimal) =>
    (x: Decimal): Decimal =>
      round(f(x));
  return {
    digits,
    pi: Result.acos(-1),
    from,
    fromRational: (value) => quotient(Result, value),
    power: (base, exponent) => round(rationalPower(constructorOf, digits + guardDigits, base, exponent)),
    exp: (x) => from(x).exp(),
    log: (x) => from(x).ln(),
    sin: (x) => from(x).sin(),
    cos: (x) => from(x).cos(),
    expm1: rounded(guarded.expm1),
    log1p: rounded(guarded.log1p),
    sinh: rounded(guarded.sinh),
    cosh: rounded(guarded.cosh),
    tanh: rounded(guarded.tanh),
    asinh: rounded(guarded.asinh),
    atan: rounded(guarded.atan),
    erf: rounded(guarded.erf),
    lambertW: (x) => round(lambertW(constructorOf, digits + guardDigits, x)),
  };
}

const constructors = new Map<number, Decimal.Constructor>();

function constructorOf(precision: number): Decimal.Constructor {
  const known = constructors.get(precision);
  if (known) return known;
  const made = Decimal.clone({ defaults: true, precision });
  constructors.set(precision, made);
  return made;
}

function quotient(Result: Decimal.Constructor, value: Rational): Decimal {
  const [numerator, denominator] = rationalText(value).split('/') as [string, string?];
  const whole = new Result(numerator);
  return denominator === undefined ? whole.plus(0) : whole.div(denominator);
}
