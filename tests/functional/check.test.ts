import { describe, expect, test } from 'vitest';
import { link, sheet } from './sheets.ts';

/** Problems of a sheet as `code line:column`, in the order they are told. */
function problems(text: string, others: Record<string, string> = {}): string[] {
  const outcome = link('test', { test: text, ...others });
  if (outcome.ok) return [];
  return outcome.problems.map(({ code, line, column }) => `${code} ${line}:${column}`);
}

const gas = sheet(
  'lda',
  'parameters: { a: 0.44 }',
  'functions: { f(x): a*x }',
  'correlation: { per-particle: -f(1)/(7.8 + rs) }',
);
const gga = sheet('gga', 'exchange: { enhancement: 1 + s^2 }');

test('a step that sums a channel step over spin can be used outside a sum', () => {
  const steps = ['  where:', '    ofChannel: n_sigma/n*rs_sigma', '    summed: spinsum(ofChannel)'];
  expect(problems(sheet('lda', 'correlation:', ...steps, '  per-particle: -summed'))).toEqual([]);
});

describe('each fault in the names of a sheet is a problem at its line and column', () => {
  test('an unknown name, with what was meant', () => {
    const outcome = link('test', {
      test: sheet('gga', 'parameters: { kappa: 0.8 }', 'exchange:', '  enhancement: 1 + kapa*s^2 + kappa'),
    });
    expect(outcome).toMatchObject({
      ok: false,
      problems: [
        {
          code: 'unknown-name',
          line: 6,
          column: 20,
          message: 'unknown name kapa',
          remedy: 'Did you mean kappa?',
          file: 'test.yaml',
        },
      ],
    });
  });

  test.each<[string, string[], string[]]>([
    ['an unknown function', ['exchange: { enhancement: 1 + foo(s) }'], ['unknown-name 4:30']],
    ['a wrong number of arguments', ['exchange:', '  enhancement: exp(s, 2)'], ['wrong-arguments 5:16']],
    [
      'a wrong number of arguments of a named function',
      ['functions:', '  f(a, b): a*b', 'exchange: { enhancement: f(s) }'],
      ['wrong-arguments 6:26'],
    ],
    [
      'a circle of parameters',
      ['parameters: { a: b, b: 2*a }', 'exchange: { enhancement: 1 + a*s^2 }'],
      ['cyclic-definition 4:18'],
    ],
    ['a circle of steps', ['where: { a: b, b: a + 1 }', 'exchange: { enhancement: a }'], ['cyclic-definition 4:13']],
    [
      'a function that calls itself',
      ['functions: { f(x): f(x) }', 'exchange: { enhancement: f(s) }'],
      ['cyclic-definition 4:20'],
    ],
    [
      'a parameter never used',
      ['parameters: { a: 1, b: 2 }', 'exchange: { enhancement: 1 + a*s^2 }'],
      ['unused-parameter 4:21'],
    ],
    ['a step never used', ['exchange: { where: { a: s }, enhancement: 1 }'], ['unused-definition 4:22']],
    ['a variable above the rung', ['exchange: { enhancement: 1 + alpha }'], ['above-rung 4:30']],
    ['a channel name outside a sum', ['correlation: { per-particle: x_sigma }'], ['channel-outside-sum 4:30']],
    [
      'a channel step outside a sum',
      ['where: { a: x_sigma }', 'correlation: { per-particle: a }'],
      ['channel-outside-sum 5:30'],
    ],
    ['a quantity in a parameter', ['parameters: { a: rs }', 'exchange: { enhancement: a }'], ['unknown-name 4:18']],
    [
      'a quantity in a named function',
      ['functions: { f(x): x*rs }', 'exchange: { enhancement: f(s) }'],
      ['unknown-name 4:22'],
    ],
    [
      'a name that already means a quantity',
      ['parameters: { mu: 1, s: 2 }', 'exchange: { enhancement: mu + s }'],
      ['reserved-name 4:22'],
    ],
    [
      'an import that is not there',
      ['uses: { g: nowhere }', 'correlation: { per-particle: g.correlation }'],
      ['missing-import 4:9'],
    ],
    [
      'a part that an import does not have',
      ['uses: { g: gas }', 'exchange: { enhancement: g.exchange }'],
      ['unknown-name 5:26'],
    ],
    [
      'an energy called with too few coordinates',
      ['uses: { g: gas }', 'correlation: { per-particle: g.correlation(rs) }'],
      ['wrong-arguments 5:30'],
    ],
    [
      'a parameter that an import does not have',
      ['uses: { g: { sheet: gas, parameters: { b: 1 } } }', 'correlation: { per-particle: g.correlation }'],
      ['unknown-name 4:40'],
    ],
    ['a whole part that an import does not have', ['uses: { g: gas }', 'exchange: { from: g }'], ['unknown-name 5:19']],
    ['an alias that is not declared', ['correlation: { per-particle: g.correlation }'], ['missing-import 4:30']],
  ])('%s', (_name, lines, expected) => expect(problems(sheet('gga', ...lines), { gas })).toEqual(expected));

  test('an imported sheet above the rung', () => {
    expect(problems(sheet('lda', 'uses: { x: gga }', 'exchange: { per-particle: x.exchange }'), { gga })).toEqual([
      'above-rung 5:27',
    ]);
  });

  test('a circle of imports', () => {
    const text = sheet('lda', 'uses: { b: b }', 'correlation: { per-particle: b.correlation }');
    const b = sheet('lda', 'uses: { a: test }', 'correlation: { per-particle: a.correlation }');
    expect(problems(text, { b })).toEqual(['cyclic-import 4:9']);
  });

  test('all problems of a sheet at once, syntax and names together', () => {
    const text = sheet(
      'gga',
      'parameters: { a: 1 }',
      'where:',
      '  u: 2x',
      '  v: foo',
      'exchange: { enhancement: u*v*alpha }',
    );
    expect(problems(text)).toEqual(['expression-form 6:6', 'unknown-name 7:6', 'above-rung 8:30']);
  });

  test('functions that double at every level are refused before they are built', () => {
    const levels = Array.from(
      { length: 40 },
      (_, k) => `  f${k}(x): ${k === 0 ? 'x' : `f${k - 1}(x) + f${k - 1}(2*x)`}`,
    );
    const text = sheet('gga', 'functions:', ...levels, 'exchange: { enhancement: f39(s) }');
    expect(problems(text).every((problem) => problem.startsWith('expression-size'))).toBe(true);
    expect(problems(text).length).toBeGreaterThan(0);
  });
});
