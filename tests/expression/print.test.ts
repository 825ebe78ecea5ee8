import { expect, test } from 'vitest';
import { parseExpression } from '../../src/expression/parse.ts';
import { expressionText } from '../../src/expression/print.ts';

const parsed = (text: string) => {
  const outcome = parseExpression({ text, placeAt: () => ({ file: '', line: 1, column: 1 }) });
  if (!outcome.ok) throw new Error(text);
  return outcome.value;
};

test.each([
  '1 + kappa - kappa/(1 + mu*s^2/kappa)',
  'limit(rs*d(eps_c, rs), rs, 0)',
  '-gas.correlation(rs, zeta) + base.mu',
  'a < 1 ? exp(-c*a/(1 - a)) : 0',
])('%s: the printed text means the same (it parses to a tree that prints alike)', (text) => {
  const once = expressionText(parsed(text));
  expect(expressionText(parsed(once))).toBe(once);
  // Only parentheses and spaces are added.
  expect(once.replace(/[()\s]/g, '')).toBe(text.replace(/[()\s]/g, ''));
});
