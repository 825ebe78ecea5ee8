import type { Rational } from '../number/rational.ts';
import { parseDecimal, rational } from '../number/rational.ts';
import type { Graph, NodeId } from './graph.ts';
import type { BinaryOperator, ChoiceOperator, UnaryOperator } from './operator.ts';

/*
 * The only way nodes are made. Simplifications are identities that hold on the whole real domain of
 * the left-hand side (they may extend it at a removable point, never change a value).
 */

export function constant(graph: Graph, value: Rational | number | bigint): NodeId {
  return graph.intern({ kind: 'rational', value: typeof value === 'object' ? value : rational(value) });
}

/** A constant from exact decimal text written in this program's own source. */
export function decimal(graph: Graph, text: string): NodeId {
  const value = parseDecimal(text);
  if (value === undefined) throw new RangeError(`not a decimal: ${text}`);
  return constant(graph, value);
}

export function pi(graph: Graph): NodeId {
  return graph.intern({ kind: 'pi' });
}

export function variable(graph: Graph, name: string): NodeId {
  return graph.intern({ kind: 'variable', name });
}

/** The exact value of a rational constant node, or undefined for any other node. */
export function rationalValue(graph: Graph, id: NodeId): Rational | undefined {
  const node = graph.node(id);
  return node.kind === 'rational' ? node.value : undefined;
}

export function add(graph: Graph, left: NodeId, right: NodeId): NodeId {
  const a = rationalValue(graph, left);
  const b = rationalValue(graph, right);
  if (a && b) return constant(graph, a.add(b));
  if (a?.equals(0)) return right;
  if (b?.equals(0)) return left;
  const negated = negatedArgument(graph, right);
  if (negated !== undefined) return sub(graph, left, negated);
  const negatedLeft = negatedArgument(graph, left);
  if (negatedLeft !== undefined) return sub(graph, right, negatedLeft);
  return commutative(graph, 'add', left, right);
}

export function sub(graph: Graph, left: NodeId, right: NodeId): NodeId {
  const a = rationalValue(graph, left);
  const b = rationalValue(graph, right);
  if (a && b) return constant(graph, a.sub(b));
  if (b?.equals(0)) return left;
  if (a?.equals(0)) return neg(graph, right);
  if (left === right) return constant(graph, 0);
  const negated = negatedArgument(graph, right);
  if (negated !== undefined) return add(graph, left, negated);
  // exp(x) − 1 = expm1(x), without the cancellation.
  const minuend = graph.node(left);
  if (b?.equals(1) && minuend.kind === 'unary' && minuend.op === 'exp') return unary(graph, 'expm1', minuend.args[0]);
  return graph.intern({ kind: 'binary', op: 'sub', args: [left, right] });
}

export function mul(graph: Graph, left: NodeId, right: NodeId): NodeId {
  const a = rationalValue(graph, left);
  const b = rationalValue(graph, right);
  if (a && b) return constant(graph, a.mul(b));
  if (a) return scale(graph, a, right);
  if (b) return scale(graph, b, left);
  const negatedLeft = negatedArgument(graph, left);
  if (negatedLeft !== undefined) return neg(graph, mul(graph, negatedLeft, right));
  const negatedRight = negatedArgument(graph, right);
  if (negatedRight !== undefined) return neg(graph, mul(graph, left, negatedRight));
  if (left === right) return power(graph, left, rational(2));
  return commutative(graph, 'mul', left, right);
}

function scale(graph: Graph, factor: Rational, operand: NodeId): NodeId {
  if (factor.equals(0)) return constant(graph, 0);
  if (factor.equals(1)) return operand;
  if (factor.equals(-1)) return neg(graph, operand);
  const node = graph.node(operand);
  if (node.kind === 'unary' && node.op === 'neg') return scale(graph, factor.neg(), node.args[0]);
  if (node.kind === 'binary' && node.op === 'mul') {
    const inner = rationalValue(graph, node.args[0]);
    if (inner) return scale(graph, factor.mul(inner), node.args[1]);
  }
  return graph.intern({ kind: 'binary', op: 'mul', args: [constant(graph, factor), operand] });
}

export function div(graph: Graph, left: NodeId, right: NodeId): NodeId {
  const a = rationalValue(graph, left);
  const b = rationalValue(graph, right);
  if (a?.equals(0) && !b?.equals(0)) return left;
  if (b && !b.equals(0)) return a ? constant(graph, a.div(b)) : scale(graph, b.inverse(), left);
  const negatedLeft = negatedArgument(graph, left);
  if (negatedLeft !== undefined) return neg(graph, div(graph, negatedLeft, right));
  return graph.intern({ kind: 'binary', op: 'div', args: [left, right] });
}

export function neg(graph: Graph, operand: NodeId): NodeId {
  return unary(graph, 'neg', operand);
}

/** base^exponent for a constant rational exponent. */
export function power(graph: Graph, base: NodeId, exponent: Rational): NodeId {
  if (exponent.equals(0)) return constant(graph, 1);
  if (exponent.equals(1)) return base;
  const node = graph.node(base);
  if (node.kind === 'rational') {
    const exact = exactPower(node.value, exponent);
    if (exact) return constant(graph, exact);
  }
  if (node.kind === 'power' && powersMerge(node.exponent, exponent)) {
    return power(graph, node.args[0], node.exponent.mul(exponent));
  }
  // (a √b)^2 = a² b, which unlike the left-hand side has a derivative at b = 0.
  if (node.kind === 'binary' && exponent.d === 1n && exponent.s > 0n && hasEvenRootFactor(graph, base)) {
    const [left, right] = node.args;
    return (node.op === 'div' ? div : mul)(graph, power(graph, left, exponent), power(graph, right, exponent));
  }
  return graph.intern({ kind: 'power', exponent, args: [base] });
}

