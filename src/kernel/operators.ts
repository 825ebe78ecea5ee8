import type { Node } from '../graph/graph.ts';
import type { BinaryOperator, ChoiceOperator, UnaryOperator } from '../graph/operator.ts';
import { type Rational, toNumber } from '../number/rational.ts';

/*
 * The float64 meaning of every operator as JavaScript text. Arguments are texts made by this folder:
 * local names and printed numbers, never a name from the graph.
 */

const unaryText: Record<UnaryOperator, (x: string) => string> = {
  neg: (x) => `-${x}`,
  abs: (x) => `Math.abs(${x})`,
  exp: (x) => `Math.exp(${x})`,
  expm1: (x) => `Math.expm1(${x})`,
  log: (x) => `Math.log(${x})`,
  log1p: (x) => `Math.log1p(${x})`,
  sin: (x) => `Math.sin(${x})`,
  cos: (x) => `Math.cos(${x})`,
  sinh: (x) => `Math.sinh(${x})`,
  cosh: (x) => `Math.cosh(${x})`,
  tanh: (x) => `Math.tanh(${x})`,
  asinh: (x) => `Math.asinh(${x})`,
  atan: (x) => `Math.atan(${x})`,
  erf: (x) => `erf(${x})`,
  lambertW: (x) => `lambertW(${x})`,
};

const binaryText: Record<BinaryOperator, (a: string, b: string) => string> = {
  add: (a, b) => `${a} + ${b}`,
  sub: (a, b) => `${a} - ${b}`,
  mul: (a, b) => `${a} * ${b}`,
  div: (a, b) => `${a} / ${b}`,
  // Both propagate NaN.
  min: (a, b) => `Math.min(${a}, ${b})`,
  max: (a, b) => `Math.max(${a}, ${b})`,
};

const choiceText: Record<ChoiceOperator, (a: string, b: string, c: string, d: string) => string> = {
  ifLess: (a, b, c, d) => `${a} < ${b} ? ${c} : ${d}`,
  ifLessEqual: (a, b, c, d) => `${a} <= ${b} ? ${c} : ${d}`,
};

/** The expression that computes the node from the texts of its arguments. */
export function nodeText(node: Node, argument: (position: number) => string): string {
  switch (node.kind) {
    case 'unary':
      return unaryText[node.op](argument(0));
    case 'binary':
      return binaryText[node.op](argument(0), argument(1));
    case 'choice':
      return choiceText[node.op](argument(0), argument(1), argument(2), argument(3));
    case 'power':
      return powerText(node.exponent, argument(0));
    default:
      throw new TypeError(`a ${node.kind} is not computed`);
  }
}

function powerText(exponent: Rational, x: string): string {
  if (exponent.n === 1n && exponent.s > 0n && exponent.d === 2n) return `Math.sqrt(${x})`;
  if (exponent.n === 1n && exponent.s > 0n && exponent.d === 3n) return `Math.cbrt(${x})`;
  const power = numberText(toNumber(exponent));
  if (exponent.d === 1n) return `Math.pow(${x}, ${power})`;
  // Math.pow(−∞, 1/4) would be ∞.
  if (exponent.d % 2n === 0n) return `Math.pow(${x} < 0 ? NaN : ${x}, ${power})`;
  const magnitude = `Math.pow(Math.abs(${x}), ${power})`;
  if (exponent.n % 2n === 0n) return magnitude;
  return `${x} < 0 || Object.is(${x}, -0) ? -${magnitude} : ${magnitude}`;
}

/** A number as a JavaScript literal that reads back as the same double, safe on either side of an operator. */
export function numberText(value: number): string {
  if (Object.is(value, -0)) return '(-0)';
  return value < 0 ? `(${value})` : String(value);
}
