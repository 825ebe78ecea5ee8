import { add, choice, constant, div, mul, neg, pi, raise, sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { builtins } from './builtins.ts';
import type { ArithmeticOperator, Comparison, Expression } from './expression.ts';

/** What names and calls beyond the built-in ones mean; asked only for names that checks have let through. */
export interface Scope {
  name(name: string): NodeId;
  member(object: string, name: string): NodeId;
  /** Arguments come unevaluated, so that a scope may evaluate them in another scope (a sum over spin). */
  call(name: string, args: readonly Expression[]): NodeId;
  memberCall(object: string, name: string, args: readonly NodeId[]): NodeId;
}

/** The node of an expression in a scope. */
export function interpret(graph: Graph, expression: Expression, scope: Scope): NodeId {
  const evaluate = (part: Expression) => interpret(graph, part, scope);
  switch (expression.kind) {
    case 'number':
      return constant(graph, expression.value);
    case 'name':
      return expression.name === 'pi' ? pi(graph) : scope.name(expression.name);
    case 'member':
      return scope.member(expression.object, expression.name);
    case 'call': {
      const builtin = builtins.get(expression.name);
      return builtin
        ? builtin.build(graph, expression.args.map(evaluate))
        : scope.call(expression.name, expression.args);
    }
    case 'member-call':
      return scope.memberCall(expression.object, expression.name, expression.args.map(evaluate));
    case 'negation':
      return neg(graph, evaluate(expression.operand));
    case 'arithmetic':
      return arithmetic[expression.op](graph, evaluate(expression.left), evaluate(expression.right));
    case 'conditional':
      return conditionals[expression.comparison](
        graph,
        evaluate(expression.left),
        evaluate(expression.right),
        evaluate(expression.whenTrue),
        evaluate(expression.whenFalse),
      );
  }
}

const arithmetic: Record<ArithmeticOperator, (graph: Graph, a: NodeId, b: NodeId) => NodeId> = {
  '+': add,
  '-': sub,
  '*': mul,
  '/': div,
  '^': raise,
};

type Conditional = (graph: Graph, a: NodeId, b: NodeId, whenTrue: NodeId, whenFalse: NodeId) => NodeId;

const conditionals: Record<Comparison, Conditional> = {
  '<': (graph, a, b, c, d) => choice(graph, 'ifLess', a, b, c, d),
  '<=': (graph, a, b, c, d) => choice(graph, 'ifLessEqual', a, b, c, d),
  '>': (graph, a, b, c, d) => choice(graph, 'ifLess', b, a, c, d),
  '>=': (graph, a, b, c, d) => choice(graph, 'ifLessEqual', b, a, c, d),
};
