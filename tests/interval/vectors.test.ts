import { existsSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { binary, power, unary, variable } from '../../src/graph/build.ts';
import { Graph, type NodeId } from '../../src/graph/graph.ts';
import { evaluateIntervals } from '../../src/kernel/interval-point.ts';
import { rational } from '../../src/number/rational.ts';

/**
 * Public vectors of tightest enclosures, kept outside the project: libieeep1788 (M. Nehmeier), Apache License 2.0.
 * Where the folder is missing the test says that it did not run.
 */
const path = '../shared/reference/interval-vectors.json';

type Ends = readonly string[];

const operations: Readonly<Record<string, (graph: Graph, args: readonly NodeId[]) => NodeId>> = Object.fromEntries([
  ...(['add', 'sub', 'mul', 'div', 'min', 'max'] as const).map(
    (op) => [op, (graph: Graph, [a, b]: readonly NodeId[]) => binary(graph, op, a as NodeId, b as NodeId)] as const,
  ),
  ...(['neg', 'abs', 'exp', 'log', 'sin', 'cos', 'sinh', 'cosh', 'tanh', 'asinh', 'atan'] as const).map(
    (op) => [op, (graph: Graph, [a]: readonly NodeId[]) => unary(graph, op, a as NodeId)] as const,
  ),
  ['sqr', (graph: Graph, [a]: readonly NodeId[]) => power(graph, a as NodeId, rational(2))] as const,
  ['sqrt', (graph: Graph, [a]: readonly NodeId[]) => power(graph, a as NodeId, rational(1, 2))] as const,
  ['recip', (graph: Graph, [a]: readonly NodeId[]) => power(graph, a as NodeId, rational(-1))] as const,
]);

describe.runIf(existsSync(path))('interval operations against public vectors of tightest enclosures', () => {
  const { rows } = (existsSync(path) ? JSON.parse(readFileSync(path, 'utf8')) : { rows: [] }) as {
    readonly rows: readonly (readonly [string, ...(readonly Ends[])])[];
  };

  it.each([...Object.keys(operations), 'pown'])(
    '%s contains the tightest enclosure wherever the arguments lie in the domain',
    (name) => {
      let compared = 0;
      for (const [operation, ...intervals] of rows) {
        if (operation !== name) continue;
        const exponent = name === 'pown' ? Number(intervals[1] as unknown as string) : undefined;
        const args = (name === 'pown' ? intervals.slice(0, 1) : intervals.slice(0, -1)).map(endsOf);
        const expected = endsOf(intervals.at(-1) as Ends);
        if (expected === undefined || args.some((ends) => ends === undefined)) continue;
        const graph = new Graph();
        const names = args.map((_, index) => `x${index}`);
        const nodes = names.map((text) => variable(graph, text));
        const node =
          exponent === undefined
            ? (operations[name] as (typeof operations)[string])(graph, nodes)
            : power(graph, nodes[0] as NodeId, rational(exponent));
        const box = new Map(names.map((text, index) => [text, args[index] as [number, number]]));
        const [value] = evaluateIntervals(graph, [node], box);
        if (value === undefined || !value.defined) continue;
        compared++;
        const inside = value.lower <= expected[0] && value.upper >= expected[1];
        if (!inside) throw new Error(`${name} ${JSON.stringify(intervals)}: ${value.lower} … ${value.upper}`);
      }
      expect(compared).toBeGreaterThan(0);
    },
  );
});

describe.skipIf(existsSync(path))('interval vectors', () => {
  it('are not there: the operations were not held against them', () => expect(existsSync(path)).toBe(false));
});

function endsOf(ends: Ends): [number, number] | undefined {
  if (ends.length === 0) return undefined;
  return [numberOf(ends[0] as string), numberOf(ends[1] as string)];
}

/** Decimal or hexadecimal floating-point text. */
function numberOf(text: string): number {
  if (/infinity/i.test(text)) return text.startsWith('-') ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
  const match = /^([+-]?)0x([0-9a-f]+)(?:\.([0-9a-f]*))?p([+-]?\d+)$/i.exec(text);
  if (match === null) return Number(text);
  const [, sign, whole = '', fraction = '', exponent = '0'] = match;
  const shift = Number(exponent) - 4 * fraction.length;
  const digits = Number(BigInt(`0x${whole}${fraction}`));
  // In two steps, so that neither factor leaves the range of doubles.
  const value = digits * 2 ** Math.trunc(shift / 2) * 2 ** (shift - Math.trunc(shift / 2));
  return sign === '-' ? -value : value;
}
