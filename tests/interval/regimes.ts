import { type SmoothName, smoothFunctions } from '../../src/interval/functions.ts';
import { powerFunction } from '../../src/interval/powers.ts';
import type { Pair } from '../../src/interval/widen.ts';
import { type Decimal, decimalContext, exactDecimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';

/** Digits of the oracle. */
const context = decimalContext(50);

export interface Regime {
  readonly name: string;
  readonly at: (x: number, out: Pair) => void;
  readonly oracle: (x: Decimal) => Decimal;
  /** An argument for a number in 0…1 and a sign. */
  readonly argument: (unit: number, sign: 1 | -1) => number;
  /** The widest enclosure allowed, in units in the last place of the value; undefined where it is absolute. */
  readonly width: number | undefined;
}

const linear = (from: number, to: number) => (unit: number) => from + (to - from) * unit;
const logarithmic = (from: number, to: number) => (unit: number) => from * (to / from) ** unit;
const signed = (f: (unit: number) => number) => (unit: number, sign: 1 | -1) => sign * f(unit);

type Arguments = readonly [name: string, argument: Regime['argument']];
const tiny: Arguments = ['tiny', signed((unit) => 10 ** (-300 + 292 * unit))];
const ordinary: Arguments = ['ordinary', linear(-3, 3)];

const unaryRegimes: Record<SmoothName, readonly [width: number | undefined, ...(readonly Arguments[])]> = {
  exp: [24, tiny, ordinary, ['huge', linear(-700, 709)]],
  expm1: [72, tiny, ordinary, ['huge', linear(-50, 709)], ['branch', signed(linear(0.339, 0.341))]],
  log: [
    24,
    ['ordinary', linear(0.1, 3)],
    ['any size', (unit) => 10 ** (-307 + 614 * unit)],
    ['branch', linear(1.4141, 1.4144)],
  ],
  log1p: [
    40,
    tiny,
    ['ordinary', linear(-0.9999, 2)],
    ['huge', (unit) => 10 ** (300 * unit)],
    ['branch', linear(0.409, 0.411)],
  ],
  sin: [
    undefined,
    ['tiny', signed((unit) => 10 ** (-30 + 22 * unit))],
    ['ordinary', linear(-7, 7)],
    ['huge', linear(-1e6, 1e6)],
  ],
  cos: [
    undefined,
    ['tiny', signed((unit) => 10 ** (-30 + 22 * unit))],
    ['ordinary', linear(-7, 7)],
    ['huge', linear(-1e6, 1e6)],
  ],
  sinh: [72, tiny, ordinary, ['huge', linear(-709, 709)]],
  cosh: [48, tiny, ordinary, ['huge', linear(-709, 709)]],
  tanh: [72, tiny, ordinary, ['huge', linear(-30, 30)], ['branch', signed(linear(0.169, 0.171))]],
  asinh: [72, tiny, ordinary, ['huge', signed((unit) => 10 ** (300 * unit))], ['branch', linear(0.99e8, 1.01e8)]],
  atan: [40, tiny, ordinary, ['huge', signed(logarithmic(1, 1e12))], ['branch', signed(linear(0.43, 2.45))]],
  erf: [900, tiny, ordinary, ['huge', signed(linear(3, 8))]],
  lambertW: [
    undefined,
    tiny,
    ['ordinary', linear(-0.36, 5)],
    ['branch', (unit) => -0.3678794411714423 + 10 ** (-16 + 14 * unit)],
  ],
};

const powers = [
  [1, 2],
  [1, 3],
  [2, 3],
  [4, 3],
  [-1, 3],
  [-7, 3],
  [3, 2],
  [2, 1],
  [-1, 1],
  [5, 7],
  [-1, 4],
  [12, 1],
] as const;

/** Every function with an enclosure, in every range of arguments that its code tells apart. */
export const regimes: readonly Regime[] = [
  ...Object.entries(unaryRegimes).flatMap(([name, [width, ...ranges]]) =>
    ranges.map(([range, argument]) => ({
      name: `${name}, ${range}`,
      at: smoothFunctions[name as SmoothName].at,
      oracle: context[name as SmoothName],
      argument,
      width,
    })),
  ),
  ...powers.flatMap(([p, q]) => {
    const exponent = rational(p, q);
    return [
      [`x^(${p}/${q}), ordinary`, logarithmic(0.01, 100)] as const,
      [`x^(${p}/${q}), any size`, (unit: number) => 10 ** (-20 + 40 * unit)] as const,
    ].map(([name, argument]) => ({
      name,
      at: powerFunction(exponent).at,
      oracle: (x: Decimal) => context.power(x, exponent),
      argument: q % 2 === 1 ? signed(argument) : argument,
      width: 1000,
    }));
  }),
];

/** Widest enclosure seen, in units in the last place; throws at a value outside its enclosure. */
export function checkRegime(regime: Regime, count: number, seed: number): number {
  const out = new Float64Array(2);
  let state = seed;
  const next = () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state + 0.5) / 2 ** 32;
  };
  let widest = 0;
  for (let index = 0; index < count; index++) {
    const x = regime.argument(next(), next() < 0.5 ? 1 : -1);
    regime.at(x, out);
    const [lower, upper] = [out[0] as number, out[1] as number];
    const value = regime.oracle(exactDecimal(x));
    if (!(exactDecimal(lower).lte(value) && exactDecimal(upper).gte(value))) {
      throw new Error(`${regime.name} at ${x}: ${value} is outside ${lower} … ${upper}`);
    }
    const size = Math.abs(value.toNumber());
    const ulp = 2 ** (Math.floor(Math.log2(size)) - 52);
    if (size > 1e-290 && size < 1e290) widest = Math.max(widest, (upper - lower) / ulp);
  }
  return widest;
}
