import type { Decimal } from 'decimal.js';
import type { Rational } from './rational.ts';

export interface ElementaryFunctions {
  readonly exp: (x: Decimal) => Decimal;
  readonly expm1: (x: Decimal) => Decimal;
  readonly log: (x: Decimal) => Decimal;
  readonly log1p: (x: Decimal) => Decimal;
  readonly sin: (x: Decimal) => Decimal;
  readonly cos: (x: Decimal) => Decimal;
  readonly sinh: (x: Decimal) => Decimal;
  readonly cosh: (x: Decimal) => Decimal;
  readonly tanh: (x: Decimal) => Decimal;
  readonly asinh: (x: Decimal) => Decimal;
  readonly atan: (x: Decimal) => Decimal;
  readonly erf: (x: Decimal) => Decimal;
}

type Constructor = Decimal.Constructor;

/** The functions at the precision of the constructor; all but its last few digits are right. */
export function elementary(Number_: Constructor): ElementaryFunctions {
  const odd =
    (f: (Number_: Constructor, magnitude: Decimal) => Decimal) =>
    (x: Decimal): Decimal => {
      const own = new Number_(x);
      if (own.isNaN() || own.isZero()) return own;
      const value = f(Number_, own.abs());
      return own.isNegative() ? value.neg() : value;
    };
  return {
    exp: (x) => new Number_(x).exp(),
    expm1: (x) => expm1(Number_, new Number_(x)),
    log: (x) => new Number_(x).ln(),
    log1p: (x) => log1p(Number_, new Number_(x)),
    sin: (x) => new Number_(x).sin(),
    cos: (x) => new Number_(x).cos(),
    sinh: odd(sinh),
    cosh: (x) => cosh(new Number_(x)),
    tanh: odd(tanh),
    asinh: odd(asinh),
    atan: odd(atan),
    erf: odd(erf),
  };
}

/** Exponents of ten below which a Taylor series replaces the closed form that would cancel. */
const seriesBelow = -3;

function expm1(Number_: Constructor, x: Decimal): Decimal {
  if (x.isZero() || x.isNaN()) return x;
  // Written so that an infinity, whose exponent is NaN, takes the closed form.
  if (!(x.e <= seriesBelow)) return x.exp().minus(1);
  let term = x;
  let sum = x;
  for (let n = 2; term.e - x.e >= -Number_.precision; n++) {
    term = term.times(x).div(n);
    sum = sum.plus(term);
  }
  return sum;
}

function log1p(Number_: Constructor, x: Decimal): Decimal {
  if (x.isZero() || x.isNaN()) return x;
  if (!(x.e <= seriesBelow)) return x.plus(1).ln();
  // log(1 + x) = 2·artanh(x/(2 + x))
  return arcSeries(Number_, x.div(x.plus(2)), 1).times(2);
}

/** x + sign·x³/3 + x⁵/5 + …: artanh for sign 1, arctan for sign −1; |x| < 10⁻². */
function arcSeries(Number_: Constructor, x: Decimal, sign: 1 | -1): Decimal {
  const step = x.times(x).times(sign);
  let power = x;
  let sum = x;
  for (let n = 3; !power.isZero() && power.e - x.e >= -Number_.precision; n += 2) {
    power = power.times(step);
    sum = sum.plus(power.div(n));
  }
  return sum;
}

function sinh(Number_: Constructor, x: Decimal): Decimal {
  const shifted = expm1(Number_, x);
  return shifted.isFinite() ? shifted.plus(shifted.div(shifted.plus(1))).div(2) : shifted;
}

function cosh(x: Decimal): Decimal {
  const growing = x.abs().exp();
  return growing.plus(new (x.constructor as Constructor)(1).div(growing)).div(2);
}

function tanh(Number_: Constructor, x: Decimal): Decimal {
  const shifted = expm1(Number_, x.times(2));
  return shifted.isFinite() ? shifted.div(shifted.plus(2)) : new Number_(1);
}

function asinh(Number_: Constructor, x: Decimal): Decimal {
  if (!x.isFinite()) return x;
  const square = x.times(x);
  return log1p(Number_, x.plus(square.div(square.plus(1).sqrt().plus(1))));
}

function atan(Number_: Constructor, x: Decimal): Decimal {
  if (x.e <= seriesBelow) return arcSeries(Number_, x, -1);
  const halfPi = Number_.acos(0);
  if (!x.isFinite()) return halfPi;
  if (x.e >= -seriesBelow) return halfPi.minus(arcSeries(Number_, new Number_(1).div(x), -1));
  // atan x = y + atan((x·cos y − sin y)/(cos y + x·sin y)), with the double y so close that the rest is tiny.
  const y = new Number_(Math.atan(x.toNumber()));
  const sine = y.sin();
  const cosine = new Number_(1).minus(sine.times(sine)).sqrt();
  const rest = x
    .times(cosine)
    .minus(sine)
    .div(cosine.plus(x.times(sine)));
  return rest.isZero() ? y : y.plus(arcSeries(Number_, rest, -1));
}

