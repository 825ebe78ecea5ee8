import { describe, expect, test } from 'vitest';
import { exactExchangeShares, instantiate } from '../../src/functional/instance.ts';
import { constant } from '../../src/graph/build.ts';
import { Graph } from '../../src/graph/graph.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { erf } from '../../src/kernel/special.ts';
import type { Decimal } from '../../src/number/decimal.ts';
import { parseDecimal, type Rational } from '../../src/number/rational.ts';
import { atSlice, onShelf } from './shelf.ts';

const digits = 50;

/** A named function of a sheet at decimal arguments, to 50 digits. */
function call(id: string, name: string, ...args: readonly string[]): Decimal {
  const graph = new Graph();
  const nodes = args.map((text) => constant(graph, parseDecimal(text) as Rational));
  const node = instantiate(graph, onShelf(id)).callFunction(name, nodes);
  return evaluateDecimal(graph, [node], new Map(), digits)[0] as Decimal;
}

function parameter(id: string, name: string): number {
  const graph = new Graph();
  const node = instantiate(graph, onShelf(id)).parameter(name);
  return (evaluateDecimal(graph, [node], new Map(), digits)[0] as Decimal).toNumber();
}

/** ∫ f(y) dy over y > 0 for a smooth f, by the trapezoidal rule in log y. */
function integral(f: (y: number) => number): number {
  const step = 1 / 64;
  let sum = 0;
  for (let k = -25 / step; k <= 25 / step; k++) {
    const y = Math.exp(k * step);
    sum += y * f(y);
  }
  return step * sum;
}

describe('short-range attenuation of uniform-gas exchange', () => {
  // Gill, Adamson and Pople, Mol. Phys. 88, 1005 (1996): the weight of the exchange hole of the uniform gas,
  // 9 (sin y − y cos y)²/y⁶, with erfc(2 a y) instead of 1.
  const byHole = (a: number) => {
    const weighted = (complement: (y: number) => number) =>
      integral((y) => {
        const bessel =
          y < 0.1 ? y ** 3 / 3 - y ** 5 / 30 + y ** 7 / 840 - y ** 9 / 45360 : Math.sin(y) - y * Math.cos(y);
        return (bessel ** 2 / y ** 5) * complement(y);
      });
    // ∫ (sin y − y cos y)²/y⁵ dy = 1/4
    return 4 * weighted((y) => (2 * a * y > 5.8 ? 0 : 1 - erf(2 * a * y)));
  };

  test.each([0.1, 0.3, 0.49, 0.51, 0.8, 2, 5])('is the integral of the exchange hole with erfc at a = %s', (a) => {
    const value = call('cam-b3lyp', 'attenuation', String(a)).toNumber();
    expect(Math.abs(value - byHole(a))).toBeLessThanOrEqual(1e-9 * value);
  });

  test('has a closed form and a series that agree to 28 digits where they meet', () => {
    const difference = call('cam-b3lyp', 'closed', '0.5').minus(call('cam-b3lyp', 'series', '1'));
    expect(difference.abs().toNumber()).toBeLessThanOrEqual(1e-28);
  });

  test('falls off as 1/(36 a²), so that the energy density is −π n²/(4 ω²) at large ω', () => {
    // The next term of the series is −1/(960 a⁴), 4e-12 of the first at a = 1e5.
    const value = call('cam-b3lyp', 'attenuation', '1e5').times(36e10);
    expect(Math.abs(value.toNumber() - 1)).toBeLessThanOrEqual(1e-11);
  });
});

// The constraint on the fits: J.-D. Chai and M. Head-Gordon, J. Chem. Phys. 128, 084106 (2008), and the later papers.
test.each([
  ['wb97x', 'cx0'],
  ['wb97x-v', 'cx0'],
  ['wb97m-v', 'cx00'],
])('uniform-gas and exact exchange of %s add up to 1 at short and at long range', (id, coefficient) => {
  const graph = new Graph();
  const { shortRange, longRange } = exactExchangeShares(instantiate(graph, onShelf(id)));
  const [short, long] = evaluateDecimal(graph, [shortRange, longRange], new Map(), digits) as [Decimal, Decimal];
  expect(short.plus(parameter(id, coefficient)).toNumber()).toBe(1);
  expect(long.toNumber()).toBe(1);
  // At r_s = 1e-6, ω/k_F is 1.6e-7 and what the attenuation takes 4e-7 of the whole.
  const exchange = atSlice(onShelf(id), 'exchange', { rs: '1e-6' }).enhancement.toNumber();
  expect(Math.abs(exchange + short.toNumber() - 1)).toBeLessThanOrEqual(4e-7);
});

describe('model hole of PBE exchange in hse06', () => {
  const [A, B, C, D, E] = ['A', 'B', 'C', 'D', 'E'].map((name) => parameter('hse06', name)) as [
    number,
    number,
    number,
    number,
    number,
  ];

  /** y J(s, y): M. Ernzerhof and J. P. Perdew, J. Chem. Phys. 109, 3313 (1998), Eq. (24), with G from the sheet. */
  function hole(s: string): (y: number) => number {
    const h = call('hse06', 'H', s).times(s).times(s).toNumber();
    const f = (parameter('hse06', 'f1') * h + parameter('hse06', 'f0') * Number(s) ** 2) as number;
    const fourth = call('hse06', 'fourth', s, String(h), String(f)).toNumber();
    return (y) => {
      const z = y * y;
      const algebraic = (A / z) * (Math.expm1(-D * z) + ((4 / 9) * A * z) / (1 + (4 / 9) * A * z));
      return y * (algebraic + (B + C * (1 + f) * z + (E + fourth) * z * z) * Math.exp(-D * z)) * Math.exp(-h * z);
    };
  }

  test.each(['0', '0.07', '0.09', '0.5', '1', '3', '8'])('holds one electron at s = %s', (s) => {
    const density = hole(s);
    // −(4/3π) ∫ y² J dy = 1; the constants are rounded to eight digits.
    const electrons = (-4 / (3 * Math.PI)) * integral((y) => y * density(y));
    expect(Math.abs(electrons - 1)).toBeLessThanOrEqual(1e-6);
  });

  test.each([
    ['0', '0.1'],
    ['0.5', '0.02'],
    ['1', '0.4'],
    ['3', '1'],
    ['3', '1.2'],
    ['8', '5'],
  ])('gives the integral with erfc, within the error of the fit of erfc, at s = %s, ω/k_F = %s', (s, nu) => {
    const density = hole(s);
    const complement = (x: number) => (x > 5.8 ? 0 : 1 - erf(x));
    const expected = (-8 / 9) * integral((y) => density(y) * complement(Number(nu) * y));
    const value = call('hse06', 'hole', s, nu).toNumber();
    expect(Math.abs(value - expected)).toBeLessThanOrEqual(1e-6);
  });
});
