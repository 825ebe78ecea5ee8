import { describe, expect, test } from 'vitest';
import { textWidth } from '../../src/report/layout.ts';
import { type PointsReport, pointsCsv, pointsJson, pointsText } from '../../src/report/points.ts';

const report: PointsReport = {
  functional: 'inv-x',
  parameters: {},
  inputColumns: ['zeta', 'rs'],
  inputs: [
    { zeta: '0', rs: '1.50' },
    { zeta: '1', rs: '2' },
  ],
  columns: ['eps_x', 'eps_c', 'Fx', 'dFx_drs'],
  rows: [
    [-0.1 - 0.2, null, 1.25, 0],
    [null, null, 1e-7, -0],
  ],
  absent: ['eps_c'],
  notes: ['point 2 without a finite value in some column'],
};

describe('values at points as text', () => {
  test('csv has the input columns first, as given, and full digits; no value is an empty cell', () => {
    expect(pointsCsv(report)).toBe(
      'zeta,rs,eps_x,eps_c,Fx,dFx_drs\n0,1.50,-0.30000000000000004,,1.25,0\n1,2,,,1e-7,-0\n',
    );
  });

  test('json has null for no value, and a note only where a value is missing that should be there', () => {
    expect(JSON.parse(pointsJson(report))).toEqual({
      functional: 'inv-x',
      points: [
        { zeta: 0, rs: 1.5, eps_x: -0.30000000000000004, eps_c: null, Fx: 1.25, dFx_drs: 0 },
        { zeta: 1, rs: 2, eps_x: null, eps_c: null, Fx: 1e-7, dFx_drs: 0, note: 'no value: eps_x' },
      ],
      notes: ['point 2 without a finite value in some column'],
    });
  });

  test('json keeps decimal text, of answers and of inputs, when digits were asked for', () => {
    const exact = {
      ...report,
      rows: [
        ['-0.30000000000000000000', null, '1.25', '0'],
        [null, null, '1e-7', '0'],
      ],
    };
    const [first] = (JSON.parse(pointsJson(exact)) as { points: unknown[] }).points;
    expect(first).toMatchObject({ rs: '1.50', eps_x: '-0.30000000000000000000', Fx: '1.25' });
  });

  test('trial parameters are marked in text and json', () => {
    const trial = { ...report, parameters: { kappa: '0.9' } };
    expect(pointsText(trial, { width: 100, colour: false })).toContain('TRIAL, not the sheet as written: kappa = 0.9');
    expect(JSON.parse(pointsJson(trial))).toMatchObject({ parameters: { kappa: '0.9' } });
  });

  test('one point is a list in the symbols of the field, without the part that is absent', () => {
    const one = { ...report, inputs: report.inputs.slice(0, 1), rows: report.rows.slice(0, 1), notes: [] };
    expect(pointsText(one, { width: 100, colour: false }).split('\n').slice(0, 6)).toEqual([
      'inv-x',
      'ζ = 0, r_s = 1.50',
      '',
      '  ε_x        -0.30000000000000004',
      '  F_x         1.25',
      '  ∂F_x/∂r_s   0',
    ]);
  });

  test('several points are cut into tables that fit, each with the number of the point', () => {
    const text = pointsText(report, { width: 40, colour: false });
    expect(text.split('\n').every((line) => textWidth(line) <= 40)).toBe(true);
    expect(text.split('\n').filter((line) => line.startsWith('point  ')).length).toBe(2);
  });
});
