import { describe, expect, test } from 'vitest';
import { growthOf } from '../../src/extrapolate/growth.ts';
import { limitOf } from '../../src/extrapolate/limit.ts';
import type { DecimalFunction, Target } from '../../src/extrapolate/sequence.ts';
import { shanks } from '../../src/extrapolate/shanks.ts';
import { Decimal, decimalContext } from '../../src/number/decimal.ts';

const infinity: Target = { kind: 'infinity' };
const zero: Target = { kind: 'value', value: new Decimal(0), side: 'above' };
const one: Target = { kind: 'value', value: new Decimal(1), side: 'below' };

/** Functions with known limits; what they are is calculus. */
const finite: [string, DecimalFunction, Target, string][] = [
  ['sin(x)/x at 0', (x, d) => decimalContext(d).sin(x).div(x), zero, '1'],
  ['(exp(x) − 1)/x at 0', (x, d) => decimalContext(d).expm1(x).div(x), zero, '1'],
  ['x ln x at 0', (x, d) => decimalContext(d).log(x).times(x), zero, '0'],
  [
    '(1 + 1/x)^x at ∞',
    (x, d) => decimalContext(d).exp(x.times(decimalContext(d).log1p(x.pow(-1)))),
    infinity,
    '2.718281828459045235360287471',
  ],
  ['sqrt(x² + x) − x at ∞', (x) => x.pow(2).plus(x).sqrt().minus(x), infinity, '0.5'],
  [
    '2 + x^(1/3) + x^(1/2) ln x at 0',
    (x, d) => x.sqrt().times(decimalContext(d).log(x)).plus(x.cbrt()).plus(2),
    zero,
    '2',
  ],
  ['(1 − x)^(4/3) at 1', (x, d) => decimalContext(d).from(1).minus(x).pow(4).cbrt(), one, '0'],
  ['3 − exp(−x) at ∞', (x, d) => decimalContext(d).from(3).minus(decimalContext(d).exp(x.neg())), infinity, '3'],
  ['5 + 1/ln x at ∞', (x, d) => decimalContext(d).log(x).pow(-1).plus(5), infinity, '5'],
  ['x/(1 + x) at ∞, a constant to round-off', (x, d) => x.div(decimalContext(d).from(1).plus(x)), infinity, '1'],
];

describe('a limit by sequences in high precision agrees with calculus', () => {
  test.each(finite)('%s', (_, f, target, expected) => {
    const found = limitOf(f, target);
    expect(found.kind).toBe('finite');
    if (found.kind !== 'finite') return;
    const miss = found.value.minus(expected).abs();
    expect(miss.lessThanOrEqualTo('1e-9')).toBe(true);
    // The error estimate is honest to an order of magnitude.
    expect(miss.lessThanOrEqualTo(found.error.times(10).plus('1e-26'))).toBe(true);
  });

  test.each([
    ['sqrt(x)', ((x) => x.sqrt()) as DecimalFunction, 'power', 1],
    ['−x²', ((x) => x.pow(2).neg()) as DecimalFunction, 'power', -1],
    ['ln x', ((x, d) => decimalContext(d).log(x)) as DecimalFunction, 'logarithm', 1],
  ] as const)('%s has no finite limit for x → ∞', (_, f, growth, sign) => {
    expect(limitOf(f, infinity)).toMatchObject({ kind: 'infinite', growth, sign });
  });

  test('sin x has no limit for x → ∞ and is not given one', () => {
    const found = limitOf((x, d) => decimalContext(d).sin(x), infinity);
    expect(found.kind === 'finite' && found.error.lessThan('1e-3')).toBe(false);
  });
});

describe('the order of growth tells powers from logarithmic factors', () => {
  test.each([
    ['x^(−1/2)', ((x) => x.sqrt().pow(-1)) as DecimalFunction, infinity, -0.5, 0],
    ['3x² + x', ((x) => x.pow(2).times(3).plus(x)) as DecimalFunction, infinity, 2, 0],
    ['x/ln x', ((x, d) => x.div(decimalContext(d).log(x))) as DecimalFunction, infinity, 1, -1],
    ['x/asinh x', ((x, d) => x.div(decimalContext(d).asinh(x))) as DecimalFunction, infinity, 1, -1],
    ['sqrt(x) (ln x)²', ((x, d) => x.sqrt().times(decimalContext(d).log(x).pow(2))) as DecimalFunction, zero, 0.5, 2],
  ] as const)('%s', (_, f, target, power, logPower) => {
    const found = growthOf(f, target);
    expect(found.kind).toBe('power');
    if (found.kind !== 'power') return;
    expect(found.power.toNumber()).toBeCloseTo(power, 5);
    expect(found.logPower.toNumber()).toBeCloseTo(logPower, 2);
  });

  test('exp(−x) falls faster than any power', () => {
    expect(growthOf((x, d) => decimalContext(d).exp(x.neg()), infinity).kind).toBe('vanishing');
  });
});

test("Wynn's algorithm removes three geometric terms from seven values", () => {
  const { from } = decimalContext(40);
  const terms = Array.from({ length: 7 }, (_, k) =>
    from(2)
      .plus(0.5 ** k)
      .plus(3 * 0.25 ** k)
      .minus(0.125 ** k),
  );
  expect(shanks(terms, new Decimal('1e-38')).value.minus(2).abs().lessThan('1e-30')).toBe(true);
});
