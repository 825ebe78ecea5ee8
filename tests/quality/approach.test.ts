import { expect, test } from 'vitest';
import { constant, mul, power, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { rational } from '../../src/number/rational.ts';
import { tendencies } from '../../src/quality/approach.ts';

const graph = new Graph();
const x = variable(graph, 'x');
const tendency = (node: NodeId) => tendencies(graph, [node], (distance) => new Map([['x', distance]]))[0];

test('x^(−2/3) diverges as that power, log x as power 0', () => {
  const diverging = tendency(power(graph, x, rational(-2, 3)));
  expect(diverging?.kind === 'diverges' && diverging.power).toBeCloseTo(2 / 3, 6);
  expect(tendency(unary(graph, 'log', x))).toEqual({ kind: 'diverges', power: 0 });
});

test('cos x and x^(1/3) settle at 1 and 0', () => {
  expect(tendency(unary(graph, 'cos', x))).toEqual({ kind: 'limit', value: 1 });
  const root = tendency(power(graph, x, rational(1, 3)));
  expect(root?.kind === 'limit' && root.value).toBeCloseTo(0, 3);
});

test('cos(1/x) stays bounded and does not settle', () => {
  expect(tendency(unary(graph, 'cos', power(graph, x, rational(-1))))?.kind).toBe('bounded');
});

test('log(−x) has no value', () => {
  expect(tendency(unary(graph, 'log', mul(graph, constant(graph, -1), x)))).toEqual({ kind: 'no-value' });
});
