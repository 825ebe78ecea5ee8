import { describe, expect, test } from 'vitest';
import { compareStates, usualTolerances } from '../../src/finding/compare.ts';
import { type StateLine, stateOf } from '../../src/finding/state.ts';
import { comparisonText } from '../../src/report/compare-text.ts';
import { textWidth } from '../../src/report/layout.ts';
import { findingsOf, functional } from './made-up.ts';

const before = stateOf(findingsOf(functional));
const changed: Readonly<Record<string, Partial<StateLine>>> = {
  'invented-bound': { verdict: 'violated', gate: 'fail', margin: -0.2, share: 0.3 },
  'invented-scaling': { verdict: 'holds', gate: 'pass', margin: 0.001, share: 0 },
  'invented-spot': { share: 0.5 },
};
const after = {
  ...before,
  engineVersion: '9.0.0',
  findings: before.findings.map((line) => ({ ...line, ...changed[line.constraint] })),
};
const comparison = compareStates(before, after, usualTolerances);

describe('a comparison for a reader', () => {
  test('says other circumstances first, then what is worse, what is better, and how much is the same', () => {
    expect(comparisonText(comparison, { width: 120, colour: false }).split('\n')).toEqual([
      '! differs engine version: recorded 0.0.0, now 9.0.0',
      '▼ worse   invented-meta invented-bound: violated, margin -0.2 over 30 % (fails), recorded: holds',
      '▼ worse   invented-meta invented-spot: violated share 4.2 % → 50 %',
      '▲ better  invented-meta invented-scaling: no longer violated: holds, margin -0.00231477 → +0.001',
      '2 worse, 1 better, 2 the same (margins to 0.1 % or the tolerance of the condition, shares to 0.1 %).',
      '',
    ]);
  });

  test('keeps to the width', () => {
    const lines = comparisonText(comparison, { width: 60, colour: false }).split('\n');
    expect(lines.filter((line) => textWidth(line) > 60)).toEqual([]);
  });
});
