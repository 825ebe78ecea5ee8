import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Decimal, exactDecimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';
import {
  addDown,
  addUp,
  divideDown,
  divideUp,
  isLess,
  multiplyDown,
  multiplyUp,
  putDown,
  putExactDouble,
  putRational,
  putUp,
} from '../../src/recheck/decimal.ts';

const Exact = Decimal.clone({ defaults: true, precision: 200 });
const Floor = Decimal.clone({ defaults: true, precision: 14, rounding: Decimal.ROUND_FLOOR });
const Ceil = Decimal.clone({ defaults: true, precision: 14, rounding: Decimal.ROUND_CEIL });

/** Mantissas of 14 digits, among them powers of ten and numbers beside them, of both signs. */
const arbitraryNumber = fc
  .tuple(
    fc.oneof(
      fc.integer({ min: 1e13, max: 1e14 - 1 }),
      fc.constantFrom(1e13, 1e13 + 1, 1e14 - 1, 5e13, 33333333333333, 31622776601683),
    ),
    fc.integer({ min: -40, max: 40 }),
    fc.constantFrom(1, -1),
  )
  .map(([mantissa, exponent, sign]) => [sign * mantissa, exponent] as const);

const decimalOf = (mantissa: number, exponent: number) => new Exact(`${mantissa}e${exponent}`);
const out = new Float64Array(4);
const result = (at = 0) => decimalOf(out[at] as number, out[at + 1] as number);
type Operation = (out: Float64Array, at: number, a: number, ea: number, b: number, eb: number) => void;

const ordinary = fc
  .tuple(fc.integer({ min: -1e9, max: 1e9 }), fc.integer({ min: 0, max: 60 }))
  .map(([p, q]) => p / 2 ** q);

describe('decimals of 14 digits', () => {
  it.each([
    ['sum', addDown, addUp, (a: Decimal, b: Decimal) => a.plus(b)],
    ['product', multiplyDown, multiplyUp, (a: Decimal, b: Decimal) => a.times(b)],
  ] as const)('a %s is rounded to the last digit in the direction asked for', (name, down, up, exactly) => {
    fc.assert(
      fc.property(arbitraryNumber, arbitraryNumber, fc.integer({ min: -2, max: 17 }), ([a, ea], [b], shift) => {
        const exact = exactly(decimalOf(a, ea), decimalOf(b, ea - shift));
        (down as Operation)(out, 0, a, ea, b, ea - shift);
        const lower = result();
        (up as Operation)(out, 0, a, ea, b, ea - shift);
        const upper = result();
        expect(lower.lte(exact) && upper.gte(exact)).toBe(true);
        // Of a sum whose parts cancel after the last digit of the smaller is lost, one unit more.
        const slack = name === 'sum' ? exact.abs().times('1.2e-13') : new Exact(0);
        expect(new Exact(new Floor(exact).plus(0)).minus(lower).lte(slack)).toBe(true);
        expect(upper.minus(new Exact(new Ceil(exact).plus(0))).lte(slack)).toBe(true);
        expect(Math.abs(out[0] as number)).toBeLessThan(1e14);
      }),
      { numRuns: 5000, seed: 11 },
    );
  });

  it('a quotient of positive numbers is enclosed, to a part in 10¹³', () => {
    fc.assert(
      fc.property(arbitraryNumber, arbitraryNumber, ([a, ea], [b, eb]) => {
        const exact = decimalOf(Math.abs(a), ea).div(decimalOf(Math.abs(b), eb));
        divideDown(out, 0, Math.abs(a), ea, Math.abs(b), eb);
        divideUp(out, 2, Math.abs(a), ea, Math.abs(b), eb);
        expect(result().lte(exact) && result(2).gte(exact)).toBe(true);
        // A unit of the last digit down and one up, of mantissas of 10¹³ or more.
        expect(result(2).minus(result()).lte(exact.times('3e-13'))).toBe(true);
      }),
      { numRuns: 5000, seed: 14 },
    );
    divideDown(out, 0, 1e13, 0, Number.POSITIVE_INFINITY, 0);
    expect(out[0]).toBe(0);
  });

  it('a sum in which all but the last digits cancel is exact', () => {
    addDown(out, 0, 1e13, -13, -99999999999999, -14);
    expect(result().toString()).toBe('1e-14');
    addDown(out, 0, 1e13, -13, -1e13, -13);
    expect([out[0], out[1]]).toEqual([0, 0]);
  });

  it('integers below 2⁵³ are rounded as they should', () => {
    fc.assert(
      fc.property(fc.maxSafeInteger(), (integer) => {
        putDown(out, 0, integer, 0);
        expect(result().eq(new Floor(integer).plus(0))).toBe(true);
        putUp(out, 0, integer, 0);
        expect(result().eq(new Ceil(integer).plus(0))).toBe(true);
      }),
      { numRuns: 3000, seed: 12 },
    );
  });

  it('are compared as numbers, infinities and zero among them', () => {
    const any = fc.oneof<fc.Arbitrary<readonly [number, number]>[]>(
      arbitraryNumber,
      fc.constantFrom([0, 0] as const, [Number.POSITIVE_INFINITY, 0] as const, [Number.NEGATIVE_INFINITY, 0] as const),
    );
    const exactValue = ([m, e]: readonly [number, number]) => (Number.isFinite(m) ? decimalOf(m, e) : new Exact(m));
    fc.assert(
      fc.property(any, any, (a, b) => {
        expect(isLess(...a, ...b)).toBe(exactValue(a).lt(exactValue(b)));
      }),
      { numRuns: 3000, seed: 13 },
    );
  });

  it('a double and a rational come with the neighbours below and above', () => {
    fc.assert(
      fc.property(fc.oneof(fc.double({ noNaN: true, noDefaultInfinity: true }), ordinary), (value) => {
        putExactDouble(out, 0, value);
        const exact = new Exact(exactDecimal(value));
        expect(result(0).lte(exact) && result(2).gte(exact)).toBe(true);
        expect(result(2).minus(result(0)).lte(exact.abs().times('1.1e-13'))).toBe(true);
      }),
      { numRuns: 1000, seed: 14 },
    );
    fc.assert(
      fc.property(fc.integer(), fc.integer({ min: 1 }), fc.integer({ min: 0, max: 30 }), (p, q, power) => {
        const value = rational(BigInt(p) * 10n ** BigInt(power), q);
        putRational(out, 0, value);
        const exact = new Exact(p).times(new Exact(10).pow(power)).div(q);
        expect(result(0).lte(exact.plus(exact.abs().times('1e-150')))).toBe(true);
        expect(result(2).gte(exact.minus(exact.abs().times('1e-150')))).toBe(true);
        expect(result(2).minus(result(0)).lte(exact.abs().times('1.1e-13'))).toBe(true);
      }),
      { numRuns: 1000, seed: 15 },
    );
    putRational(out, 0, rational(3, 8));
    expect([result(0).toString(), result(2).toString()]).toEqual(['0.375', '0.375']);
  });
});