function hasEvenRootFactor(graph: Graph, id: NodeId): boolean {
  const node = graph.node(id);
  if (node.kind === 'power') return node.exponent.d % 2n === 0n && node.exponent.s > 0n;
  if (node.kind !== 'binary' || (node.op !== 'mul' && node.op !== 'div')) return false;
  return node.args.some((factor) => hasEvenRootFactor(graph, factor));
}

/** (x^a)^b = x^(ab) needs x ≥ 0 by the domain of x^a (even denominator), or integers throughout. */
function powersMerge(inner: Rational, outer: Rational): boolean {
  const innerIsEvenRoot = inner.d % 2n === 0n && inner.s > 0n;
  const positiveIntegers = inner.d === 1n && outer.d === 1n;
  return innerIsEvenRoot || positiveIntegers;
}

function exactPower(base: Rational, exponent: Rational): Rational | undefined {
  if (base.equals(1)) return base;
  if (base.equals(0)) return exponent.s > 0n ? base : undefined;
  if (exponent.d !== 1n || exponent.n > 64n) return undefined;
  return base.pow(exponent) ?? undefined;
}

export function sqrt(graph: Graph, operand: NodeId): NodeId {
  return power(graph, operand, rational(1, 2));
}

export function cbrt(graph: Graph, operand: NodeId): NodeId {
  return power(graph, operand, rational(1, 3));
}

/** base^exponent for any exponent node: a rational constant gives a power, else exp(exponent·log(base)). */
export function raise(graph: Graph, base: NodeId, exponent: NodeId): NodeId {
  const value = rationalValue(graph, exponent);
  if (value) return power(graph, base, value);
  return unary(graph, 'exp', mul(graph, exponent, unary(graph, 'log', base)));
}

export function unary(graph: Graph, op: UnaryOperator, operand: NodeId): NodeId {
  const value = rationalValue(graph, operand);
  if (value) {
    if (op === 'neg') return constant(graph, value.neg());
    if (op === 'abs') return constant(graph, value.abs());
    if (value.equals(0)) {
      if (op === 'exp' || op === 'cos' || op === 'cosh') return constant(graph, 1);
      if (op !== 'log') return operand;
    }
    if (op === 'log' && value.equals(1)) return constant(graph, 0);
  }
  if (op === 'neg') {
    const negated = negatedArgument(graph, operand);
    if (negated !== undefined) return negated;
    const node = graph.node(operand);
    if (node.kind === 'binary' && node.op === 'sub') return sub(graph, node.args[1], node.args[0]);
  }
  if (op === 'log') {
    const shifted = argumentBeyondOne(graph, operand);
    if (shifted !== undefined) return unary(graph, 'log1p', shifted);
  }
  return graph.intern({ kind: 'unary', op, args: [operand] });
}

/** x where the node is 1 + x or 1 − y (x = −y), so that log(1 + x) = log1p(x) without the cancellation. */
function argumentBeyondOne(graph: Graph, id: NodeId): NodeId | undefined {
  const node = graph.node(id);
  if (node.kind !== 'binary') return undefined;
  const [left, right] = node.args;
  if (node.op === 'add') {
    if (rationalValue(graph, left)?.equals(1)) return right;
    if (rationalValue(graph, right)?.equals(1)) return left;
  }
  if (node.op === 'sub' && rationalValue(graph, left)?.equals(1)) return neg(graph, right);
  return undefined;
}

export function binary(graph: Graph, op: BinaryOperator, left: NodeId, right: NodeId): NodeId {
  switch (op) {
    case 'add':
      return add(graph, left, right);
    case 'sub':
      return sub(graph, left, right);
    case 'mul':
      return mul(graph, left, right);
    case 'div':
      return div(graph, left, right);
    case 'min':
    case 'max': {
      if (left === right) return left;
      const a = rationalValue(graph, left);
      const b = rationalValue(graph, right);
      if (a && b) return a.compare(b) < 0 === (op === 'min') ? left : right;
      return commutative(graph, op, left, right);
    }
  }
}

export function choice(
  graph: Graph,
  op: ChoiceOperator,
  left: NodeId,
  right: NodeId,
  whenTrue: NodeId,
  whenFalse: NodeId,
): NodeId {
  if (whenTrue === whenFalse) return whenTrue;
  const a = rationalValue(graph, left);
  const b = rationalValue(graph, right);
  if (a && b) return (op === 'ifLess' ? a.compare(b) < 0 : a.compare(b) <= 0) ? whenTrue : whenFalse;
  return graph.intern({ kind: 'choice', op, args: [left, right, whenTrue, whenFalse] });
}

function commutative(graph: Graph, op: 'add' | 'mul' | 'min' | 'max', left: NodeId, right: NodeId): NodeId {
  return graph.intern({ kind: 'binary', op, args: left <= right ? [left, right] : [right, left] });
}

function negatedArgument(graph: Graph, id: NodeId): NodeId | undefined {
  const node = graph.node(id);
  return node.kind === 'unary' && node.op === 'neg' ? node.args[0] : undefined;
}
