import { rationalText } from '../number/rational.ts';
import type { Expression } from './expression.ts';

/** Binding strength of the forms that may need parentheses. */
const strengths = { '+': 1, '-': 1, '*': 2, '/': 2, '^': 4 } as const;
const strengthOfSign = 3;

/** The expression as text in the notation of the sheets. */
export function expressionText(expression: Expression): string {
  switch (expression.kind) {
    case 'number':
      return rationalText(expression.value);
    case 'name':
      return expression.name;
    case 'member':
      return `${expression.object}.${expression.name}`;
    case 'call':
      return `${expression.name}(${expression.args.map(expressionText).join(', ')})`;
    case 'member-call':
      return `${expression.object}.${expression.name}(${expression.args.map(expressionText).join(', ')})`;
    case 'negation':
      return `-${operandText(expression.operand, strengthOfSign + 1)}`;
    case 'arithmetic': {
      const { op, left, right } = expression;
      const own = strengths[op];
      const space = own === 1 ? ' ' : '';
      // Everything but a power joins from the left.
      const [leastLeft, leastRight] = op === '^' ? [own + 1, own] : [own, own + 1];
      return `${operandText(left, leastLeft)}${space}${op}${space}${operandText(right, leastRight)}`;
    }
    case 'conditional': {
      const { left, right, comparison, whenTrue, whenFalse } = expression;
      const test = `${operandText(left, 1)} ${comparison} ${operandText(right, 1)}`;
      return `${test} ? ${operandText(whenTrue, 1)} : ${operandText(whenFalse, 1)}`;
    }
  }
}

function operandText(expression: Expression, least: number): string {
  const text = expressionText(expression);
  return strengthOf(expression) >= least ? text : `(${text})`;
}

function strengthOf(expression: Expression): number {
  switch (expression.kind) {
    case 'arithmetic':
      return strengths[expression.op];
    case 'negation':
      return strengthOfSign;
    case 'conditional':
      return 0;
    case 'number':
      // A number that is no integer prints as a quotient, a negative one with a sign.
      return expression.value.d !== 1n ? strengths['/'] : expression.value.s < 0n ? strengthOfSign : 5;
    default:
      return 5;
  }
}
