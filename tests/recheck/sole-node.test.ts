import { describe, expect, it } from 'vitest';
import { add, constant, mul, power, sub, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { reachable, variablesOf } from '../../src/graph/traverse.ts';
import { rational } from '../../src/number/rational.ts';
import { soleNodes } from '../../src/recheck/sole-node.ts';

describe('the node through which alone a variable reaches the output', () => {
  const graph = new Graph();
  const [a, b] = [variable(graph, 'a'), variable(graph, 'b')];
  const square = power(graph, a, rational(2));
  const cube = power(graph, a, rational(3));
  const soleOf = (output: NodeId) => {
    const axesOf = (id: NodeId) =>
      [...variablesOf(graph, [id])].reduce((mask, name) => mask | (name === 'a' ? 1 : 2), 0);
    return soleNodes(graph, reachable(graph, [output]), output, axesOf);
  };

  it('is a², where b meets a² and 1 − 3·a² only', () => {
    const shifted = sub(graph, constant(graph, 1), mul(graph, constant(graph, 3), square));
    expect(soleOf(add(graph, mul(graph, b, square), unary(graph, 'exp', mul(graph, b, shifted))))).toEqual(
      new Set([square, b]),
    );
  });

  it('does not exist where b meets a² and a³', () => {
    expect(soleOf(sub(graph, mul(graph, b, square), mul(graph, b, cube)))).toEqual(new Set([b]));
  });

  it('does not exist where b meets a² and a itself', () => {
    expect(soleOf(sub(graph, mul(graph, b, square), mul(graph, b, a)))).toEqual(new Set([b]));
  });
});
