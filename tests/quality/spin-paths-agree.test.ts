import { expect, test } from 'vitest';
import { ask, correlation, exchange } from './ask.ts';

const asked = (functional: Parameters<typeof ask>[1]) => ask('spin-paths-agree', functional);

test('f(ζ)/ζ² has the limit 4/9 at ζ = 0 but no value, by either way', () => {
  const { verdict, reason } = asked(correlation('lda', '-0.01*((1 + zeta)^(4/3) + (1 - zeta)^(4/3) - 2)/zeta^2'));
  expect(verdict).toBe('violated');
  expect(reason).toMatch(/no value without spin, no value with it/);
});

test('what rounding alone parts is called round-off: sin(10¹² s²) turns the last digits of s² into the first', () => {
  const { verdict, reason } = asked(exchange('1 + sin(1000000000000*p)/10'));
  expect(verdict).toBe('violated');
  expect(reason).toMatch(/by round-off and not in high precision/);
});
