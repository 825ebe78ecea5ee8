import { describe, expect, it } from 'vitest';
import type { Condition } from '../../src/constraint/condition.ts';
import { customDomain } from '../../src/constraint/domain.ts';
import { rational } from '../../src/number/rational.ts';
import { claimFields } from '../../src/proof/certificate.ts';
import type { Claim, ClaimSettings } from '../../src/proof/claim.ts';
import { provableClaim } from '../../src/proof/prove.ts';
import { claimIdentity, formsHash, searchStateOf, stateDifference } from '../../src/proof/search-state.ts';
import { conditionOf, functionalOf, standardSettings } from '../constraint/catalogue.ts';

function claimed(
  functional = 'pw92',
  constraint = 'correlation-non-positive',
  settings: ClaimSettings = standardSettings,
  tolerance?: number,
) {
  const read = conditionOf(constraint) as Condition;
  const definition = { ...read.definition, tolerance: tolerance ?? read.definition.tolerance };
  const condition = { ...read, definition };
  const claim = provableClaim(condition, functionalOf(functional), settings) as Claim;
  return { claim, fields: claimFields(condition, functionalOf(functional), settings, claim) };
}

describe('the state of a search', () => {
  const { claim, fields } = claimed();
  const state = searchStateOf(fields, claim, '10.', '0.0.0');

  it('is of the claim it was made for, read again', () => {
    const again = claimed();
    expect(stateDifference(state, again.fields, again.claim)).toBeUndefined();
    expect(claimIdentity(again.fields, again.claim)).toBe(claimIdentity(fields, claim));
  });

  it.each([
    ['another functional (pw92)', claimed('vwn5')],
    ['another condition (correlation-non-positive)', claimed('pw92', 'correlation-coordinate-scaling')],
    ['another tolerance (1e-9)', claimed('pw92', 'correlation-non-positive', standardSettings, 1e-6)],
    [
      'another domain',
      claimed('pw92', 'correlation-non-positive', {
        ...standardSettings,
        domain: customDomain(new Map([['rs', [0.1, 100]]])),
      }),
    ],
    [
      'other values of constants',
      claimed('pw92', 'correlation-non-positive', {
        ...standardSettings,
        constants: new Map([...standardSettings.constants, ['lieb-oxford', rational(2)]]),
      }),
    ],
  ])('says when it is of %s', (words, other) => {
    expect(stateDifference(state, other.fields, other.claim)).toBe(words);
  });

  it('says when the sheet or the formulas are others', () => {
    expect(stateDifference(state, { ...fields, functionalHash: 'other' }, claim)).toContain('text of the sheet');
    const [form = 0] = claim.forms;
    const changed = { ...claim, forms: [form - 1] };
    expect(formsHash(changed)).not.toBe(formsHash(claim));
    expect(stateDifference(state, fields, changed)).toBe('other formulas for the same margin');
  });
});
