import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { PartName } from '../../src/definition/functional.ts';
import type { Functional } from '../../src/functional/functional.ts';
import { instantiate } from '../../src/functional/instance.ts';
import { densityPlace, slicePlace } from '../../src/functional/place.ts';
import { variable } from '../../src/graph/build.ts';
import { Graph } from '../../src/graph/graph.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { decimalContext } from '../../src/number/decimal.ts';
import { linked, sheet } from './sheets.ts';

const context = decimalContext(40);
const densityNames = ['n_up', 'n_dn', 'sigma_uu', 'sigma_ud', 'sigma_dd', 'tau_up', 'tau_dn'] as const;

function onSlice(functional: Functional, part: PartName, point: Record<'rs' | 'zeta' | 's' | 'alpha', number>): number {
  const graph = new Graph();
  const v = (name: string) => variable(graph, name);
  const place = slicePlace(graph, { rs: v('rs'), zeta: v('zeta'), s: v('s'), alpha: v('alpha') });
  const energy = instantiate(graph, functional).part(part, place)?.perParticle as number;
  const bindings = new Map(Object.entries(point).map(([name, value]) => [name, context.from(value)]));
  return Number(evaluateDecimal(graph, [energy], bindings, 40)[0]);
}

/** The density whose slice coordinates are given (design of the slice: ∇n_σ = (n_σ/n)∇n, τ_σ = τ_Wσ + α τ_unif,σ). */
function slicedDensity(point: Record<'rs' | 'zeta' | 's' | 'alpha', number>): Record<string, number> {
  const n = 3 / (4 * Math.PI * point.rs ** 3);
  const grad = 2 * (3 * Math.PI ** 2) ** (1 / 3) * n ** (4 / 3) * point.s;
  const channel = (sign: number) => {
    const density = (n * (1 + sign * point.zeta)) / 2;
    const gradient = (density / n) * grad;
    const kinetic =
      gradient ** 2 / (8 * density) + point.alpha * 0.3 * (6 * Math.PI ** 2) ** (2 / 3) * density ** (5 / 3);
    return { density, gradient, kinetic };
  };
  const up = channel(1);
  const dn = channel(-1);
  return {
    n_up: up.density,
    n_dn: dn.density,
    sigma_uu: up.gradient ** 2,
    sigma_ud: up.gradient * dn.gradient,
    sigma_dd: dn.gradient ** 2,
    tau_up: up.kinetic,
    tau_dn: dn.kinetic,
  };
}

function onDensity(functional: Functional, part: PartName, inputs: Record<string, number>): number {
  const graph = new Graph();
  const v = (name: string) => variable(graph, name);
  const [n_up, n_dn, sigma_uu, sigma_ud, sigma_dd, tau_up, tau_dn] = densityNames.map(v) as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const place = densityPlace(graph, { n_up, n_dn, sigma_uu, sigma_ud, sigma_dd, tau_up, tau_dn });
  const energy = instantiate(graph, functional).part(part, place)?.perParticle as number;
  const bindings = new Map(densityNames.map((name) => [name as string, context.from(inputs[name] as number)]));
  return Number(evaluateDecimal(graph, [energy], bindings, 40)[0]);
}

const quantities = [
  'n',
  'rs',
  'zeta',
  'kF',
  'ks',
  'phi',
  'epsx_unif',
  's',
  'p',
  't',
  'sigma',
  'tauW',
  'tau',
  'tauUnif',
  'alpha',
  'n_up',
  'rs_dn',
  's_up',
  'p_dn',
  'x_up',
  'x2_dn',
  'sigma_up',
  'tauW_dn',
  'tau_up',
  'tauUnif_dn',
  'alpha_up',
];

