import type { MathNode } from 'mathjs';
import { parseDecimal } from '../number/rational.ts';
import type { ArithmeticOperator, Comparison, Expression } from './expression.ts';
import { type FaultSignal, fault } from './fault.ts';
import type { TokenCursor } from './tokens.ts';

/** What mathjs says of an operator; its own types leave this open. */
export interface OperatorShape {
  readonly op: string;
  readonly implicit: boolean;
  readonly args: readonly MathNode[];
}

const comparisons: Readonly<Record<string, Comparison>> = { '<': '<', '<=': '<=', '>': '>', '>=': '>=' };
const arithmetic: Readonly<Record<string, ArithmeticOperator>> = { '+': '+', '-': '-', '*': '*', '/': '/', '^': '^' };

/** The node inside any parentheses around it. */
export function strip(node: MathNode): MathNode {
  return node.type === 'ParenthesisNode' ? strip((node as unknown as { content: MathNode }).content) : node;
}

/** The expression of a parsed node; the allow-list of node kinds is this function. Throws a FaultSignal for any other. */
export function convert(wrapped: MathNode, tokens: TokenCursor): Expression {
  const node = strip(wrapped);
  const here = tokens.here;
  switch (node.type) {
    case 'ConstantNode':
      return convertNumber((node as unknown as { value: unknown }).value, tokens.take());
    case 'SymbolNode': {
      const { name } = node as unknown as { name: string };
      return { kind: 'name', name, offset: tokens.take(name) };
    }
    case 'AccessorNode': {
      const { object, name } = memberOf(node, here);
      const offset = tokens.take(object);
      tokens.take(name);
      return { kind: 'member', object, name, offset };
    }
    case 'FunctionNode':
      return convertCall(node, tokens, here);
    case 'OperatorNode':
      return convertOperator(node as unknown as OperatorShape, tokens, here);
    case 'ConditionalNode':
      return convertConditional(node, tokens, here);
    default:
      throw fault(
        'expression-form',
        `${formNames[node.type] ?? node.type} has no place in an expression`,
        'Use names, numbers, + - * / ^, calls, and a < b ? c : d.',
        here,
      );
  }
}

const formNames: Readonly<Record<string, string>> = {
  AssignmentNode: 'an assignment',
  FunctionAssignmentNode: 'a function definition',
  BlockNode: 'a sequence of statements',
  ArrayNode: 'a list',
  ObjectNode: 'an object',
  RangeNode: 'a range',
  RelationalNode: 'a chain of comparisons',
  IndexNode: 'an index',
};

function convertNumber(value: unknown, offset: number): Expression {
  const exact = typeof value === 'object' && value !== null ? parseDecimal(String(value)) : undefined;
  if (exact === undefined) {
    throw fault(
      'expression-form',
      `${String(value)} is not a decimal number in range`,
      'Write a decimal with an exponent between −400 and 400.',
      offset,
    );
  }
  return { kind: 'number', value: exact, offset };
}

function memberOf(node: MathNode, offset: number): { object: string; name: string } {
  const { object, index } = node as unknown as {
    object: MathNode;
    index: { dotNotation?: boolean; dimensions: { value?: unknown }[] };
  };
  const name = index.dimensions[0]?.value;
  if (object.type !== 'SymbolNode' || index.dotNotation !== true || typeof name !== 'string') {
    throw fault(
      'expression-form',
      'only alias.part, alias.parameter or alias.function can follow a name',
      'Write it as alias.name.',
      offset,
    );
  }
  return { object: (object as unknown as { name: string }).name, name };
}

function convertCall(node: MathNode, tokens: TokenCursor, here: number): Expression {
  const { fn, args } = node as unknown as { fn: MathNode; args: readonly MathNode[] };
  if (fn.type === 'SymbolNode') {
    const { name } = fn as unknown as { name: string };
    const offset = tokens.take(name);
    return { kind: 'call', name, args: args.map((argument) => convert(argument, tokens)), offset };
  }
  if (fn.type !== 'AccessorNode')
    throw fault('expression-form', 'only a name can be called', 'Write name(arguments).', here);
  const { object, name } = memberOf(fn, here);
  const offset = tokens.take(object);
  tokens.take(name);
  return { kind: 'member-call', object, name, args: args.map((argument) => convert(argument, tokens)), offset };
}

function convertOperator(node: OperatorShape, tokens: TokenCursor, here: number): Expression {
  if (node.implicit) {
    throw fault(
      'expression-form',
      'multiplication must be written out',
      'Put * between the factors: 2*x, not 2x; a/(2*x), not a/2x.',
      here,
    );
  }
  const [first, second] = node.args as [MathNode, MathNode | undefined];
  if (second === undefined) {
    if (node.op === '+') return convert(first, tokens);
    if (node.op !== '-') throw operatorFault(node.op, here);
    return { kind: 'negation', operand: convert(first, tokens), offset: here };
  }
  const op = arithmetic[node.op];
  if (op === undefined || node.args.length !== 2) throw operatorFault(node.op, here);
  return { kind: 'arithmetic', op, left: convert(first, tokens), right: convert(second, tokens), offset: here };
}

function operatorFault(op: string, offset: number): FaultSignal {
  const remedy = op in comparisons ? 'A comparison belongs in a < b ? c : d.' : 'Use + - * / ^, or a < b ? c : d.';
  return fault('expression-form', `the operator ${op} has no place here`, remedy, offset);
}

function convertConditional(node: MathNode, tokens: TokenCursor, here: number): Expression {
  const { condition, trueExpr, falseExpr } = node as unknown as Record<
    'condition' | 'trueExpr' | 'falseExpr',
    MathNode
  >;
  const test = strip(condition) as unknown as OperatorShape & MathNode;
  const comparison = test.type === 'OperatorNode' ? comparisons[test.op] : undefined;
  if (comparison === undefined) {
    throw fault(
      'expression-form',
      'the test of a conditional must compare two expressions',
      'Write a < b ? c : d with <, <=, > or >=.',
      here,
    );
  }
  const [left, right] = test.args as [MathNode, MathNode];
  return {
    kind: 'conditional',
    comparison,
    left: convert(left, tokens),
    right: convert(right, tokens),
    whenTrue: convert(trueExpr, tokens),
    whenFalse: convert(falseExpr, tokens),
    offset: here,
  };
}
