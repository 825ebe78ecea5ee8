import { argumentsOf, type Graph, type NodeId } from '../graph/graph.ts';
import { reachable } from '../graph/traverse.ts';
import { toNumber } from '../number/rational.ts';
import { evaluateDecimal } from './decimal.ts';
import { lowerPowers } from './lower.ts';
import { type AxisMask, chooseLoopOrder } from './order.ts';

/** One loop of a kernel. All its variables advance together, so several make a list of points. */
export interface AxisGroup {
  readonly variables: readonly string[];
}

/** What is to be computed, and in which loops; independent of the language it is written in. */
export interface Plan {
  readonly graph: Graph;
  readonly outputs: readonly NodeId[];
  readonly axes: readonly AxisGroup[];
  /** Axis indices, outermost loop first. */
  readonly order: readonly number[];
  /** The value of each node that depends on no axis, rounded once. */
  readonly constants: ReadonlyMap<NodeId, number>;
  /** The axis and the place in its list of each variable node. */
  readonly inputs: ReadonlyMap<NodeId, { readonly axis: number; readonly index: number }>;
  readonly masks: ReadonlyMap<NodeId, AxisMask>;
  /** The nodes to compute by the axes they depend on, each list with arguments first. */
  readonly groups: ReadonlyMap<AxisMask, readonly NodeId[]>;
  /** The nodes of each group that other groups or the outputs read. */
  readonly exported: ReadonlyMap<AxisMask, readonly NodeId[]>;
}

/** Digits in which constants are evaluated before their one rounding to a double. */
const constantDigits = 40;

const largestAxisCount = 30;

/**
 * The plan of a kernel. `lengths` are the expected axis lengths; they only guide the loop order.
 * Throws a RangeError for a variable that no axis names, or that two do.
 */
export function planKernel(
  source: Graph,
  sourceOutputs: readonly NodeId[],
  axes: readonly AxisGroup[],
  lengths?: readonly number[],
): Plan {
  const { graph, outputs } = lowerPowers(source, sourceOutputs);
  const places = variablePlaces(axes);
  const ids = reachable(graph, outputs);
  const masks = new Map<NodeId, AxisMask>();
  const inputs = new Map<NodeId, { axis: number; index: number }>();
  for (const id of ids) {
    const node = graph.node(id);
    if (node.kind === 'variable') {
      const place = places.get(node.name);
      if (place === undefined) throw new RangeError(`the variable ${node.name} is on no axis`);
      inputs.set(id, place);
      masks.set(id, 1 << place.axis);
    } else {
      masks.set(
        id,
        argumentsOf(node).reduce((mask, argument) => mask | (masks.get(argument) as AxisMask), 0),
      );
    }
  }
  const groups = new Map<AxisMask, NodeId[]>();
  for (const id of ids) {
    const mask = masks.get(id) as AxisMask;
    if (mask !== 0 && !inputs.has(id)) append(groups, mask, id);
  }
  const exported = exportedNodes(graph, ids, outputs, masks, (id) => masks.get(id) !== 0 && !inputs.has(id));
  const constants = foldConstants(graph, ids, outputs, masks);
  const order = chooseLoopOrder(axes.length, exported, outputs.length, lengths);
  return { graph, outputs, axes, order, constants, inputs, masks, groups, exported };
}

function variablePlaces(axes: readonly AxisGroup[]): Map<string, { axis: number; index: number }> {
  if (axes.length > largestAxisCount) throw new RangeError(`${axes.length} axes; at most ${largestAxisCount}`);
  const places = new Map<string, { axis: number; index: number }>();
  axes.forEach(({ variables }, axis) => {
    if (variables.length === 0) throw new RangeError(`axis ${axis} has no variable`);
    variables.forEach((name, index) => {
      if (places.has(name)) throw new RangeError(`the variable ${name} is on two axes`);
      places.set(name, { axis, index });
    });
  });
  return places;
}

function exportedNodes(
  graph: Graph,
  ids: readonly NodeId[],
  outputs: readonly NodeId[],
  masks: ReadonlyMap<NodeId, AxisMask>,
  computed: (id: NodeId) => boolean,
): Map<AxisMask, NodeId[]> {
  const readElsewhere = new Set<NodeId>(outputs.filter(computed));
  for (const id of ids) {
    for (const argument of argumentsOf(graph.node(id))) {
      if (computed(argument) && masks.get(argument) !== masks.get(id)) readElsewhere.add(argument);
    }
  }
  const exported = new Map<AxisMask, NodeId[]>();
  for (const id of [...readElsewhere].sort((a, b) => a - b)) append(exported, masks.get(id) as AxisMask, id);
  return exported;
}

/** The constants that other nodes or the outputs read; those inside a constant expression stay there. */
function foldConstants(
  graph: Graph,
  ids: readonly NodeId[],
  outputs: readonly NodeId[],
  masks: ReadonlyMap<NodeId, AxisMask>,
): Map<NodeId, number> {
  const isConstant = (id: NodeId): boolean => masks.get(id) === 0;
  const used = new Set<NodeId>(outputs.filter(isConstant));
  for (const id of ids) {
    if (isConstant(id)) continue;
    for (const argument of argumentsOf(graph.node(id))) if (isConstant(argument)) used.add(argument);
  }
  const constants = new Map<NodeId, number>();
  const expressions: NodeId[] = [];
  for (const id of used) {
    const node = graph.node(id);
    if (node.kind === 'rational') constants.set(id, toNumber(node.value));
    else expressions.push(id);
  }
  evaluateDecimal(graph, expressions, new Map(), constantDigits).forEach((value, index) => {
    constants.set(expressions[index] as NodeId, value.toNumber());
  });
  return constants;
}

function append(lists: Map<AxisMask, NodeId[]>, mask: AxisMask, id: NodeId): void {
  const list = lists.get(mask);
  if (list) list.push(id);
  else lists.set(mask, [id]);
}
