import { describe, expect, test } from 'vitest';
import { ask, correlation, exchange } from './ask.ts';

const asked = (functional: Parameters<typeof ask>[1]) => ask('finite-everywhere', functional);

describe('what is finite holds', () => {
  test('a removable 0/0 is a limit and no fault: expm1(s²)/s² → 1 at s = 0', () => {
    const { verdict, reason } = asked(exchange('expm1(p)/p/(1 + 10*p^2*exp(p))'));
    expect(reason).toMatch(/exists? as limits only/);
    expect(verdict).toBe('holds');
  });

  test('∞/∞ in double precision alone is no fault: exp(s)/(1 + exp(s)) at s = 1000', () => {
    const { verdict, reason } = asked(exchange('1 + p/(1 + p)*exp(p)/(1 + exp(p))'));
    expect(verdict).toBe('holds');
    expect(reason).toMatch(/exists? in high precision but not in double precision/);
  });
});

describe('what diverges is named with its power (closed forms)', () => {
  test('F = 1 + s/10: n ε goes as √σ, so its first derivative goes as σ^(−1/2)', () => {
    const { verdict, reason, mildBecause } = asked(exchange('1 + s/10/(1 + s)'));
    expect(verdict).toBe('violated');
    expect(reason).toMatch(/^∂nε_x\/∂σ↑↑ grows without bound, as the power −1\/2 of the distance, at ∇n = 0/);
    expect(mildBecause).toBeUndefined();
  });

  test('F = 1 + s³/10: only the second derivative by σ goes as σ^(−1/2)', () => {
    expect(asked(exchange('1 + s^3/(10 + s^3)')).reason).toMatch(/^∂²nε_x\/∂σ↑↑² grows .* −1\/2 .* ∇n = 0/);
  });

  test('F = 1 + s⁴ log(s)/10: the second derivative by σ is a logarithm', () => {
    const made = exchange('s > 0 ? 1 + p^2*log(p)/(10 + p^3) : 1');
    expect(asked(made).reason).toMatch(/^∂²nε_x\/∂σ↑↑² grows without bound, as a logarithm .* ∇n = 0/);
  });

  test('φ alone: dφ/dζ = (1/3)[(1 + ζ)^(−1/3) − (1 − ζ)^(−1/3)] at ζ = 1, an edge that weighs less', () => {
    const { reason, witness, mildBecause } = asked(correlation('lda', '-0.01*phi'));
    expect(reason).toMatch(/^∂F_c\/∂ζ grows without bound, as the power −1\/3 of the distance, at ζ = 1/);
    expect(witness).toMatchObject({ zeta: 1 });
    expect(mildBecause).toMatch(/spin channel is empty/);
  });

  test('PBE correlation has it through φ (its Eq. 7)', () => {
    expect(asked('pbe').reason).toMatch(/^∂F_c\/∂ζ grows without bound, as the power −1\/3 of the distance, at ζ = 1/);
  });

  test('P86 is linear in |∇n| at small gradients: ∂²/∂σ² as σ^(−1/2)', () => {
    expect(asked('p86').reason).toMatch(/^∂²nε_c\/∂σ↑↑² grows without bound, as the power −1\/2 .* ∇n = 0/);
  });
});

test('TPSS has no value at s = 0 with α = 0: z = 5p/(5p + 3α) is 0 to 1 by the way', () => {
  const { reason, witness } = asked('tpss');
  expect(reason).toMatch(/^F_x has no limit \(.* by the way it is approached\) at s = 0, α = 0/);
  expect(witness).toMatchObject({ s: 0, alpha: 0 });
});
