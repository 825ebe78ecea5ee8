import type { UnaryOperator } from '../graph/operator.ts';
import { Decimal, decimalContext } from '../number/decimal.ts';
import type { Rational } from '../number/rational.ts';

/*
 * What the decimal forms need to know of a function of one variable. Shares nothing with src/interval: values come from
 * high-precision decimal arithmetic and are moved outward.
 */

/** Working digits. Every value is moved outward by 10⁻²⁰ of itself, a thousand times what its rounding can be. */
export const formDigits = 24;
const outward = new Decimal('1e-20');
const context = decimalContext(formDigits);

export type DecimalInterval = readonly [Decimal, Decimal];

export interface DecimalFunction {
  readonly value: (x: Decimal) => Decimal;
  readonly slope?: (x: Decimal, value: Decimal) => Decimal;
  /** 1 convex, −1 concave, 0 unknown on the interval. */
  readonly curvature: (lower: Decimal, upper: Decimal) => 1 | -1 | 0;
  /** 1 increasing, −1 decreasing, 0 neither is known on the interval. */
  readonly direction: (lower: Decimal, upper: Decimal) => 1 | -1 | 0;
  /** Whether the function has a value everywhere on the interval; of one that only touches a pole or an open end, `touches`. */
  readonly domain: (lower: Decimal, upper: Decimal) => 'inside' | 'touches' | 'outside';
}

/** Around the true value of something computed with formDigits digits. */
export function around(value: Decimal): DecimalInterval {
  // An infinite end is a limit, and not computed.
  if (!value.isFinite()) return [value, value];
  const margin = value.abs().times(outward);
  return [value.minus(margin), value.plus(margin)];
}

const one = context.from(1);
const always = () => 'inside' as const;
const rising = () => 1 as const;
const convex = () => 1 as const;
const concave = () => -1 as const;
const towardZero = (lower: Decimal, upper: Decimal) => (lower.gte(0) ? -1 : upper.lte(0) ? 1 : 0);
const away = (lower: Decimal, upper: Decimal) => (lower.gte(0) ? 1 : upper.lte(0) ? -1 : 0);
const above = (end: Decimal) => (lower: Decimal) =>
  lower.gt(end) ? ('inside' as const) : lower.eq(end) ? ('touches' as const) : ('outside' as const);
const onePlusSquare = (x: Decimal) => x.times(x).plus(1);

const wave = { curvature: () => 0 as const, direction: () => 0 as const, domain: always };

export const decimalFunctions: Record<Exclude<UnaryOperator, 'neg' | 'abs'>, DecimalFunction> = {
  exp: { value: context.exp, slope: (_x, value) => value, curvature: convex, direction: rising, domain: always },
  expm1: {
    value: context.expm1,
    slope: (_x, value) => value.plus(1),
    curvature: convex,
    direction: rising,
    domain: always,
  },
  log: {
    value: context.log,
    slope: (x) => one.div(x),
    curvature: concave,
    direction: rising,
    domain: above(context.from(0)),
  },
  log1p: {
    value: context.log1p,
    slope: (x) => one.div(x.plus(1)),
    curvature: concave,
    direction: rising,
    domain: above(context.from(-1)),
  },
  sin: { value: context.sin, ...wave },
  cos: { value: context.cos, ...wave },
  sinh: { value: context.sinh, slope: context.cosh, curvature: away, direction: rising, domain: always },
  cosh: { value: context.cosh, slope: context.sinh, curvature: convex, direction: away, domain: always },
  tanh: {
    value: context.tanh,
    slope: (_x, value) => one.minus(value.times(value)),
    curvature: towardZero,
    direction: rising,
    domain: always,
  },
  asinh: {
    value: context.asinh,
    slope: (x) => one.div(onePlusSquare(x).sqrt()),
    curvature: towardZero,
    direction: rising,
    domain: always,
  },
  atan: {
    value: context.atan,
    slope: (x) => one.div(onePlusSquare(x)),
    curvature: towardZero,
    direction: rising,
    domain: always,
  },
  erf: {
    value: context.erf,
    slope: (x) => context.exp(x.times(x).neg()).times(2).div(context.pi.sqrt()),
    curvature: towardZero,
    direction: rising,
    domain: always,
  },
  lambertW: {
    value: context.lambertW,
    slope: (_x, value) => one.div(context.exp(value).times(value.plus(1))),
    curvature: concave,
    direction: rising,
    domain: (lower) => (lower.gte('-0.36787944117144232') ? 'inside' : 'outside'),
  },
};

/** x^(p/q): the real root for odd q. */
export function decimalPower(exponent: Rational): DecimalFunction {
  const isNegative = exponent.s < 0n;
  const isRoot = exponent.d % 2n === 0n;
  const isEven = exponent.n % 2n === 0n;
  const factor = context.fromRational(exponent);
  const bends = isNegative || factor.gt(1);
  return {
    value: (x) => context.power(x, exponent),
    slope: (x, value) => value.times(factor).div(x),
    curvature(lower, upper) {
      if (lower.gte(0)) return bends ? 1 : -1;
      if (upper.lte(0)) return bends === isEven ? 1 : -1;
      return isEven && !isNegative && exponent.d === 1n ? 1 : 0;
    },
    direction(lower, upper) {
      if (lower.gte(0)) return isNegative ? -1 : 1;
      if (upper.lte(0)) return isNegative === isEven ? 1 : -1;
      return !isNegative && !isEven ? 1 : 0;
    },
    domain(lower, upper) {
      if (isRoot && lower.lt(0)) return 'outside';
      if (!isNegative || lower.gt(0) || upper.lt(0)) return 'inside';
      return lower.eq(0) || upper.eq(0) ? 'touches' : 'outside';
    },
  };
}
