import type { Graph, Node, NodeId } from '../graph/graph.ts';
import type { ChoiceOperator } from '../graph/operator.ts';
import { reachable } from '../graph/traverse.ts';
import { smoothFunctions } from '../interval/functions.ts';
import { addIntervals, multiplyIntervals, subtractIntervals } from '../interval/operations.ts';
import { powerFunction } from '../interval/powers.ts';
import { encloseRational, piInterval } from '../interval/rational.ts';
import { makeScratch, register } from '../interval/scratch.ts';
import { imageOf, type Smooth } from '../interval/smooth.ts';
import type { Pair } from '../interval/widen.ts';
import { rational } from '../number/rational.ts';

/** An enclosure of every value that a node takes; whether it may have none somewhere. */
export interface EnclosedValue {
  readonly lower: number;
  readonly upper: number;
  readonly defined: boolean;
}

const reciprocal = powerFunction(rational(-1));

/**
 * Encloses the outputs over a box by natural interval arithmetic, node by node: for constants, single boxes and tests.
 * A branch that the comparison excludes on the whole box does not count; on a straddling box both do.
 */
export function evaluateIntervals(
  graph: Graph,
  outputs: readonly NodeId[],
  box: ReadonlyMap<string, readonly [number, number]>,
): EnclosedValue[] {
  return outputs.map(intervalsOver(graph, box));
}

/** The same for one node after the other; what has been enclosed is kept. */
export function intervalsOver(
  graph: Graph,
  box: ReadonlyMap<string, readonly [number, number]>,
): (id: NodeId) => EnclosedValue {
  const values = new Map<NodeId, Pair>();
  const undefinedNodes = new Set<NodeId>();
  return (output) => {
    for (const id of values.has(output) ? [] : reachable(graph, [output])) {
      if (values.has(id)) continue;
      const { value, defined } = evaluateNode(graph.node(id), values, undefinedNodes, box);
      values.set(id, value);
      if (!defined) undefinedNodes.add(id);
    }
    const [lower, upper] = values.get(output) as Pair;
    return { lower: lower as number, upper: upper as number, defined: !undefinedNodes.has(output) };
  };
}

interface Evaluated {
  readonly value: Pair;
  readonly defined: boolean;
}

function evaluateNode(
  node: Node,
  values: ReadonlyMap<NodeId, Pair>,
  undefinedNodes: ReadonlySet<NodeId>,
  box: ReadonlyMap<string, readonly [number, number]>,
): Evaluated {
  const known = (id: NodeId) => values.get(id) as Pair;
  const value = new Float64Array(2);
  const defined = !('args' in node) || !node.args.some((id) => undefinedNodes.has(id));
  switch (node.kind) {
    case 'rational':
      value.set(encloseRational(node.value));
      return { value, defined };
    case 'pi':
      value.set(piInterval);
      return { value, defined };
    case 'variable': {
      const bounds = box.get(node.name);
      if (bounds === undefined) throw new RangeError(`no bounds for the variable ${node.name}`);
      value.set(bounds);
      return { value, defined };
    }
    case 'unary': {
      const x = known(node.args[0]);
      if (node.op === 'neg') value.set([-(x[1] as number), -(x[0] as number)]);
      else if (node.op === 'abs') value.set(absolute(x));
      else return applied(smoothFunctions[node.op], x, defined);
      return { value, defined };
    }
    case 'power':
      return applied(powerFunction(node.exponent), known(node.args[0]), defined);
    case 'binary': {
      const [a, b] = [known(node.args[0]), known(node.args[1])];
      if (node.op === 'div') {
        const inverse = applied(reciprocal, b, defined);
        multiplyIntervals(a, inverse.value, value);
        return { value, defined: inverse.defined };
      }
      if (node.op === 'add') addIntervals(a, b, value);
      else if (node.op === 'sub') subtractIntervals(a, b, value);
      else if (node.op === 'mul') multiplyIntervals(a, b, value);
      else {
        const pick = node.op === 'min' ? Math.min : Math.max;
        value.set([pick(a[0] as number, b[0] as number), pick(a[1] as number, b[1] as number)]);
      }
      return { value, defined };
    }
    case 'choice': {
      const [a, b, whenTrue, whenFalse] = node.args;
      const { mayHold, mayFail } = outcomes(node.op, known(a), known(b));
      const branches = [...(mayHold ? [whenTrue] : []), ...(mayFail ? [whenFalse] : [])];
      value[0] = Math.min(...branches.map((id) => known(id)[0] as number));
      value[1] = Math.max(...branches.map((id) => known(id)[1] as number));
      return { value, defined: ![a, b, ...branches].some((id) => undefinedNodes.has(id)) };
    }
  }
}

function applied(f: Smooth, x: Pair, argumentDefined: boolean): Evaluated {
  const scratch = makeScratch();
  scratch.set(x);
  imageOf(f, scratch);
  return { value: scratch.slice(0, 2), defined: argumentDefined && scratch[register.outside] === 0 };
}

function absolute(x: Pair): [number, number] {
  const [lower, upper] = [x[0] as number, x[1] as number];
  if (lower >= 0) return [lower, upper];
  if (upper <= 0) return [-upper, -lower];
  return [0, Math.max(-lower, upper)];
}

/** Which outcomes a comparison of two intervals may have. */
function outcomes(op: ChoiceOperator, a: Pair, b: Pair): { mayHold: boolean; mayFail: boolean } {
  const [al, au, bl, bu] = [a[0] as number, a[1] as number, b[0] as number, b[1] as number];
  return op === 'ifLess' ? { mayHold: al < bu, mayFail: au >= bl } : { mayHold: al <= bu, mayFail: au > bl };
}
