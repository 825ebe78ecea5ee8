import { describe, expect, test } from 'vitest';
import { evaluatePoints } from '../../src/evaluate/points.ts';
import type { MapPanel } from '../../src/finding/margin-map.ts';
import { mapMargins } from '../../src/map/margin-map.ts';
import { conditionOf, functionalOf } from '../constraint/catalogue.ts';
import { condition, invented, request, value } from './invented.ts';

const first = (panels: readonly MapPanel[]) => panels[0] as MapPanel;

describe('a map of F_x = 5 − s² − α² against F_x ≥ 1, by hand: margin 4 − s² − α²', () => {
  const map = value(mapMargins(request(invented('5 - s^2 - alpha^2'), condition('Fx >= 1'))));
  const panel = first(map.panels);

  test('its axes are the coordinates that matter', () => expect([map.x.name, map.y.name]).toEqual(['s', 'alpha']));

  test('every cell is the closed form', () => {
    const expected = map.y.values.flatMap((alpha) => map.x.values.map((s) => 4 - s * s - alpha * alpha));
    for (const [cell, margin] of panel.margins.entries()) expect(margin).toBeCloseTo(expected[cell] as number, 10);
  });

  test('the violated region ends on the circle of radius 2, to a hundredth of a cell of 0.1', () => {
    const inside = panel.region.flat().filter(([s, alpha]) => s > 0 && alpha > 0 && s < 5 && alpha < 5);
    expect(inside.length).toBeGreaterThan(50);
    for (const [s, alpha] of inside) expect(Math.abs(Math.hypot(s, alpha) - 2)).toBeLessThan(1e-3);
  });

  test('the lowest point is the far corner, with −46 (by hand)', () => {
    expect(panel.lowest).toEqual({ margin: -46, point: { s: 5, alpha: 5 } });
  });

  test('it is plain data: written as JSON and read back it is the same (law)', () => {
    expect(JSON.parse(JSON.stringify(map))).toEqual(map);
  });
});

describe('coordinates that are not shown', () => {
  const functional = invented('5 - s^2 - (alpha - 2)^2');

  test('are at their worst: over s and r_s the margin is 4 − s² − 9, at α = 5 (by hand)', () => {
    const map = value(mapMargins(request(functional, condition('Fx >= 1'), { x: 's', y: 'rs' })));
    const panel = first(map.panels);
    expect(panel.worstOver).toMatchObject([{ name: 'alpha', lower: 0, upper: 5 }]);
    expect(panel.margins[50]).toBeCloseTo(4 - 25 - 9, 10);
    expect(new Set(panel.worstAt.alpha)).toEqual(new Set([5]));
  });

  test('or fixed, one panel for each slice', () => {
    const slices = [new Map([['alpha', 2] as const]), new Map([['alpha', 0] as const])];
    const map = value(mapMargins(request(functional, condition('Fx >= 1'), { x: 's', y: 'rs', slices })));
    expect(map.panels.map(({ fixed, margins }) => [fixed.alpha, margins[50]])).toEqual([
      [2, expect.closeTo(-21, 10)],
      [0, expect.closeTo(-25, 10)],
    ]);
  });
});

test('a margin that is zero on one side has no stairs: F_x = 1 for s < 2.013 (by hand the region ends there)', () => {
  const functional = invented('"s < 2.013 ? 1 : 1 - (s - 2.013)"');
  const panel = first(value(mapMargins(request(functional, condition('Fx >= 1')))).panels);
  const edge = Math.min(...panel.region.flat().map(([s]) => s));
  // A quarter of a cell of 0.1.
  expect(Math.abs(edge - 2.013)).toBeLessThan(0.025);
});

test('a place without a value is null and never counts as violated', () => {
  const functional = invented('1 + sqrt(s - 1)');
  const panel = first(value(mapMargins(request(functional, condition('Fx >= 1')))).panels);
  expect(panel.margins[0]).toBeNull();
  expect([panel.violatedCells, panel.region.length]).toEqual([0, 0]);
});

test('cells of PBE against the Lieb-Oxford bound equal C/A_x − F_xc of rungcheck at there', () => {
  const map = value(mapMargins({ ...request(functionalOf('pbe'), conditionOf('lieb-oxford') as never), cells: 11 }));
  const panel = first(map.panels);
  const cells = [0, 37, 120];
  const points = cells.map((cell) => ({
    s: String(map.x.values[cell % 11]),
    rs: String(map.y.values[Math.floor(cell / 11)]),
    zeta: String(panel.worstAt.zeta?.[cell]),
  }));
  const { columns, rows } = evaluatePoints(functionalOf('pbe'), { space: 'slice', points, derivatives: false });
  // 1.679/((3/4)(3/π)^(1/3)) = 2.27335: the bound at C = 1.679.
  const bound = 1.679 / (0.75 * (3 / Math.PI) ** (1 / 3));
  cells.forEach((cell, index) => {
    expect(panel.margins[cell]).toBeCloseTo(bound - (rows[index]?.[columns.indexOf('Fxc')] as number), 12);
  });
});

describe('the unit of a margin', () => {
  test.each([
    ['lieb-oxford', ''],
    ['correlation-coordinate-scaling', 'bohr^−1'],
    ['correlation-interaction-monotonic', ''],
  ])('%s: %j (dimensions of its requirement)', (id, unit) => {
    const map = value(mapMargins({ ...request(functionalOf('pbe'), conditionOf(id) as never), cells: 11 }));
    expect(map.condition.unit).toBe(unit);
  });
});

describe('a request that makes no map is told why', () => {
  const functional = invented('1');
  test.each([
    ['a spin-space condition', 'exchange-spin-scaling', {}, /not a condition on the slice/],
    ['a condition asked at points', 'correlation-gas-high-density', {}, /asked at given points/],
    ['a coordinate that the condition fixes', 'exchange-lieb-oxford', { x: 'zeta' as const }, /holds zeta fixed/],
    [
      'an axis that is fixed too',
      'lieb-oxford',
      { x: 's' as const, slices: [new Map([['s' as const, 1]])] },
      /is an axis/,
    ],
    ['one coordinate twice', 'lieb-oxford', { x: 's' as const, y: 's' as const }, /both axes are s/],
  ])('%s', (_, id, changes, message) => {
    const outcome = mapMargins(request(functionalOf('pbe'), conditionOf(id) as never, changes));
    expect(outcome.ok ? '' : outcome.problems.map((problem) => problem.message).join()).toMatch(message);
  });

  test('a functional without the part', () => {
    const outcome = mapMargins(request(functional, conditionOf('correlation-non-positive') as never));
    expect(outcome.ok).toBe(false);
  });
});
