import { describe, expect, it } from 'vitest';
import { erf, lambertW } from '../../src/kernel/special.ts';
import { type Decimal, decimalContext, exactDecimal } from '../../src/number/decimal.ts';

const context = decimalContext(40);

/** The largest error in units of the last place of the result, at evenly spaced points. */
function largestError(
  f: (x: number) => number,
  reference: (x: Decimal) => Decimal,
  [from, to]: readonly [number, number],
): number {
  let largest = 0;
  for (let index = 0; index <= 100; index++) {
    const x = from + ((to - from) * index) / 100;
    const value = f(x);
    const unit = 2 ** (Math.floor(Math.log2(Math.abs(value))) - 52);
    const error =
      value === 0
        ? 0
        : context
            .from(exactDecimal(value))
            .minus(reference(exactDecimal(x)))
            .abs()
            .toNumber() / unit;
    largest = Math.max(error, largest);
  }
  return largest;
}

describe('against 40 digits', () => {
  it.each([[[-1e-8, 1e-8]], [[0, 0.84]], [[0.84, 1.25]], [[1.25, 2.86]], [[2.86, 6.2]], [[-3, -0.5]]] as const)(
    'erf is within 1.5 ulp on %j',
    (interval) => {
      expect(largestError(erf, context.erf, interval)).toBeLessThan(1.5);
    },
  );

  it.each([
    [[-0.36787944117, -0.3678]],
    [[-0.3678, -0.33]],
    [[-0.33, -0.2]],
    [[-0.2, 0.1]],
    [[0.1, 3]],
    [[3, 200]],
    [[1e10, 1e300]],
  ] as const)('lambertW is within 3 ulp on %j', (interval) => {
    expect(largestError(lambertW, context.lambertW, interval)).toBeLessThan(3);
  });
});

it('limits and signed zeros are those of the functions', () => {
  expect([erf(0), erf(-0), erf(Infinity), erf(-Infinity), erf(NaN)]).toEqual([0, -0, 1, -1, NaN]);
  expect([lambertW(0), lambertW(-0), lambertW(Infinity), lambertW(-0.4), lambertW(-Infinity), lambertW(NaN)]).toEqual([
    0,
    -0,
    Infinity,
    NaN,
    NaN,
    NaN,
  ]);
});
