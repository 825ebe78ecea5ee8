import { describe, expect, test } from 'vitest';
import type { EvaluateBlock } from '../../src/search/block.ts';
import { layCells, neighbourSteps } from '../../src/search/cells.ts';
import { gridOf } from '../../src/search/grid.ts';
import { type ScanOutput, scanGrid } from '../../src/search/scan.ts';
import { axisOf, cubeGrids, distanceTo, scanOf } from './boxes.ts';

describe('shares of known volume', () => {
  test('a ball of radius 0.4 in the unit cube has the share 4π/3·0.4³', () => {
    const { violatedShare } = scanOf((x) => distanceTo(x, [0.5, 0.5, 0.5]) - 0.4, cubeGrids(3, 81));
    expect(violatedShare).toBeCloseTo(((4 * Math.PI) / 3) * 0.4 ** 3, 3);
  });

  test('x > 10 on a logarithmic axis 0.01…100 has the share 1/4', () => {
    const grid = gridOf(axisOf('rs', 0.01, 100, 'logarithmic'), 4001);
    expect(scanOf((x) => 10 - (x[0] as number), [grid]).violatedShare).toBeCloseTo(0.25, 3);
  });

  test('ζ > 0.9 on an axis that closes up towards 1 has the share 1/10 of plain ζ', () => {
    const grid = gridOf(axisOf('zeta', 0, 1, 'toward-upper'), 2001);
    expect(scanOf((x) => 0.9 - (x[0] as number), [grid]).violatedShare).toBeCloseTo(0.1, 3);
  });

  test('α > 3 on a compact axis to infinity has the share 1/4 of α/(1 + α)', () => {
    const grid = gridOf(axisOf('alpha', 0, Infinity, 'compact'), 2001);
    const scan = scanOf((x) => 3 - (x[0] as number), [grid]);
    expect(scan.violatedShare).toBeCloseTo(0.25, 3);
    // 3 − Infinity is no value.
    expect(scan.withoutValue).toBe(1);
    expect(scan.firstWithoutValue).toEqual(Float64Array.of(Infinity));
  });

  test('a value of exactly −tolerance is not violated', () => {
    expect(scanOf(() => -1e-9, cubeGrids(2, 5), 1e-9).violatedPoints).toBe(0);
    expect(scanOf(() => -1.0001e-9, cubeGrids(2, 5), 1e-9).violatedShare).toBe(1);
  });
});

describe('points without a value', () => {
  const withGap = (x: Float64Array) => ((x[0] as number) < 0.5 ? Number.NaN : (x[1] as number) - 0.5);

  test('are counted, and left out of shares', () => {
    const scan = scanOf(withGap, cubeGrids(2, 101));
    // 50 of 101 columns; of the rest (50.5 steps wide) the lower half is violated up to 0.49 + half a step.
    expect(scan.withoutValue).toBe(50 * 101);
    expect([...(scan.firstWithoutValue as Float64Array)]).toEqual([0, 0]);
    expect(scan.violatedShare).toBeCloseTo(0.495, 12);
    expect(scan.minimum?.value).toBe(-0.5);
  });

  test('alone leave no minimum, no share and no candidates', () => {
    const scan = scanOf(() => Number.NaN, cubeGrids(2, 7));
    expect([scan.withoutValue, scan.violatedShare, scan.minimum, scan.candidates.length]).toEqual([
      49,
      0,
      undefined,
      0,
    ]);
  });
});

describe('several outputs in one pass', () => {
  test('each is reduced with its own tolerance', () => {
    const evaluate: EvaluateBlock = ([xs], [first, second]) => {
      for (const [index, x] of (xs as Float64Array).entries()) {
        (first as Float64Array)[index] = x - 0.5;
        (second as Float64Array)[index] = 0.5 - x;
      }
    };
    const { outputs } = scanGrid(evaluate, cubeGrids(1, 1001), { tolerances: [0.25, 0] });
    expect(outputs.map(({ violatedShare }) => violatedShare)).toEqual([
      expect.closeTo(0.25, 2),
      expect.closeTo(0.5, 2),
    ]);
    expect(outputs.map(({ minimum }) => minimum?.place[0])).toEqual([0, 1]);
  });
});

describe('bounds', () => {
  test('10^7 points pass through one block of buffers and a bounded map', () => {
    let largest = 0;
    const evaluate: EvaluateBlock = (slices, [out]) => {
      largest = Math.max(largest, (out as Float64Array).length, ...slices.map(({ length }) => length));
      (out as Float64Array).fill(1);
      (out as Float64Array)[0] = -1;
    };
    const before = process.memoryUsage().arrayBuffers;
    const scan = scanGrid(evaluate, cubeGrids(3, 216), { tolerances: [0] });
    const grown = process.memoryUsage().arrayBuffers - before;
    expect(scan.points).toBe(216 ** 3);
    expect(scan.blocks).toBe(216);
    expect(largest).toBe(216 * 216);
    // 20 bytes for each of at most 2^17 cells, and the buffer: far below the 80 MB of the values.
    expect(grown).toBeLessThan(8e6);
    expect((scan.outputs[0] as ScanOutput).tally.layout.total).toBeLessThanOrEqual(2 ** 17);
  });

  test('a budget ends the scan between blocks and says so', () => {
    const evaluate: EvaluateBlock = (_slices, [out]) => (out as Float64Array).fill(1);
    const scan = scanGrid(evaluate, cubeGrids(3, 20), { tolerances: [0], budget: 1000, blockPoints: 400 });
    expect([scan.stop, scan.points]).toEqual(['budget', 800]);
  });
});

describe('candidates', () => {
  test('of Himmelblau on a grid are the neighbourhoods of its four minima first', () => {
    const himmelblau = ([x, y]: Float64Array) =>
      ((x as number) ** 2 + (y as number) - 11) ** 2 + ((x as number) + (y as number) ** 2 - 7) ** 2;
    const { candidates } = scanOf(himmelblau, cubeGrids(2, 61, -5, 5));
    for (const centre of himmelblauMinima) {
      expect(candidates.some(({ place }) => distanceTo(place, centre) < 0.2)).toBe(true);
    }
    expect(candidates.length).toBeLessThanOrEqual(64);
  });

  test('of a constant begin with one place, not one for every cell', () => {
    expect(scanOf(() => 0, cubeGrids(2, 30)).candidates.length).toBeLessThanOrEqual(17);
  });

  // D. M. Himmelblau, Applied Nonlinear Programming (1972): the four zeros.
  const himmelblauMinima = [
    [3, 2],
    [-2.805118, 3.131312],
    [-3.77931, -3.283186],
    [3.584428, -1.848126],
  ];
});

describe('cells', () => {
  test('are the grid where it fits, and coarser on the longest axis first', () => {
    expect(layCells([5, 7], 100).counts).toEqual([5, 7]);
    expect(layCells([5, 100], 100).counts).toEqual([5, 13]);
    expect([...(layCells([4], 2).starts[0] as Int32Array)]).toEqual([0, 2, 4]);
  });

  test('have 2d faces, 2d(d − 1) edges and 3^d − 1 neighbours in all', () => {
    expect([1, 2, 4].map((reach) => neighbourSteps(4, reach).length)).toEqual([8, 8 + 24, 80]);
  });
});
