import { argumentsOf, type Graph, type Node, type NodeId } from '../graph/graph.ts';
import { reachable } from '../graph/traverse.ts';
import { leaves, touches } from '../interval/scratch.ts';
import { rational } from '../number/rational.ts';
import { type Guard, guardOf, guardsOf, isNonZero } from './guards.ts';
import {
  above,
  axesIn,
  axesOfNodes,
  constantOperand,
  enclosedConstants,
  type FunctionName,
  mayLeave,
  type Operand,
  productText,
  radius,
  step,
  underflow,
} from './interval-operand.ts';
import { type EnclosedValue, evaluateIntervals } from './interval-point.ts';

export interface IntervalOptions {
  /** Whether first-order forms are carried beside the natural intervals. */
  readonly affine: boolean;
  /** Variables that are not zero, even where their interval touches it. */
  readonly nonZero?: ReadonlySet<string>;
}

export interface IntervalCode {
  /** Bodies of functions, to be called in turn. */
  readonly parts: readonly string[];
  /** Numbers that are kept between the parts, in V. */
  readonly slots: number;
  /** What `images` and `lines` must hold, in order. */
  readonly functions: readonly FunctionName[];
}

/**
 * JavaScript for the outputs. Local names: l, u the interval of a node, c its centre, a its coefficients by axis, e the
 * error of its first-order form, w whether it may lack a value. What a node leaves is kept in V; what an earlier box left
 * there is read only where a guard says that it does not count.
 *
 * Soundness of the forms: every coefficient and centre is the result of a few operations that err by u relatively; the
 * sum of their magnitudes times 2u (`step`), and 1e-150 for underflow, is added to the error, and the error, a sum of
 * positive numbers, is rounded up by a factor. The interval is intersected with the range of the form; where the form
 * is the wider by its error alone, it is replaced by the middle of the interval. NaN fails each comparison that would
 * let a form tighten an interval.
 */
