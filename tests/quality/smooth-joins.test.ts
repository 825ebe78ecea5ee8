import { describe, expect, test } from 'vitest';
import { ask, exchange } from './ask.ts';

const asked = (functional: Parameters<typeof ask>[1]) => ask('smooth-joins', functional);

test('PBE has no join inside the domain', () => {
  expect(asked('pbe')).toMatchObject({ verdict: 'holds', margin: null });
});

describe('a join with a known jump (closed forms)', () => {
  // F = 1 + (s − 2)^k/k! beyond s = 2: the k-th derivative jumps by 1 at ζ = 0 and by Σ ½(1 ± ζ)^((4 − k)/3) at others,
  // each channel at its own s = 2(1 ± ζ)^(1/3).
  const joined = (k: number, factorial: number) => exchange(`s < 2 ? 1 : 1 + (s - 2)^${k}/${factorial}`);

  test.each([
    { k: 1, factorial: 1, verdict: 'violated', words: /^∂F_x\/∂s jumps by 0\.\d+, class C⁰, at a surface through/ },
    { k: 2, factorial: 2, verdict: 'violated', words: /^∂²F_x\/∂s² jumps by 0\.\d+, class C¹, at a surface through/ },
    { k: 3, factorial: 6, verdict: 'holds', words: /^∂³F_x\/∂s³ jumps by 0\.\d+, class C², at a surface through/ },
    { k: 4, factorial: 24, verdict: 'holds', words: /^∂⁴F_x\/∂s⁴ jumps by 0\.5, class C³, at a surface through/ },
  ])('(s − 2)^$k beyond s = 2', ({ k, factorial, verdict, words }) => {
    const answer = asked(joined(k, factorial));
    expect(answer.verdict).toBe(verdict);
    expect(answer.reason).toMatch(words);
    const { s, zeta } = answer.witness as { s: number; zeta: number };
    const own = [1 + zeta, 1 - zeta].map((share) => Math.abs(s / Math.cbrt(share) - 2));
    expect(Math.min(...own)).toBeLessThan(1e-9);
  });

  test('(s − 2) beyond s = 2: the slope jumps by ½(1 ± ζ)', () => {
    const { margin, witness } = asked(joined(1, 1));
    const { s, zeta } = witness as { s: number; zeta: number };
    const share = s > 2 ? 1 + zeta : 1 - zeta;
    expect(margin).toBeCloseTo(-share / 2, 9);
  });

  test('max(1, s) and |s − 1| turn with slopes 0 and ∓1', () => {
    expect(asked(exchange('max(1, s)')).reason).toMatch(/^∂F_x\/∂s jumps by .* class C⁰/);
    expect(asked(exchange('1 + abs(s - 1)')).reason).toMatch(/^∂F_x\/∂s jumps by .* class C⁰/);
  });

  test('|x|³ is of class C², as x³ and −x³ part in the third derivative', () => {
    expect(asked(exchange('1 + abs(s - 2)^3')).reason).toMatch(/class C², at a surface/);
  });
});

test('PZ81 jumps at r_s = 1 by what its printed constants leave (Table XII)', () => {
  const { verdict, reason, witness } = asked('pz81');
  expect(verdict).toBe('violated');
  expect(witness).toMatchObject({ rs: 1 });
  // high density B + D, low density γ/(1 + β₁ + β₂), at ζ = 0 and 1
  const unpolarised = -0.1423 / (1 + 1.0529 + 0.3334) - (-0.048 - 0.0116);
  const polarised = -0.0843 / (1 + 1.3981 + 0.2611) - (-0.0269 - 0.0048);
  const zeta = witness?.zeta as number;
  const f = ((1 + zeta) ** (4 / 3) + (1 - zeta) ** (4 / 3) - 2) / (2 ** (4 / 3) - 2);
  // over −ε_x^unif at r_s = 1, check-values 2a
  const jump = Math.abs(unpolarised + (polarised - unpolarised) * f) / 0.4581652932831429;
  const found = Number(/^F_c jumps by (\S+) at r_s = 1/.exec(reason)?.[1]);
  expect(found / jump).toBeCloseTo(1, 2);
});

test('SCAN is continuous with its derivatives at α = 1: exp(−c α/(1 − α)) and its likes vanish with all of them', () => {
  const { verdict, reason } = asked('scan');
  expect(verdict).toBe('holds');
  expect(reason).toMatch(/F_x is continuous with derivatives to order 4 at α = 1/);
  expect(reason).toMatch(/F_c is continuous with derivatives to order 4 at α = 1/);
});

test('rSCAN joins its polynomial at α′ = 2.5 with class C³ (Bartok, Yates 2019)', () => {
  const { verdict, reason, witness } = asked('rscan');
  expect(verdict).toBe('holds');
  expect(reason).toMatch(/^∂⁴F_x\/∂α⁴ jumps by .*, class C³/);
  expect(witness?.alpha).toBeCloseTo(2.5, 2);
});

test('TPSS kinks where the energies in its max() cross, near full polarisation', () => {
  const { verdict, reason, witness } = asked('tpss');
  expect(verdict).toBe('violated');
  expect(reason).toMatch(/^∂F_c\/∂ζ jumps by .*, class C⁰/);
  expect(witness?.zeta).toBeGreaterThan(0.9);
});
