import { variable } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { printNode } from '../graph/print.ts';
import { reachable, substitute, variablesOf } from '../graph/traverse.ts';

/** A rational function as text in neutral names, and which name stands for which variable. */
export interface RationalForm {
  readonly text: string;
  readonly names: ReadonlyMap<string, string>;
}

/** Beyond this computer algebra takes longer than a reader waits. */
const mostNodes = 80;
const longestText = 1500;

/**
 * The node as text for computer algebra, with `x` for one variable and p0, p1 … for the others; undefined when it is not a
 * small rational function of its variables. Names of sheets never reach the other program.
 */
export function rationalForm(graph: Graph, node: NodeId, along: string | undefined): RationalForm | undefined {
  const nodes = reachable(graph, [node]);
  if (nodes.length > mostNodes || !nodes.every((id) => isRationalOperation(graph, id))) return undefined;
  const variables = [...variablesOf(graph, [node])].filter((name) => name !== along);
  const names = new Map(variables.map((name, index) => [`p${index}`, name]));
  const renamed = new Map([...names].map(([short, name]) => [name, variable(graph, short)]));
  if (along !== undefined) renamed.set(along, variable(graph, 'x'));
  const [neutral] = substitute(graph, [node], renamed) as [NodeId];
  const text = printNode(graph, neutral, longestText);
  return text.includes('…') ? undefined : { text, names };
}

function isRationalOperation(graph: Graph, id: NodeId): boolean {
  const node = graph.node(id);
  switch (node.kind) {
    case 'rational':
    case 'variable':
      return true;
    case 'unary':
      return node.op === 'neg';
    case 'binary':
      return node.op !== 'min' && node.op !== 'max';
    case 'power':
      return node.exponent.d === 1n;
    default:
      return false;
  }
}
