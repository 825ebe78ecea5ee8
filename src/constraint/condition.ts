import type { ConstraintDefinition } from '../definition/constraint.ts';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { suggestion } from '../errors/suggest.ts';
import { childrenOf, type Expression, type Requirement } from '../expression/expression.ts';
import { type PlacedText, parseExpression, parseRequirement, placedProblem } from '../expression/parse.ts';
import type { Functional } from '../functional/functional.ts';
import { isPartName } from '../functional/instance.ts';
import { quantityNames } from '../functional/quantities.ts';
import {
  type ConditionKind,
  callFault,
  expressionArguments,
  kindOf,
  nameOf,
  separationName,
  sequenceCalls,
} from './calls.ts';
import { selectableConstants } from './constants.ts';
import { coordinatesOf } from './coordinates.ts';
import { readPoints, type SweptPoint } from './points.ts';

/** A checked condition: its requirement parsed, its reference sheets joined. */
export interface Condition {
  readonly definition: ConstraintDefinition;
  readonly requirement: Requirement;
  readonly kind: ConditionKind;
  /** Fixed coordinates. */
  readonly at: ReadonlyMap<string, Expression>;
  /** The points that a swept condition is asked at: values of the swept coordinates and of a table's columns. */
  readonly points: readonly SweptPoint[];
  readonly imports: ReadonlyMap<string, Functional>;
}

/** The energies that a requirement may name: enhancement factors and energies per particle. */
export const energyNames = ['Fx', 'Fc', 'Fxc', 'eps_x', 'eps_c', 'eps_xc'] as const;
export type EnergyName = (typeof energyNames)[number];

/** Names for the shares of exact exchange: of a global hybrid, and at short and at long range. */
export const shareNames: readonly string[] = ['exactExchange', 'shortRangeExchange', 'longRangeExchange'];

/** Parses a condition and checks every name in it. `find` gives the functionals that it uses as references. */
export function readCondition(
  definition: ConstraintDefinition,
  find: (id: string) => Outcome<Functional>,
): Outcome<Condition> {
  if (definition.rule !== undefined) return failure([ruleProblem(definition)]);
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
  const constantAt = (source: PlacedText): Expression | undefined => {
    const value = parseExpression(source);
    if (!value.ok) {
      problems.push(...value.problems);
      return undefined;
    }
    problems.push(...checkNames(value.value, source, constantNames(definition), definition, imports));
    return value.value;
  };
  const at = new Map<string, Expression>();
  for (const step of definition.at) {
    const value = constantAt(step.value);
    if (value !== undefined) at.set(step.name, value);
  }
  const points = readPoints(definition, constantAt, problems);
  const requirement = parseRequirement(definition.requirement);
  if (!requirement.ok) return failure([...problems, ...requirement.problems]);
  for (const side of [requirement.value.left, requirement.value.right]) {
    problems.push(...checkNames(side, definition.requirement, knownNames(definition), definition, imports));
  }
  const kind = kindOf(definition, requirement.value);
  if (kind === 'swept') problems.push(...unplacedProblems(definition, requirement.value));
  if (problems.length > 0) return failure(problems);
  return success({ definition, kind, requirement: requirement.value, at, points, imports });
}

/** A coordinate that the requirement needs and the sheet gives no value, for a condition asked at points. */
function unplacedProblems(definition: ConstraintDefinition, { left, right }: Requirement): Problem[] {
  // q is 0 where the sheet does not say otherwise.
  const all = coordinatesOf(definition.space).filter((name) => name !== 'q');
  const given = [...definition.at, ...definition.sweep].map(({ name }) => name);
  const placed = new Set([...given, ...(definition.table?.columns.map(({ text }) => text) ?? [])]);
  const needed = (part: Expression): string[] => {
    if (part.kind === 'name') {
      if (all.includes(part.name)) return [part.name];
      const isEnergy = (energyNames as readonly string[]).includes(part.name);
      return isEnergy || quantityNames().includes(part.name) ? [...all] : [];
    }
    if (part.kind === 'member') return [...all];
    if (part.kind !== 'call') return childrenOf(part).flatMap(needed);
    const inside = expressionArguments(part).flatMap(needed);
    const leaves = sequenceCalls.includes(part.name) || part.name === 'at' ? nameOf(part.args[1]) : undefined;
    return inside.filter((name) => name !== leaves);
  };
  const missing = all.filter((name) => !placed.has(name) && [left, right].some((side) => needed(side).includes(name)));
  return missing.map((name) =>
    placedProblem(definition.requirement, {
      code: 'missing-key',
      message: `${name} has no value: limits and coefficients are asked at given points`,
      remedy: `Fix it, as in at: { ${name}: 1 }, or list values, as in sweep: { ${name}: [0.5, 1] }.`,
      offset: 0,
    }),
  );
}

function ruleProblem({ id }: ConstraintDefinition): Problem {
  return {
    code: 'unknown-constraint',
    message: `${id} is a rule of numerical quality: it has no margin`,
    remedy: 'Name a condition that has a requirement, or ask for the rule with vet.',
  };
}

function constantNames(definition: ConstraintDefinition): string[] {
  return ['pi', ...definition.constants.map(({ name }) => name)];
}

function knownNames(definition: ConstraintDefinition): string[] {
  const quantities = quantityNames().filter((name) => !/_(sigma|other)$/.test(name));
  return [
    ...constantNames(definition),
    ...(definition.table?.columns.map(({ text }) => text) ?? []),
    ...shareNames,
    separationName,
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
      const fault = callFault(part, definition);
      if (fault !== undefined) problems.push(placedProblem(source, fault));
      expressionArguments(part).forEach(visit);
      return;
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
}
