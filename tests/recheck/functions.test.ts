import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Decimal, decimalContext } from '../../src/number/decimal.ts';
import { type Rational, rational, rationalText } from '../../src/number/rational.ts';
import { mostAxes, putApplied } from '../../src/recheck/apply.ts';
import { embedding } from '../../src/recheck/combine.ts';
import { putDown } from '../../src/recheck/decimal.ts';
import { closeness, type PutValue } from '../../src/recheck/elementary.ts';
import type { SmoothFunction } from '../../src/recheck/expansion.ts';
import { rowLength, slot } from '../../src/recheck/form.ts';
import { powerAcrossZero, powerFunction } from '../../src/recheck/power.ts';
import { putVariable } from '../../src/recheck/single.ts';
import { smoothFunctions } from '../../src/recheck/smooth.ts';

const exact = decimalContext(60);
const number = new Float64Array(2);
const value = new Float64Array(2);

/** How far a value is off in parts of itself, at a decimal of 14 digits near x·10^power. */
function departure(f: PutValue, truth: (x: Decimal) => Decimal, x: number, power: number): number {
  putDown(number, 0, Math.trunc(x * 1e14), power - 14);
  f(value, number[0] as number, number[1] as number);
  const expected = truth(exact.from(`${number[0]}e${number[1]}`));
  const found = exact.from(value[0] as number).times(exact.from(10).pow(value[1] as number));
  return expected.isZero() ? found.abs().toNumber() : found.minus(expected).div(expected).abs().toNumber();
}

const fraction = fc.double({ min: 0.1, max: 1, noNaN: true, maxExcluded: true });
const sign = fc.constantFrom(1, -1);

/** Powers of ten of the arguments: tiny, ordinary, huge. */
const valueCases: readonly (readonly [
  string,
  PutValue,
  (x: Decimal) => Decimal,
  readonly [number, number],
  readonly number[],
])[] = [
  ['exp', smoothFunctions.exp.value, exact.exp, [-250, 5], [1, -1]],
  ['expm1', smoothFunctions.expm1.value, exact.expm1, [-250, 5], [1, -1]],
  ['log', smoothFunctions.log.value, exact.log, [-1000, 1000], [1]],
  ['log1p', smoothFunctions.log1p.value, exact.log1p, [-250, 300], [1]],
  ['log1p of negative x', smoothFunctions.log1p.value, exact.log1p, [-250, 0], [-1]],
  ...(['sin', 'cos', 'tanh', 'asinh', 'atan', 'erf'] as const).map(
    (name) => [name, smoothFunctions[name].value, exact[name], [-30, 1], [1, -1]] as const,
  ),
  ...(['sinh', 'cosh'] as const).map(
    (name) => [name, smoothFunctions[name].value, exact[name], [-30, 2], [1, -1]] as const,
  ),
  ['lambertW', smoothFunctions.lambertW.value, exact.lambertW, [-30, 30], [1]],
];

const powers = [
  [1, 2],
  [-1, 2],
  [3, 2],
  [1, 3],
  [-4, 3],
  [8, 3],
  [9, 4],
  [-5, 6],
  [9, 1],
  [-7, 1],
  [24, 1],
  [2, 5],
  [-11, 8],
].map(([p, q]) => rational(p as number, q));

function checkValues(
  f: PutValue,
  truth: (x: Decimal) => Decimal,
  [least, most]: readonly [number, number],
  signs: readonly number[],
  seed: number,
): void {
  const digits = fc.tuple(fc.oneof(fraction, fc.constantFrom(0.1, 0.99999999999999, 0.5, 0.31622776601684)), sign);
  fc.assert(
    fc.property(digits, fc.integer({ min: least, max: most }), ([x], power) => {
      for (const own of signs) expect(departure(f, truth, own * x, power)).toBeLessThan(closeness);
    }),
    { numRuns: 120, seed },
  );
}

