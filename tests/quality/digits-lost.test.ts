import { expect, test } from 'vitest';
import { ask, exchange } from './ask.ts';

const asked = (functional: Parameters<typeof ask>[1]) => ask('digits-lost', functional);
const lostInValue = (reason: string) => Number(/loses at most ([\d.]+) in F_x/.exec(reason)?.[1]);

test('(10¹⁰ + s²) − 10¹⁰ keeps s² to half a unit in the last place of 10¹⁰: 2⁻²⁰, 9.9 digits more than 2⁻⁵³', () => {
  const { verdict, reason } = asked(exchange('1 + ((10000000000 + p) - 10000000000)/(1 + p)'));
  expect(verdict).toBe('violated');
  // Less the sizes of F (1 to 2) and of 1/(1 + s²) where it is worst.
  expect(lostInValue(reason)).toBeGreaterThan(9);
  expect(lostInValue(reason)).toBeLessThanOrEqual(Math.log10(2 ** 53 / 2 ** 20) + 0.1);
});

test('the same formula without the detour loses next to nothing', () => {
  const { verdict, reason } = asked(exchange('1 + p/(1 + p)'));
  expect(verdict).toBe('holds');
  expect(lostInValue(reason)).toBeLessThan(1.5);
});
