import type { Condition } from '../../src/constraint/condition.ts';
import { axesOf, standardDomain } from '../../src/constraint/domain.ts';
import { limitInFloat64 } from '../../src/constraint/limit.ts';
import { buildMargin } from '../../src/constraint/margin.ts';
import { Graph } from '../../src/graph/graph.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { compilePoint } from '../../src/kernel/float64.ts';
import { exactDecimal } from '../../src/number/decimal.ts';
import type { Axis } from '../../src/search/axis.ts';
import { conditionOf, functionalOf, standardSettings } from '../constraint/catalogue.ts';

/** So that what round-off moves is decided without an allowance. */
const digits = 50;

/**
 * Random points of the standard domain, on its edges and close to them too, at which the margin is below minus the
 * tolerance: in double precision, and then in 50 digits at the same point.
 */
export function sampledOutside(functional: string, constraint: string, count: number): number[][] {
  const graph = new Graph();
  const condition = conditionOf(constraint) as Condition;
  const { node, variables } = buildMargin(graph, condition, functionalOf(functional), {
    ...standardSettings,
    limit: limitInFloat64,
  });
  const { space, tolerance } = condition.definition;
  const all = axesOf(standardDomain, space);
  const axes = variables.map((name) => all.find((axis) => axis.name === name) as Axis);
  const at = compilePoint(graph, node, variables);
  const outside: number[][] = [];
  const next = randomNumbers(5);
  const point = new Float64Array(axes.length);
  for (let drawn = 0; drawn < count; drawn++) {
    for (let index = 0; index < axes.length; index++) point[index] = drawnFrom(axes[index] as Axis, next);
    if (!(at(point) < -tolerance)) continue;
    const bindings = new Map(variables.map((name, index) => [name, exactDecimal(point[index] as number)]));
    const [exact] = evaluateDecimal(graph, [node], bindings, digits);
    if (exact?.lessThan(-tolerance)) outside.push([...point]);
  }
  return outside;
}

/** Mostly anywhere on the axis; one time in eight close to an end, and one in sixteen at one. */
function drawnFrom({ lower, upper, scale }: Axis, next: () => number): number {
  const way = next();
  const place = next();
  const share = way < 1 / 16 ? 0 : way < 3 / 16 ? 10 ** (-12 * next()) : next();
  const end = way < 3 / 16 && place < 0.5 ? 1 - share : share;
  return scale === 'logarithmic' ? lower * (upper / lower) ** end : lower + (upper - lower) * end;
}

/** Numbers from 0 to 1, the same ones for the same seed: a generator of full period. */
export function randomNumbers(seed: number): () => number {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state + 0.5) / 2 ** 32;
  };
}
