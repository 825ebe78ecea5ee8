import { expect, test } from 'vitest';
import { regionWords } from '../../src/constraint/words.ts';
import { extentOf } from '../../src/search/region.ts';

const alpha = { name: 'alpha', lower: 0, upper: 5, scale: 'linear' } as const;

test.each([
  [0, 5, 'every α'],
  [0.04, 5, 'α ≥ 0.04'],
  [0, 0.0552, 'α ≤ 0.0552'],
  [0.1, 0.9999999, '0.1 ≤ α < 1'],
  // Bisection towards a point without a value ends at the smallest numbers there are.
  [7.97e-139, 0.0552, '0 < α ≤ 0.0552'],
  [3.87e-122, 5, 'α > 0'],
])('a region from %s to %s reads as a person would say it', (lower, upper, words) => {
  expect(regionWords([extentOf(alpha, lower, upper)])).toBe(words);
});
