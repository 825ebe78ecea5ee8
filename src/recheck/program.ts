import type { Graph, Node, NodeId } from '../graph/graph.ts';
import { type Guard, guardsOf, isNonZero } from '../graph/guards.ts';
import type { Signs } from '../graph/sign.ts';
import { reachable } from '../graph/traverse.ts';
import { mostAxes } from './apply.ts';
import { type Crossing, crossing, type Embedding, embedding } from './combine.ts';
import { certainLeast, type Inverse, otherTerm } from './domain.ts';
import { soleNodes } from './sole-node.ts';

/** A node's place: the group of its axes, and its row there. */
export interface Operand {
  readonly group: number;
  readonly row: number;
  readonly embedding: Embedding;
}

/** A comparison that must be able to come out as `outcome` for a step to count at all. */
export interface Condition {
  readonly strict: boolean;
  readonly left: Operand;
  readonly right: Operand;
  readonly outcome: boolean;
}

export interface Step {
  /** A quotient's divisor is inverted in a step of its own, since it may depend on fewer axes than the quotient. */
  readonly node: Node | Inverse;
  readonly row: number;
  readonly operands: readonly Operand[];
  readonly cross: Crossing;
  readonly conditions: readonly Condition[];
  /** Whether the operand may touch the number where the domain begins, since at no point that counts it is that. */
  readonly touchingIsSafe: boolean;
  /** Where the domain begins, when the operand is known never to be below; see certainLeast. */
  readonly least: number | undefined;
  /** b of a quotient a/(a + b). */
  readonly other: Operand | undefined;
  /** Whether its form may run along its own interval; see soleNodes. */
  readonly isSole: boolean;
}

/** The nodes that depend on the same axes, in order. */
export interface Group {
  readonly axes: readonly number[];
  readonly steps: readonly Step[];
}

/** A formula arranged for evaluation on boxes: groups with fewer axes first. */
export interface Program {
  readonly groups: readonly Group[];
  readonly output: Operand;
}

/**
 * Arranges what an output needs. What `signs` calls positive is not zero at any point that counts. Throws a RangeError
 * for more variables than forms may have axes.
 */
export function arrange(graph: Graph, output: NodeId, variables: readonly string[], signs?: Signs): Program {
  const { groups, operandOf } = arrangeRows(graph, output, variables, signs);
  return { groups, output: operandOf(output) as Operand };
}

/** All rows that an output needs. */
export interface Rows {
  readonly groups: readonly Group[];
  /** The place of a node that the output needs. */
  readonly operandOf: (id: NodeId) => Operand | undefined;
}

