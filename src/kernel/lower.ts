import { argumentsOf, Graph, type Node, type NodeId } from '../graph/graph.ts';
import { reachable } from '../graph/traverse.ts';
import { type Rational, rational } from '../number/rational.ts';

export interface Lowered {
  readonly graph: Graph;
  readonly outputs: readonly NodeId[];
}

/** Integer parts of an exponent beyond this stay a general power. */
const largestProduct = 64n;

/**
 * A new graph of only the nodes the outputs need, with powers written as products, square roots, cube
 * roots and reciprocals wherever the exponent's denominator is 1, 2, 3, 4 or 6, so that x^(4/3),
 * x^(−1/3) and x^(5/3) share one cbrt(x). Of powers there remain the exponents 1/2 and 1/3 and the
 * general ones. To be done after differentiation: x·cbrt(x) has a derivative that is 0/0 at x = 0.
 *
 * Signs and limits are those of the power: the real root for odd denominators, NaN on negative x for
 * even ones, no negative zero from an even root, an infinity where a negative power meets 0.
 */
export function lowerPowers(source: Graph, outputs: readonly NodeId[]): Lowered {
  const graph = new Graph();
  const images = new Map<NodeId, NodeId>();
  for (const id of reachable(source, outputs)) images.set(id, lowerNode(graph, source.node(id), images));
  return { graph, outputs: outputs.map((id) => images.get(id) as NodeId) };
}

function lowerNode(graph: Graph, node: Node, images: ReadonlyMap<NodeId, NodeId>): NodeId {
  const [first, second, third, fourth] = argumentsOf(node).map((id) => images.get(id)) as [
    NodeId,
    NodeId,
    NodeId,
    NodeId,
  ];
  switch (node.kind) {
    case 'unary':
      return graph.intern({ ...node, args: [first] });
    case 'binary':
      return graph.intern({ ...node, args: [first, second] });
    case 'choice':
      return graph.intern({ ...node, args: [first, second, third, fourth] });
    case 'power':
      return lowerPower(graph, first, node.exponent);
    default:
      return graph.intern(node);
  }
}

function lowerPower(graph: Graph, x: NodeId, exponent: Rational): NodeId {
  const whole = exponent.n / exponent.d;
  const rest = exponent.n % exponent.d;
  const root = rest === 0n ? undefined : fractionalPower(graph, x, rest, exponent.d);
  if (whole > largestProduct || (rest !== 0n && root === undefined)) return generalPower(graph, x, exponent);
  const product = whole === 0n ? undefined : integerPower(graph, x, whole);
  const joined = product === undefined || root === undefined ? (product ?? root) : multiply(graph, product, root);
  if (joined === undefined) return graph.intern({ kind: 'rational', value: rational(1) });
  // √−0 is −0 in IEEE arithmetic; its reciprocal would be −∞.
  const unsigned = exponent.d % 2n === 0n ? graph.intern({ kind: 'unary', op: 'abs', args: [joined] }) : joined;
  return exponent.s < 0n ? reciprocal(graph, unsigned) : unsigned;
}

/** x^(rest/degree) for 0 < rest < degree, or undefined where roots do not suffice. */
function fractionalPower(graph: Graph, x: NodeId, rest: bigint, degree: bigint): NodeId | undefined {
  const half = (): NodeId => generalPower(graph, x, rational(1, 2));
  const third = (): NodeId => generalPower(graph, x, rational(1, 3));
  switch (`${rest}/${degree}`) {
    case '1/2':
      return half();
    case '1/3':
      return third();
    case '2/3':
      return multiply(graph, third(), third());
    case '1/4':
      return generalPower(graph, half(), rational(1, 2));
    case '3/4':
      return multiply(graph, half(), generalPower(graph, half(), rational(1, 2)));
    case '1/6':
      return generalPower(graph, third(), rational(1, 2));
    case '5/6':
      return multiply(graph, half(), third());
    default:
      return undefined;
  }
}

/** xⁿ by repeated squaring; x² and x⁴ are shared with other powers of x. */
function integerPower(graph: Graph, x: NodeId, exponent: bigint): NodeId {
  if (exponent === 1n) return x;
  const half = integerPower(graph, x, exponent / 2n);
  const square = multiply(graph, half, half);
  return exponent % 2n === 0n ? square : multiply(graph, square, x);
}

function multiply(graph: Graph, left: NodeId, right: NodeId): NodeId {
  return graph.intern({ kind: 'binary', op: 'mul', args: left <= right ? [left, right] : [right, left] });
}

function reciprocal(graph: Graph, x: NodeId): NodeId {
  const one = graph.intern({ kind: 'rational', value: rational(1) });
  return graph.intern({ kind: 'binary', op: 'div', args: [one, x] });
}

function generalPower(graph: Graph, x: NodeId, exponent: Rational): NodeId {
  return graph.intern({ kind: 'power', exponent, args: [x] });
}
