import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { isInadmissible, limitProblems } from '../../src/cli/point-limits.ts';
import { parsePoints } from '../../src/cli/points-file.ts';

const known = ['rs', 'zeta', 's', 'alpha'];
const faults = (text: string) => {
  const read = parsePoints(text, 'p.csv', known);
  return read.ok ? [] : read.problems.map(({ line, column, message }) => `${line}:${column} ${message}`);
};

describe('a file of points', () => {
  test('is read in any order of columns, past blank lines, comments, spaces, quotes, CRLF and a byte order mark', () => {
    const text = '\uFEFF# ours\r\n s , rs,"zeta"\r\n\r\n0.5, 1e-3 ,"1"\r\n# more\r\n2,3,0\r\n';
    expect(parsePoints(text, 'p.csv', known)).toEqual({
      ok: true,
      value: {
        columns: ['s', 'rs', 'zeta'],
        points: [
          { s: '0.5', rs: '1e-3', zeta: '1' },
          { s: '2', rs: '3', zeta: '0' },
        ],
        lines: [4, 6],
      },
    });
  });

  test.each([
    ['', 'undefined:undefined there are no points'],
    ['# nothing\n\n', 'undefined:undefined there are no points'],
    ['rs,zeta\n', '1:1 there is a header and no points'],
    ['rs, zet\n1,2', '1:5 unknown column zet'],
    ['rs,rs\n1,2', '1:4 the column rs is there twice'],
    ['rs,\n1,2', '1:4 unknown column without a name'],
    ['rs;zeta\n1;2', '1:1 the columns are not separated by commas'],
    ['1,0,2\n', '1:1 the header has the number 1 in place of a name'],
    ['rs,zeta\n1,abc', '2:3 zeta is not a decimal number: abc'],
    ['rs,zeta\n1,', '2:3 zeta is empty'],
    ['rs,zeta\n\n1,  NaN', '3:5 zeta is not a decimal number: NaN'],
    ['rs,zeta\n1,inf', '2:3 zeta is not a decimal number: inf'],
    ['rs,zeta\n1,1D0', '2:3 zeta is not a decimal number: 1D0'],
    ['rs,zeta\n1,1e999', '2:3 zeta is not a decimal number: 1e999'],
    ['rs,zeta\n1,2,3', '2:1 the line has 3 cells, the header 2'],
    ['rs,zeta\n1', '2:1 the line has 1 cells, the header 2'],
  ])('%j has its fault at line and column', (text, fault) => {
    expect(faults(text)).toContain(fault);
  });

  test('a misspelt column is guessed', () => {
    const read = parsePoints('rs,zeta,alhpa\n1,0,1', 'p.csv', known);
    expect(read.ok ? '' : read.problems[0]?.remedy).toBe('Did you mean alpha?');
  });

  test('all faults are told, up to a bound', () => {
    expect(faults('rs,zeta\na,b\n1,c\n')).toHaveLength(3);
    expect(faults(`rs\n${'x\n'.repeat(100000)}`).length).toBeLessThan(100);
  });

  test('doubles written in their shortest form come back as they are (law, seed 3)', () => {
    const number = fc.double({ noNaN: true, noDefaultInfinity: true });
    fc.assert(
      fc.property(fc.array(fc.tuple(number, number), { minLength: 1, maxLength: 20 }), (pairs) => {
        const read = parsePoints(['rs,s', ...pairs.map((pair) => pair.join(','))].join('\n'), 'p.csv', known);
        if (!read.ok) return false;
        return read.value.points.every(
          ({ rs, s }, index) => Number(rs) === pairs[index]?.[0] && Number(s) === pairs[index]?.[1],
        );
      }),
      { seed: 3, numRuns: 200 },
    );
  });

  test('any text is points or problems, and never throws (seed 5)', () => {
    fc.assert(
      fc.property(fc.string({ unit: fc.constantFrom(...'rs,zeta"#\n\r1.e-;\t '.split('')), maxLength: 60 }), (text) => {
        const read = parsePoints(text, 'p.csv', known);
        return read.ok ? read.value.points.length > 0 : read.problems.length > 0;
      }),
      { seed: 5, numRuns: 1000 },
    );
  });
});

describe('limits of points', () => {
  test.each([
    [{ rs: '0' }, 1],
    [{ rs: '1', zeta: '-1.01', s: '-1', alpha: '-1e-9' }, 3],
    [{ rs: '1', zeta: '-1', s: '0', alpha: '0' }, 0],
    [{ n_up: '0', n_dn: '0' }, 1],
    [{ n_up: '0', n_dn: '1', sigma_ud: '-1' }, 0],
    [{ n_up: '-1', n_dn: '1', sigma_uu: '-1', tau_up: '-1' }, 3],
  ] as const)('%j has %i problems', (point, count) => {
    expect(limitProblems(point as Readonly<Record<string, string>>, {})).toHaveLength(count);
  });

  test('τ_σ = τ_Wσ is a density of one orbital, and a little less is none (design: τ_σ ≥ τ_Wσ)', () => {
    // τ_W = 0.01/(8·0.1) = 0.0125
    const orbital = {
      n_up: '0.1',
      n_dn: '0',
      sigma_uu: '0.01',
      sigma_ud: '0',
      sigma_dd: '0',
      tau_up: '0.0125',
      tau_dn: '0',
    };
    expect(isInadmissible(orbital)).toBe(false);
    expect(isInadmissible({ ...orbital, tau_up: '0.0124' })).toBe(true);
  });

  test('|∇n↑·∇n↓| is at most |∇n↑||∇n↓| (Cauchy-Schwarz)', () => {
    const point = { n_up: '1', n_dn: '1', sigma_uu: '4', sigma_dd: '1', sigma_ud: '-2' };
    expect(isInadmissible(point)).toBe(false);
    expect(isInadmissible({ ...point, sigma_ud: '-2.1' })).toBe(true);
    expect(isInadmissible({ rs: '1', zeta: '0', s: '1' })).toBe(false);
  });
});
