import type { ConstraintDefinition, RuleName } from '../definition/constraint.ts';
import { type Outcome, success } from '../errors/problem.ts';
import type { Functional } from '../functional/functional.ts';
import { type Condition, readCondition } from './condition.ts';

/** A rule of numerical quality: decided by its own code and not by a comparison. */
export interface RuleCondition {
  readonly kind: 'rule';
  readonly definition: ConstraintDefinition;
  readonly rule: RuleName;
}

/** All that a functional can be vetted against. */
export type Constraint = Condition | RuleCondition;

/** Reads what a constraint sheet defines: a condition, with every name in it checked, or a rule. */
export function readConstraint(
  definition: ConstraintDefinition,
  find: (id: string) => Outcome<Functional>,
): Outcome<Constraint> {
  const { rule } = definition;
  return rule === undefined ? readCondition(definition, find) : success({ kind: 'rule', definition, rule });
}
