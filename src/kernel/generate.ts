import { argumentsOf, type NodeId } from '../graph/graph.ts';
import { nodeText, numberText } from './operators.ts';
import type { AxisMask } from './order.ts';
import { bitCount, prefixLength } from './order.ts';
import type { Plan } from './plan.ts';

/** A table of every exported node of one mask, interleaved; its index runs over the axes not yet bound where it is filled. */
export interface Table {
  readonly mask: AxisMask;
  /** In loop order; the last advances fastest. */
  readonly axes: readonly number[];
  readonly width: number;
}

export interface Generated {
  /** The body of a function (values, out, tables, erf, lambertW). */
  readonly source: string;
  readonly tables: readonly Table[];
}

/**
 * JavaScript for a plan. A node whose axes are the outermost k loops is a local of loop k. Any other
 * is stored in a table, filled in loops of its own inside the longest such prefix of its axes, and
 * read where its last axis is bound. Local names are made here: v a node, i an index, n a length,
 * x an input, t a table, k its offset, y an output, o its offset, s its stride.
 */
export function generate(plan: Plan): Generated {
  const { order, groups, exported } = plan;
  const isPrefix = (mask: AxisMask): boolean => prefixLength(mask, order) === bitCount(mask);
  // A table may read the tables of fewer axes.
  const tabled = [...exported.keys()].filter((mask) => !isPrefix(mask)).sort((a, b) => bitCount(a) - bitCount(b));
  const tables = tabled.map((mask): Table => {
    const bound = prefixLength(mask, order);
    return {
      mask,
      axes: order.filter((axis, depth) => depth >= bound && mask & (1 << axis)),
      width: (exported.get(mask) as readonly NodeId[]).length,
    };
  });
  const lines: string[] = ['"use strict";'];
  const write = (indent: number, text: string): void => {
    lines.push('  '.repeat(indent) + text);
  };
  declareLocals(plan, tables, (text) => write(0, text));

  const mainUses = new Set<NodeId>(plan.outputs);
  for (const mask of groups.keys()) {
    // A table filled at some depth also reads what is bound there already.
    const outer = isPrefix(mask) ? mask : prefixMask(order, prefixLength(mask, order));
    for (const id of argumentsRead(plan, mask)) {
      if (((plan.masks.get(id) as AxisMask) & ~outer) === 0) mainUses.add(id);
    }
  }

  /** Opens what becomes readable once `bound` is bound by its last axis: inputs and tables. */
  const readNew = (indent: number, bound: AxisMask, newest: number, needed: ReadonlySet<NodeId>): void => {
    for (const [id, { axis, index }] of plan.inputs) {
      if (axis === newest && needed.has(id)) write(indent, `const v${id} = x${axis}_${index}[i${axis}];`);
    }
    for (const table of tables) {
      const { mask } = table;
      if (!(mask & (1 << newest)) || (mask & bound) !== mask) continue;
      const read = (exported.get(mask) as readonly NodeId[]).flatMap((id, slot) =>
        needed.has(id) ? [{ id, slot }] : [],
      );
      if (read.length === 0) continue;
      write(indent, `const k${mask} = ${offsetText(table)};`);
      for (const { id, slot } of read) write(indent, `const v${id} = t${mask}[k${mask} + ${slot}];`);
    }
  };

  const compute = (indent: number, mask: AxisMask): void => {
    for (const id of groups.get(mask) ?? []) write(indent, `const v${id} = ${definition(plan, id)};`);
  };

  const fillTable = (depth: number, mask: AxisMask): void => {
    const rest = order.filter((axis, place) => place >= depth && mask & (1 << axis));
    const needed = argumentsRead(plan, mask);
    let bound = prefixMask(order, depth);
    let inner = depth;
    for (const axis of rest) {
      write(inner++, `for (let i${axis} = 0; i${axis} < n${axis}; i${axis}++) {`);
      bound |= 1 << axis;
      readNew(inner, bound, axis, needed);
    }
    compute(inner, mask);
    const table = tables.find((candidate) => candidate.mask === mask);
    if (table) {
      write(inner, `const k${mask} = ${offsetText(table)};`);
      for (const [slot, id] of (exported.get(mask) as readonly NodeId[]).entries()) {
        write(inner, `t${mask}[k${mask} + ${slot}] = v${id};`);
      }
    }
    while (inner > depth) write(--inner, '}');
  };

  let bound = 0;
  for (let depth = 0; depth <= order.length; depth++) {
    if (depth > 0) {
      const axis = order[depth - 1] as number;
      write(depth - 1, `for (let i${axis} = 0; i${axis} < n${axis}; i${axis}++) {`);
      bound |= 1 << axis;
      readNew(depth, bound, axis, mainUses);
      write(depth, `const o${depth} = ${depth > 1 ? `o${depth - 1} + ` : ''}i${axis} * s${axis};`);
      compute(depth, bound);
    }
    for (const mask of tabled) {
      if (prefixLength(mask, order) === depth) fillTable(depth, mask);
    }
  }
  const last = order.length;
  for (const [index, id] of plan.outputs.entries()) {
    write(last, `y${index}[${last > 0 ? `o${last}` : '0'}] = ${reference(plan, id)};`);
  }
  for (let depth = last - 1; depth >= 0; depth--) write(depth, '}');
  return { source: lines.join('\n'), tables };
}

function declareLocals(plan: Plan, tables: readonly Table[], write: (text: string) => void): void {
  for (const [axis, { variables }] of plan.axes.entries()) {
    for (const index of variables.keys()) write(`const x${axis}_${index} = values[${axis}][${index}];`);
    write(`const n${axis} = x${axis}_0.length;`);
  }
  for (let axis = plan.axes.length - 1; axis >= 0; axis--) {
    write(`const s${axis} = ${axis === plan.axes.length - 1 ? '1' : `s${axis + 1} * n${axis + 1}`};`);
  }
  for (const index of plan.outputs.keys()) write(`const y${index} = out[${index}];`);
  for (const [index, { mask }] of tables.entries()) write(`const t${mask} = tables[${index}];`);
}

function offsetText({ axes, width }: Table): string {
  const offset = axes.reduce((text, axis) => (text === '' ? `i${axis}` : `(${text}) * n${axis} + i${axis}`), '');
  return width === 1 ? offset : `(${offset}) * ${width}`;
}

/** The nodes of other groups that one group reads. */
function argumentsRead(plan: Plan, mask: AxisMask): Set<NodeId> {
  const read = (plan.groups.get(mask) ?? []).flatMap((id) => argumentsOf(plan.graph.node(id)));
  return new Set(read.filter((id) => plan.inputs.has(id) || plan.masks.get(id) !== mask));
}

function prefixMask(order: readonly number[], depth: number): AxisMask {
  return order.slice(0, depth).reduce((mask, axis) => mask | (1 << axis), 0);
}

function definition(plan: Plan, id: NodeId): string {
  const node = plan.graph.node(id);
  const args = argumentsOf(node);
  return nodeText(node, (position) => reference(plan, args[position] as NodeId));
}

function reference(plan: Plan, id: NodeId): string {
  const value = plan.constants.get(id);
  return value === undefined ? `v${id}` : numberText(value);
}
