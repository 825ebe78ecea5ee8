import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parseConstraintSheet } from '../../src/definition/constraint.ts';
import { parseFunctionalSheet } from '../../src/definition/functional.ts';
import { newSheet } from '../../src/definition/template.ts';
import { type Outcome, problemCodes } from '../../src/errors/problem.ts';
import { origin, wholeConstraint, wholeFunctional } from './sheets.ts';

const sheets = [wholeFunctional, wholeConstraint, newSheet('f', 'gga'), newSheet('f', 'meta-gga')];

type Mutation = (text: string) => string;

const place = fc.nat({ max: 5_000 });
const onLines = (change: (lines: string[], at: number, other: number) => void) =>
  fc.tuple(place, place).map(
    ([at, other]): Mutation =>
      (text) => {
        const lines = text.split('\n');
        change(lines, at % lines.length, other % lines.length);
        return lines.join('\n');
      },
  );
const insertion = (inserted: fc.Arbitrary<string>) =>
  fc.tuple(place, inserted).map(
    ([at, what]): Mutation =>
      (text) => {
        const offset = at % (text.length + 1);
        return text.slice(0, offset) + what + text.slice(offset);
      },
  );
const bomb = 'a: &a [x, x, x]\nb: &b [*a, *a, *a]\nc: &c [*b, *b, *b]\nd: &d [*c, *c, *c]\ne: [*d, *d, *d]\n';
const signs = fc.constantFrom(
  ...'[]{}:,-?&*!|>\'"%@`#\\\t\r\n ~<=()',
  '---\n',
  '\u0000',
  '\ufeff',
  '\ud800',
  '😀',
  ': ',
);

const mutation = fc.oneof(
  { weight: 4, arbitrary: onLines((lines, at) => lines.splice(at, 1)) },
  { weight: 4, arbitrary: onLines((lines, at, to) => lines.splice(to, 0, lines[at] as string)) },
  {
    weight: 4,
    arbitrary: onLines((lines, at, other) => {
      [lines[at], lines[other]] = [lines[other] as string, lines[at] as string];
    }),
  },
  { weight: 2, arbitrary: onLines((lines, at) => lines.splice(at, 1, `  ${lines[at]}`)) },
  { weight: 8, arbitrary: insertion(fc.array(signs, { minLength: 1, maxLength: 4 }).map((parts) => parts.join(''))) },
  { weight: 4, arbitrary: insertion(fc.string({ unit: 'binary', maxLength: 20 })) },
  { weight: 1, arbitrary: insertion(fc.constant(`\n${bomb}`)) },
  {
    weight: 1,
    arbitrary: insertion(
      fc
        .tuple(fc.constantFrom('[', '{', '- ', '? ', '{a: ', '(', 'a: '), fc.nat({ max: 60_000 }))
        .map(([one, count]) => one.repeat(count / one.length)),
    ),
  },
  {
    weight: 1,
    arbitrary: insertion(
      fc
        .tuple(fc.constantFrom('x', ' ', '\n', '9', 'é', '&a ', '"', 'a,'), fc.nat({ max: 200_000 }))
        .map(([one, count]) => one.repeat(count / one.length)),
    ),
  },
);

/** Neither parser throws or dawdles; problems have a known code and a place inside the file. */
function check(text: string): readonly Outcome<unknown>[] {
  return [parseFunctionalSheet, parseConstraintSheet].map((parse) => {
    const start = performance.now();
    const outcome: Outcome<unknown> = parse(text, origin);
    const time = performance.now() - start;
    expect(time).toBeLessThan(1_000);
    if (outcome.ok) return outcome;
    expect(outcome.problems.length).toBeGreaterThan(0);
    const lines = text.split('\n');
    for (const { code, file, line = 0, column = 0, message, remedy } of outcome.problems) {
      expect(problemCodes).toContain(code);
      expect(file).toBe('f.yaml');
      expect(column).toBeGreaterThanOrEqual(1);
      expect(column).toBeLessThanOrEqual((lines[line - 1] as string).length + 1);
      expect(message.length + remedy.length).toBeLessThan(700);
    }
    return outcome;
  });
}

describe('a malformed sheet', () => {
  test('2,000 mutated sheets give a problem with a place or a value, each within a second', () => {
    let refused = 0;
    const mutated = fc
      .tuple(fc.constantFrom(...sheets), fc.array(mutation, { minLength: 1, maxLength: 4 }))
      .map(([sheet, mutations]) => mutations.reduce((text, mutate) => mutate(text), sheet))
      .map((text) => ({ text, [fc.toStringMethod]: () => JSON.stringify(text.slice(0, 2_000)) }));
    const property = fc.property(mutated, ({ text }) => {
      if (check(text).every(({ ok }) => !ok)) refused++;
    });
    fc.assert(property, { seed: 20262, numRuns: 2_000 });
    // Most mutations must be faults, or the test tries nothing.
    expect(refused).toBeGreaterThan(1_000);
  }, 300_000);

  test.each([
    ['keys', (at: number) => `key${at}: 1\n`],
    ['the same key', () => 'a: 1\n'],
    ['names in a mapping', (at: number) => `${at === 0 ? 'where:\n' : ''}  a${at}: 1\n`],
    ['bad names in a mapping', (at: number) => `${at === 0 ? 'parameters:\n' : ''}  a-${at}: [1]\n`],
    ['aliases', () => '- *a\n'],
    ['quotes', () => '"a" '],
    ['brackets', () => '}'],
    ['question marks', (at: number) => (at === 0 ? 'a: b: ' : '?')],
    ['words in a broken line', (at: number) => (at === 0 ? 'a: b: ' : '? a ')],
    ['aliases in a broken line', (at: number) => (at === 0 ? 'uses: { a: [' : '*a ')],
    ['tags', () => '! '],
    ['documents', () => '---\n'],
    ['lines of a text', (at: number) => `${at === 0 ? 'notes: |\n' : ''}  a b\n`],
    ['long keys', (at: number) => `${'k'.repeat(10_000)}${at}: 1\n`],
  ])('a file full of %s is answered within a second', (_, part) => {
    let text = '';
    for (let at = 0; text.length < 250_000; at++) text += part(at);
    check(text);
  });
});