export function generateIntervals(
  graph: Graph,
  outputs: readonly NodeId[],
  variables: readonly string[],
  { affine, nonZero = new Set() }: IntervalOptions,
): IntervalCode {
  const ids = reachable(graph, outputs);
  const guards = guardsOf(graph, ids, outputs);
  const masks = axesOfNodes(graph, ids, variables);
  const constants = enclosedConstants(graph, ids, masks);
  const functions: FunctionName[] = [];
  const parts: string[][] = [];
  const lines: string[] = [];
  const slots = new Map<string, number>();
  let locals: string[] = [];
  let nodesInPart = 0;
  const flagged = new Set<NodeId>();
  const done = new Set<NodeId>();
  const computed = new Set<NodeId>();
  const comparisons = new Map<string, string>();
  const reciprocals = new Map<string, Operand>();
  let open: string | undefined;

  const order: NodeId[] = [];
  for (const id of outputs) visit(id, new Set());
  for (const id of order) emitNode(id);
  closeBlock();
  outputs.forEach((id, index) => {
    emitOutput(id, index);
  });
  endPart();
  return {
    parts: parts.map((part) => ['"use strict"; let h = 0.5, t = 0.5, r = 0.5, q = 0.5, k = 0.5;', ...part].join('\n')),
    functions,
    slots: slots.size,
  };

  /** Arguments first, and before a guarded node what its guards compare. */
  function visit(id: NodeId, path: Set<NodeId>): void {
    if (done.has(id) || path.has(id) || isConstant(id)) return;
    path.add(id);
    for (const guard of guards.get(id)?.values() ?? []) {
      visit(guard.left, path);
      visit(guard.right, path);
    }
    for (const argument of argumentsOf(graph.node(id))) visit(argument, path);
    path.delete(id);
    if (done.has(id)) return;
    done.add(id);
    order.push(id);
  }

  function isConstant(id: NodeId): boolean {
    return masks.get(id) === 0;
  }

  function emitNode(id: NodeId): void {
    const node = graph.node(id);
    const guarding = [...(guards.get(id) as ReadonlyMap<string, Guard>).values()].map(comparisonName);
    if (nodesInPart >= nodesPerPart) endPart();
    openBlock(guarding.filter((name) => name !== undefined).join(' && '));
    emitComputation(id, node);
    end();
  }

  function endPart(): void {
    closeBlock();
    parts.push(lines.splice(0));
    nodesInPart = 0;
  }

  function openBlock(condition: string): void {
    if (open === condition) return;
    closeBlock();
    open = condition;
    if (condition !== '') lines.push(`if (${condition}) {`);
  }

  function closeBlock(): void {
    if (open !== undefined && open !== '') lines.push('}');
    open = undefined;
  }

  /** The local that tells whether a comparison may come out as the guard says; undefined when it is not known yet. */
  function comparisonName(guard: Guard): string | undefined {
    const known = comparisons.get(guard.key);
    if (known !== undefined) return known;
    const ready = [guard.left, guard.right].every((id) => isConstant(id) || computed.has(id));
    if (!ready) return undefined;
    // Computed outside every block, so that it is there for all.
    closeBlock();
    const name = `${slot(`m${comparisons.size}`)} !== 0`;
    comparisons.set(guard.key, name);
    const [a, b] = [operand(guard.left), operand(guard.right)];
    const strict = guard.op === 'ifLess';
    const text = guard.outcome
      ? `${a.lower} ${strict ? '<' : '<='} ${b.upper}`
      : `${a.upper} ${strict ? '>=' : '>'} ${b.lower}`;
    lines.push(`${name.replace(' !== 0', '')} = ${text} ? 1 : 0;`);
    return name;
  }

  function operand(id: NodeId): Operand {
    const constant = constants.get(id);
    if (constant !== undefined) return constantOperand(constant);
    const axes = axesIn(masks.get(id) as number);
    return stored(id, axes, flagged.has(id));
  }

  /** The texts that read what a node has stored. */
  function stored(id: NodeId | string, axes: readonly number[], isFlagged: boolean): Operand {
    return {
      lower: slot(`l${id}`),
      upper: slot(`u${id}`),
      centre: slot(`c${id}`),
      error: slot(`e${id}`),
      axes,
      coefficient: (axis) => slot(`a${id}_${axis}`),
      outside: isFlagged ? slot(`w${id}`) : undefined,
    };
  }

  function slot(name: string): string {
    const index = slots.get(name) ?? slots.size;
    slots.set(name, index);
    return `V[${index}]`;
  }

  /** Opens the block of one node, with its values as locals until they are stored. */
  function declare(id: NodeId | string, axes: readonly number[], isFlagged: boolean): void {
    locals = [`l${id}`, `u${id}`];
    if (affine) locals.push(`c${id}`, `e${id}`, ...axes.map((axis) => `a${id}_${axis}`));
    if (isFlagged) locals.push(`w${id}`);
    lines.push(`{ let ${locals.map((name) => `${name} = 0.5`).join(', ')};`);
  }

  function end(): void {
    lines.push(`${locals.map((name) => `${slot(name)} = ${name};`).join(' ')} }`);
    nodesInPart++;
  }

  function emitComputation(id: NodeId, node: Node): void {
    const axes = axesIn(masks.get(id) as number);
    const args = argumentsOf(node).map(operand);
    computed.add(id);
    if (node.kind === 'variable') {
      declare(id, axes, false);
      emitVariable(id, variables.indexOf(node.name));
      return;
    }
    switch (node.kind) {
      case 'unary': {
        const [x] = args as [Operand];
        if (node.op === 'neg') {
          begin(id, axes, args);
          lines.push(`l${id} = -${x.upper}; u${id} = -${x.lower};`);
          if (affine)
            lines.push(
              `c${id} = -${x.centre}; e${id} = ${x.error};`,
              ...axes.map((axis) => `a${id}_${axis} = -${x.coefficient(axis)};`),
            );
        } else if (node.op === 'abs') {
          begin(id, axes, args);
          emitAbsolute(id, axes, x);
        } else
          emitFunction(
            id,
            axes,
            node.op,
            x,
            argumentsOf(node)[0] as NodeId,
            guards.get(id) as ReadonlyMap<string, Guard>,
          );
        return;
      }
      case 'power': {
        const [x] = args as [Operand];
        emitFunction(
          id,
          axes,
          [node.exponent.s * node.exponent.n, node.exponent.d],
          x,
          node.args[0],
          guards.get(id) as ReadonlyMap<string, Guard>,
        );
        return;
      }
      case 'binary': {
        const [a, b] = args as [Operand, Operand];
        if (node.op === 'add' || node.op === 'sub') {
          begin(id, axes, args);
          emitSum(id, axes, a, b, node.op === 'sub');
        } else if (node.op === 'mul') {
          begin(id, axes, args);
          emitProduct(id, axes, a, b);
        } else if (node.op === 'div') {
          const inverse = reciprocalOf(node.args[1], b, guards.get(id) as ReadonlyMap<string, Guard>);
          begin(id, axes, [a, inverse]);
          emitProduct(id, axes, a, inverse);
        } else {
          begin(id, axes, args);
          emitExtreme(id, axes, a, b, node.op);
        }
        return;
      }
      case 'choice': {
        emitChoice(id, axes, node, args as [Operand, Operand, Operand, Operand]);
        return;
      }
      default:
        throw new TypeError(`a ${node.kind} is not computed`);
    }
  }

  /** Declares a node and passes on whether its arguments may lack a value. */
  function begin(id: NodeId | string, axes: readonly number[], args: readonly Operand[], more?: string): void {
    const flags = [...new Set(args.flatMap(({ outside }) => (outside === undefined ? [] : [outside])))];
    if (more !== undefined) flags.push(more);
    declare(id, axes, flags.length > 0);
    if (flags.length === 0) return;
    if (typeof id === 'number') flagged.add(id);
    lines.push(`w${id} = ${flags.join(' | ')};`);
  }

  function emitVariable(id: NodeId, axis: number): void {
    lines.push(`l${id} = box[offset + ${2 * axis}]; u${id} = box[offset + ${2 * axis + 1}];`);
    if (!affine) return;
    lines.push(
      `if (u${id} - l${id} < Infinity) {`,
      `c${id} = l${id} + (u${id} - l${id}) * 0.5;`,
      `a${id}_${axis} = Math.max(u${id} - c${id}, c${id} - l${id}) * ${above}; e${id} = 0;`,
      `} else { c${id} = 0; a${id}_${axis} = 0; e${id} = Infinity; }`,
    );
  }

  function emitSum(id: NodeId, axes: readonly number[], a: Operand, b: Operand, isDifference: boolean): void {
    const sign = isDifference ? '-' : '+';
    const [low, high] = isDifference ? [b.upper, b.lower] : [b.lower, b.upper];
    lines.push(
      `l${id} = ${a.lower} ${sign} ${low}; l${id} -= Math.abs(l${id}) * ${step};`,
      `u${id} = ${a.upper} ${sign} ${high}; u${id} += Math.abs(u${id}) * ${step};`,
      `if (!(l${id} <= u${id})) { l${id} = -Infinity; u${id} = Infinity; }`,
    );
    if (!affine) return;
    lines.push(`c${id} = ${a.centre} ${sign} ${b.centre};`);
    const rounded = [`Math.abs(c${id})`];
    for (const axis of axes) {
      const [hasA, hasB] = [a.axes.includes(axis), b.axes.includes(axis)];
      const [x, y] = [a.coefficient(axis), b.coefficient(axis)];
      const value = hasA && hasB ? `${x} ${sign} ${y}` : hasA ? x : isDifference ? `-${y}` : y;
      lines.push(`a${id}_${axis} = ${value};`);
      if (hasA && hasB) rounded.push(`Math.abs(a${id}_${axis})`);
    }
    lines.push(`e${id} = (${a.error} + ${b.error} + (${rounded.join(' + ')}) * ${step}) * ${above};`);
    tighten(id, axes);
  }

  function emitProduct(id: NodeId | string, axes: readonly number[], a: Operand, b: Operand): void {
    lines.push(productText(id, a, b));
    if (!affine) return;
    if (b.constant !== undefined || a.constant !== undefined) {
      const [k, x] = b.constant === undefined ? [a, b] : [b, a];
      lines.push(`c${id} = ${k.centre} * ${x.centre};`);
      for (const axis of axes) lines.push(`a${id}_${axis} = ${k.centre} * ${x.coefficient(axis)};`);
      const size = [`Math.abs(c${id})`, ...axes.map((axis) => `Math.abs(a${id}_${axis})`)].join(' + ');
      const spread = k.error === '0' ? '' : ` + ${k.error} * (Math.abs(${x.centre}) + ${radius(x)})`;
      lines.push(
        `e${id} = (Math.abs(${k.centre}) * ${x.error} + (${size}) * ${step}${spread} + ${underflow}) * ${above};`,
      );
      tighten(id, axes);
      return;
    }
    // Of the products of two symbols, that of one with itself lies between 0 and 1: half of it joins the centre.
    const shared = axes.filter((axis) => a.axes.includes(axis) && b.axes.includes(axis));
    const squares = shared.map((axis) => `${a.coefficient(axis)} * ${b.coefficient(axis)}`);
    const centreTerms = [`${a.centre} * ${b.centre}`, ...squares.map((text) => `0.5 * (${text})`)];
    lines.push(`c${id} = ${centreTerms.join(' + ')};`);
    const sizes = [`Math.abs(${a.centre} * ${b.centre})`, ...squares.map((text) => `Math.abs(${text})`)];
    for (const axis of axes) {
      const parts = [
        ...(b.axes.includes(axis) ? [`${a.centre} * ${b.coefficient(axis)}`] : []),
        ...(a.axes.includes(axis) ? [`${b.centre} * ${a.coefficient(axis)}`] : []),
      ];
      lines.push(`a${id}_${axis} = ${parts.join(' + ')};`);
      sizes.push(...parts.map((text) => `Math.abs(${text})`));
    }
    const halfSquares =
      squares.length === 0 ? '' : ` - 0.5 * (${squares.map((text) => `Math.abs(${text})`).join(' + ')})`;
    lines.push(
      `t = ${sizes.join(' + ')}; r = ${radius(a)}; q = ${radius(b)};`,
      `e${id} = (Math.abs(${a.centre}) * ${b.error} + Math.abs(${b.centre}) * ${a.error} + (r * q * ${above}${halfSquares}) + (t + r * q) * 8.881784197001252e-16 + ${underflow}) * ${above};`,
    );
    tighten(id, axes);
  }

  function emitFunction(
    id: NodeId | string,
    axes: readonly number[],
    name: FunctionName,
    x: Operand,
    argument: NodeId,
    guarding: ReadonlyMap<string, Guard>,
  ): void {
    const index = functionIndex(name);
    const isSafe = isNonZero(graph, argument, guarding, nonZero);
    lines.push(`R[0] = ${x.lower}; R[1] = ${x.upper}; ${affine ? 'lines' : 'images'}[${index}](R);`);
    begin(id, axes, [x], mayLeave(name) ? `(R[5] & ${isSafe ? leaves : leaves | touches})` : undefined);
    lines.push(`l${id} = R[0]; u${id} = R[1];`);
    if (!affine) return;
    lines.push(`k = R[2]; c${id} = k * ${x.centre} + R[3]; t = Math.abs(k * ${x.centre}) + Math.abs(c${id});`);
    for (const axis of axes) lines.push(`a${id}_${axis} = k * ${x.coefficient(axis)}; t += Math.abs(a${id}_${axis});`);
    lines.push(`e${id} = (Math.abs(k) * ${x.error} + R[4] + t * ${step} + ${underflow}) * ${above};`);
    tighten(id, axes);
  }

  /** 1/x, shared by all quotients with this denominator under the same guards. */
  function reciprocalOf(denominator: NodeId, x: Operand, guarding: ReadonlyMap<string, Guard>): Operand {
    if (x.constant !== undefined) {
      const [value] = evaluateIntervals(
        graph,
        [
          graph.intern({
            kind: 'binary',
            op: 'div',
            args: [graph.intern({ kind: 'rational', value: one }), denominator],
          }),
        ],
        new Map(),
      );
      return constantOperand(value as EnclosedValue);
    }
    const key = `${denominator} ${[...guarding.keys()].sort().join()}`;
    const known = reciprocals.get(key);
    if (known !== undefined) return known;
    const name = `${denominator}_i${reciprocals.size}`;
    emitFunction(name, x.axes, [-1n, 1n], x, denominator, guarding);
    end();
    const made = stored(name, x.axes, true);
    reciprocals.set(key, made);
    return made;
  }

  function emitAbsolute(id: NodeId, axes: readonly number[], x: Operand): void {
    const copy = (sign: string) =>
      affine
        ? [
            `c${id} = ${sign}${x.centre}; e${id} = ${x.error};`,
            ...axes.map((axis) => `a${id}_${axis} = ${sign}${x.coefficient(axis)};`),
          ].join(' ')
        : '';
    lines.push(
      `if (${x.lower} >= 0) { l${id} = ${x.lower}; u${id} = ${x.upper}; ${copy('')} }`,
      `else if (${x.upper} <= 0) { l${id} = -${x.upper}; u${id} = -${x.lower}; ${copy('-')} }`,
      `else { l${id} = 0; u${id} = Math.max(-${x.lower}, ${x.upper}); ${levelText(id, axes)} }`,
    );
  }

  function emitExtreme(id: NodeId, axes: readonly number[], a: Operand, b: Operand, op: 'min' | 'max'): void {
    const [first, second] = op === 'min' ? [a, b] : [b, a];
    lines.push(
      `if (${first.upper} <= ${second.lower}) { ${copyText(id, axes, a)} }`,
      `else if (${second.upper} <= ${first.lower}) { ${copyText(id, axes, b)} }`,
      `else { l${id} = Math.${op}(${a.lower}, ${b.lower}); u${id} = Math.${op}(${a.upper}, ${b.upper}); ${levelText(id, axes)} }`,
    );
  }

  function emitChoice(
    id: NodeId,
    axes: readonly number[],
    node: Extract<Node, { kind: 'choice' }>,
    [a, b, whenTrue, whenFalse]: readonly [Operand, Operand, Operand, Operand],
  ): void {
    const [holds, fails] = [comparisonText(guardOf(node, true)), comparisonText(guardOf(node, false))];
    declare(id, axes, true);
    flagged.add(id);
    const compared = [a, b].flatMap(({ outside }) => (outside === undefined ? [] : [outside]));
    const flags = (...branches: readonly Operand[]) =>
      [...compared, ...branches.flatMap(({ outside }) => (outside === undefined ? [] : [outside]))].join(' | ') || '0';
    lines.push(
      `if (${holds}) { if (${fails}) {`,
      `l${id} = Math.min(${whenTrue.lower}, ${whenFalse.lower}); u${id} = Math.max(${whenTrue.upper}, ${whenFalse.upper});`,
      `w${id} = ${flags(whenTrue, whenFalse)}; ${levelText(id, axes)}`,
      `} else { ${copyText(id, axes, whenTrue)} w${id} = ${flags(whenTrue)}; } }`,
      `else { ${copyText(id, axes, whenFalse)} w${id} = ${flags(whenFalse)}; }`,
    );
  }

  function comparisonText(guard: Guard): string {
    const name = comparisons.get(guard.key);
    if (name !== undefined) return name;
    const [a, b] = [operand(guard.left), operand(guard.right)];
    const strict = guard.op === 'ifLess';
    return guard.outcome
      ? `${a.lower} ${strict ? '<' : '<='} ${b.upper}`
      : `${a.upper} ${strict ? '>=' : '>'} ${b.lower}`;
  }

  function copyText(id: NodeId, axes: readonly number[], x: Operand): string {
    const interval = `l${id} = ${x.lower}; u${id} = ${x.upper};`;
    if (!affine) return interval;
    const coefficients = axes.map((axis) => `a${id}_${axis} = ${x.axes.includes(axis) ? x.coefficient(axis) : '0'};`);
    return [interval, `c${id} = ${x.centre}; e${id} = ${x.error};`, ...coefficients].join(' ');
  }

  /** Makes the form the middle of the interval and half its width. */
  function levelText(id: NodeId | string, axes: readonly number[]): string {
    if (!affine) return '';
    const none = axes.map((axis) => `a${id}_${axis} = 0;`).join(' ');
    return `${none} h = (u${id} - l${id}) * 0.5; if (h < Infinity) { c${id} = l${id} + h; e${id} = (h + (Math.abs(l${id}) + Math.abs(u${id})) * ${step}) * ${above}; } else { c${id} = 0; e${id} = Infinity; }`;
  }

  /** Intersects the interval with the range of the form, or gives the form up. */
  function tighten(id: NodeId | string, axes: readonly number[]): void {
    const sum = [`e${id}`, ...axes.map((axis) => `Math.abs(a${id}_${axis})`)].join(' + ');
    lines.push(
      `r = (${sum}) * ${above};`,
      `t = c${id} - r; t -= Math.abs(t) * ${step}; if (t > l${id} && t <= u${id}) l${id} = t;`,
      `t = c${id} + r; t += Math.abs(t) * ${step}; if (t < u${id} && t >= l${id}) u${id} = t;`,
      `if (!(e${id} <= (u${id} - l${id}) * 0.5)) { ${levelText(id, axes)} }`,
    );
  }

  function emitOutput(id: NodeId, index: number): void {
    const x = operand(id);
    const base = index * (4 + variables.length);
    lines.push(`out[${base}] = ${x.lower}; out[${base + 1}] = ${x.upper}; out[${base + 2}] = ${x.outside ?? '0'};`);
    lines.push(`out[${base + 3}] = ${affine ? x.error : `${x.upper} - ${x.lower}`};`);
    variables.forEach((_, axis) => {
      const has = affine && x.axes.includes(axis);
      lines.push(`out[${base + 4 + axis}] = ${has ? `Math.abs(${x.coefficient(axis)})` : '0'};`);
    });
  }

  function functionIndex(name: FunctionName): number {
    const key = String(name);
    const found = functions.findIndex((known) => String(known) === key);
    if (found >= 0) return found;
    functions.push(name);
    return functions.length - 1;
  }
}

/** V8 takes seconds to optimise one function of thousands of operations, and milliseconds for each of many small ones. */
const nodesPerPart = 5;

const one = rational(1);