/** The same for every node below the output. */
export function arrangeRows(graph: Graph, output: NodeId, variables: readonly string[], signs?: Signs): Rows {
  if (variables.length > mostAxes) throw new RangeError(`forms have ${mostAxes} axes at most, not ${variables.length}`);
  const ids = reachable(graph, [output]);
  const guards = guardsOf(graph, ids, [output]);
  const masks = new Map<NodeId, number>();
  for (const id of ids) {
    const node = graph.node(id);
    const own = node.kind === 'variable' ? 1 << variables.indexOf(node.name) : 0;
    masks.set(id, 'args' in node ? node.args.reduce((mask, part) => mask | maskOf(part), 0) : own);
  }
  const isSafe = (user: NodeId, pole: NodeId) =>
    isNonZero(graph, pole, guards.get(user) as ReadonlyMap<string, Guard>, signs);
  const inverseKey = (divisor: NodeId, safe: boolean) => `${divisor} ${safe}`;
  const inverses = new Map<string, { divisor: NodeId; safe: boolean }>();
  for (const id of ids) {
    const node = graph.node(id);
    if (node.kind !== 'binary' || node.op !== 'div') continue;
    const [divisor, safe] = [node.args[1], isSafe(id, node.args[1])];
    inverses.set(inverseKey(divisor, safe), { divisor, safe });
  }
  const all = [...new Set(masks.values())].sort((a, b) => bits(a).length - bits(b).length || a - b);
  const groupOf = new Map(all.map((mask, index) => [mask, index] as const));
  const sole = soleNodes(graph, ids, output, maskOf);
  const rows = new Map<NodeId | string, number>();
  const counts = all.map(() => 0);
  const groups = all.map((mask) => ({ axes: bits(mask), steps: [] as Step[] }));
  for (const id of ids) {
    place(id, id, (row) => stepOf(id, row));
    for (const [key, { divisor, safe }] of inverses) {
      if (divisor === id) place(id, key, (row) => inverseOf(id, safe, row));
    }
  }
  return { groups, operandOf: (id) => (masks.has(id) ? operandOf(id, maskOf(id)) : undefined) };

  /** log(1 + x) begins at −1, where x ≠ 0 helps nothing; all others that lack a value where they begin, at 0. */
  function isNowhereAtBeginning(id: NodeId, node: Node, argument: NodeId): boolean {
    if (node.kind === 'unary' && node.op === 'log1p') return signs?.isAboveMinusOne(argument) === true;
    return isSafe(id, argument);
  }

  function place(id: NodeId, key: NodeId | string, step: (row: number) => Step): void {
    const group = groupOf.get(maskOf(id)) as number;
    const row = counts[group] as number;
    counts[group] = row + 1;
    rows.set(key, row);
    groups[group]?.steps.push(step(row));
  }

  function maskOf(id: NodeId): number {
    return masks.get(id) as number;
  }

  function operandOf(id: NodeId, mask: number, key: NodeId | string = id): Operand {
    const axes = bits(mask);
    const positions = bits(maskOf(id)).map((axis) => axes.indexOf(axis));
    return {
      group: groupOf.get(maskOf(id)) as number,
      row: rows.get(key) as number,
      embedding: embedding(positions, axes.length),
    };
  }

  function inverseOf(divisor: NodeId, touchingIsSafe: boolean, row: number): Step {
    const operands = [operandOf(divisor, maskOf(divisor))];
    const node = { kind: 'inverse' } as const;
    return {
      node,
      row,
      operands,
      cross: crossing([], [], 0),
      conditions: [],
      touchingIsSafe,
      least: certainLeast(node, divisor, signs),
      other: undefined,
      isSole: false,
    };
  }

  function stepOf(id: NodeId, row: number): Step {
    const node = graph.node(id);
    const mask = maskOf(id);
    const args = 'args' in node ? [...node.args] : [];
    const axes = bits(mask);
    const positions = args.map((part) => bits(maskOf(part)).map((axis) => axes.indexOf(axis)));
    const own = guards.get(id) as ReadonlyMap<string, Guard>;
    const isQuotient = node.kind === 'binary' && node.op === 'div';
    // Of a constant the inverted divisor tells as much.
    const isShare = isQuotient && maskOf(node.args[0]) !== 0;
    const rest = isShare ? otherTerm(graph, ...node.args) : undefined;
    return {
      node,
      row,
      operands: args.map((part, index) =>
        isQuotient && index === 1 ? operandOf(part, mask, inverseKey(part, isSafe(id, part))) : operandOf(part, mask),
      ),
      cross: crossing(positions[0] ?? [], positions[1] ?? [], axes.length),
      // Only comparisons that are known before the step, on the same axes or fewer.
      conditions: [...own.values()]
        .filter(({ left, right }) => left < id && right < id && ((maskOf(left) | maskOf(right)) & ~mask) === 0)
        .map(({ op, left, right, outcome }) => ({
          strict: op === 'ifLess',
          left: operandOf(left, mask),
          right: operandOf(right, mask),
          outcome,
        })),
      touchingIsSafe: args[0] !== undefined && isNowhereAtBeginning(id, node, args[0]),
      least: args[0] === undefined ? undefined : certainLeast(node, args[0], signs),
      other: rest === undefined ? undefined : operandOf(rest, mask),
      isSole: sole.has(id) && node.kind !== 'variable',
    };
  }
}

function bits(mask: number): number[] {
  return Array.from({ length: 31 }, (_, bit) => bit).filter((bit) => mask & (1 << bit));
}
