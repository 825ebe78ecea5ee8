import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Decimal, decimalContext, exactDecimal } from '../../src/number/decimal.ts';
import { rational } from '../../src/number/rational.ts';

const context = decimalContext(50);
const at = (text: string): Decimal => context.from(text);

const Wide = Decimal.clone({ precision: 130 });

/** Expects a relative difference below one unit of the 50th digit. */
function expectDigits(actual: Decimal, digits: string): void {
  const expected = new Wide(digits);
  const difference = expected.minus(actual).abs();
  expect(difference.lessThan(expected.abs().times('1e-49')), `${actual} is not ${digits}`).toBe(true);
}

describe('closed forms at 50 digits', () => {
  // Decimal expansions from the On-Line Encyclopedia of Integer Sequences, by sequence number.
  it.each([
    ['pi (A000796)', () => context.pi, '3.1415926535897932384626433832795028841971693993751058'],
    ['exp(1) (A001113)', () => context.exp(at('1')), '2.7182818284590452353602874713526624977572470936999596'],
    ['expm1(1) (A001113)', () => context.expm1(at('1')), '1.7182818284590452353602874713526624977572470936999596'],
    ['log(2) (A002162)', () => context.log(at('2')), '0.69314718055994530941723212145817656807550013436025525'],
    ['log1p(1) (A002162)', () => context.log1p(at('1')), '0.69314718055994530941723212145817656807550013436025525'],
    ['sinh(1) (A073742)', () => context.sinh(at('1')), '1.1752011936438014568823818505956008151557179813340959'],
    ['cosh(1) (A073743)', () => context.cosh(at('1')), '1.5430806348152437784779056207570616826015291123658637'],
    ['tanh(1) (A073744)', () => context.tanh(at('1')), '0.76159415595576488811945828260479359041276859725793655'],
    ['asinh(1) (A091648)', () => context.asinh(at('1')), '0.88137358701954302523260932497979230902816032826163541'],
    [
      'cbrt(2) (A002580)',
      () => context.power(at('2'), rational(1, 3)),
      '1.2599210498948731647672106072782283505702514647015080',
    ],
    [
      'W(1), the omega constant (A030178)',
      () => context.lambertW(at('1')),
      '0.56714329040978387299996866221035554975381578718651251',
    ],
  ])('%s', (_name, evaluate, digits) => expectDigits(evaluate(), digits));

  it('atan(1) is a quarter of pi and atan(√3) a third', () => {
    expectDigits(context.atan(at('1')).times(4), context.pi.toString());
    const wide = decimalContext(60);
    expectDigits(wide.atan(wide.from(3).sqrt()).times(3), wide.pi.toString());
  });
});

describe('independent routes', () => {
  it('erf agrees with the alternating series NIST DLMF 7.6.1 summed with 120 digits', () => {
    const wide = decimalContext(120);
    for (const text of ['1e-20', '0.3', '1', '2.5', '4']) {
      const x = wide.from(text);
      let term = x;
      let sum = x;
      for (let n = 1; n < 400; n++) {
        term = term.times(x).times(x).neg().div(n);
        sum = sum.plus(term.div(2 * n + 1));
      }
      expectDigits(context.erf(at(text)), sum.times(2).div(wide.pi.sqrt()).toString());
    }
  });

  it('1 − erf agrees with the continued fraction NIST DLMF 7.9.1 of erfc at x = 5', () => {
    const wide = decimalContext(90);
    const x = wide.from(5);
    // √π·exp(x²)·erfc(x) = 1/(x + (1/2)/(x + 1/(x + (3/2)/(x + …))))
    let tail = wide.from(0);
    for (let k = 2000; k >= 1; k--) tail = wide.from(k).div(2).div(x.plus(tail));
    const complement = wide.exp(x.times(x).neg()).div(x.plus(tail)).div(wide.pi.sqrt());
    expectDigits(wide.from(1).minus(wide.erf(x)), complement.toString());
  });

  it.each([
    'exp',
    'expm1',
    'log',
    'log1p',
    'sin',
    'cos',
    'sinh',
    'cosh',
    'tanh',
    'asinh',
    'atan',
    'erf',
    'lambertW',
  ] as const)('%s at 50 digits is its value at 120 digits, rounded, over the whole range of sizes', (name) => {
    const wide = decimalContext(120);
    for (const text of [
      '1e-200',
      '1e-30',
      '-2.5e-7',
      '0.0012',
      '0.0234',
      '-0.3',
      '-0.36787944',
      '0.9999',
      '3.14159265358979',
      '11.25',
      '-40',
      '1234567.5',
      '1e25',
    ]) {
      const value = context[name](at(text));
      const reference = wide[name](wide.from(text));
      if (reference.isNaN()) expect(value.isNaN()).toBe(true);
      else if (!reference.isFinite() || reference.isZero()) expect(value.equals(reference)).toBe(true);
      else expectDigits(value, reference.toString());
    }
  });

  it('W satisfies its defining equation w·exp(w) = x, next to the branch point too', () => {
    const wide = decimalContext(110);
    for (const text of ['-0.36787944117144232159552377016146086744', '-0.3', '-1e-9', '1e-9', '2', '1e40']) {
      const w = wide.lambertW(wide.from(text));
      expectDigits(w.times(wide.exp(w)), text);
    }
    expect(context.lambertW(at('-0.3678794411714423216')).isNaN()).toBe(true);
  });

  it('doubles agree with Math to 15 digits', () => {
    const relative = (a: number, b: number): number => Math.abs(a - b) / Math.abs(b);
    for (const name of [
      'exp',
      'expm1',
      'log',
      'log1p',
      'sin',
      'cos',
      'sinh',
      'cosh',
      'tanh',
      'asinh',
      'atan',
    ] as const) {
      for (const x of [0.001, 0.7, 1.9]) {
        expect(relative(context[name](exactDecimal(x)).toNumber(), Math[name](x))).toBeLessThan(1e-15);
      }
    }
  });
});

