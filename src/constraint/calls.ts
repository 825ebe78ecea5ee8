import type { ConstraintDefinition } from '../definition/constraint.ts';
import { suggestion } from '../errors/suggest.ts';
import { builtins } from '../expression/builtins.ts';
import { childrenOf, type Expression, type Requirement } from '../expression/expression.ts';
import type { ExpressionFault } from '../expression/fault.ts';
import { parseRequirement } from '../expression/parse.ts';
import { type Rational, rational } from '../number/rational.ts';
import { coordinatesOf } from './coordinates.ts';

export type Call = Extract<Expression, { kind: 'call' }>;

/** Calls that only requirements know, with their number of arguments. */
const requirementCalls: ReadonlyMap<string, number> = new Map([
  ['d', 2],
  ['limit', 3],
  ['order', 3],
  ['logOrder', 3],
  ['coefficient', 3],
  ['at', 3],
  ['spinscaled', 1],
  ['swapped', 1],
]);

/** Calls whose value is found by sequences of points. */
export const sequenceCalls: readonly string[] = ['limit', 'order', 'logOrder'];

/** The range-separation parameter of a functional; limits are taken along it as along a coordinate. */
export const separationName = 'omega';

/** How a condition is decided: over a domain, or at given points. */
export type ConditionKind = 'pointwise' | 'swept';

/**
 * A low-density limit in a condition without a list of points is part of a pointwise margin; every other limit, order or
 * coefficient, and any table or sweep, makes the condition one that is asked at given points.
 */
export function kindOf(definition: ConstraintDefinition, { left, right }: Requirement): ConditionKind {
  if (definition.sweep.length > 0 || definition.table !== undefined) return 'swept';
  const asksForPoints = (part: Expression): boolean =>
    (part.kind === 'call' &&
      (part.name === 'coefficient' || (sequenceCalls.includes(part.name) && !isLowDensityLimit(part)))) ||
    childrenOf(part).some(asksForPoints);
  return asksForPoints(left) || asksForPoints(right) ? 'swept' : 'pointwise';
}

/** Whether a sheet makes a condition that is asked at given points; false for a faulty requirement. */
export function isAskedAtPoints(definition: ConstraintDefinition): boolean {
  const requirement = definition.rule === undefined ? parseRequirement(definition.requirement) : undefined;
  return requirement?.ok === true && kindOf(definition, requirement.value) === 'swept';
}

function isLowDensityLimit({ name, args }: Call): boolean {
  return name === 'limit' && nameOf(args[1]) === 'rs' && targetOf(args[2]) === 'infinity';
}

/** The arguments of a call that are expressions; the others are words such as a variable or `inf`. */
export function expressionArguments({ name, args }: Call): readonly Expression[] {
  if (name === 'at') return [args[0], args[2]].filter((argument) => argument !== undefined);
  if (sequenceCalls.includes(name) || name === 'd' || name === 'coefficient') return args.slice(0, 1);
  return args;
}

/** `inf`, or an exact number such as 0 or −1; undefined for anything else. */
export function targetOf(expression: Expression | undefined): Rational | 'infinity' | undefined {
  if (expression?.kind === 'name' && expression.name === 'inf') return 'infinity';
  if (expression?.kind === 'number') return expression.value;
  if (expression?.kind !== 'negation') return undefined;
  const operand = targetOf(expression.operand);
  return operand === undefined || operand === 'infinity' ? undefined : rational(-1).mul(operand);
}

/** The n of `coefficient(f, x, n)`; undefined when it is no whole number from 0 to 8. */
export function coefficientOrder(expression: Expression | undefined): number | undefined {
  if (expression?.kind !== 'number' || expression.value.d !== 1n) return undefined;
  const n = Number(expression.value.n);
  return expression.value.s >= 0n && n <= 8 ? n : undefined;
}

export function nameOf(expression: Expression | undefined): string | undefined {
  return expression?.kind === 'name' ? expression.name : undefined;
}

/** What is wrong with a call in a requirement; undefined for a right one. */
export function callFault(call: Call, definition: ConstraintDefinition): ExpressionFault | undefined {
  const { name, args, offset } = call;
  const arity = builtins.get(name)?.arity ?? requirementCalls.get(name);
  if (arity === undefined) {
    const known = [...builtins.keys(), ...requirementCalls.keys()];
    const remedy =
      'A requirement knows d, limit, order, logOrder, coefficient, at, spinscaled and swapped beside the functions of the sheets.';
    return {
      code: 'unknown-name',
      message: `unknown function ${name}`,
      remedy: suggestion(name, known, remedy),
      offset,
    };
  }
  const wrong = (message: string, remedy: string) => ({ code: 'wrong-arguments', message, remedy, offset }) as const;
  if (arity !== args.length) {
    return wrong(`${name} takes ${arity} arguments, not ${args.length}`, `Give ${name} ${arity} arguments.`);
  }
  const coordinates = coordinatesOf(definition.space);
  const along = nameOf(args[1]) ?? '';
  const choices = coordinates.join(', ');
  const isSeparation = name === 'd' && along === separationName;
  if ((name === 'd' || name === 'at') && !coordinates.includes(along) && !isSeparation) {
    const form = name === 'd' ? 'd(f, x)' : 'at(f, x, value)';
    const does = name === 'd' ? 'd( , ) differentiates by a coordinate' : 'at( , , ) gives a coordinate another value';
    return wrong(does, `Write ${form} with x one of ${choices}.`);
  }
  if (sequenceCalls.includes(name)) {
    if (!coordinates.includes(along) && along !== separationName) {
      return wrong(
        `${name}( , , ) goes along a coordinate`,
        `Write ${name}(f, x, inf) with x one of ${choices}, omega.`,
      );
    }
    if (targetOf(args[2]) === undefined) {
      return wrong(
        `${name}( , , ) goes to inf or to a number`,
        `Write ${name}(f, ${along}, inf) or ${name}(f, ${along}, 0).`,
      );
    }
  }
  if (name === 'coefficient') return coefficientFault(call, definition, wrong);
  if (name === 'spinscaled' && (definition.space !== 'spin' || nameOf(args[0]) !== 'Fx')) {
    return wrong(
      'spinscaled( ) is the spin-scaled F_x of the general spin space',
      'Write spinscaled(Fx), with space: spin.',
    );
  }
  return undefined;
}

function coefficientFault(
  { args }: Call,
  definition: ConstraintDefinition,
  wrong: (message: string, remedy: string) => ExpressionFault,
): ExpressionFault | undefined {
  const choices = [...coordinatesOf(definition.space), 'p'];
  const along = nameOf(args[1]) ?? '';
  if (!choices.includes(along)) {
    return wrong(
      'coefficient( , , ) expands in a coordinate',
      `Write coefficient(f, x, n) with x one of ${choices.join(', ')}; p is s².`,
    );
  }
  const order = coefficientOrder(args[2]);
  if (order === undefined || (along === 'p' && order > 4)) {
    return wrong(
      'the order of a coefficient is a whole number from 0 to 8, of p to 4',
      `Write coefficient(f, ${along}, 1).`,
    );
  }
  const point = along === 'p' ? 's' : along;
  const value = definition.at.find(({ name }) => name === point)?.value.text.trim();
  const isGiven = value !== undefined || definition.sweep.some(({ name }) => name === point);
  if (!isGiven || (along === 'p' && value !== '0')) {
    const example = along === 'p' ? 's: 0' : `${point}: <value>`;
    return wrong(`the expansion in ${along} needs the point it is taken at`, `Give it: at: { ${example} }.`);
  }
  return undefined;
}
