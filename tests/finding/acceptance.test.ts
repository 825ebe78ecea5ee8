import { describe, expect, test } from 'vitest';
import { type Acceptance, applyAcceptances, strayAcceptances } from '../../src/finding/acceptance.ts';
import type { Finding } from '../../src/finding/finding.ts';
import { failing, functional, holding } from '../report/made-up.ts';

const place = { file: 'rungcheck.yaml', line: 7, column: 5 };
const today = '2026-05-01';
const bounds = [{ coordinate: 's', lower: 2, upper: 3, whole: false }];
const known: Finding = {
  ...failing,
  moreRegions: 0,
  regions: [{ share: 0.1, bounds, words: '2 ≤ s ≤ 3' }],
  margin: -0.02,
};

function apply(acceptance: Partial<Acceptance>, finding: Finding = known) {
  const whole: Acceptance = {
    constraint: finding.constraint,
    functional: functional.id,
    reason: 'a form of 1996',
    place,
    ...acceptance,
  };
  const { functionals, remarks } = applyAcceptances([{ ...functional, findings: [finding] }], [whole], today);
  const [found] = functionals[0]?.findings ?? [];
  return { gate: found?.gate, reason: found?.gateReason, remarks: remarks.map(({ kind, text }) => `${kind}: ${text}`) };
}

describe('an accepted violation', () => {
  test('counts as accepted, with the reason of the project', () => {
    expect(apply({})).toEqual({ gate: 'accepted', reason: 'accepted by the project: a form of 1996', remarks: [] });
  });

  test('of another functional or condition changes nothing', () => {
    expect(apply({ functional: 'other' })).toMatchObject({ gate: 'fail', remarks: [] });
    expect(apply({ constraint: 'other' })).toMatchObject({ gate: 'fail', remarks: [] });
  });

  test('down to a margin fails beyond it', () => {
    expect(apply({ margin: -0.02 }).gate).toBe('accepted');
    expect(apply({ margin: -0.0199 })).toMatchObject({
      gate: 'fail',
      remarks: [
        'acceptance-exceeded: the violation is larger than accepted: the margin is -0.02, accepted down to -0.0199',
      ],
    });
    expect(apply({ margin: -1 }, { ...known, margin: null }).gate).toBe('fail');
  });

  test('within a region fails outside it, and where small regions are not told', () => {
    const region = (lower: number, upper: number) => ({ region: new Map([['s', [lower, upper] as const]]) });
    expect(apply(region(2, 3)).gate).toBe('accepted');
    expect(apply(region(2.2, 3))).toMatchObject({ gate: 'fail' });
    expect(apply(region(2.2, 3)).remarks[0]).toContain('it reaches s = 2, accepted within 2.2 to 3');
    expect(apply(region(0, 5), { ...known, moreRegions: 1 }).gate).toBe('fail');
  });

  test('that no longer applies is reported', () => {
    const { gate, remarks } = apply({ constraint: holding.constraint }, holding);
    expect(gate).toBe('pass');
    expect(remarks[0]).toContain('acceptance-unused: the acceptance no longer applies: the verdict is holds');
  });

  test.each([
    ['2026-05-02', 0],
    ['2026-05-01', 1],
    ['2025-12-31', 1],
  ])('reviewed by %s is due on 2026-05-01: %i', (review, due) => {
    const { gate, remarks } = apply({ review });
    expect([gate, remarks.filter((text) => text.startsWith('review-due')).length]).toEqual(['accepted', due]);
  });

  test('of what is not vetted at all is stray', () => {
    const acceptance = { constraint: 'c', functional: 'f', reason: 'r', place };
    expect(strayAcceptances([acceptance], ['f'], ['c'])).toEqual([]);
    expect(strayAcceptances([acceptance], ['g'], ['c'])[0]?.text).toContain('f is not vetted');
    expect(strayAcceptances([acceptance], ['f'], ['d'])[0]?.text).toContain('c is not vetted');
  });
});
