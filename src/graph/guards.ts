import { rationalValue } from './build.ts';
import { argumentsOf, type Graph, type Node, type NodeId } from './graph.ts';
import type { Signs } from './sign.ts';

/** A comparison whose outcome decides whether a node counts: of a choice, with the outcome that leads to the node. */
export interface Guard {
  readonly key: string;
  readonly op: 'ifLess' | 'ifLessEqual';
  readonly left: NodeId;
  readonly right: NodeId;
  readonly outcome: boolean;
}

export function guardOf(node: Extract<Node, { kind: 'choice' }>, outcome: boolean): Guard {
  const [left, right] = node.args;
  return { key: `${node.op} ${left} ${right} ${outcome}`, op: node.op, left, right, outcome };
}

/**
 * The comparisons whose outcome every way from an output to a node needs: where one of them comes out otherwise, the
 * node's value counts for nothing.
 */
export function guardsOf(
  graph: Graph,
  ids: readonly NodeId[],
  outputs: readonly NodeId[],
): Map<NodeId, ReadonlyMap<string, Guard>> {
  const guards = new Map<NodeId, ReadonlyMap<string, Guard>>(outputs.map((id) => [id, new Map()]));
  for (const id of [...ids].reverse()) {
    const own = guards.get(id) as ReadonlyMap<string, Guard>;
    const node = graph.node(id);
    argumentsOf(node).forEach((argument, index) => {
      const branch = node.kind === 'choice' && index >= 2 ? guardOf(node, index === 2) : undefined;
      const along = branch === undefined ? own : new Map([...own, [branch.key, branch]]);
      const known = guards.get(argument);
      guards.set(argument, known === undefined ? along : common(known, along));
    });
  }
  return guards;
}

function common(a: ReadonlyMap<string, Guard>, b: ReadonlyMap<string, Guard>): ReadonlyMap<string, Guard> {
  return new Map([...a].filter(([key]) => b.has(key)));
}

/**
 * Whether a node is known not to be zero wherever the guards come out as they say, or by its sign: then an interval that
 * only touches zero does not leave the domain of a quotient.
 */
export function isNonZero(graph: Graph, id: NodeId, guards: ReadonlyMap<string, Guard>, signs?: Signs): boolean {
  const positive = new Set<NodeId>();
  const differences: (readonly [NodeId, NodeId])[] = [];
  for (const { op, left, right, outcome } of guards.values()) {
    // a < b being so, and a ≤ b not being so, are strict.
    if ((op === 'ifLess') !== outcome) continue;
    differences.push([left, right]);
    if (rationalValue(graph, left)?.equals(0)) collectFactors(graph, right, positive);
    if (rationalValue(graph, right)?.equals(0)) collectFactors(graph, left, positive);
  }
  return holds(id);

  function holds(part: NodeId): boolean {
    if (positive.has(part) || signs?.isPositive(part) === true) return true;
    const node = graph.node(part);
    switch (node.kind) {
      case 'rational':
        return !node.value.equals(0);
      case 'pi':
        return true;
      case 'power':
        return holds(node.args[0]);
      case 'unary':
        if (node.op === 'exp' || node.op === 'cosh') return true;
        return (node.op === 'neg' || node.op === 'abs') && holds(node.args[0]);
      case 'binary': {
        const [a, b] = node.args;
        if (node.op === 'mul') return holds(a) && holds(b);
        if (node.op === 'div') return holds(a);
        if (node.op !== 'sub') return false;
        return differences.some(([left, right]) => (a === left && b === right) || (a === right && b === left));
      }
      case 'variable':
      case 'choice':
        return false;
    }
  }
}

/** A product or power that is not zero has no factor that is. */
function collectFactors(graph: Graph, id: NodeId, into: Set<NodeId>): void {
  into.add(id);
  const node = graph.node(id);
  if (node.kind === 'power' || (node.kind === 'unary' && (node.op === 'neg' || node.op === 'abs')))
    collectFactors(graph, node.args[0], into);
  else if (node.kind === 'binary' && node.op === 'mul') for (const part of node.args) collectFactors(graph, part, into);
}
