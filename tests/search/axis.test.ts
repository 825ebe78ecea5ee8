import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  type Axis,
  axisMeasure,
  axisUnit,
  axisValue,
  checkAxis,
  partOfAxis,
  type Scale,
} from '../../src/search/axis.ts';

const seed = 20_311;
const axis = (scale: Scale, lower: number, upper: number): Axis => ({ name: 'x', scale, lower, upper });
const axes = [
  axis('linear', -3, 5),
  axis('logarithmic', 0.01, 100),
  axis('toward-upper', 0, 1),
  axis('compact', 0, Infinity),
  axis('compact', 0, 1e9),
  axis('compact', 2, 100),
];

describe('the unit coordinate', () => {
  test.each(axes)('ends are met to the last bit: $scale $lower…$upper', (each) => {
    expect([axisValue(each, 0), axisValue(each, 1)]).toEqual([each.lower, each.upper]);
    expect([axisUnit(each, each.lower), axisUnit(each, each.upper)]).toEqual([0, 1]);
  });

  // Closed forms: the geometric mean, 1 − (1/2)³, u/(1 − u) at u = 1/2 and at u = (2/3 + 100/101)/2.
  test.each([
    [axis('linear', -3, 5), 1],
    [axis('logarithmic', 0.01, 100), 1],
    [axis('toward-upper', 0, 1), 0.875],
    [axis('compact', 0, Infinity), 1],
    [axis('compact', 2, 100), 502 / 104],
  ])('the middle is where its closed form says: %o', (each, middle) => {
    expect(axisValue(each, 0.5)).toBeCloseTo(middle, 13);
    expect(axisUnit(each, middle)).toBeCloseTo(0.5, 13);
  });

  test('unit → value → unit is the identity as far as the values are distinct', () => {
    fc.assert(
      fc.property(fc.constantFrom(...axes), fc.double({ min: 0, max: 1, noNaN: true }), (each, unit) => {
        // Rounding of 1 − w³ moves w by up to eps^(1/3); of x = 1e9 on a compact axis by eps·1e9.
        const allowed = each.scale === 'toward-upper' ? 1e-5 : 1e-12;
        expect(Math.abs(axisUnit(each, axisValue(each, unit)) - unit)).toBeLessThanOrEqual(allowed);
      }),
      { seed, numRuns: 2000 },
    );
  });

  test('value → unit → value is the identity to rounding, and stays in the axis', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...axes.filter(({ upper }) => upper <= 100)),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (each, part) => {
          const value = Math.min(each.upper, each.lower + part * (each.upper - each.lower));
          const back = axisValue(each, axisUnit(each, value));
          expect(Math.abs(back - value)).toBeLessThanOrEqual(1e-12 * Math.max(1, Math.abs(value)));
          expect(back >= each.lower && back <= each.upper).toBe(true);
        },
      ),
      { seed, numRuns: 2000 },
    );
  });

  test('the unit coordinate rises with the value', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...axes),
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (each, a, b) => {
          expect(axisValue(each, Math.min(a, b))).toBeLessThanOrEqual(axisValue(each, Math.max(a, b)));
        },
      ),
      { seed },
    );
  });
});

describe('the measure of shares', () => {
  test('is logarithmic, plain and compact as documented (closed forms)', () => {
    expect(axisMeasure(axis('logarithmic', 0.01, 100), 10)).toBeCloseTo(3 / 4, 14);
    expect(axisMeasure(axis('toward-upper', 0, 1), 0.95)).toBeCloseTo(0.95, 14);
    expect(axisMeasure(axis('compact', 0, Infinity), 3)).toBeCloseTo(3 / 4, 14);
  });

  test('a part of an axis has the measure of the axis', () => {
    for (const each of axes) {
      const [low, high] = [axisValue(each, 0.3), axisValue(each, 0.8)];
      const middle = axisValue(each, 0.55);
      const part = partOfAxis(each, low, high);
      const expected =
        (axisMeasure(each, middle) - axisMeasure(each, low)) / (axisMeasure(each, high) - axisMeasure(each, low));
      expect(axisMeasure(part, middle)).toBeCloseTo(expected, 10);
    }
  });
});

test.each([
  axis('logarithmic', 0, 1),
  axis('linear', 1, 0),
  axis('linear', 0, Infinity),
  axis('compact', -1, 1),
  axis('linear', Number.NaN, 1),
])('an axis without such a scale is refused: %o', (each) => {
  expect(() => checkAxis(each)).toThrow(RangeError);
});