describe('powers', () => {
  it('a power with denominator q raised to q is the base to the numerator', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 1_000_000 }),
        fc.integer({ min: -12, max: 12 }),
        fc.integer({ min: 1, max: 12 }),
        (base, p, q) => {
          const root = decimalContext(70).power(decimalContext(70).from(base).div(997), rational(p, q));
          expectDigits(root.pow(q), decimalContext(70).from(base).div(997).pow(p).toString());
        },
      ),
      { seed: 20, numRuns: 60 },
    );
  });

  it.each([
    // exponent, then the power at 0, −0, ∞, −∞, −8; real root for odd denominators, as IEEE 754 rootn and pown
    [rational(1, 3), [0, -0, Infinity, -Infinity, -2]],
    [rational(4, 3), [0, 0, Infinity, Infinity, 16]],
    [rational(-1, 3), [Infinity, -Infinity, 0, -0, -0.5]],
    [rational(-2, 3), [Infinity, Infinity, 0, 0, 0.25]],
    [rational(1, 2), [0, 0, Infinity, NaN, NaN]],
    [rational(-7, 6), [Infinity, Infinity, 0, NaN, NaN]],
    [rational(-1), [Infinity, -Infinity, 0, -0, -0.125]],
    [rational(3), [0, -0, Infinity, -Infinity, -512]],
  ] as const)('%s meets the limits at 0 and infinity', (exponent, expected) => {
    const bases = ['0', '-0', 'Infinity', '-Infinity', '-8'];
    expect(bases.map((base) => context.power(at(base), exponent).toNumber())).toEqual(expected);
  });
});

describe('conventions', () => {
  it('every function passes NaN on and meets its limits at infinity', () => {
    const limits: Record<string, readonly [number, number]> = {
      exp: [0, Infinity],
      expm1: [-1, Infinity],
      log: [NaN, Infinity],
      log1p: [NaN, Infinity],
      sinh: [-Infinity, Infinity],
      cosh: [Infinity, Infinity],
      tanh: [-1, 1],
      asinh: [-Infinity, Infinity],
      atan: [-Math.PI / 2, Math.PI / 2],
      erf: [-1, 1],
      lambertW: [NaN, Infinity],
    };
    for (const [name, [below, above]] of Object.entries(limits)) {
      const f = context[name as 'exp'];
      expect([name, f(at('-Infinity')).toNumber(), f(at('Infinity')).toNumber()]).toEqual([name, below, above]);
      expect(f(at('NaN')).isNaN()).toBe(true);
    }
  });

  it('exactDecimal has all binary digits of 0.1 and of the smallest double', () => {
    // 0.1 = 3602879701896397/2^55
    expect(exactDecimal(0.1).toFixed()).toBe('0.1000000000000000055511151231257827021181583404541015625');
    expect(exactDecimal(Number.MIN_VALUE).toNumber()).toBe(Number.MIN_VALUE);
    expect(exactDecimal(-6).toNumber()).toBe(-6);
  });

  it('refuses a precision beyond the digits of pi that decimal.js holds', () => {
    expect(() => decimalContext(401)).toThrow(RangeError);
    expect(() => decimalContext(Number.NaN)).toThrow(RangeError);
  });
});
