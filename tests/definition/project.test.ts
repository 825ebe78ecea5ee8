import { describe, expect, test } from 'vitest';
import { projectFileSchema } from '../../src/definition/json-schema.ts';
import { parseProjectFile } from '../../src/definition/project.ts';

const whole = `
sheets: [functionals/, ./mine.yaml, pbe]
constraints: [conditions]
except: [no-wiggles]
domain: { rs: [0.02, 10], s: [0, 3] }
constants: { lieb-oxford: 1.6358 }
tolerances: { correlation-uniform-gas: 0.03 }
compare: { margin: 1e-4, share: 0.01 }
accept:
  - constraint: lieb-oxford
    functional: mine
    reason: known since 2024
    margin: -0.02
    region: { s: [3.5, 5], zeta: [0.9, 1] }
    review: 2027-06-01
  - { constraint: two-electron-bound, functional: pbe, reason: a GGA }
`;

function faults(text: string): string[] {
  const read = parseProjectFile(text, 'rungcheck.yaml');
  return read.ok ? [] : read.problems.map(({ line, column, message }) => `${line}:${column} ${message}`);
}

describe('a project file', () => {
  test('says what is vetted, how, and what is accepted', () => {
    const read = parseProjectFile(whole, 'rungcheck.yaml');
    if (!read.ok) throw new Error(read.problems[0]?.message);
    const { sheets, except, domain, constants, tolerances, compare, accept } = read.value;
    expect(sheets.map(({ text }) => text)).toEqual(['functionals/', './mine.yaml', 'pbe']);
    expect(except.map(({ text }) => text)).toEqual(['no-wiggles']);
    expect(domain?.text).toBe('rs=0.02:10,s=0:3');
    expect(constants.map(({ name, text }) => `${name}=${text}`)).toEqual(['lieb-oxford=1.6358']);
    expect(tolerances.map(({ name, text }) => `${name}=${text}`)).toEqual(['correlation-uniform-gas=0.03']);
    expect(compare).toEqual({ margin: 1e-4, share: 0.01 });
    expect(accept[0]).toEqual({
      constraint: 'lieb-oxford',
      functional: 'mine',
      reason: 'known since 2024',
      margin: -0.02,
      region: new Map([
        ['s', [3.5, 5]],
        ['zeta', [0.9, 1]],
      ]),
      review: '2027-06-01',
      place: { file: 'rungcheck.yaml', line: 10, column: 5 },
    });
    expect(accept[1]?.place.line).toBe(16);
  });

  test('a plain domain is kept as it is', () => {
    const read = parseProjectFile('sheets: [pbe]\ndomain: wide\n', 'p.yaml');
    expect(read.ok && read.value.domain?.text).toBe('wide');
  });

  test.each([
    ['', ['1:1 the sheet is empty']],
    ['sheets: []', ['1:9 sheets must be a list with at least one sheet, not a list']],
    ['sheet: [pbe]', ['1:1 the sheet has no sheets', '1:1 unknown key sheet']],
    ['sheets: [pbe]\nonly: [a]\nexcept: [b]', ['2:1 the file has both only and except']],
    ['sheets: [pbe]\naccept:\n  - { constraint: a, functional: b }', ['3:5 accept item 1 has no reason']],
    [
      'sheets: [pbe]\naccept:\n  - { constraint: a, functional: b, reason: c, review: soon }',
      ['3:56 accept item 1.review must be a date: year-month-day, not "soon"'],
    ],
    [
      'sheets: [pbe]\nconstants: { a: pi }',
      ['2:17 constants.a must be a decimal number, or a quotient of two, not "pi"'],
    ],
    ['sheets: [pbe]\ndomain: { rs: [1] }', ['2:15 domain.rs must be two numbers: [lower, upper], not a list']],
  ])('%j', (text, messages) => {
    expect(faults(text)).toEqual(messages);
  });

  test('has a JSON Schema that knows every key', () => {
    const { properties } = projectFileSchema() as { properties: Record<string, unknown> };
    expect(Object.keys(properties)).toEqual([
      'sheets',
      'constraints',
      'only',
      'except',
      'domain',
      'constants',
      'tolerances',
      'compare',
      'accept',
    ]);
  });
});
