import { describe, expect, test } from 'vitest';
import { progressLine } from '../../src/cli/progress.ts';
import { exitStatus, faultOf, problemsText } from '../../src/cli/status.ts';
import { coloursIn, widthOf } from '../../src/cli/terminal.ts';
import { ProblemError } from '../../src/errors/problem.ts';

const screen = { isTTY: true, columns: 132 } as NodeJS.WriteStream;
const pipe = { isTTY: false } as NodeJS.WriteStream;

describe('what the program knows of its terminal', () => {
  test('the width is that of the screen, else COLUMNS, else 100', () => {
    expect(widthOf(screen, { COLUMNS: '80' })).toBe(132);
    expect(widthOf(pipe, { COLUMNS: '80' })).toBe(80);
    expect([undefined, '', 'x', '3', '-1'].map((COLUMNS) => widthOf(pipe, { COLUMNS }))).toEqual(Array(5).fill(100));
  });

  test.each([
    [screen, {}, true],
    [pipe, {}, false],
    [screen, { NO_COLOR: '1' }, false],
    [screen, { NO_COLOR: '' }, true],
    [pipe, { FORCE_COLOR: '1' }, true],
    [pipe, { FORCE_COLOR: '1', NO_COLOR: '1' }, false],
    [screen, { FORCE_COLOR: '0' }, false],
    [screen, { TERM: 'dumb' }, false],
  ])('colour: case %#', (stream, environment, colour) => {
    expect(coloursIn(stream, environment)).toBe(colour);
  });
});

describe('progress', () => {
  const watch = (watched: boolean, times: readonly number[]) => {
    let err = '';
    let now = 0;
    const writeErr = (text: string) => {
      err += text;
    };
    const line = progressLine({ watched, writeErr }, () => now);
    for (const time of times) {
      now = time;
      line.report('pbe', 500_000);
    }
    line.end();
    return err;
  };

  test('nothing is shown of a short run, nor to nobody', () => {
    expect(watch(true, [100, 500, 900])).toBe('');
    expect(watch(false, [100, 5000, 9000])).toBe('');
  });

  test('a long run tells the points so far, and the line is taken away at the end', () => {
    expect(watch(true, [500, 2000, 2050, 3000])).toBe(
      '\r\u001b[Kpbe: 1.0 million points looked at, 2 s\r\u001b[Kpbe: 2.0 million points looked at, 3 s\r\u001b[K',
    );
  });

  test('a note stands behind the count, and a small count in full', () => {
    const told: string[] = [];
    let now = 0;
    const line = progressLine({ watched: true, writeErr: (text) => told.push(text) }, () => now, 'boxes');
    now = 2000;
    line.report('pbe', 10_716, '42 % undecided');
    expect(told).toEqual(['\r\u001b[Kpbe: 10 716 boxes looked at, 42 % undecided, 2 s']);
  });
});

describe('faults', () => {
  const problem = { code: 'wrong-option', message: 'no', remedy: 'yes' } as const;

  test('a fault of the user is its problems and status 2; a fault of the program one line and status 70', () => {
    expect(faultOf(new ProblemError([problem]), false)).toEqual({
      text: 'no [wrong-option]\n    yes\n',
      status: exitStatus.faultyRequest,
    });
    const fault = faultOf(new TypeError('broken\nat line 2'), false);
    expect(fault.status).toBe(70);
    expect(fault.text).toMatch(/^internal fault: broken .*\n$/);
  });

  test('a trace is shown when it is asked for', () => {
    expect(faultOf(new TypeError('broken'), true).text).toContain('    at ');
  });

  test('of very many problems some are only counted', () => {
    expect(problemsText(Array(100).fill(problem))).toContain('… and 60 more problems');
  });
});