/** 2/√π·exp(−x²)·Σ 2ⁿx^(2n+1)/(2n+1)!! (NIST DLMF 7.6.2): all terms positive, so nothing cancels. */
function erf(Number_: Constructor, x: Decimal): Decimal {
  const square = x.times(x);
  // erfc(x) < exp(−x²) is below the last digit.
  if (!square.lessThan(Number_.precision * Math.LN10 + 5)) return new Number_(1);
  const twice = square.times(2);
  let term = x;
  let sum = x;
  for (let n = 3; term.e - sum.e >= -Number_.precision; n += 2) {
    term = term.times(twice).div(n);
    sum = sum.plus(term);
  }
  return sum.times(square.neg().exp()).times(2).div(Number_.acos(-1).sqrt());
}

/**
 * W₀(x) by Halley's iteration on w·eʷ − x. Near x = −1/e the root is nearly double, so as many digits
 * are added as the distance from it has leading zeros.
 */
export function lambertW(constructorOf: (precision: number) => Constructor, precision: number, x: Decimal): Decimal {
  if (x.isNaN() || x.isZero()) return x;
  if (!x.isFinite()) return x.isPositive() ? x : new (x.constructor as Constructor)(Number.NaN);
  const nearBranch = x.lessThan(-0.35);
  const Working = constructorOf(nearBranch ? precision * 2 : precision);
  const target = new Working(x);
  if (nearBranch) {
    // p² = 2(1 + e·x), the expansion variable at the branch point
    const square = new Working(1).exp().times(target).plus(1).times(2);
    if (square.isNegative() && !square.isZero()) return new Working(Number.NaN);
    const p = square.sqrt();
    return halley(target, p.minus(1).minus(square.div(3)), precision);
  }
  if (x.lessThan(3)) {
    return halley(target, log1p(Working, target).times(x.isNegative() ? 1.2 : 0.8), precision);
  }
  const logarithm = target.ln();
  return halley(target, logarithm.minus(logarithm.ln()), precision);
}

function halley(target: Decimal, start: Decimal, precision: number): Decimal {
  let w = start;
  for (let count = 0; count < 200; count++) {
    const power = w.exp();
    const residual = w.times(power).minus(target);
    if (residual.isZero()) return w;
    const beyond = w.plus(1);
    const slope = power.times(beyond).minus(w.plus(2).times(residual).div(beyond.times(2)));
    const step = residual.div(slope);
    w = w.minus(step);
    // Cubic convergence: this many digits before the step are all of them after it.
    if (step.isZero() || step.e - w.e < -0.7 * precision) return w;
  }
  return w;
}

/** x^(p/q) at that precision; see DecimalContext.power. */
export function rationalPower(
  constructorOf: (precision: number) => Constructor,
  precision: number,
  base: Decimal,
  exponent: Rational,
): Decimal {
  const Number_ = constructorOf(precision);
  const x = new Number_(base);
  const rises = exponent.s >= 0n;
  const evenRoot = exponent.d % 2n === 0n;
  if (x.isNaN() || (evenRoot && x.isNegative() && !x.isZero())) return new Number_(Number.NaN);
  if (exponent.n === 0n) return new Number_(1);
  const keepsSign = !evenRoot && exponent.n % 2n === 1n;
  const negative = keepsSign && x.isNegative();
  if (x.isZero() || !x.isFinite()) {
    const magnitude = new Number_(x.isZero() === rises ? 0 : Number.POSITIVE_INFINITY);
    return negative ? magnitude.neg() : magnitude;
  }
  const root = exponent.n <= 64n ? rootOf(x.abs(), exponent.d) : undefined;
  const magnitude = root ? root.pow(Number(exponent.n)) : powerByLogarithm(constructorOf, precision, x.abs(), exponent);
  const value = root && !rises ? new Number_(1).div(magnitude) : magnitude;
  return negative ? value.neg() : value;
}

/** The root by sqrt and cbrt where these suffice. */
function rootOf(x: Decimal, degree: bigint): Decimal | undefined {
  switch (degree) {
    case 1n:
      return x;
    case 2n:
      return x.sqrt();
    case 3n:
      return x.cbrt();
    case 4n:
      return x.sqrt().sqrt();
    case 6n:
      return x.cbrt().sqrt();
    default:
      return undefined;
  }
}

function powerByLogarithm(
  constructorOf: (precision: number) => Constructor,
  precision: number,
  x: Decimal,
  exponent: Rational,
): Decimal {
  const signed = (Working: Constructor): Decimal => {
    const numerator = (exponent.s * exponent.n).toString();
    return new Working(x).ln().times(numerator).div(exponent.d.toString());
  };
  const estimate = signed(constructorOf(precision));
  if (estimate.isZero()) return estimate.exp();
  // The absolute error of the logarithm is the relative error of the power.
  const extra = Math.min(20, Math.max(0, estimate.e + 1));
  return extra === 0 ? estimate.exp() : signed(constructorOf(precision + extra)).exp();
}
