import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parseDomain } from '../../src/cli/domain-option.ts';
import { parseAssignments, parseDigits, parseExact, parseIds } from '../../src/cli/options.ts';
import { standardDomain, wideDomain } from '../../src/constraint/domain.ts';
import { failure, type Outcome, success } from '../../src/errors/problem.ts';
import { rationalText } from '../../src/number/rational.ts';

function remedies(outcome: Outcome<unknown>): string[] {
  return outcome.ok ? [] : outcome.problems.map(({ message, remedy }) => `${message} | ${remedy}`);
}

const noFile = (path: string) =>
  failure([{ code: 'file-unreadable', file: path, message: 'cannot read the file', remedy: '' }]);

describe('values on the command line', () => {
  test.each([
    ['0.804', '201/250'],
    ['10/81', '10/81'],
    ['-1e-3', '-1/1000'],
    ['0.5/0.25', '2'],
  ])('%s is exactly %s', (text, exact) => {
    const value = parseExact(text);
    expect(value === undefined ? undefined : rationalText(value)).toBe(exact);
  });

  test.each(['', '1/0', '1/2/3', 'pi', 'inf', '1e', '0x10', '1 2'])('%j is no number', (text) => {
    expect(parseExact(text)).toBeUndefined();
  });

  test('assignments keep exact value and typed text, over commas and repetition', () => {
    const read = parseAssignments('--set', ['kappa=0.9, mu=10/81', 'b=1']);
    expect(read.ok && [...read.value].map(([name, { text, value }]) => [name, text, rationalText(value)])).toEqual([
      ['kappa', '0.9', '9/10'],
      ['mu', '10/81', '10/81'],
      ['b', '1', '1'],
    ]);
  });

  test('all faults of assignments are told at once, a misspelt name with its neighbour', () => {
    expect(
      remedies(parseAssignments('--constants', ['lieb-oxfrod=1,q,a=b,lieb-oxford=1,lieb-oxford=2'], ['lieb-oxford'])),
    ).toEqual([
      '--constants does not know lieb-oxfrod | Did you mean lieb-oxford?',
      '--constants does not understand q | Write name=number, as in --constants kappa=0.9.',
      '--constants does not understand a=b | Write name=number, as in --constants kappa=0.9.',
      '--constants gives lieb-oxford twice | Give it once.',
    ]);
  });

  test('ids are known, and none twice', () => {
    expect(parseIds('--only', ['a,b', 'a'], ['a', 'b', 'c'])).toEqual(success(['a', 'b']));
    expect(remedies(parseIds('--only', ['lieb'], ['lieb-x']))).toHaveLength(1);
    expect(remedies(parseIds('--only', [' ,'], ['a']))).toEqual([
      '--only names no condition | Give ids separated by commas.',
    ]);
  });

  test('digits are whole numbers from 1 to 100', () => {
    expect(['1', '50', '100'].map(parseDigits)).toEqual([success(1), success(50), success(100)]);
    expect(['0', '101', '1.5', '-3', 'x', '1e2'].every((text) => !parseDigits(text).ok)).toBe(true);
  });
});

describe('a domain on the command line', () => {
  test('standard and wide are the domains of those names', () => {
    expect(parseDomain('standard', noFile)).toEqual(success(standardDomain));
    expect(parseDomain('wide', noFile)).toEqual(success(wideDomain));
  });

  test('bounds change the coordinates named and leave the others as in standard', () => {
    const read = parseDomain('rs=0.1:10, s=0:2', noFile);
    expect(read.ok && [read.value.name, read.value.axes.rs.lower, read.value.axes.rs.upper]).toEqual([
      'custom',
      0.1,
      10,
    ]);
    expect(read.ok && [read.value.axes.s.upper, read.value.axes.alpha]).toEqual([2, standardDomain.axes.alpha]);
  });

  test('a file has bounds over several lines, with comments', () => {
    const file = '# our box\nrs = 0.1:10\n\ns=0:2, alpha = 0:1 # narrow\n';
    const read = parseDomain('box.txt', () => success(file));
    expect(read.ok && [read.value.axes.rs.upper, read.value.axes.s.upper, read.value.axes.alpha.upper]).toEqual([
      10, 2, 1,
    ]);
  });

  test('faults of a file have their line', () => {
    const read = parseDomain('box.txt', () => success('rs=1:2\nbeta=0:1\ns=2:1'));
    expect(read.ok ? [] : read.problems.map(({ file, line }) => [file, line])).toEqual([
      ['box.txt', 2],
      ['box.txt', 3],
    ]);
  });

  test.each([
    'rs=0:1',
    'rs=-1:1',
    'zeta=0:2',
    's=-1:1',
    's=2:1',
    's=0:inf',
    's=nan:1',
    's=0',
    's=0:1:2',
    's=0:1,s=0:2',
    'zet=0:1',
    's=',
    '',
    'standrad',
    'nowhere.txt',
  ])('%j is refused', (text) => {
    expect(parseDomain(text, noFile).ok).toBe(false);
  });

  test('a misspelt name is guessed', () => {
    expect(remedies(parseDomain('standrad', noFile))[0]).toContain('Did you mean standard?');
  });

  test('any text gives a domain or problems, and never throws (seed 11)', () => {
    const alphabet = fc.constantFrom(...'rszeta=:,.0123e-#\n '.split(''));
    fc.assert(
      fc.property(fc.string({ unit: alphabet, maxLength: 30 }), (text) => {
        const read = parseDomain(text, (path) => success(path));
        return read.ok ? read.value.axes.rs.lower > 0 : read.problems.length > 0;
      }),
      { seed: 11, numRuns: 500 },
    );
  });
});
