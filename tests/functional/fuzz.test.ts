import { readdirSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { type FunctionalDefinition, parseFunctionalSheet } from '../../src/definition/functional.ts';
import { type Outcome, problemCodes } from '../../src/errors/problem.ts';
import { linkFunctional } from '../../src/functional/link.ts';

/** 10,000 with FUZZ_RUNS=10000; fewer by default, to keep the suite quick. */
const runs = Number(process.env.FUZZ_RUNS ?? 600);

const files = readdirSync('functionals').filter((file) => file.endsWith('.yaml'));
const texts = new Map(files.map((file) => [file.replace('.yaml', ''), readFileSync(`functionals/${file}`, 'utf8')]));
const find = (id: string): Outcome<FunctionalDefinition> | undefined => {
  const text = texts.get(id);
  return text === undefined ? undefined : parseFunctionalSheet(text, { file: `${id}.yaml`, id });
};

/** A change that leaves most of a sheet sound, so that faults reach the expressions and the joining of sheets. */
const change = fc.oneof(
  fc.tuple(fc.constant('drop'), fc.nat(), fc.constant('')),
  fc.tuple(fc.constant('line'), fc.nat(), fc.constant('')),
  fc.tuple(
    fc.constant('insert'),
    fc.nat(),
    fc.constantFrom(
      '(',
      ')',
      '^',
      '*',
      '-',
      '/',
      '2',
      '.',
      ',',
      ' ',
      'x',
      '0',
      '1e400',
      'spinsum(',
      'exp(',
      '(((((((',
      ' ? ',
      ' : ',
      '<',
      'alpha',
      'rs',
      'zeta',
      '-1/0',
      '^(1/3)',
      '^0.5^2',
    ),
  ),
  fc.tuple(
    fc.constant('swap'),
    fc.nat(),
    fc.constantFrom('rs', 'zeta', 's', 'n_sigma', 'x_up', 'tau', 'q', 'pi', 'gas.correlation', 'base.exchange'),
  ),
);

function mutate(text: string, [kind, at, what]: [string, number, string]): string {
  if (kind === 'line') {
    const lines = text.split('\n');
    lines.splice(at % lines.length, 1);
    return lines.join('\n');
  }
  if (kind === 'swap') {
    const words = [...text.matchAll(/[A-Za-z_]\w*/g)];
    const word = words[at % words.length];
    return word === undefined ? text : text.slice(0, word.index) + what + text.slice(word.index + word[0].length);
  }
  const offset = at % text.length;
  return text.slice(0, offset) + what + text.slice(offset + (kind === 'drop' ? 1 : 0));
}

test(`${runs} sheets of the shelf with small faults: a problem or a valid functional, each within a second`, () => {
  let valid = 0;
  let slowest = 0;
  fc.assert(
    fc.property(fc.constantFrom(...texts.keys()), fc.array(change, { minLength: 1, maxLength: 4 }), (id, changes) => {
      const text = changes.reduce(mutate, texts.get(id) as string);
      const start = performance.now();
      const definition = parseFunctionalSheet(text, { file: 'mutant.yaml', id: 'mutant' });
      const outcome = definition.ok ? linkFunctional(definition.value, find) : definition;
      slowest = Math.max(slowest, performance.now() - start);
      if (outcome.ok) valid++;
      else {
        expect(outcome.problems.length).toBeGreaterThan(0);
        for (const { code, message, remedy } of outcome.problems) {
          expect(problemCodes).toContain(code);
          expect(message.length * remedy.length).toBeGreaterThan(0);
        }
      }
    }),
    { seed: 20261201, numRuns: runs },
  );
  // Both outcomes must be reached, or the mutations are too weak or too strong to say anything.
  expect(valid).toBeGreaterThan(runs / 50);
  expect(valid).toBeLessThan(runs);
  expect(slowest).toBeLessThan(1000);
});