describe('the slice and the general density agree where they meet (definitions of the quantities)', () => {
  test.each(quantities)('%s', (name) => {
    const functional = linked('t', { t: sheet('meta-gga', `correlation: { per-particle: ${name} }`) });
    fc.assert(
      fc.property(
        fc.double({ min: 0.05, max: 20, noNaN: true }),
        fc.double({ min: 0, max: 0.99, noNaN: true }),
        fc.double({ min: 0, max: 5, noNaN: true }),
        fc.double({ min: 0, max: 5, noNaN: true }),
        (rs, zeta, s, alpha) => {
          const point = { rs, zeta, s, alpha };
          const slice = onSlice(functional, 'correlation', point);
          const density = onDensity(functional, 'correlation', slicedDensity(point));
          // The density's inputs are doubles: 1 − ζ and τ − τ_W lose digits, hence the floor.
          return Math.abs(slice - density) <= 1e-10 * Math.abs(density) + 1e-11 * (1 + s * s);
        },
      ),
      { seed: 11, numRuns: 25 },
    );
  });
});

describe('known values', () => {
  // Closed form: −(3/4)(3/π)^(1/3) n^(1/3) = −0.4581652932831429/r_s at ζ = 0, times 2^(1/3) at ζ = 1 (Dirac 1930).
  const dirac = linked('t', { t: sheet('lda', 'exchange: { enhancement: 1 }') });
  test('uniform-gas exchange at ζ = 0 and 1', () => {
    expect(onSlice(dirac, 'exchange', { rs: 2, zeta: 0, s: 0, alpha: 1 })).toBeCloseTo(-0.4581652932831429 / 2, 15);
    expect(onSlice(dirac, 'exchange', { rs: 2, zeta: 1, s: 0, alpha: 1 })).toBeCloseTo(
      (-0.4581652932831429 * 2 ** (1 / 3)) / 2,
      15,
    );
  });

  test('an empty channel contributes nothing, even where its reduced gradient is infinite', () => {
    const steep = linked('t', { t: sheet('gga', 'exchange: { enhancement: 1 + s^2/(1 + s) }') });
    // ζ = 1: F_x = 2^(1/3) F(s/2^(1/3)), exact spin scaling.
    const s = 1.5 / 2 ** (1 / 3);
    const expected = ((-0.4581652932831429 * 2 ** (1 / 3)) / 3) * (1 + (s * s) / (1 + s));
    expect(onSlice(steep, 'exchange', { rs: 3, zeta: 1, s: 1.5, alpha: 1 })).toBeCloseTo(expected, 14);
  });

  test('with both factors 1 the same-spin and opposite-spin parts add up to the gas they part', () => {
    const gas = sheet('lda', 'correlation: { per-particle: -0.44*(1 - zeta^2/2)/(7.8 + rs) }');
    const parted = sheet(
      'gga',
      'uses: { g: gas }',
      'correlation: { partition: g, same-spin: 1 + 0*x_sigma, opposite-spin: 1 }',
    );
    const whole = linked('gas', { gas });
    const functional = linked('t', { t: parted, gas });
    for (const zeta of [0, 0.4, 1]) {
      const point = { rs: 1.3, zeta, s: 0.7, alpha: 1 };
      expect(onSlice(functional, 'correlation', point)).toBeCloseTo(onSlice(whole, 'correlation', point), 15);
    }
  });

  test('an imported sheet takes changed parameters, and a weighted sum is the sum', () => {
    const base = sheet('gga', 'parameters: { mu: 0.1 }', 'exchange: { enhancement: 1 + mu*s^2 }');
    const changed = sheet('gga', 'uses: { b: { sheet: base, parameters: { mu: 2*0.3 } } }', 'exchange: { from: b }');
    const mixed = sheet(
      'gga',
      'uses: { b: base, c: changed }',
      'exchange: { per-particle: 0.25*b.exchange + 0.75*c.exchange }',
    );
    const point = { rs: 0.8, zeta: 0.3, s: 1.1, alpha: 1 };
    const [b, c, m] = ['base', 'changed', 'mixed'].map((id) =>
      onSlice(linked(id, { base, changed, mixed }), 'exchange', point),
    ) as [number, number, number];
    const direct = onSlice(
      linked('d', { d: sheet('gga', 'exchange: { enhancement: 1 + 0.6*s^2 }') }),
      'exchange',
      point,
    );
    expect(c).toBeCloseTo(direct, 15);
    expect(m).toBeCloseTo(0.25 * b + 0.75 * c, 15);
  });
});
