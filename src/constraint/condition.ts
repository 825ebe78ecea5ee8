import type { ConstraintDefinition } from '../definition/constraint.ts';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import { builtins } from '../expression/builtins.ts';
import { childrenOf, type Expression, type Requirement } from '../expression/expression.ts';
import { type PlacedText, parseExpression, parseRequirement, placedProblem } from '../expression/parse.ts';
import type { Functional } from '../functional/functional.ts';
import { isPartName } from '../functional/instance.ts';
import { quantityNames } from '../functional/quantities.ts';
import { selectableConstants } from './constants.ts';
import { coordinatesOf } from './coordinates.ts';

/** A checked condition: its requirement parsed, its reference sheets joined. */
export interface Condition {
  readonly definition: ConstraintDefinition;
  readonly requirement: Requirement;
  /** Fixed coordinates. */
  readonly at: ReadonlyMap<string, Expression>;
  readonly imports: ReadonlyMap<string, Functional>;
}

/** The energies that a requirement may name: enhancement factors and energies per particle. */
export const energyNames = ['Fx', 'Fc', 'Fxc', 'eps_x', 'eps_c', 'eps_xc'] as const;
export type EnergyName = (typeof energyNames)[number];

/** Calls that only requirements know, with their number of arguments. */
const conditionCalls: ReadonlyMap<string, number> = new Map([
  ['d', 2],
  ['limit', 3],
  ['spinscaled', 1],
  ['swapped', 1],
]);

/** Parses a condition and checks every name in it. `find` gives the functionals that it uses as references. */
export function readCondition(
  definition: ConstraintDefinition,
  find: (id: string) => Outcome<Functional>,
): Outcome<Condition> {
  const problems: Problem[] = [];
  const imports = new Map<string, Functional>();
  for (const used of definition.uses) {
    const found = find(used.sheet);
    if (found.ok) imports.set(used.alias, found.value);
    else problems.push(...found.problems.map((problem) => ({ ...problem, ...used.place })));
  }
  for (const { constant, place } of definition.constants) {
    if (selectableConstants.some(({ name }) => name === constant)) continue;
    const known = selectableConstants.map(({ name }) => name);
    problems.push({
      code: 'unknown-name',
      message: `there is no constant ${constant}`,
      remedy: suggestion(constant, known, `The constants are ${known.join(', ')}.`),
      ...place,
    });
  }
  const at = new Map<string, Expression>();
  for (const step of definition.at) {
    const value = parseExpression(step.value);
    if (!value.ok) problems.push(...value.problems);
    else {
      problems.push(...checkNames(value.value, step.value, constantNames(definition), definition, imports));
      at.set(step.name, value.value);
    }
  }
  const requirement = parseRequirement(definition.requirement);
  if (!requirement.ok) return failure([...problems, ...requirement.problems]);
  for (const side of [requirement.value.left, requirement.value.right]) {
    problems.push(...checkNames(side, definition.requirement, knownNames(definition), definition, imports));
  }
  if (problems.length > 0) return failure(problems);
  return success({ definition, requirement: requirement.value, at, imports });
}

function constantNames(definition: ConstraintDefinition): string[] {
  return ['pi', ...definition.constants.map(({ name }) => name)];
}

function knownNames(definition: ConstraintDefinition): string[] {
  const quantities = quantityNames().filter((name) => !/_(sigma|other)$/.test(name));
  return [
    ...constantNames(definition),
    'exactExchange',
    ...energyNames,
    ...coordinatesOf(definition.space),
    ...quantities,
  ];
}

function checkNames(
  expression: Expression,
  source: PlacedText,
  known: readonly string[],
  definition: ConstraintDefinition,
  imports: ReadonlyMap<string, Functional>,
): Problem[] {
  const problems: Problem[] = [];
  const report = (code: Problem['code'], message: string, remedy: string, offset: number) =>
    problems.push(placedProblem(source, { code, message, remedy, offset }));
  visit(expression);
  return problems;

  function visit(part: Expression): void {
    if (part.kind === 'name' && !known.includes(part.name)) {
      report(
        'unknown-name',
        `unknown name ${part.name}`,
        suggestion(part.name, known, 'Use Fx, Fc, Fxc, a coordinate, or a constant named under constants.'),
        part.offset,
      );
    }
    if (part.kind === 'member' || part.kind === 'member-call') checkMember(part);
    if (part.kind === 'call') {
      checkCall(part);
      // The variable of a derivative or a limit, and the point of a limit, are words and not values.
      if (part.name === 'd' || part.name === 'limit') {
        if (part.args[0] !== undefined) visit(part.args[0]);
        return;
      }
    }
    childrenOf(part).forEach(visit);
  }

  function checkMember(part: Extract<Expression, { kind: 'member' | 'member-call' }>): void {
    const imported = imports.get(part.object);
    if (imported === undefined) {
      report(
        'missing-import',
        `${part.object} is not imported`,
        `Add it under uses: { ${part.object}: <sheet id> }.`,
        part.offset,
      );
    } else if (
      part.kind === 'member' ? !isPartName(part.name) : !isPartName(part.name) && part.name !== 'enhancement'
    ) {
      report(
        'unknown-name',
        `${part.object}.${part.name} is no energy`,
        'Write alias.exchange, alias.correlation or alias.correlation(rs, zeta).',
        part.offset,
      );
    } else if (isPartName(part.name) && !imported.parts.has(part.name)) {
      report(
        'unknown-name',
        `${imported.definition.id} has no ${part.name}`,
        `It has ${[...imported.parts.keys()].join(' and ')}.`,
        part.offset,
      );
    }
  }

  function checkCall({ name, args, offset }: Extract<Expression, { kind: 'call' }>): void {
    const arity = builtins.get(name)?.arity ?? conditionCalls.get(name);
    if (arity === undefined) {
      report(
        'unknown-name',
        `unknown function ${name}`,
        suggestion(
          name,
          [...builtins.keys(), ...conditionCalls.keys()],
          'A requirement knows d(f, rs), limit(f, rs, inf), spinscaled(Fx) and swapped(f) beside the functions of the sheets.',
        ),
        offset,
      );
      return;
    }
    if (arity !== args.length) {
      report(
        'wrong-arguments',
        `${name} takes ${arity} arguments, not ${args.length}`,
        `Give ${name} ${arity} arguments.`,
        offset,
      );
      return;
    }
    const second = args[1];
    const coordinates = coordinatesOf(definition.space);
    if (name === 'd' && !(second?.kind === 'name' && coordinates.includes(second.name))) {
      report(
        'wrong-arguments',
        'd( , ) differentiates by a coordinate',
        `Write d(f, x) with x one of ${coordinates.join(', ')}.`,
        offset,
      );
    }
    const third = args[2];
    const atLowDensity =
      second?.kind === 'name' && second.name === 'rs' && third?.kind === 'name' && third.name === 'inf';
    if (name === 'limit' && !atLowDensity) {
      report('wrong-arguments', 'only the low-density limit is known', 'Write limit(f, rs, inf).', offset);
    }
    if (
      name === 'spinscaled' &&
      (definition.space !== 'spin' || !(args[0]?.kind === 'name' && args[0].name === 'Fx'))
    ) {
      report(
        'wrong-arguments',
        'spinscaled( ) is the spin-scaled F_x of the general spin space',
        'Write spinscaled(Fx), with space: spin.',
        offset,
      );
    }
  }
}
