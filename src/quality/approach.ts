import type { Graph, NodeId } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';

/** A way to an edge: a point for each distance from it. */
export type Path = (distance: Decimal) => ReadonlyMap<string, Decimal>;

/** What a quantity does on the way to an edge. */
export type Tendency =
  | { readonly kind: 'limit'; readonly value: number }
  /** |f| grows as distance^(−power); power 0 for a logarithm. */
  | { readonly kind: 'diverges'; readonly power: number }
  /** Neither settles nor grows: it stays bounded as far as can be told. */
  | { readonly kind: 'bounded'; readonly value: number }
  | { readonly kind: 'no-value' };

/** Digits of the points on a path. */
export const pathDigits = 60;
const distances = ['1e-6', '1e-9', '1e-12'];
const decadesApart = 3;
/** Two values that differ by less have settled: a difference that falls as the cube root of the distance still shows. */
const settled = 2e-3;

/** How each node behaves as a path is followed to its end, from three points close to it in high precision. */
export function tendencies(graph: Graph, nodes: readonly NodeId[], path: Path): Tendency[] {
  const context = decimalContext(pathDigits);
  const rows = distances.map((distance) => evaluateDecimal(graph, nodes, path(context.from(distance)), pathDigits));
  return nodes.map((_, index) => tendency(rows.map((row) => row[index] as Decimal)));
}

function tendency(values: readonly Decimal[]): Tendency {
  const [first, second, third] = values as [Decimal, Decimal, Decimal];
  if (!values.every((value) => value.isFinite())) return { kind: 'no-value' };
  const value = third.toNumber();
  const difference = third.minus(second).abs();
  if (difference.lessThanOrEqualTo(third.abs().times(settled).plus(1e-6))) return { kind: 'limit', value };
  const grows = (a: Decimal, b: Decimal) => b.abs().greaterThan(a.abs().times(1.1));
  if (grows(first, second) && grows(second, third)) {
    const ratio = third.div(second).abs();
    const power = decimalContext(20).log(ratio).toNumber() / (decadesApart * Math.LN10);
    // A logarithm grows by less and less each time.
    return { kind: 'diverges', power: power < 0.1 ? 0 : power };
  }
  return { kind: 'bounded', value };
}
