import { expect, test } from 'vitest';
import { ask, exchange } from './ask.ts';

const asked = (functional: Parameters<typeof ask>[1]) => ask('printed-digits', functional);
/** F = 1 + a s²; the slice has s up to 5, where a change of a moves F by 25 times as much at ζ = 0. */
const square = (value: string, digits: number) =>
  exchange('1 + a*p', 'parameters:', `  a: { value: ${value}, digits: ${digits} }`);

test('nothing is asked of a sheet without printed digits', () => {
  expect(asked('dirac').verdict).toBe('not-applicable');
});

test('0.123456789 printed to 4 digits is 0.1235: F moves by 25·4.3211e-5', () => {
  const { verdict, margin, witness } = asked(square('0.123456789', 4));
  expect(verdict).toBe('violated');
  expect(margin).toBeCloseTo(1e-6 - 25 * 4.3211e-5, 10);
  expect(witness).toMatchObject({ s: 5, zeta: 0 });
});

test('printed to 9 digits it holds; the first count at which 25·|Δa| passes 1e-6 is 6', () => {
  const { verdict, reason } = asked(square('0.123456789', 9));
  expect(verdict).toBe('holds');
  // 0.123457 is off by 2.11e-7, 0.1234568 by 1.1e-8
  expect(reason).toMatch(/with 6 digits F moves by up to 5\.3e-6/);
});

test('F = c − 0.0416 s² with c = 1.04 touches 0 at s = 5 and turns negative with c = 1.0, at two digits', () => {
  const { reason } = asked(exchange('c - 0.0416*p', 'parameters:', '  c: { value: 1.04, digits: 3 }'));
  expect(reason).toMatch(/with 2 digits F moves by up to 0\.05\d? .*and the verdict of exchange-non-positive turns/);
});

test('PW92 moves by more than 1e-6 with 4 digits of its constants, which the paper gives to 5', () => {
  expect(asked('pw92').reason).toMatch(/^rounding to the digits printed moves F by 0; with 4 digits/);
});
