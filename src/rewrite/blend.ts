import { add, constant, mul, sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { type Rational, rational } from '../number/rational.ts';
import { mapGraph } from './simplify.ts';
import { type Sum, sumNode, sumOf } from './sum.ts';

/**
 * a + f·(b − a) → a·(1 − f) + f·b, anywhere in a sum: f·(b − a) = f·b − f·a, and a − f·a = a·(1 − f), in any field.
 * Both sides have values at the same points. The left-hand side hides that the result lies between a and b.
 */
export function separateBlends(graph: Graph, outputs: readonly NodeId[]): NodeId[] {
  return mapGraph(graph, outputs, (id) => {
    const node = graph.node(id);
    if (node.kind !== 'binary' || (node.op !== 'add' && node.op !== 'sub')) return id;
    return (
      direct(graph, node.args[0], node.args[1], node.op === 'add' ? 1 : -1) ?? separated(graph, sumOf(graph, id)) ?? id
    );
  });
}

/** a + sign·term where the term has b − a as a factor and a is itself a sum. */
function direct(graph: Graph, a: NodeId, term: NodeId, sign: 1 | -1): NodeId | undefined {
  for (const [first, second, own] of [[a, term, sign], ...(sign === 1 ? [[term, a, 1] as const] : [])] as const) {
    const whole = {
      constant: rational(0),
      terms: new Map([
        [first, rational(1)],
        [second, rational(own)],
      ]),
    };
    const found = separated(graph, whole);
    if (found !== undefined) return found;
  }
  return undefined;
}

function separated(graph: Graph, sum: Sum): NodeId | undefined {
  for (const [term, coefficient] of sum.terms) {
    const factors = factorsOf(graph, term);
    for (const [index, factor] of factors.entries()) {
      const node = graph.node(factor);
      if (node.kind !== 'binary' || node.op !== 'sub') continue;
      for (const [a, b, sign] of [
        [node.args[1], node.args[0], 1],
        [node.args[0], node.args[1], -1],
      ] as const) {
        if (!isUnit(sum.terms.get(a)) || a === term) continue;
        const rest = factors.filter((_, other) => other !== index);
        const product = rest.reduce((left, right) => mul(graph, left, right), constant(graph, coefficient.mul(sign)));
        const terms = new Map(sum.terms);
        terms.delete(a);
        terms.delete(term);
        const remainder = { constant: sum.constant, terms };
        const others = separated(graph, remainder) ?? sumNode(graph, remainder);
        const blend = add(graph, mul(graph, a, sub(graph, constant(graph, 1), product)), mul(graph, product, b));
        return add(graph, others, blend);
      }
    }
  }
  return undefined;
}

function isUnit(coefficient: Rational | undefined): boolean {
  return coefficient?.equals(rational(1)) ?? false;
}

function factorsOf(graph: Graph, id: NodeId): NodeId[] {
  const node = graph.node(id);
  if (node.kind !== 'binary' || node.op !== 'mul') return [id];
  return node.args.flatMap((argument) => factorsOf(graph, argument));
}
