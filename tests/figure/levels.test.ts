import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { chooseLevels, compress } from '../../src/figure/levels.ts';

describe('steps of a margin scale', () => {
  test('values of one size have even steps (by hand)', () => {
    const { kind, levels } = chooseLevels([-1, -0.5, 0.5, 1], 1e-9);
    expect([kind, levels]).toEqual(['linear', [-0.8, -0.6, -0.4, -0.2, 0, 0.2, 0.4, 0.6, 0.8]]);
  });

  test('values of many sizes have steps of 1, 2, 5 times powers of ten on either side (by hand)', () => {
    const { kind, levels, ticks } = chooseLevels([-0.003, -0.002, 0.05, 0.9, 1], 1e-9);
    expect(kind).toBe('compressed');
    expect(levels).toEqual([-0.002, -0.001, 0, 0.001, 0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5]);
    expect(ticks).toEqual([-0.001, 0, 0.001, 0.01, 0.1]);
  });

  test('rise, hold zero, and measure margins in a rising way, with the sign of the margin (property)', () => {
    const size = fc
      .tuple(fc.integer({ min: -999, max: 999 }), fc.integer({ min: -8, max: 3 }))
      .map(([mantissa, exponent]) => mantissa * 10 ** exponent);
    fc.assert(
      fc.property(fc.array(size, { minLength: 1, maxLength: 40 }), size, size, (values, a, b) => {
        const chosen = chooseLevels(values, 1e-9);
        const { levels } = chosen;
        expect(levels).toEqual([...levels].sort((x, y) => x - y));
        const zero = levels.indexOf(0);
        expect(zero).toBeGreaterThanOrEqual(0);
        const [low, high] = [Math.min(a, b), Math.max(a, b)];
        expect(compress(chosen, low)).toBeLessThanOrEqual(compress(chosen, high) + 1e-12);
        if (levels.length > 1) expect(compress(chosen, a) >= zero).toBe(a >= 0);
      }),
      { seed: 5, numRuns: 300 },
    );
  });
});
