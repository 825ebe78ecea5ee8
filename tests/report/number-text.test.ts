import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  countText,
  leadingDigits,
  percentText,
  roundTripText,
  shortText,
  signedText,
} from '../../src/report/number-text.ts';

describe('numbers as text', () => {
  test('round-trip text reads back as the same double, sign of zero included (law)', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) =>
        Object.is(Number(roundTripText(value)), value),
      ),
      { seed: 7 },
    );
  });

  test('short text differs from the number by at most half a unit of its last digit (law)', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e300, max: 1e300, noNaN: true }),
        fc.integer({ min: 1, max: 9 }),
        (value, digits) => {
          fc.pre(Math.abs(value) > 1e-300);
          return Math.abs(Number(shortText(value, digits)) - value) <= 0.5000001 * Math.abs(value) * 10 ** (1 - digits);
        },
      ),
      { seed: 7 },
    );
  });

  test('short texts are those written out by hand', () => {
    expect([0, 0.0512345, -2.3e-7, 1234567, 99999, 62475.4, 1e-3].map((value) => shortText(value))).toEqual([
      '0',
      '0.0512',
      '-2.3e-7',
      '1.23e+6',
      '1e+5',
      '62500',
      '0.001',
    ]);
    expect([signedText(0.5), signedText(-0.5), signedText(0)]).toEqual(['+0.5', '-0.5', '0']);
    expect([shortText(Number.POSITIVE_INFINITY), shortText(Number.NaN)]).toEqual(['∞', 'no value']);
  });

  test('a share that is not zero is never called 0 %, and less than all never 100 %', () => {
    expect([0, 1e-9, 0.0423, 0.5, 0.99999, 1].map(percentText)).toEqual([
      '0 %',
      '< 0.01 %',
      '4.2 %',
      '50 %',
      '> 99.9 %',
      '100 %',
    ]);
  });

  test('counts are set apart by thousands', () => {
    expect([7, 999, 1000, 62475, 1234567].map(countText)).toEqual(['7', '999', '1 000', '62 475', '1 234 567']);
  });

  test('decimal text is cut to significant digits and says so', () => {
    expect(leadingDigits('-0.00231477091234567890', 6)).toBe('-0.00231477…');
    expect(leadingDigits('1.25', 6)).toBe('1.25');
    expect(leadingDigits('123456.789e-30', 7)).toBe('123456.7…e-30');
    expect(leadingDigits('123456', 3)).toBe('123456');
  });
});
