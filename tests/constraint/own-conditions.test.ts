import { describe, expect, test } from 'vitest';
import { findingOf, madeCondition, settled } from './made.ts';

const sheet = (rest: string) => `title: own
statement: own
force: sufficient
status: norm
sources: [own]
part: exchange
rungs: [gga]
tolerance: 1e-9
${rest}`;

describe('a condition in a file of the user', () => {
  test('with a sweep is asked at every combination of its lists', () => {
    const condition = settled(
      madeCondition(
        sheet('at: { alpha: 1 }\nsweep: { s: [0.1, 1, 3], zeta: [0, 1], rs: [1] }\nrequirement: Fx <= 1.804'),
      ),
    );
    const finding = findingOf('pbe', condition);
    expect(finding).toMatchObject({ verdict: 'violated', points: 6 });
    // F_x at s = 3 of the half-filled form: 2^(1/3)(1 + κ − κ/(1 + μ s²/(2^(2/3) κ)))
    const mu = 0.2195149727645171;
    const expected = 1.804 - 2 ** (1 / 3) * (1.804 - 0.804 / (1 + (mu * 9) / (2 ** (2 / 3) * 0.804)));
    expect(finding.margin).toBeCloseTo(expected, 12);
    expect(finding.witness).toMatchObject({ s: 3, zeta: 1 });
  });

  test('with a table has the names of its columns', () => {
    const condition = settled(
      madeCondition(
        sheet(
          'at: { zeta: 0, alpha: 1, rs: 1 }\ntable:\n  columns: [s, value, error]\n  rows:\n    - [0, 1, 0.001]\n    - [1, 1 + 1/6, 0.01]\nrequirement: abs(Fx - value) <= error',
        ),
      ),
    );
    // F_x(1) of PBE is 1.17245, 0.0058 from 7/6
    expect(findingOf('pbe', condition)).toMatchObject({ verdict: 'holds', points: 2 });
    expect(findingOf('revpbe', condition).verdict).toBe('violated');
  });

  test('with a value at another place compares the two', () => {
    const condition = settled(
      madeCondition(
        sheet('at: { alpha: 1, rs: 1 }\nsweep: { zeta: [1], s: [0] }\nrequirement: Fx == 2^(1/3)*at(Fx, zeta, 0)'),
      ),
    );
    expect(findingOf('pbe', condition).verdict).toBe('holds');
  });
});

describe('a faulty condition is answered with the place of the fault', () => {
  const full = 'at: { rs: 1, zeta: 0, alpha: 1, s: 0 }\n';
  test.each([
    [`${full}requirement: limit(Fx, x, inf) <= 2`, 'wrong-arguments', 10, 14, 'goes along a coordinate'],
    [`${full}requirement: limit(Fx, s, Fx) <= 2`, 'wrong-arguments', 10, 14, 'goes to inf or to a number'],
    [`${full}requirement: limit(Fx, s) <= 2`, 'wrong-arguments', 10, 14, 'takes 3 arguments'],
    [`${full}requirement: 2*lim(Fx, s, inf) <= 2`, 'unknown-name', 10, 16, 'unknown function lim'],
    [`${full}requirement: coefficient(Fx, p, 1/2) <= 2`, 'wrong-arguments', 10, 14, 'whole number'],
    [
      `at: { rs: 1, zeta: 0, alpha: 1, s: 1 }\nrequirement: coefficient(Fx, p, 1) == 0`,
      'wrong-arguments',
      10,
      14,
      'needs the point',
    ],
    [`at: { zeta: 0, alpha: 1 }\nrequirement: limit(Fx, s, inf) <= 2`, 'missing-key', 10, 14, 'rs has no value'],
    [`${full}sweep: { s: [0, 1] }\nrequirement: Fx <= 2`, 'duplicate-key', 10, 10, 's is given twice'],
    [
      `at: { rs: 1, zeta: 0, alpha: 1 }\nsweep: { s: [0, one] }\nrequirement: Fx <= 2`,
      'unknown-name',
      10,
      17,
      'unknown name one',
    ],
    [
      `at: { rs: 1, zeta: 0, alpha: 1 }\nsweep: { s: 1 }\nrequirement: Fx <= 2`,
      'wrong-value',
      10,
      13,
      'a list of values',
    ],
    [
      `${full}table: { columns: [value], rows: [[1, 2]] }\nrequirement: Fx <= value`,
      'wrong-value',
      10,
      35,
      '2 values for 1 columns',
    ],
    [
      `${full}table: { columns: [phi], rows: [[1]] }\nrequirement: Fx <= phi`,
      'reserved-name',
      10,
      20,
      'means something else',
    ],
    [`${full}requirement: d(Fx, t) <= 2`, 'wrong-arguments', 10, 14, 'differentiates by a coordinate'],
    [`${full}requirement: at(Fx, n, 0) <= 2`, 'wrong-arguments', 10, 14, 'gives a coordinate another value'],
  ])('%s', (rest, code, line, column, words) => {
    const outcome = madeCondition(sheet(rest));
    expect(outcome.ok).toBe(false);
    if (outcome.ok) return;
    const [problem] = outcome.problems;
    expect(problem).toMatchObject({ code, line, column, file: 'own.yaml' });
    expect(problem?.message).toContain(words);
    expect(problem?.remedy).not.toBe('');
  });
});
