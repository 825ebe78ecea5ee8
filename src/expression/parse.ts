import { create, type FactoryFunctionMap, type MathNode, parseDependencies } from 'mathjs';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { convert, type OperatorShape, strip } from './convert.ts';
import type { Expression, Relation, Requirement } from './expression.ts';
import { type ExpressionFault, FaultSignal, fault } from './fault.ts';
import { TokenCursor } from './tokens.ts';

// The parser alone, with number literals kept as exact decimals; nothing of mathjs evaluates anything here.
const mathjs = create({ parseDependencies } as FactoryFunctionMap, { number: 'BigNumber', precision: 64 });

export const longestExpression = 20_000;
export const deepestNesting = 64;

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
