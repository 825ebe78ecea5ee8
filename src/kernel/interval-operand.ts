import { argumentsOf, type Graph, type NodeId } from '../graph/graph.ts';
import { type SmoothName, smoothFunctions } from '../interval/functions.ts';
import { type EnclosedValue, evaluateIntervals } from './interval-point.ts';
import { numberText } from './operators.ts';

/** A unary operator, or numerator and denominator of a power. */
export type FunctionName = SmoothName | readonly [bigint, bigint];

/** 2⁻⁵²: one step outward; and what a sum of at most eight positive numbers must be multiplied by to be a bound. */
export const step = '2.220446049250313e-16';
export const above = '1.0000000000000036';
/** More than what underflow can lose in the few products of one node. */
export const underflow = '1e-150';

/** An operand as texts: its interval, and its first-order form over the axes it depends on. */
export interface Operand {
  readonly lower: string;
  readonly upper: string;
  readonly centre: string;
  readonly error: string;
  readonly axes: readonly number[];
  readonly coefficient: (axis: number) => string;
  /** A value that is not 0 where the operand may lack a value. */
  readonly outside: string | undefined;
  readonly constant?: EnclosedValue;
}

export function mayLeave(name: FunctionName): boolean {
  if (typeof name !== 'string') return name[0] < 0n || name[1] % 2n === 0n;
  return smoothFunctions[name].least > Number.NEGATIVE_INFINITY;
}

export function radius(x: Operand): string {
  return `(${[x.error, ...x.axes.map((axis) => `Math.abs(${x.coefficient(axis)})`)].join(' + ')})`;
}

/** l, u of a product, with one step outward; a call where a product is zero, tiny, huge or not a number. */
export function productText(id: NodeId | string, a: Operand, b: Operand): string {
  const products = [
    `${a.lower} * ${b.lower}`,
    `${a.lower} * ${b.upper}`,
    `${a.upper} * ${b.lower}`,
    `${a.upper} * ${b.upper}`,
  ];
  const scalar = b.constant ?? a.constant;
  const distinct = scalar !== undefined && scalar.lower === scalar.upper ? [products[0], products[3]] : products;
  return [
    `l${id} = Math.min(${distinct.join(', ')}); u${id} = Math.max(${distinct.join(', ')});`,
    `t = Math.abs(l${id}); q = Math.abs(u${id});`,
    `if (t > 1e-280 && t < 1e300 && q > 1e-280 && q < 1e300) { l${id} -= t * ${step}; u${id} += q * ${step}; }`,
    `else { R[0] = ${a.lower}; R[1] = ${a.upper}; R[2] = ${b.lower}; R[3] = ${b.upper}; multiply(R); l${id} = R[0]; u${id} = R[1]; }`,
  ].join('\n');
}

export function constantOperand(value: EnclosedValue): Operand {
  const { lower, upper } = value;
  const centre = lower + (upper - lower) / 2;
  const error = lower === upper ? 0 : Math.max(upper - centre, centre - lower) * (1 + 2 ** -50);
  return {
    lower: numberText(lower),
    upper: numberText(upper),
    centre: numberText(Number.isFinite(centre) ? centre : 0),
    error: Number.isFinite(centre) ? numberText(error) : 'Infinity',
    axes: [],
    coefficient: () => '0',
    outside: value.defined ? undefined : '1',
    constant: value,
  };
}

export function axesIn(mask: number): number[] {
  const axes: number[] = [];
  for (let axis = 0; mask >> axis !== 0; axis++) if (mask & (1 << axis)) axes.push(axis);
  return axes;
}

export function axesOfNodes(graph: Graph, ids: readonly NodeId[], variables: readonly string[]): Map<NodeId, number> {
  const masks = new Map<NodeId, number>();
  for (const id of ids) {
    const node = graph.node(id);
    if (node.kind === 'variable') {
      const axis = variables.indexOf(node.name);
      if (axis < 0) throw new RangeError(`the variable ${node.name} has no axis`);
      masks.set(id, 1 << axis);
    } else {
      masks.set(
        id,
        argumentsOf(node).reduce((mask, argument) => mask | (masks.get(argument) as number), 0),
      );
    }
  }
  return masks;
}

/** Every node that depends on no variable, enclosed from its exact rationals. */
export function enclosedConstants(
  graph: Graph,
  ids: readonly NodeId[],
  masks: ReadonlyMap<NodeId, number>,
): Map<NodeId, EnclosedValue> {
  const constant = ids.filter((id) => masks.get(id) === 0);
  const values = evaluateIntervals(graph, constant, new Map());
  return new Map(constant.map((id, index) => [id, values[index] as EnclosedValue]));
}
