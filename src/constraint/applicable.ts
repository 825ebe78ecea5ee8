import type { PartName } from '../definition/functional.ts';
import { childrenOf, type Expression } from '../expression/expression.ts';
import type { Functional } from '../functional/functional.ts';
import { type Condition, type EnergyName, energyNames } from './condition.ts';

/** Why a condition does not apply to a functional; undefined when it does. */
export function notApplicable(condition: Condition, functional: Functional): string | undefined {
  const { definition, requirement } = condition;
  const { rung } = functional.definition;
  if (!definition.rungs.includes(rung))
    return `it is a condition on ${definition.rungs.join(', ')} forms; this one is ${rung}`;
  for (const name of energiesIn(requirement.left, requirement.right)) {
    const missing = missingParts(functional, name);
    if (missing !== undefined) return missing;
  }
  if (functional.exactExchange?.kind === 'range-separated' && definition.part !== 'correlation') {
    return 'exact exchange with a range-separated share is not evaluated, and the semilocal remainder alone is not the exchange energy';
  }
  return undefined;
}

function energiesIn(...expressions: readonly Expression[]): Set<EnergyName> {
  const found = new Set<EnergyName>();
  const visit = (part: Expression): void => {
    if (part.kind === 'name' && (energyNames as readonly string[]).includes(part.name))
      found.add(part.name as EnergyName);
    childrenOf(part).forEach(visit);
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
