import { argumentsOf, type Graph, type Node, type NodeId } from '../graph/graph.ts';
import { type Guard, guardOf, guardsOf, isNonZero } from '../graph/guards.ts';
import type { Signs } from '../graph/sign.ts';
import { reachable } from '../graph/traverse.ts';
import { leaves, touches } from '../interval/scratch.ts';
import { rational } from '../number/rational.ts';
import { makeCodeBlocks } from './code-blocks.ts';
import { axesIn, part } from './form-layout.ts';
import type { FormOperations } from './form-operations.ts';
import { makeFormPlaces, type Place } from './form-places.ts';
import { above } from './form-text.ts';
import { type FunctionName, mayLeave, reciprocal } from './function-domain.ts';
import { axesOfNodes } from './node-axes.ts';
import { soleWays } from './sole-way.ts';

export interface IntervalCode {
  /** Bodies of functions of V, box, offset, changed and out, to be called in turn. */
  readonly parts: readonly string[];
  /** What the bodies call f0, f1, … */
  readonly operations: readonly unknown[];
  /** What the bodies call e0, e1, …: each expands a function over the interval in the scratch R. */
  readonly functions: readonly FunctionName[];
  /** V as it begins: constants are in their places. */
  readonly values: Float64Array;
}

/**
 * JavaScript that computes the forms of all nodes over a box, each by one call of a form operation. What a node leaves is
 * kept in V: of a node that depends on some axes only it is still right for a box that differs along others, and is not
 * computed again (`changed` has the bits of the axes that differ). What an earlier box left otherwise is read only where
 * a guard says that it does not count.
 */
