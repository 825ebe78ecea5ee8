import type { RuleName } from '../../src/definition/constraint.ts';
import type { Functional } from '../../src/functional/functional.ts';
import { parseDecimal, type Rational } from '../../src/number/rational.ts';
import type { RuleAnswer } from '../../src/quality/rule.ts';
import { rules } from '../../src/quality/rules.ts';
import { conditionOf, functionalOf } from '../constraint/catalogue.ts';
import { linked, sheet } from '../functional/sheets.ts';

/** What a rule says of a functional of the shelf (by id) or of a made one, with the threshold of its sheet. */
export function ask(rule: RuleName, functional: string | Functional, trial: Record<string, string> = {}): RuleAnswer {
  return rules[rule]({
    functional: typeof functional === 'string' ? functionalOf(functional) : functional,
    parameters: new Map(Object.entries(trial).map(([name, text]) => [name, parseDecimal(text) as Rational])),
    threshold: conditionOf(rule).definition.tolerance,
  });
}

/** A GGA whose exchange has this enhancement factor. */
export function exchange(enhancement: string, ...lines: string[]): Functional {
  return linked('made', { made: sheet('gga', ...lines, 'exchange:', `  enhancement: "${enhancement}"`) });
}

/** A correlation functional of that energy per particle. */
export function correlation(rung: string, perParticle: string): Functional {
  return linked('made', { made: sheet(rung, 'correlation:', `  per-particle: "${perParticle}"`) });
}
