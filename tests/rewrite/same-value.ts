import { expect } from 'vitest';
import type { Graph, NodeId } from '../../src/graph/graph.ts';
import { variablesOf } from '../../src/graph/traverse.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { decimalContext } from '../../src/number/decimal.ts';

const context = decimalContext(50);

/** The two nodes agree to 40 digits at 30 points of 0.6…1.4, each coordinate with the sign given. */
export function expectSame(graph: Graph, a: NodeId, b: NodeId, sign: Readonly<Record<string, number>> = {}): void {
  const names = [...variablesOf(graph, [a, b])];
  for (let count = 1; count <= 30; count++) {
    const point = new Map(
      names.map((name, index) => {
        const unit = (count * (index + 1) * 0.6180339887498949) % 1;
        return [name, context.from((sign[name] ?? 1) * (0.6 + 0.8 * unit))] as const;
      }),
    );
    const [x, y] = evaluateDecimal(graph, [a, b], point, 50);
    expect(
      x
        ?.minus(y ?? 0)
        .abs()
        .lte(x.abs().plus(1).times('1e-40')),
    ).toBe(true);
  }
}