export function generateIntervals(
  graph: Graph,
  outputs: readonly NodeId[],
  variables: readonly string[],
  operations: FormOperations,
  signs: Signs | undefined,
): IntervalCode {
  const ids = reachable(graph, outputs);
  const guards = guardsOf(graph, ids, outputs);
  const masks = axesOfNodes(graph, ids, variables);
  const whole = (1 << variables.length) - 1;
  const renewed = soleWays(graph, ids, outputs, masks);
  const functions: FunctionName[] = [];
  const used: unknown[] = [];
  const code = makeCodeBlocks();
  const places = makeFormPlaces(graph);
  const comparisons = new Map<string, string>();
  const reciprocals = new Map<string, Place>();
  const done = new Set<NodeId>();
  const order: NodeId[] = [];
  for (const id of outputs) visit(id, new Set());
  for (const id of order) emitNode(id);
  outputs.forEach((id, index) => {
    emitOutput(places.of(id), index);
  });
  return { parts: code.parts(), operations: used, functions, values: places.values() };

  /** Arguments first, and before a guarded node what its guards compare. */
  function visit(id: NodeId, path: Set<NodeId>): void {
    if (done.has(id) || path.has(id) || masks.get(id) === 0) return;
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

  function emitNode(id: NodeId): void {
    const guarding = guards.get(id) as ReadonlyMap<string, Guard>;
    const mask = masks.get(id) as number;
    const node = graph.node(id);
    const make = computation(id, node, mask, guarding);
    openBlock(mask, guarding);
    make();
    if (renewed.has(id)) code.push(`${nameIn(used, operations.renew, 'f')}(V, ${places.of(id).offset});`);
    code.rest();
  }

  function openBlock(mask: number, guarding: ReadonlyMap<string, Guard>): void {
    const all = [...guarding.values()];
    const tests = all.map(comparisonName).filter((name) => name !== undefined);
    // A guard that looks at other axes may let a node in that it kept out before.
    const ownGuards = all.every(({ left, right }) => ((maskOf(left) | maskOf(right)) & ~mask) === 0);
    const condition = [...(mask !== whole && ownGuards ? [`changed & ${mask}`] : []), ...tests].join(' && ');
    code.open(condition);
  }

  function maskOf(id: NodeId): number {
    return masks.get(id) ?? 0;
  }

  /** The value that tells whether a comparison may come out as the guard says; undefined when it is not known yet. */
  function comparisonName(guard: Guard): string | undefined {
    const found = comparisons.get(guard.key);
    if (found !== undefined) return found;
    const ready = [guard.left, guard.right].every((id) => masks.get(id) === 0 || places.has(id));
    if (!ready) return undefined;
    // Computed outside every block, so that it is there for all.
    code.close();
    const offset = places.reserve(1);
    code.push(`V[${offset}] = ${comparisonText(guard)} ? 1 : 0;`);
    comparisons.set(guard.key, `V[${offset}] !== 0`);
    return comparisons.get(guard.key);
  }

  function comparisonText(guard: Guard): string {
    const [a, b] = [places.of(guard.left).offset, places.of(guard.right).offset];
    const strict = guard.op === 'ifLess';
    return guard.outcome
      ? `V[${a + part.lower}] ${strict ? '<' : '<='} V[${b + part.upper}]`
      : `V[${a + part.upper}] ${strict ? '>=' : '>'} V[${b + part.lower}]`;
  }

  function flagText(target: Place, args: readonly Place[], more?: string): string {
    if (target.outside === undefined) return '';
    const flags = [
      ...new Set([...args.flatMap(({ outside }) => outside ?? []), ...(more === undefined ? [] : [more])]),
    ];
    return ` ${target.outside} = ${flags.join(' | ')};`;
  }

  /** Reserves what the node needs, and answers what writes its code. */
  function computation(id: NodeId, node: Node, mask: number, guarding: ReadonlyMap<string, Guard>): () => void {
    const args = argumentsOf(node).map(places.of);
    const simple = (operation: unknown) => {
      const target = places.form(mask, args, false);
      places.set(id, target);
      return () => code.push(`${callText(operation, target, args)}${flagText(target, args)}`);
    };
    const [a, b] = args as [Place, Place];
    switch (node.kind) {
      case 'variable': {
        const target = places.form(mask, [], false);
        places.set(id, target);
        return () => code.push(variableText(target.offset, variables.indexOf(node.name)));
      }
      case 'unary':
        if (node.op === 'neg') return simple(operations.neg(a.mask));
        if (node.op === 'abs') return simple(operations.abs(a.mask));
        return functionCode(id, node.op, a, node.args[0], guarding);
      case 'power':
        return functionCode(id, [node.exponent.s * node.exponent.n, node.exponent.d], a, node.args[0], guarding);
      case 'binary':
        if (node.op !== 'div') return simple(operations[node.op](a.mask, b.mask));
        return quotientCode(id, mask, a, b, node.args, guarding);
      case 'choice': {
        const target = places.form(mask, args, false);
        places.set(id, target);
        return () => emitChoice(node, target, args as [Place, Place, Place, Place]);
      }
      default:
        throw new TypeError(`a ${node.kind} is not computed`);
    }
  }

  function callText(operation: unknown, target: Place, args: readonly Place[]): string {
    return `${nameIn(used, operation, 'f')}(V, ${[target, ...args].map(({ offset }) => offset).join(', ')});`;
  }

  function functionCode(
    id: NodeId | undefined,
    name: FunctionName,
    x: Place,
    argument: NodeId,
    guarding: ReadonlyMap<string, Guard>,
    into?: Place,
  ): () => void {
    const mayLack = mayLeave(name, argument, signs);
    const target = into ?? places.form(x.mask, [x], mayLack);
    if (id !== undefined) places.set(id, target);
    // Not to be zero helps only where the domain ends there.
    const isSafe = name !== 'log1p' && name !== 'lambertW' && isNonZero(graph, argument, guarding, signs);
    const left = mayLack ? `(R[5] & ${isSafe ? leaves : leaves | touches})` : undefined;
    const expansion = `e${indexOfFunction(functions, name)}`;
    return () =>
      code.push(
        `R[0] = V[${x.offset}]; R[1] = V[${x.offset + 1}]; ${expansion}(R);`,
        `${nameIn(used, operations.apply(x.mask), 'f')}(V, ${target.offset}, ${x.offset}, R);${flagText(target, [x], left)}`,
      );
  }

  /** A product with 1/x, which all quotients with this denominator under the same guards share. */
  function quotientCode(
    id: NodeId,
    mask: number,
    a: Place,
    b: Place,
    [top, denominator]: readonly [NodeId, NodeId],
    guarding: ReadonlyMap<string, Guard>,
  ): () => void {
    const rest = otherTerm(graph, top, denominator);
    const other = rest === undefined ? undefined : places.of(rest);
    const key = `${denominator} ${[...guarding.keys()].sort().join()}`;
    const shared = reciprocals.get(key);
    const mayLack = mayLeave(reciprocal, denominator, signs);
    const inverse = shared ?? (b.mask === 0 ? constantReciprocal(denominator) : places.form(b.mask, [b], mayLack));
    reciprocals.set(key, inverse);
    const isNew = shared === undefined && b.mask !== 0;
    const invert = isNew ? functionCode(undefined, reciprocal, b, denominator, guarding, inverse) : undefined;
    const target = places.form(mask, [a, inverse], false);
    places.set(id, target);
    return () => {
      if (invert !== undefined) {
        openBlock(b.mask, guarding);
        invert();
        openBlock(mask, guarding);
      }
      const operation = operations.mul(a.mask, inverse.mask);
      code.push(`${callText(operation, target, [a, inverse])}${flagText(target, [a, inverse])}`);
      // a/(a + b) lies between 0 and 1 for a, b ≥ 0, also where both come to 0.
      if (other !== undefined) code.push(callText(operations.share(mask), target, [a, other]));
    };
  }

  function constantReciprocal(denominator: NodeId): Place {
    const one = graph.intern({ kind: 'rational', value: rational(1) });
    return places.constant(graph.intern({ kind: 'binary', op: 'div', args: [one, denominator] }));
  }

  function emitChoice(
    node: Extract<Node, { kind: 'choice' }>,
    target: Place,
    [a, b, whenTrue, whenFalse]: readonly [Place, Place, Place, Place],
  ): void {
    const test = (outcome: boolean) => {
      const guard = guardOf(node, outcome);
      return comparisons.get(guard.key) ?? comparisonText(guard);
    };
    const copied = (x: Place) =>
      `${callText(operations.copy(x.mask, target.mask), target, [x])}${flagText(target, [a, b, x], '0')}`;
    const hull = callText(operations.hull(whenTrue.mask, whenFalse.mask, target.mask), target, [whenTrue, whenFalse]);
    code.push(
      `if (${test(true)}) { if (${test(false)}) { ${hull}${flagText(target, [a, b, whenTrue, whenFalse], '0')} }`,
      `else { ${copied(whenTrue)} } } else { ${copied(whenFalse)} }`,
    );
  }

  function emitOutput(x: Place, index: number): void {
    code.close();
    const base = index * (4 + variables.length);
    const axes = axesIn(x.mask);
    const count = axes.length;
    code.push(
      `out[${base}] = V[${x.offset}]; out[${base + 1}] = V[${x.offset + 1}]; out[${base + 2}] = ${x.outside ?? '0'};`,
      `out[${base + 3}] = V[${x.offset + part.error}];`,
    );
    variables.forEach((_, axis) => {
      const own = axes.indexOf(axis);
      const start = x.offset + part.coefficients;
      const shares = own < 0 ? ['0'] : [`Math.abs(V[${start + own}])`];
      let next = start + count;
      for (let i = 0; i < count; i++) {
        for (let j = i; j < count; j++, next++) {
          if (own >= 0 && (i === own || j === own)) shares.push(`${i === j ? '' : '0.5 * '}Math.abs(V[${next}])`);
        }
      }
      code.push(`out[${base + 4 + axis}] = ${shares.join(' + ')};`);
    });
  }
}

/** b of a quotient a/(a + b). */
function otherTerm(graph: Graph, top: NodeId, bottom: NodeId): NodeId | undefined {
  const node = graph.node(bottom);
  if (node.kind !== 'binary' || node.op !== 'add') return undefined;
  const index = node.args.indexOf(top);
  return index < 0 ? undefined : node.args[1 - index];
}

function nameIn(used: unknown[], operation: unknown, letter: string): string {
  const index = used.indexOf(operation);
  if (index >= 0) return `${letter}${index}`;
  used.push(operation);
  return `${letter}${used.length - 1}`;
}

function indexOfFunction(functions: FunctionName[], name: FunctionName): number {
  const found = functions.findIndex((other) => String(other) === String(name));
  if (found >= 0) return found;
  functions.push(name);
  return functions.length - 1;
}

/** The box's own ends, and a form that runs along one axis. */
function variableText(o: number, axis: number): string {
  const [l, u] = [`V[${o}]`, `V[${o + 1}]`];
  const [c, e, linear, a] = [part.centre, part.error, part.linear, part.coefficients].map((at) => `V[${o + at}]`);
  return [
    `${l} = box[offset + ${2 * axis}]; ${u} = box[offset + ${2 * axis + 1}];`,
    `if (${u} - ${l} < Infinity) { ${c} = ${l} + (${u} - ${l}) * 0.5; ${a} = Math.max(${u} - ${c}, ${c} - ${l}) * ${above}; ${e} = 0; ${linear} = ${a}; }`,
    `else { ${c} = 0; ${a} = 0; ${e} = Infinity; ${linear} = 0; }`,
  ].join('\n');
}