describe('values lie as close to 60 digits as is said of them', () => {
  it.each(valueCases)('%s', (_name, f, truth, regimes, signs) => checkValues(f, truth, regimes, signs, 21));

  it.each(powers.map((power) => [rationalText(power), power] as const))('x^(%s)', (_name, exponent) =>
    checkValues(powerFunction(exponent).value, (x) => exact.power(x, exponent), [-60, 60], [1], 22),
  );

  it('log and log1p beside their zeros', () => {
    fc.assert(
      fc.property(fc.double({ min: -0.05, max: 0.05, noNaN: true }), (d) => {
        if (Math.abs(d) < 1e-9) return;
        expect(departure(smoothFunctions.log.value, exact.log, (1 + d) / 10, 1)).toBeLessThan(closeness);
        expect(departure(smoothFunctions.log1p.value, exact.log1p, d, 0)).toBeLessThan(closeness);
        expect(departure(smoothFunctions.expm1.value, exact.expm1, 10 * d, 0)).toBeLessThan(closeness);
      }),
      { numRuns: 600, seed: 23 },
    );
  });
});

type Case = readonly [string, SmoothFunction, (x: Decimal) => Decimal, readonly [number, number]];

const powerCase = (exponent: Rational, f: SmoothFunction, least: number): Case => [
  `x^(${rationalText(exponent)}) from ${least}`,
  f,
  (x) => exact.power(x, exponent),
  [least, 50],
];

const formCases: readonly Case[] = [
  ...(['exp', 'expm1', 'sin', 'cos', 'sinh', 'cosh', 'tanh', 'asinh', 'atan', 'erf'] as const).map(
    (name): Case => [name, smoothFunctions[name], exact[name], [-6, 6]],
  ),
  ['log', smoothFunctions.log, exact.log, [0, 50]],
  ['log1p', smoothFunctions.log1p, exact.log1p, [-1, 50]],
  ['lambertW', smoothFunctions.lambertW, exact.lambertW, [-0.36787944117, 50]],
  ...powers.map((exponent) => powerCase(exponent, powerFunction(exponent), 0)),
  ...powers
    .filter((exponent) => exponent.s > 0n && exponent.d % 2n === 1n)
    .map((exponent) => powerCase(exponent, powerAcrossZero(exponent), -3)),
];

/** centre + aε + qε² of a row over one axis, at some ε. */
function valueAt(row: Float64Array, epsilon: number): Decimal {
  const [centre, a, q] = [0, 1, 2].map((index) => exact.from(row[slot.centre + index] as number)) as Decimal[];
  const e = exact.from(epsilon);
  return (centre as Decimal).plus((a as Decimal).times(e)).plus((q as Decimal).times(e.times(e)));
}

describe('forms hold the function at every point of the interval, against 60 digits', () => {
  it.each(formCases)('%s', (name, f, truth, [least, most]) => {
    let forms = 0;
    const width = fc.constantFrom(1e-6, 1e-3, 0.02, 0.2, 0.5, 1);
    const epsilons = fc.array(fc.oneof(fc.constantFrom(-1, 1), fc.double({ min: -1, max: 1, noNaN: true })), {
      minLength: 4,
      maxLength: 4,
    });
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e6 }), width, epsilons, (millionths, share, points) => {
        const place = millionths / 1e6;
        // Where a domain begins, more and narrower intervals.
        const begins = least > -2;
        const lower = least + (most - least) * place ** (begins ? 3 : 1);
        const upper = Math.min(most, lower + share * (begins ? lower - least + 1e-3 : 1));
        if (!(upper > lower)) return;
        const [x, y] = [new Float64Array(rowLength(1)), new Float64Array(rowLength(1))];
        putVariable(x, 0, lower, upper);
        putApplied(y, 0, 1, f, x, 0, true);
        const error = y[slot.error] as number;
        if (!(y[slot.linear] as number) || !Number.isFinite(error)) return;
        forms++;
        const scale = (row: Float64Array) => exact.from(10).pow(row[slot.unit] as number);
        for (const epsilon of points) {
          const at = valueAt(x, epsilon).times(scale(x));
          const expected = truth(at);
          // The form of x reaches a little beyond the interval, where f may have no value.
          if (at.lt(lower) || at.gt(upper) || !expected.isFinite()) continue;
          const off = valueAt(y, epsilon)
            .minus(expected.div(scale(y)))
            .abs();
          expect(off.lte(error)).toBe(true);
        }
      }),
      { numRuns: 160, seed: 24 },
    );
    // Roots across zero have none.
    expect(forms).toBeGreaterThanOrEqual(/\/.* from -3/.test(name) ? 0 : 60);
  });

  it('places of coefficients: all different, over as many axes as there may be', () => {
    const places = embedding([0, 2, 5], mostAxes).places;
    expect(new Set(places).size).toBe(places.length);
  });
});
