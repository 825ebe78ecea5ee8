import { describe, expect, test } from 'vitest';
import { readCondition } from '../../src/constraint/condition.ts';
import { vetFunctional } from '../../src/constraint/vet.ts';
import { findingSchema } from '../../src/finding/finding.ts';
import { conditionOf, functionalOf, shelf, standardSettings } from './catalogue.ts';

const findingOf = (functional: string, rule: string) => {
  const [finding] = vetFunctional(functionalOf(functional), [conditionOf(rule)], standardSettings).findings;
  return findingSchema.parse(finding);
};

describe('what a broken rule of numerical quality counts as', () => {
  test('inside the realistic box it fails: PZ81 jumps at r_s = 1', () => {
    expect(findingOf('pz81', 'smooth-joins')).toMatchObject({
      verdict: 'violated',
      gate: 'fail',
      witness: { rs: 1 },
      rule: true,
    });
  });

  test('where only an empty channel is concerned it is a warning: PBE at ζ = 1', () => {
    const { gate, gateReason } = findingOf('pbe', 'finite-everywhere');
    expect(gate).toBe('warn');
    expect(gateReason).toMatch(/spin channel is empty/);
  });

  test('a sheet with its own gate keeps it: SCAN wiggles, for a score', () => {
    expect(findingOf('scan', 'no-wiggles')).toMatchObject({ verdict: 'violated', gate: 'score' });
  });

  test('a rung that the sheet leaves out is not asked', () => {
    expect(findingOf('dirac', 'no-wiggles')).toMatchObject({ verdict: 'not-applicable', gate: 'pass' });
  });
});

test('a rule has no margin: what needs one says so', () => {
  const { definition } = conditionOf('digits-lost');
  const outcome = readCondition(definition, (id) => shelf.functional(id));
  expect(outcome.ok ? [] : outcome.problems.map(({ code }) => code)).toEqual(['unknown-constraint']);
});
