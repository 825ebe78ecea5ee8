import { create, type FactoryFunctionMap, type MathNode, parseDependencies } from 'mathjs';
import { failure, type Outcome, type Problem, type ProblemCode, success } from '../errors/problem.ts';
import { parseDecimal } from '../number/rational.ts';
import type { ArithmeticOperator, Comparison, Expression, Relation, Requirement } from './expression.ts';
import { tokenOffsets } from './tokens.ts';

// The parser alone, with number literals kept as exact decimals; nothing of mathjs evaluates anything here.
const mathjs = create({ parseDependencies } as FactoryFunctionMap, { number: 'BigNumber', precision: 64 });

export const longestExpression = 20_000;
export const deepestNesting = 64;

/** A fault in an expression; `offset` is its place in the text. */
export interface ExpressionFault {
  readonly code: ProblemCode;
  readonly message: string;
  readonly remedy: string;
  readonly offset: number;
}

class FaultSignal extends Error {
  readonly fault: ExpressionFault;
  constructor(fault: ExpressionFault) {
    super(fault.message);
    this.fault = fault;
  }
}

/** Text with the place of each of its characters, as the sheets give it. */
export interface PlacedText {
  readonly text: string;
  placeAt(offset: number): { readonly file: string; readonly line: number; readonly column: number };
}

/** The expression in a text; or the first fault in it, at its line and column. Allowed: see the README, "The sheet". */
export function parseExpression(source: PlacedText): Outcome<Expression> {
  return attempt(source, (tokens) => convert(parseText(source.text), tokens));
}

/** A requirement `left >= right`, `left <= right` or `left == right`. */
export function parseRequirement(source: PlacedText): Outcome<Requirement> {
  return attempt(source, (tokens) => {
    const node = strip(parseText(source.text));
    const relation = node.type === 'OperatorNode' ? relations[(node as unknown as OperatorShape).op] : undefined;
    if (relation === undefined) {
      throw fault(
        'expression-form',
        'a requirement compares two expressions',
        'Write left >= right, left <= right or left == right.',
        0,
      );
    }
    const [left, right] = (node as unknown as OperatorShape).args as [MathNode, MathNode];
    return { relation, left: convert(left, tokens), right: convert(right, tokens) };
  });
}

/** A fault as a problem of the file that the text stands in. */
export function placedProblem(source: PlacedText, fault: ExpressionFault): Problem {
  const { code, message, remedy, offset } = fault;
  return { code, message, remedy, ...source.placeAt(offset) };
}

const relations: Readonly<Record<string, Relation>> = { '>=': '>=', '<=': '<=', '==': '==' };
const comparisons: Readonly<Record<string, Comparison>> = { '<': '<', '<=': '<=', '>': '>', '>=': '>=' };
const arithmetic: Readonly<Record<string, ArithmeticOperator>> = { '+': '+', '-': '-', '*': '*', '/': '/', '^': '^' };

interface OperatorShape {
  readonly op: string;
  readonly implicit: boolean;
  readonly args: readonly MathNode[];
}

function attempt<Value>(source: PlacedText, work: (tokens: TokenCursor) => Value): Outcome<Value> {
  try {
    refuseOversize(source.text);
    return success(work(new TokenCursor(source.text)));
  } catch (error) {
    if (error instanceof FaultSignal) return failure([placedProblem(source, error.fault)]);
    if (error instanceof RangeError) {
      const oversize = fault('expression-size', 'the expression is nested too deeply', 'Split it into named steps.', 0);
      return failure([placedProblem(source, oversize.fault)]);
    }
    throw error;
  }
}

function refuseOversize(text: string): void {
  if (text.length > longestExpression) {
    throw fault(
      'expression-size',
      `the expression has ${text.length} characters`,
      `Split it into named steps of at most ${longestExpression} characters.`,
      0,
    );
  }
  let depth = 0;
  for (let offset = 0; offset < text.length; offset++) {
    const character = text[offset];
    if (character === '(') depth++;
    if (character === ')') depth--;
    if (depth > deepestNesting) {
      throw fault(
        'expression-size',
        `parentheses are nested more than ${deepestNesting} deep`,
        'Split the expression into named steps.',
        offset,
      );
    }
    if (character !== undefined && !/[\w\s.+\-*/^(),<>=?:\u0080-\uffff]/.test(character)) {
      throw fault(
        'expression-syntax',
        `the character ${character} has no meaning in an expression`,
        'Use names, numbers, + - * / ^, parentheses, and a < b ? c : d.',
        offset,
      );
    }
  }
}

function parseText(text: string): MathNode {
  if (text.trim() === '')
    throw fault('expression-syntax', 'the expression is empty', 'Write an expression, or remove the key.', 0);
  try {
    return mathjs.parse(text);
  } catch (error) {
    // Whatever the parser throws at a text is a fault of the text, except that it ran out of stack.
    if (!(error instanceof Error) || error instanceof RangeError) throw error;
    const char = (error as Error & { char?: number }).char ?? 1;
    const message = error.message.replace(/\s*\(char \d+\)$/, '');
    const offset = Math.max(0, Math.min(char - 1, text.length - 1));
    throw fault(
      'expression-syntax',
      `syntax error: ${message.charAt(0).toLowerCase()}${message.slice(1)}`,
      'Check operators, commas and parentheses here.',
      offset,
    );
  }
}

/** Names and numbers stand in the text in the order in which a walk of the tree meets them. */
class TokenCursor {
  readonly #tokens: readonly { readonly text: string; readonly offset: number }[];
  #next = 0;

  constructor(text: string) {
    this.#tokens = tokenOffsets(text);
  }

  take(name?: string): number {
    while (this.#next < this.#tokens.length) {
      const token = this.#tokens[this.#next++] as { text: string; offset: number };
      if (name === undefined || token.text === name) return token.offset;
    }
    return 0;
  }

  get here(): number {
    return this.#tokens[this.#next]?.offset ?? this.#tokens.at(-1)?.offset ?? 0;
  }
}

function strip(node: MathNode): MathNode {
  return node.type === 'ParenthesisNode' ? strip((node as unknown as { content: MathNode }).content) : node;
}

function convert(wrapped: MathNode, tokens: TokenCursor): Expression {
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

function fault(code: ProblemCode, message: string, remedy: string, offset: number): FaultSignal {
  return new FaultSignal({ code, message, remedy, offset });
}
