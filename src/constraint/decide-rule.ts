import type { Finding } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import { rules } from '../quality/rules.ts';
import type { RuleCondition } from './constraint.ts';
import { heading, type Settings } from './decide.ts';
import { gateOf, isRealistic } from './gate.ts';

/** Coordinates of a witness that a rule does not name. */
const neutral = { rs: 1, zeta: 0, s: 0, alpha: 1 };

/** Asks a rule of numerical quality about a functional. */
export function decideRule(condition: RuleCondition, functional: Functional, settings: Settings): Finding {
  const { definition, rule } = condition;
  const { parameters } = settings;
  const answer = rules[rule]({ functional, parameters, threshold: definition.tolerance });
  const { verdict, reason, margin, witness, points, mildBecause } = answer;
  const judged = gateOf(definition, functional, verdict, witness !== null && isRealistic(witness));
  // A rule knows of places that are within the realistic box and yet matter to no density.
  const isMild = judged.gate === 'fail' && mildBecause !== undefined;
  return {
    ...heading(condition, functional, settings),
    verdict,
    gate: isMild ? 'warn' : judged.gate,
    gateReason: isMild ? `a rule of numerical quality, broken ${mildBecause}` : judged.reason,
    margin: margin === null || !Number.isFinite(margin) ? null : margin,
    confirmed: null,
    confirmedDigits: 0,
    witness: witness === null ? null : { ...neutral, ...witness },
    irrelevant: witness === null ? [] : Object.keys(neutral).filter((name) => !(name in witness)),
    violatedShare: null,
    regions: [],
    moreRegions: 0,
    through: [],
    cause: null,
    points,
    withoutValue: 0,
    domain: { name: settings.domain.name, space: 'slice', coordinates: [], fixed: {} },
    rule: true,
    reason,
  };
}
