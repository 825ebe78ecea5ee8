import { describe, expect, test } from 'vitest';
import { evaluatePoints, type PointSpace } from '../../src/evaluate/points.ts';
import { decimalContext } from '../../src/number/decimal.ts';
import { functionalOf } from '../constraint/catalogue.ts';

function evaluate(
  id: string,
  space: PointSpace,
  point: Record<string, string>,
  more: { derivatives?: boolean; digits?: number } = {},
): Record<string, number | string | null> {
  const { columns, rows } = evaluatePoints(functionalOf(id), { space, points: [point], derivatives: false, ...more });
  return Object.fromEntries(columns.map((name, index) => [name, rows[0]?.[index] ?? null]));
}

const density = { n_up: '0.3', n_dn: '0.2', sigma_uu: '0', sigma_ud: '0', sigma_dd: '0', tau_up: '0.4', tau_dn: '0.3' };

describe('edges are met by their limits', () => {
  test('∂e/∂σ of B88 at vanishing gradient is −β n_σ^(−4/3) (closed form, from its Eq. (8))', () => {
    const at = evaluate('b88', 'density', density, { derivatives: true });
    expect(at.d_sigma_uu_x).toBeCloseTo(-0.0042 * 0.3 ** (-4 / 3), 12);
    expect(at.d_sigma_dd_x).toBeCloseTo(-0.0042 * 0.2 ** (-4 / 3), 12);
  });

  test('∂e/∂σ of PBE exchange at vanishing gradient is n ε_x^unif μ ∂s²/∂σ for each doubled channel (closed form)', () => {
    const at = evaluate('pbe', 'density', density, { derivatives: true });
    // ½ (2n) ε_x(2n) μ · 4/(4 (3π²)^(2/3) (2n)^(8/3)), with ε_x(n) = −(3/4)(3n/π)^(1/3)
    const doubled = 0.6;
    const gas = -0.75 * (3 / Math.PI) ** (1 / 3) * doubled ** (4 / 3);
    const slope = 4 / (4 * (3 * Math.PI ** 2) ** (2 / 3) * doubled ** (8 / 3));
    expect(at.d_sigma_uu_x).toBeCloseTo(0.5 * gas * 0.2195149727645171 * slope, 12);
  });

  test('an empty channel: ∂e_c/∂n↑ of PBE is the limit n↓ → 0, ∂e_c/∂n↓ diverges and is left out', () => {
    const empty = {
      n_up: '0.3',
      n_dn: '0',
      sigma_uu: '0.05',
      sigma_ud: '0',
      sigma_dd: '0',
      tau_up: '0.4',
      tau_dn: '0',
    };
    const at = evaluate('pbe', 'density', empty, { derivatives: true });
    const near = evaluate('pbe', 'density', { ...empty, n_dn: '1e-18' }, { derivatives: true });
    expect(at.d_n_up_c).toBeCloseTo(near.d_n_up_c as number, 7);
    expect(at.d_n_dn_c).toBeNull();
    expect(at.eps_c).toBeCloseTo(near.eps_c as number, 10);
  });

  test('ζ = 1, s = 0 and α = 0 have values; τ_W/τ at s = α = 0 has none', () => {
    for (const [s, alpha] of [
      ['0', '1'],
      ['2', '0'],
      ['2', '1'],
    ] as const) {
      const at = evaluate('tpss', 'slice', { rs: '1', zeta: '1', s, alpha }, { derivatives: true });
      expect(
        Object.values(at).every((value) => value !== null),
        `s ${s}, α ${alpha}`,
      ).toBe(true);
    }
    expect(evaluate('tpss', 'slice', { rs: '1', zeta: '0', s: '0', alpha: '0' }).Fx).toBeNull();
  });
});

describe('high precision', () => {
  test('uniform-gas exchange to 50 digits against the closed form −(3/4)(9/(4π²))^(1/3)/r_s', () => {
    const { eps_x } = evaluate('dirac', 'slice', { rs: '0.1', zeta: '0' }, { digits: 50 });
    const context = decimalContext(70);
    const expected = context.from(9).div(context.pi.times(context.pi).times(4)).cbrt().times('-0.75').div('0.1');
    expect(eps_x).toBe(expected.toSignificantDigits(50).toString());
  });

  test('double precision equals 50 digits rounded, to 1e-13 relative (PBE, SCAN)', () => {
    const point = { rs: '2', zeta: '0.4', s: '0.7', alpha: '0.6' };
    for (const id of ['pbe', 'scan']) {
      const doubles = evaluate(id, 'slice', point, { derivatives: true });
      const digits = evaluate(id, 'slice', point, { derivatives: true, digits: 50 });
      for (const [name, value] of Object.entries(doubles)) {
        expect(Math.abs((value as number) - Number(digits[name])), `${id} ${name}`).toBeLessThanOrEqual(
          1e-13 * Math.abs(Number(digits[name])) + 1e-14,
        );
      }
    }
  });
});

test('a part that the functional does not have is empty, not zero', () => {
  const at = evaluate('lyp', 'slice', { rs: '1', zeta: '0', s: '1' });
  expect([at.eps_x, at.Fx, at.eps_xc, at.Fxc]).toEqual([null, null, null, null]);
  expect(at.eps_c).toBeLessThan(0);
});
