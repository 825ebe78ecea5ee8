import type { ConstraintDefinition } from '../definition/constraint.ts';
import type { PartName } from '../definition/functional.ts';
import { childrenOf, type Expression } from '../expression/expression.ts';
import type { Functional } from '../functional/functional.ts';
import { expressionArguments, separationName } from './calls.ts';
import { type Condition, type EnergyName, energyNames } from './condition.ts';

/** Why a condition does not apply to a functional; undefined when it does. */
export function notApplicable(condition: Condition, functional: Functional): string | undefined {
  const { definition, requirement } = condition;
  const otherRung = rungReason(definition, functional);
  if (otherRung !== undefined) return otherRung;
  const names = namesIn(requirement.left, requirement.right);
  for (const name of energyNames) {
    if (!names.has(name)) continue;
    const missing = missingParts(functional, name);
    if (missing !== undefined) return missing;
  }
  const asksOfShares = names.has('shortRangeExchange') || names.has('longRangeExchange');
  if (asksOfShares && functional.exactExchange === undefined) return 'the functional has no exact exchange';
  if (names.has(separationName) && functional.exactExchange?.kind !== 'range-separated') {
    return 'the functional has no range separation';
  }
  if (functional.exactExchange?.kind === 'range-separated' && definition.part !== 'correlation' && !asksOfShares) {
    return 'exact exchange with a range-separated share is not evaluated, and the semilocal remainder alone is not the exchange energy';
  }
  return undefined;
}

/** Why a constraint is not one on functionals of this rung; undefined when it is. */
export function rungReason({ rungs }: ConstraintDefinition, functional: Functional): string | undefined {
  const { rung } = functional.definition;
  return rungs.includes(rung) ? undefined : `it is a condition on ${rungs.join(', ')} forms; this one is ${rung}`;
}

/** The names that stand for values; the variable of a derivative or a limit is a word. */
function namesIn(...expressions: readonly Expression[]): Set<string> {
  const found = new Set<string>();
  const visit = (part: Expression): void => {
    if (part.kind === 'name') found.add(part.name);
    (part.kind === 'call' ? expressionArguments(part) : childrenOf(part)).forEach(visit);
  };
  expressions.forEach(visit);
  return found;
}

function missingParts(functional: Functional, name: EnergyName): string | undefined {
  const has = (part: PartName) => functional.parts.has(part);
  if (name === 'Fxc' || name === 'eps_xc') {
    if (has('exchange-correlation') || (has('exchange') && has('correlation'))) return undefined;
    return has('exchange') ? 'the functional has no correlation' : 'the functional has no exchange';
  }
  const part = name === 'Fx' || name === 'eps_x' ? 'exchange' : 'correlation';
  if (has(part)) return undefined;
  if (has('exchange-correlation')) return `the sheet gives only the sum of exchange and correlation, not ${part} alone`;
  return `the functional has no ${part}`;
}
