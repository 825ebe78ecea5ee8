import type { Graph, NodeId } from '../graph/graph.ts';
import type { Signs } from '../graph/sign.ts';
import { toDouble } from './decimal.ts';
import { type Bounds, makeRows } from './evaluate.ts';
import { arrangeRows } from './program.ts';

/**
 * Of each node that an output needs a number that none of its values on the box is below; −∞ for all others. All rows are
 * computed together, when the first is asked for. Throws a RangeError for more variables than forms may have axes.
 */
export function lowerBounds(
  graph: Graph,
  output: NodeId,
  variables: readonly string[],
  box: Float64Array,
  signs: Signs,
): (id: NodeId) => number {
  let boundOf: ((id: NodeId) => number) | undefined;
  return (id) => {
    boundOf ??= evaluated();
    return boundOf(id);
  };

  function evaluated(): (id: NodeId) => number {
    const { groups, operandOf } = arrangeRows(graph, output, variables, signs);
    const rows = makeRows(groups);
    rows.enter(box, 0);
    return (id) => {
      const operand = operandOf(id);
      return operand === undefined ? Number.NEGATIVE_INFINITY : doubleBelow(rows.boundsOf(operand));
    };
  }
}

/** A double not above the lower end: 0 or −∞ where it is too small or too large for one that is near. */
function doubleBelow({ lower, lowerPower }: Bounds): number {
  if (lower === 0) return 0;
  const isNear = Math.abs(lowerPower) < 150;
  if (lower > 0) return isNear ? toDouble(lower, lowerPower) * (1 - 1e-15) : 0;
  return isNear && lower > Number.NEGATIVE_INFINITY
    ? toDouble(lower, lowerPower) * (1 + 1e-15)
    : Number.NEGATIVE_INFINITY;
}
