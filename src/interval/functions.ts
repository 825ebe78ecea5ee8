import { asinhBends, atanBends, erfBends, expBends, expm1Bends, log1pBends, logBends, tanhBends } from './bends.ts';
import { cosh, exp, expm1, sinh, tanh } from './exponential.ts';
import { asinh, log, log1p } from './logarithm.ts';
import { reciprocal } from './powers.ts';
import { sqrt } from './root.ts';
import type { Smooth } from './smooth.ts';
import { branchPointAbove, branchPointBelow, erf, lambertW } from './special.ts';
import { atan, cos, largestAngle, sin } from './trigonometric.ts';
import { down, type Pair, productDown, productUp, up } from './widen.ts';

const every = Number.NEGATIVE_INFINITY;
const convex = (): 1 => 1;
const concave = (): -1 => -1;
/** Concave for x ≥ 0 and convex for x ≤ 0. */
const bendsTowardZero = (lower: number, upper: number): 1 | -1 | 0 => (lower >= 0 ? -1 : upper <= 0 ? 1 : 0);
/** Convex for x ≥ 0 and concave for x ≤ 0. */
const bendsAway = (lower: number, upper: number): 1 | -1 | 0 => (lower >= 0 ? 1 : upper <= 0 ? -1 : 0);

/** The slope of exp is its value. */
function itself(_x: number, value: Pair, out: Pair): void {
  out[0] = value[0] as number;
  out[1] = value[1] as number;
}

/** 1/f(x) for an enclosed f > 0. */
const inverse = (f: (x: number, out: Pair) => void) => (x: number, _value: Pair, out: Pair) => {
  f(x, out);
  reciprocal(out);
};

function exact(f: (x: number) => number): (x: number, out: Pair) => void {
  return (x, out) => {
    const value = f(x);
    out[0] = down(value);
    out[1] = up(value);
  };
}

/** 1 + x² for an x whose square is finite. */
function onePlusSquare(x: number, out: Pair): void {
  out[0] = down(1 + productDown(x, x));
  out[1] = up(1 + productUp(x, x));
}

/** Every unary operator but neg and abs. */
export const smoothFunctions = {
  exp: { at: exp, least: every, open: false, over: 1, slope: itself, curvature: convex, bends: expBends },
  expm1: {
    at: expm1,
    least: every,
    open: false,
    over: 1,
    slope: (x, _value, out) => exp(x, out),
    curvature: convex,
    bends: expm1Bends,
  },
  log: { at: log, least: 0, open: true, over: 1, slope: inverse(exact((x) => x)), curvature: concave, bends: logBends },
  log1p: {
    at: log1p,
    least: -1,
    open: true,
    over: 1,
    slope: inverse(exact((x) => 1 + x)),
    curvature: concave,
    bends: log1pBends,
  },
  sin: { at: sin, least: every, open: false, over: wave(sin, Math.PI / 2), curvature: () => 0 },
  cos: { at: cos, least: every, open: false, over: wave(cos, 0), curvature: () => 0 },
  sinh: { at: sinh, least: every, open: false, over: 1, slope: (x, _value, out) => cosh(x, out), curvature: bendsAway },
  cosh: {
    at: cosh,
    least: every,
    open: false,
    over: overEven(cosh, 1),
    slope: (x, _value, out) => sinh(x, out),
    curvature: convex,
  },
  tanh: {
    at: tanh,
    least: every,
    open: false,
    over: 1,
    slope: (x, _value, out) => {
      cosh(x, out);
      out[0] = productDown(out[0] as number, out[0] as number);
      out[1] = productUp(out[1] as number, out[1] as number);
      reciprocal(out);
    },
    curvature: bendsTowardZero,
    bends: tanhBends,
  },
  asinh: {
    at: asinh,
    least: every,
    open: false,
    over: 1,
    slope: (x, _value, out) => {
      onePlusSquare(x, out);
      const upper = out[1] as number;
      sqrt(out[0] as number, out);
      const lower = out[0] as number;
      sqrt(upper, out);
      out[0] = lower;
      reciprocal(out);
    },
    curvature: bendsTowardZero,
    bends: asinhBends,
  },
  atan: {
    at: atan,
    least: every,
    open: false,
    over: 1,
    slope: inverse(onePlusSquare),
    curvature: bendsTowardZero,
    bends: atanBends,
  },
  erf: {
    at: erf,
    least: every,
    open: false,
    over: 1,
    // 2/√π·exp(−x²)
    slope: (x, _value, out) => {
      const [square, above] = [productDown(x, x), productUp(x, x)];
      exp(-above, out);
      const lower = out[0] as number;
      exp(-square, out);
      out[0] = productDown(lower, twoOverRootPi[0]);
      out[1] = productUp(out[1] as number, twoOverRootPi[1]);
    },
    curvature: bendsTowardZero,
    bends: erfBends,
  },
  lambertW: {
    at: lambertW,
    least: branchPointAbove,
    open: false,
    over: 1,
    // 1/(eʷ(1 + w))
    slope: (_x, value, out) => {
      const [low, high] = [value[0] as number, value[1] as number];
      exp(low, out);
      const lower = productDown(out[0] as number, Math.max(0, down(1 + low)));
      exp(high, out);
      out[1] = productUp(out[1] as number, up(1 + high));
      out[0] = lower;
      reciprocal(out);
    },
    curvature: (lower) => (lower > branchPointBelow ? -1 : 0),
  },
} satisfies Record<string, Smooth> as Record<SmoothName, Smooth>;

export type SmoothName =
  | 'exp'
  | 'expm1'
  | 'log'
  | 'log1p'
  | 'sin'
  | 'cos'
  | 'sinh'
  | 'cosh'
  | 'tanh'
  | 'asinh'
  | 'atan'
  | 'erf'
  | 'lambertW';

/** 2/√π lies within u of this. */
const twoOverRootPi = [down(1.1283791670955126), up(1.1283791670955126)] as const;

/** An even function that increases with |x|, over an interval; its value at 0. */
function overEven(at: (x: number, out: Pair) => void, atZero: number) {
  return (lower: number, upper: number, out: Pair): 0 => {
    at(Math.max(lower, Math.min(upper, 0)), out);
    const least = lower > 0 || upper < 0 ? (out[0] as number) : atZero;
    at(Math.max(-lower, upper), out);
    out[0] = least;
    return 0;
  };
}

/** A wave whose maxima lie at peak + 2πn, minima half a turn further: the ends and what lies between. */
function wave(at: (x: number, out: Pair) => void, peak: number) {
  return (lower: number, upper: number, out: Pair): 0 => {
    if (!(upper - lower < 6.28) || !(Math.abs(lower) <= largestAngle) || !(Math.abs(upper) <= largestAngle)) {
      out[0] = -1;
      out[1] = 1;
      return 0;
    }
    at(lower, out);
    const [a, b] = [out[0] as number, out[1] as number];
    at(upper, out);
    out[0] = reaches(peak + Math.PI) ? -1 : Math.min(a, out[0] as number);
    out[1] = reaches(peak) ? 1 : Math.max(b, out[1] as number);
    return 0;
    // With room for rounding: 10⁶ turns err by less than 10⁻⁹.
    function reaches(place: number): boolean {
      const slack = 1e-9;
      const turn = Math.ceil((lower - slack - place) / (2 * Math.PI) - 1e-9);
      return place + turn * 2 * Math.PI <= upper + slack;
    }
  };
}
