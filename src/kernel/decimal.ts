import { argumentsOf, type Graph, type Node, type NodeId } from '../graph/graph.ts';
import type { BinaryOperator, ChoiceOperator, UnaryOperator } from '../graph/operator.ts';
import { type Decimal, type DecimalContext, decimalContext } from '../number/decimal.ts';

type UnaryRule = (context: DecimalContext, x: Decimal) => Decimal;
type BinaryRule = (a: Decimal, b: Decimal) => Decimal;

const unaryRules: Record<UnaryOperator, UnaryRule> = {
  neg: (_context, x) => x.neg(),
  abs: (_context, x) => x.abs(),
  exp: (context, x) => context.exp(x),
  expm1: (context, x) => context.expm1(x),
  log: (context, x) => context.log(x),
  log1p: (context, x) => context.log1p(x),
  sin: (context, x) => context.sin(x),
  cos: (context, x) => context.cos(x),
  sinh: (context, x) => context.sinh(x),
  cosh: (context, x) => context.cosh(x),
  tanh: (context, x) => context.tanh(x),
  asinh: (context, x) => context.asinh(x),
  atan: (context, x) => context.atan(x),
  erf: (context, x) => context.erf(x),
  lambertW: (context, x) => context.lambertW(x),
};

const binaryRules: Record<BinaryOperator, BinaryRule> = {
  add: (a, b) => a.plus(b),
  sub: (a, b) => a.minus(b),
  mul: (a, b) => a.times(b),
  div: (a, b) => a.div(b),
  // Decimal.min would answer in the default precision.
  min: (a, b) => (a.isNaN() || a.lessThan(b) ? a : b),
  max: (a, b) => (a.isNaN() || a.greaterThan(b) ? a : b),
};

const choiceRules: Record<ChoiceOperator, (a: Decimal, b: Decimal) => boolean> = {
  ifLess: (a, b) => a.lessThan(b),
  ifLessEqual: (a, b) => a.lessThanOrEqualTo(b),
};

/**
 * The outputs at one point, each operation rounded to `digits` significant digits. Infinities and NaN
 * propagate as in IEEE 754; of a choice only the branch taken is evaluated. Throws a RangeError for a
 * variable without a binding.
 */
export function evaluateDecimal(
  graph: Graph,
  outputs: readonly NodeId[],
  bindings: ReadonlyMap<string, Decimal>,
  digits: number,
): Decimal[] {
  return evaluateInto(new Map(), graph, outputs, bindings, digits);
}

/** As `evaluateDecimal`, with the values of some nodes known already; those of the nodes that it needs are added. */
export function evaluateInto(
  values: Map<NodeId, Decimal>,
  graph: Graph,
  outputs: readonly NodeId[],
  bindings: ReadonlyMap<string, Decimal>,
  digits: number,
): Decimal[] {
  const context = decimalContext(digits);
  const known = (id: NodeId): Decimal => values.get(id) as Decimal;
  const pending = [...outputs];
  // A stack instead of a loop in id order, so that the branch not taken costs nothing and cannot fail.
  while (pending.length > 0) {
    const id = pending[pending.length - 1] as NodeId;
    const node = graph.node(id);
    const missing = values.has(id) ? [] : needed(node, values);
    if (missing.length > 0) {
      pending.push(...missing);
      continue;
    }
    pending.pop();
    if (!values.has(id)) values.set(id, evaluateNode(context, node, bindings, known));
  }
  return outputs.map(known);
}

/** The arguments still to be evaluated before the node can be; for a choice first those of the comparison. */
function needed(node: Node, values: ReadonlyMap<NodeId, Decimal>): NodeId[] {
  const unknown = (id: NodeId): boolean => !values.has(id);
  if (node.kind !== 'choice') return argumentsOf(node).filter(unknown);
  const compared = [node.args[0], node.args[1]].filter(unknown);
  if (compared.length > 0) return compared;
  return [taken(node, (id) => values.get(id) as Decimal)].filter(unknown);
}

function taken(node: Node & { kind: 'choice' }, known: (id: NodeId) => Decimal): NodeId {
  const [left, right, whenTrue, whenFalse] = node.args;
  return choiceRules[node.op](known(left), known(right)) ? whenTrue : whenFalse;
}

function evaluateNode(
  context: DecimalContext,
  node: Node,
  bindings: ReadonlyMap<string, Decimal>,
  known: (id: NodeId) => Decimal,
): Decimal {
  switch (node.kind) {
    case 'rational':
      return context.fromRational(node.value);
    case 'pi':
      return context.pi;
    case 'variable': {
      const bound = bindings.get(node.name);
      if (bound === undefined) throw new RangeError(`no value for the variable ${node.name}`);
      return context.from(bound);
    }
    case 'unary':
      return unaryRules[node.op](context, known(node.args[0]));
    case 'binary':
      return binaryRules[node.op](known(node.args[0]), known(node.args[1]));
    case 'power':
      return context.power(known(node.args[0]), node.exponent);
    case 'choice':
      return known(taken(node, known));
  }
}
