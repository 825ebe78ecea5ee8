import type { Rational } from '../number/rational.ts';
import { rationalText } from '../number/rational.ts';
import type { BinaryOperator, ChoiceOperator, UnaryOperator } from './operator.ts';

/** The index of a node in its graph; a child's id is smaller than its parent's. */
export type NodeId = number;

export type Node =
  | { readonly kind: 'rational'; readonly value: Rational }
  | { readonly kind: 'pi' }
  | { readonly kind: 'variable'; readonly name: string }
  | { readonly kind: 'unary'; readonly op: UnaryOperator; readonly args: readonly [NodeId] }
  | { readonly kind: 'binary'; readonly op: BinaryOperator; readonly args: readonly [NodeId, NodeId] }
  /** x^(p/q) with a constant rational exponent; for odd q it is the real root on negative x. */
  | { readonly kind: 'power'; readonly exponent: Rational; readonly args: readonly [NodeId] }
  | {
      readonly kind: 'choice';
      readonly op: ChoiceOperator;
      readonly args: readonly [NodeId, NodeId, NodeId, NodeId];
    };

const noArguments: readonly NodeId[] = [];

export function argumentsOf(node: Node): readonly NodeId[] {
  return 'args' in node ? node.args : noArguments;
}

/**
 * An append-only arena of interned nodes: structurally equal means same id. Passes add nodes and
 * never change one, so any pass over a graph is one loop in id order.
 */
export class Graph {
  readonly nodes: Node[] = [];
  readonly #interned = new Map<string, NodeId>();

  node(id: NodeId): Node {
    const found = this.nodes[id];
    if (found === undefined) throw new RangeError(`no node ${id} in a graph of ${this.nodes.length}`);
    return found;
  }

  intern(node: Node): NodeId {
    const key = keyOf(node);
    const existing = this.#interned.get(key);
    if (existing !== undefined) return existing;
    const id = this.nodes.length;
    this.nodes.push(node);
    this.#interned.set(key, id);
    return id;
  }
}

function keyOf(node: Node): string {
  switch (node.kind) {
    case 'rational':
      return `q${rationalText(node.value)}`;
    case 'pi':
      return 'pi';
    case 'variable':
      return `v${node.name}`;
    case 'power':
      return `^${rationalText(node.exponent)} ${node.args[0]}`;
    default:
      return `${node.op} ${node.args.join(' ')}`;
  }
}
