import { binary, cbrt, sqrt, unary } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import type { UnaryOperator } from '../graph/operator.ts';

export interface Builtin {
  readonly arity: number;
  build(graph: Graph, args: readonly NodeId[]): NodeId;
}

/** The functions that every expression may call, by their name in sheets. */
export const builtins: ReadonlyMap<string, Builtin> = new Map<string, Builtin>([
  ...unaryBuiltins({
    exp: 'exp',
    log: 'log',
    expm1: 'expm1',
    log1p: 'log1p',
    abs: 'abs',
    sin: 'sin',
    cos: 'cos',
    sinh: 'sinh',
    cosh: 'cosh',
    tanh: 'tanh',
    asinh: 'asinh',
    atan: 'atan',
    erf: 'erf',
    lambertw: 'lambertW',
  }),
  ['sqrt', { arity: 1, build: (graph, [x]) => sqrt(graph, x as NodeId) }],
  ['cbrt', { arity: 1, build: (graph, [x]) => cbrt(graph, x as NodeId) }],
  ['min', { arity: 2, build: (graph, [a, b]) => binary(graph, 'min', a as NodeId, b as NodeId) }],
  ['max', { arity: 2, build: (graph, [a, b]) => binary(graph, 'max', a as NodeId, b as NodeId) }],
]);

function unaryBuiltins(names: Record<string, UnaryOperator>): [string, Builtin][] {
  return Object.entries(names).map(([name, op]) => [
    name,
    { arity: 1, build: (graph, [x]) => unary(graph, op, x as NodeId) },
  ]);
}
