import { dirname, join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { describe, expect, test } from 'vitest';
import type { Condition } from '../../src/constraint/condition.ts';
import { decideClaim } from '../../src/proof/decide-claim.ts';
import { leavesOf } from '../../src/proof/leaves.ts';
import { provableClaim } from '../../src/proof/prove.ts';
import { makeRecheck, recheckWork } from '../../src/proof/recheck.ts';
import { recheckBoxes } from '../../src/run/recheck-threads.ts';
import { builtProgram } from '../ci/program.ts';
import { conditionOf, functionalOf, standardSettings } from '../constraint/catalogue.ts';

describe('boxes of a certificate shared by threads', () => {
  const condition = conditionOf('correlation-coordinate-scaling') as Condition;
  const claim = provableClaim(condition, functionalOf('pbe'), standardSettings);
  if (typeof claim === 'string') throw new Error(claim);
  const { tree } = decideClaim(claim, { budget: 300, keepTree: true });
  const leaves = leavesOf(claim.axes, tree.replaceAll('?', '.'));
  if (typeof leaves === 'string') throw new Error(leaves);
  const { boxes } = leaves;
  const width = 2 * claim.axes.length;
  const work = recheckWork(claim);
  // The whole domain, which needs thousands of boxes, in the place of two of them.
  const whole = claim.axes.flatMap(({ lower, upper }) => [lower, upper]);
  for (const place of [100, 120]) boxes.set(whole, place * width);

  test('the first that does not hold is the same for any number of threads', async () => {
    const first = makeRecheck(work)(boxes);
    expect(first).toBe(100);
    const script = pathToFileURL(join(dirname(builtProgram()), 'worker.js'));
    for (const jobs of [1, 2]) {
      let told = 0;
      const onBoxes = (count: number) => {
        told += count;
      };
      expect(await recheckBoxes(work, boxes, { script, jobs, onBoxes, fewBoxes: 0, blockSize: 8 })).toBe(first);
      expect(told).toBeGreaterThan(first);
      const sound = boxes.slice(0, first * width);
      expect(await recheckBoxes(work, sound, { script, jobs, onBoxes: () => {}, fewBoxes: 0, blockSize: 8 })).toBe(-1);
    }
  });
});
