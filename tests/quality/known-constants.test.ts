import { describe, expect, test } from 'vitest';
import { nameConstants } from '../../src/quality/known-constants.ts';
import type { ConstantName } from '../../src/quality/published-constants.ts';
import { type BlackBox, readConstants } from '../../src/quality/read-constants.ts';
import { ask } from './ask.ts';

/** ε_x^unif r_s, check-values 2a */
const gas = -0.4581652932831429;
const exchangeBox = (factor: (s: number) => number): BlackBox => ({
  exchange: (points) => points.map(({ rs, s }) => (gas / rs) * factor(s)),
});
const pbeLike = (kappa: number, mu: number) => exchangeBox((s) => 1 + kappa - kappa / (1 + (mu * s * s) / kappa));
const nameOf = (box: BlackBox, constant: ConstantName) =>
  nameConstants(box).find((reading) => reading.constant === constant);

describe('a black box is told by its limits', () => {
  test.each([
    { mu: 0.2195149727645171, name: /^PBE, βπ²\/3 with all digits/ },
    { mu: 0.21951, name: /^PBE as printed/ },
    { mu: 0.2195164512, name: /^βπ²\/3 with the printed β/ },
    { mu: 10 / 81, name: /^10\/81 \(/ },
    { mu: 7 / 81, name: /^7\/81/ },
  ])('μ = $mu (check-values 2b)', ({ mu, name }) => {
    const found = nameOf(pbeLike(0.804, mu), 'exchange-gradient');
    expect(found?.values[0]).toBeCloseTo(mu, 9);
    expect(found?.nearest.name).toMatch(name);
    expect(found?.isIt).toBe(true);
  });

  test.each([
    { kappa: 0.804, name: /PBE 1996/ },
    { kappa: 0.80436, name: /0\.80436/ },
    { kappa: 1.245, name: /revPBE/ },
  ])('κ = $kappa', ({ kappa, name }) => {
    expect(nameOf(pbeLike(kappa, 0.21951), 'exchange-large-s')?.nearest.name).toMatch(name);
  });

  test('a μ that nobody published is nearest to one and is not it', () => {
    expect(nameOf(pbeLike(0.804, 0.2197), 'exchange-gradient')).toMatchObject({ isIt: false });
  });

  test('an F that is not even in s has no μ, and none is named', () => {
    expect(
      nameOf(
        exchangeBox((s) => 1 + s / (4 + s)),
        'exchange-gradient',
      ),
    ).toBeUndefined();
  });

  test('a gas by its three energies at r_s = 2: PW92 of a code, from the paper’s Table I', () => {
    const g = (rs: number, a: number, a1: number, b: readonly number[]) => {
      const r = Math.sqrt(rs);
      const [b1, b2, b3, b4] = b as [number, number, number, number];
      return -2 * a * (1 + a1 * rs) * Math.log(1 + 1 / (2 * a * (b1 * r + b2 * rs + b3 * r ** 3 + b4 * rs ** 2)));
    };
    const box: BlackBox = {
      correlation: (points) =>
        points.map(({ rs, zeta }) => {
          const f = ((1 + zeta) ** (4 / 3) + (1 - zeta) ** (4 / 3) - 2) / (2 ** (4 / 3) - 2);
          const e0 = g(rs, 0.031091, 0.2137, [7.5957, 3.5876, 1.6382, 0.49294]);
          const e1 = g(rs, 0.015545, 0.20548, [14.1189, 6.1977, 3.3662, 0.62517]);
          const stiffness = -g(rs, 0.016887, 0.11125, [10.357, 3.6231, 0.88026, 0.49671]);
          return e0 + ((stiffness * f) / 1.709921) * (1 - zeta ** 4) + (e1 - e0) * f * zeta ** 4;
        }),
    };
    expect(nameOf(box, 'gas-correlation')).toMatchObject({ isIt: true, nearest: { name: 'PW92 as printed' } });
    expect(nameOf(box, 'gas-high-density')?.nearest.name).toMatch(/PW92 prints/);
  });
});

describe('sheets of the catalogue', () => {
  test('PBE as it stands, and with the digits of its paper', () => {
    const whole = ask('known-constants', 'pbe').reason;
    expect(whole).toMatch(/μ = 0\.21951497: PBE, βπ²\/3 with all digits/);
    expect(whole).toMatch(/β\(r_s → 0\) = 0\.066724551: PBE with all digits/);
    expect(whole).toMatch(/γ = 0\.031090691: \(1 − ln 2\)\/π²/);
    expect(whole).toMatch(/ε_c of the gas: PW92 with full digits/);
    const printed = ask('known-constants', 'pbe', { mu: '0.21951', beta: '0.066725', gamma: '0.031091' }).reason;
    expect(printed).toMatch(/μ = 0\.21951: PBE as printed/);
    expect(printed).toMatch(/β\(r_s → 0\) = 0\.066725: as printed/);
    expect(printed).toMatch(/γ = 0\.031091\d*: as printed/);
  });

  test.each([
    { id: 'pw92', name: 'PW92 as printed' },
    { id: 'pw92-full-digits', name: 'PW92 with full digits' },
    { id: 'vwn5', name: 'VWN5' },
    { id: 'vwn-rpa', name: 'VWN of the random-phase approximation' },
    { id: 'pz81', name: 'PZ81' },
    { id: 'gunnarsson-lundqvist', name: 'Gunnarsson, Lundqvist 1976' },
    { id: 'hedin-lundqvist', name: 'Hedin, Lundqvist 1971' },
    { id: 'chachiyo', name: 'Chachiyo 2016' },
  ])('$id is itself', ({ id, name }) => {
    expect(ask('known-constants', id).reason).toContain(`ε_c of the gas: ${name}`);
  });

  // Effective μ of check-values 2b, measured with another evaluator to five digits.
  test.each([
    ['scan', 0.123457],
    ['r2scan', 0.123456],
    ['rppscan', 0.24428],
    ['tpss', 0.123457],
    ['mvs', 0.123455],
    ['task', 0.123456],
    ['m06-l', 0.10757],
    ['mn15-l', -0.1426],
    ['mbeef', 0.0967],
    ['b88', 0.274293],
  ])('μ of %s is %d', (id, mu) => {
    const found = Number(/μ = ([-\d.]+)/.exec(ask('known-constants', id).reason)?.[1]);
    expect(Math.abs(found - mu)).toBeLessThan(5e-5);
  });

  test('PBE0 carries PBE: its exchange is divided by the semilocal share', () => {
    expect(ask('known-constants', 'pbe0').reason).toMatch(/μ = 0\.21951497: PBE/);
  });
});

test('a functional with nothing to read gives no constants', () => {
  expect(readConstants({})).toEqual([]);
});
