import type { Graph, Node, NodeId } from './graph.ts';

/** What is known of the sign of a node wherever it has a value. */
export interface Signs {
  isPositive(id: NodeId): boolean;
  isNonNegative(id: NodeId): boolean;
  isAboveMinusOne(id: NodeId): boolean;
}

/** −2 negative, −1 not positive, 0 unknown, 1 not negative, 2 positive. */
type Sign = -2 | -1 | 0 | 1 | 2;

/**
 * Signs by how nodes are made of variables that are positive; `lower`, where given, is a lower bound of a node's values
 * and is asked where that does not tell.
 */
export function makeSigns(
  graph: Graph,
  positiveVariables: ReadonlySet<string>,
  lower: (id: NodeId) => number = () => Number.NEGATIVE_INFINITY,
): Signs {
  const known = new Map<NodeId, Sign>();
  return {
    isPositive: (id) => signOf(id) === 2,
    isNonNegative: (id) => signOf(id) > 0,
    isAboveMinusOne,
  };

  function signOf(id: NodeId): Sign {
    const found = known.get(id);
    if (found !== undefined) return found;
    const made = bySigns(graph.node(id));
    const sign = made < 0 || made === 2 ? made : (Math.max(made, byBound(lower(id))) as Sign);
    known.set(id, sign);
    return sign;
  }

  function bySigns(node: Node): Sign {
    switch (node.kind) {
      case 'rational':
        return node.value.equals(0) ? 1 : node.value.s < 0n ? -2 : 2;
      case 'pi':
        return 2;
      case 'variable':
        return positiveVariables.has(node.name) ? 2 : 0;
      case 'unary':
        return ofUnary(node);
      case 'power':
        return ofPower(node);
      case 'binary':
        return ofBinary(node);
      case 'choice':
        return eitherOf(signOf(node.args[2]), signOf(node.args[3]));
    }
  }

  function ofUnary({ op, args }: Extract<Node, { kind: 'unary' }>): Sign {
    if (op === 'exp' || op === 'cosh') return 2;
    const inner = signOf(args[0]);
    if (op === 'neg') return opposite(inner);
    if (op === 'abs') return Math.abs(inner) === 2 ? 2 : 1;
    // Those that rise through 0 at 0.
    const rising = ['expm1', 'log1p', 'sinh', 'tanh', 'asinh', 'atan', 'erf', 'lambertW'];
    return rising.includes(op) ? inner : 0;
  }

  function ofPower({ exponent, args }: Extract<Node, { kind: 'power' }>): Sign {
    const base = signOf(args[0]);
    if (base === 2) return 2;
    const isEven = exponent.n % 2n === 0n || exponent.d % 2n === 0n;
    if (isEven && base === -2) return 2;
    const sign = isEven ? 1 : base;
    // A reciprocal that has a value is not zero.
    return exponent.s < 0n ? strict(sign) : sign;
  }

  function ofBinary({ op, args }: Extract<Node, { kind: 'binary' }>): Sign {
    const [a, b] = [signOf(args[0]), signOf(args[1])];
    switch (op) {
      case 'add':
        return a > 0 && b > 0 && areApart(args) ? 2 : sumOf(a, b);
      case 'sub':
        return sumOf(a, opposite(b));
      case 'mul':
        return productOf(a, b);
      case 'div':
        return productOf(a, strict(b));
      case 'max':
        return a > 0 || b > 0 ? (Math.max(a, b) as Sign) : eitherOf(a, b);
      case 'min':
        return a < 0 || b < 0 ? (Math.min(a, b) as Sign) : eitherOf(a, b);
    }
  }

  /** Whether two powers are not zero at once: of c + x and c − x for a constant c that is not zero. */
  function areApart(args: readonly NodeId[]): boolean {
    const [first, second] = args.map((id) => graph.node(id));
    if (first?.kind !== 'power' || second?.kind !== 'power') return false;
    const [plus, minus] = [graph.node(first.args[0]), graph.node(second.args[0])].sort((p, q) => opOf(p) - opOf(q));
    if (plus?.kind !== 'binary' || minus?.kind !== 'binary' || plus.op !== 'add' || minus.op !== 'sub') return false;
    const [c, x] = minus.args;
    const value = graph.node(c);
    return value.kind === 'rational' && !value.value.equals(0) && plus.args.includes(c) && plus.args.includes(x);
  }

  /** eˣ − 1 exceeds −1, and so does its product with what lies between 0 and 1. */
  function isAboveMinusOne(id: NodeId): boolean {
    if (signOf(id) > 0 || lower(id) > -1) return true;
    const node = graph.node(id);
    if (node.kind === 'unary') return node.op === 'expm1' || node.op === 'tanh';
    if (node.kind !== 'binary') return false;
    const [a, b] = node.args;
    if (node.op === 'mul') return (isAboveMinusOne(a) && isShare(b)) || (isAboveMinusOne(b) && isShare(a));
    return node.op === 'div' && isAboveMinusOne(a) && isAtLeastOne(b);
  }

  /** Whether a node lies between 0 and 1. */
  function isShare(id: NodeId): boolean {
    const node = graph.node(id);
    if (node.kind === 'rational') return node.value.s >= 0n && node.value.compare(1) <= 0;
    if (node.kind === 'power') return node.exponent.s < 0n && isAtLeastOne(node.args[0]);
    if (node.kind !== 'binary') return false;
    if (node.op === 'mul') return node.args.every(isShare);
    return node.op === 'div' && isShare(node.args[0]) && isAtLeastOne(node.args[1]);
  }

  function isAtLeastOne(id: NodeId): boolean {
    const node = graph.node(id);
    if (node.kind === 'rational') return node.value.compare(1) >= 0;
    if (node.kind !== 'binary' || node.op !== 'add') return false;
    const [a, b] = node.args;
    return (isAtLeastOne(a) && signOf(b) > 0) || (isAtLeastOne(b) && signOf(a) > 0);
  }
}

const opOf = (node: Node) => (node.kind === 'binary' && node.op === 'add' ? 0 : 1);
const opposite = (sign: Sign): Sign => (sign === 0 ? 0 : (-sign as Sign));
const strict = (sign: Sign): Sign => (2 * Math.sign(sign)) as Sign;

function sumOf(a: Sign, b: Sign): Sign {
  if (a > 0 && b > 0) return Math.max(a, b) as Sign;
  return a < 0 && b < 0 ? (Math.min(a, b) as Sign) : 0;
}

function productOf(a: Sign, b: Sign): Sign {
  if (a === 0 || b === 0) return 0;
  return (Math.sign(a * b) * Math.min(Math.abs(a), Math.abs(b))) as Sign;
}

/** What is true of both. */
function eitherOf(a: Sign, b: Sign): Sign {
  if (a > 0 && b > 0) return Math.min(a, b) as Sign;
  return a < 0 && b < 0 ? (Math.max(a, b) as Sign) : 0;
}

function byBound(lower: number): Sign {
  return lower > 0 ? 2 : lower >= 0 ? 1 : 0;
}
