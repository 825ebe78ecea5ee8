import { describe, expect, test } from 'vitest';
import { constantValues } from '../../src/constraint/constants.ts';
import { standardDomain } from '../../src/constraint/domain.ts';
import type { CurvePanel } from '../../src/finding/curves.ts';
import { type CurvesRequest, drawnCurves } from '../../src/map/curves.ts';
import { rational } from '../../src/number/rational.ts';
import { conditionOf, functionalOf } from '../constraint/catalogue.ts';
import { invented, value } from './invented.ts';

const ids = ['exchange-lieb-oxford', 'exchange-two-electron-bound', 'lieb-oxford', 'correlation-coordinate-scaling'];

const request = (changes: Partial<CurvesRequest>): CurvesRequest => ({
  functionals: [],
  quantities: ['Fx'],
  along: 's',
  domain: standardDomain,
  slices: [new Map()],
  conditions: ids.map((id) => conditionOf(id) as never),
  constants: constantValues(new Map()),
  points: 6,
  ...changes,
});
const panelOf = (changes: Partial<CurvesRequest>) => value(drawnCurves(request(changes))).panels[0] as CurvePanel;

test('the curve of F_x = 1 + κ s² for two values of κ is the closed form', () => {
  const functional = invented('1 + kappa*s^2', 'parameters: { kappa: 1 }');
  const functionals = [rational(1, 2), rational(3)].map((kappa) => ({
    functional,
    parameters: new Map([['kappa', kappa]]),
  }));
  const { curves } = panelOf({ functionals });
  expect(curves.map(({ values }) => values)).toEqual([
    [1, 1.5, 3, 5.5, 9, 13.5],
    [1, 4, 13, 28, 49, 76],
  ]);
  expect(curves.map(({ parameters }) => parameters.kappa)).toEqual(['0.5', '3']);
});

describe('bounds that speak of the quantity at the slice (values: the constraint sheets)', () => {
  const pbe = [{ functional: functionalOf('pbe'), parameters: new Map() }];
  const names = (panel: CurvePanel) =>
    panel.bounds.map(({ condition, value: level }) => [condition, Number(level.toFixed(3))]);

  test('F_x at ζ = 0: 1.804 and 1.174', () => {
    expect(names(panelOf({ functionals: pbe }))).toEqual([
      ['exchange-lieb-oxford', 1.804],
      ['exchange-two-electron-bound', 1.174],
    ]);
  });

  test('F_x at ζ = 1: none of them', () => {
    expect(panelOf({ functionals: pbe, slices: [new Map([['zeta', 1]])] }).bounds).toEqual([]);
  });

  test('F_xc: 2.273; ∂F_c/∂r_s: 0', () => {
    expect(names(panelOf({ functionals: pbe, quantities: ['Fxc'] }))).toEqual([['lieb-oxford', 2.273]]);
    expect(names(panelOf({ functionals: pbe, quantities: ['dFc_drs'] }))).toEqual([
      ['correlation-coordinate-scaling', 0],
    ]);
  });

  test('along ζ a condition at ζ = 0 draws no line', () => {
    expect(panelOf({ functionals: pbe, along: 'zeta' }).bounds).toEqual([]);
  });
});

test('a quantity that a functional does not have is a problem', () => {
  const outcome = drawnCurves(request({ functionals: [{ functional: functionalOf('lyp'), parameters: new Map() }] }));
  expect(outcome).toMatchObject({ ok: false, problems: [{ message: 'lyp has no Fx' }] });
});
