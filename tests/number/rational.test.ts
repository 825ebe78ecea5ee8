import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parseDecimal, type Rational, rational, rationalText, toNumber } from '../../src/number/rational.ts';

const exact = (text: string) => parseDecimal(text) as Rational;

test('decimal text is read exactly', () => {
  expect(rationalText(exact('0.1'))).toBe('1/10');
  expect(rationalText(exact('-7.389e-6'))).toBe('-7389/1000000000');
  expect(rationalText(exact('12e2'))).toBe('1200');
});

test('what is not a decimal in range is refused', () => {
  for (const text of ['', '.', '1.2.3', '0x10', 'e5', '1e401', '1e9999999', '--1'])
    expect(parseDecimal(text)).toBeUndefined();
});

test('rounding to a double equals the language’s own reading of the decimal text (ECMAScript, correctly rounded)', () => {
  const edges = [
    '1e-400',
    '5e-324',
    '2.4703282292062327e-324',
    '2.4703282292062328e-324',
    '2.2250738585072011e-308',
    '1.7976931348623157e308',
    '1.7976931348623159e308',
    '9007199254740993',
    '0.1',
    '1e23',
    '8.5e-320',
  ];
  for (const text of edges) expect(toNumber(exact(text)), text).toBe(Number(text));
  fc.assert(
    fc.property(fc.bigInt({ min: 0n, max: 10n ** 40n }), fc.integer({ min: -360, max: 300 }), (digits, exponent) => {
      const text = `${digits}e${exponent}`;
      return toNumber(exact(text)) === Number(text);
    }),
    { seed: 7, numRuns: 2000 },
  );
});

test('quotients round to nearest even (IEEE 754 division of exact doubles)', () => {
  fc.assert(
    fc.property(fc.integer({ min: -(2 ** 31), max: 2 ** 31 }), fc.integer({ min: 1, max: 2 ** 31 }), (a, b) => {
      return Object.is(toNumber(rational(a, b)) + 0, a / b + 0);
    }),
    { seed: 8, numRuns: 2000 },
  );
});
