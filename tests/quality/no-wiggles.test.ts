import { expect, test } from 'vitest';
import { ask, exchange } from './ask.ts';

const asked = (functional: Parameters<typeof ask>[1]) => ask('no-wiggles', functional);
const measure = (reason: string, part: string) => Number(new RegExp(`\\|${part}\\| ≤ ([\\d.e+-]+)`).exec(reason)?.[1]);

test('an LDA has neither s nor α', () => {
  expect(asked('dirac').verdict).toBe('not-applicable');
});

test('PBE exchange bends most at s = 0, by 2μ, and has one inflection, at s = (κ/3μ)^(1/2)', () => {
  const { verdict, reason } = asked('pbe');
  expect(verdict).toBe('holds');
  expect(reason).toMatch(/^F_x along s: 0 extrema, 1 inflection/);
  // μ = βπ²/3; the first point of a line is s = 0.0075
  expect(measure(reason, '∂²F_x/∂s²')).toBeCloseTo((2 * 0.06672455060314922 * Math.PI ** 2) / 3, 3);
});

test('sin(10 s): ten extrema and nine inflections up to s = 3, bent by 100 times its size', () => {
  const { verdict, reason } = asked(exchange('1 + sin(10*s)/20'));
  expect(verdict).toBe('violated');
  expect(reason).toMatch(/^F_x along s: 10 extrema, 9 inflections/);
  expect(measure(reason, '∂²F_x/∂s²')).toBeCloseTo(5, 1);
});

test('exp(−200 s²) turns nowhere but bends by 400 times its size: too sharply', () => {
  const { verdict, margin, reason } = asked(exchange('1 - 0.1*exp(-200*p)'));
  expect(verdict).toBe('violated');
  expect(reason).toMatch(/^F_x along s: 0 extrema, 1 inflection/);
  expect(margin).toBeLessThan(-25);
});

test('r2SCAN bends F_x along α ten times less than SCAN (Furness et al. 2020)', () => {
  const [smooth, steep] = ['r2scan', 'scan'].map((id) => measure(asked(id).reason, '∂²F_x/∂α²'));
  expect(steep).toBeGreaterThan(2);
  expect(smooth).toBeLessThan(0.25);
});
