import { choice, rationalValue } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import type { Signs } from '../graph/sign.ts';
import { hasCertainValue } from './domain.ts';
import { productOf } from './product.ts';
import { mapGraph } from './simplify.ts';

/**
 * Switches that ask whether something is positive, where its sign on the domain answers: (0 < x ? A : B) → A for x > 0,
 * and (0 < x ? x·A : 0) → x·A for x ≥ 0 where A has a value at x = 0 too, for both are 0 there. And any switch inside a
 * branch of the same switch, which is decided there.
 */
export function decideSwitches(graph: Graph, outputs: readonly NodeId[], signs: Signs): NodeId[] {
  return mapGraph(graph, outputs, (made) => {
    const id = withinBranches(graph, made);
    const node = graph.node(id);
    if (node.kind !== 'choice' || node.op !== 'ifLess') return id;
    const [left, x, whenTrue, whenFalse] = node.args;
    if (rationalValue(graph, left)?.equals(0) !== true || !signs.isNonNegative(x)) return id;
    if (signs.isPositive(x)) return whenTrue;
    const isZero = rationalValue(graph, whenFalse)?.equals(0) === true && hasFactors(graph, whenTrue, x);
    return isZero && hasCertainValue(graph, whenTrue, signs) ? whenTrue : id;
  });
}

/** A choice with the same comparison in its branches decided. */
function withinBranches(graph: Graph, id: NodeId): NodeId {
  const node = graph.node(id);
  if (node.kind !== 'choice') return id;
  const [left, right, whenTrue, whenFalse] = node.args;
  const decided = (branch: NodeId, outcome: 2 | 3) =>
    (
      mapGraph(graph, [branch], (inner) => {
        const other = graph.node(inner);
        const isSame =
          other.kind === 'choice' && other.op === node.op && other.args[0] === left && other.args[1] === right;
        return isSame ? other.args[outcome] : inner;
      }) as [NodeId]
    )[0];
  return choice(graph, node.op, left, right, decided(whenTrue, 2), decided(whenFalse, 3));
}

function hasFactors(graph: Graph, id: NodeId, x: NodeId): boolean {
  const { factors } = productOf(graph, id);
  return [...productOf(graph, x).factors].every(([factor, exponent]) => (factors.get(factor) ?? 0) >= exponent);
}
