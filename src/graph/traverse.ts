import { binary, choice, power, unary } from './build.ts';
import { argumentsOf, type Graph, type Node, type NodeId } from './graph.ts';

/** The nodes that the outputs depend on, themselves included, in id order (children first). */
export function reachable(graph: Graph, outputs: Iterable<NodeId>): NodeId[] {
  const needed = new Set<NodeId>(outputs);
  const top = Math.max(-1, ...needed);
  for (let id = top; id >= 0; id--) {
    if (!needed.has(id)) continue;
    for (const argument of argumentsOf(graph.node(id))) needed.add(argument);
  }
  return [...needed].sort((a, b) => a - b);
}

/** The names of the variables that the outputs depend on. */
export function variablesOf(graph: Graph, outputs: Iterable<NodeId>): Set<string> {
  const names = new Set<string>();
  for (const id of reachable(graph, outputs)) {
    const node = graph.node(id);
    if (node.kind === 'variable') names.add(node.name);
  }
  return names;
}

/** The outputs with each named variable replaced by a node of the same graph. */
export function substitute(graph: Graph, outputs: readonly NodeId[], bindings: ReadonlyMap<string, NodeId>): NodeId[] {
  const images = new Map<NodeId, NodeId>();
  for (const id of reachable(graph, outputs)) {
    const node = graph.node(id);
    const bound = node.kind === 'variable' ? bindings.get(node.name) : undefined;
    images.set(id, bound ?? rebuild(graph, node, id, (argument) => images.get(argument) as NodeId));
  }
  return outputs.map((id) => images.get(id) as NodeId);
}

/** The node remade over the images of its arguments; the node itself when none of them changed. */
export function rebuild(graph: Graph, node: Node, id: NodeId, image: (argument: NodeId) => NodeId): NodeId {
  if (!('args' in node)) return id;
  const args = node.args.map(image);
  if (args.every((argument, index) => argument === node.args[index])) return id;
  const [first, second, third, fourth] = args as [NodeId, NodeId, NodeId, NodeId];
  switch (node.kind) {
    case 'unary':
      return unary(graph, node.op, first);
    case 'binary':
      return binary(graph, node.op, first, second);
    case 'power':
      return power(graph, first, node.exponent);
    case 'choice':
      return choice(graph, node.op, first, second, third, fourth);
  }
}
