import { describe, expect, test } from 'vitest';
import { vetFunctional } from '../../src/constraint/vet.ts';
import { conditionOf, functionalOf, shelf, standardSettings } from './catalogue.ts';

/** Conditions that no functional of the shelf breaks: forms made to break them are in limits.test.ts and seeded-faults.test.ts. */
const brokenOnlyByMadeForms = [
  'correlation-spin-symmetry',
  'exchange-spin-scaling',
  'exchange-non-positive',
  'exchange-alpha-bounded',
  'correlation-low-density-limit',
  'hybrid-bookkeeping',
  'range-separation-limits',
  // tests/quality has the forms; known-constants only reports.
  'digits-lost',
  'spin-paths-agree',
  'printed-digits',
  'known-constants',
];

describe('each condition says what the literature says of the functionals that its sheet names', () => {
  for (const id of shelf.constraintIds()) {
    const condition = conditionOf(id);
    const verdictOf = (functional: string) =>
      vetFunctional(functionalOf(functional), [condition], standardSettings).findings[0];

    test(`${id}: names functionals that hold it and functionals that break it`, () => {
      expect(condition.definition.holds.length).toBeGreaterThan(0);
      if (!brokenOnlyByMadeForms.includes(id)) expect(condition.definition.breaks.length).toBeGreaterThan(0);
    });

    test.each(condition.definition.holds)(`${id}: $id holds it`, (known) => {
      const finding = verdictOf(known.id);
      expect(finding?.verdict, finding?.reason).toBe('holds');
    });

    test.each(condition.definition.breaks)(`${id}: $id breaks it`, (known) => {
      const finding = verdictOf(known.id);
      expect(finding?.verdict, finding?.reason).toBe('violated');
      // A limit that is approached slowly has few digits, and one that does not exist has none.
      const isLimit = finding?.sequences !== undefined;
      if (condition.kind !== 'rule' && !isLimit) expect(finding?.confirmedDigits).toBeGreaterThanOrEqual(10);
    });
  }
});
