import { rationalText } from '../number/rational.ts';
import type { Expression } from './expression.ts';

/** The expression as text, with every sum and product inside an operation in parentheses. */
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
      return `-${operandText(expression.operand)}`;
    case 'arithmetic': {
      const space = expression.op === '+' || expression.op === '-' ? ' ' : '';
      return `${operandText(expression.left)}${space}${expression.op}${space}${operandText(expression.right)}`;
    }
    case 'conditional': {
      const { left, right, comparison, whenTrue, whenFalse } = expression;
      const test = `${operandText(left)} ${comparison} ${operandText(right)}`;
      return `${test} ? ${operandText(whenTrue)} : ${operandText(whenFalse)}`;
    }
  }
}

function operandText(expression: Expression): string {
  const text = expressionText(expression);
  const isSimple = expression.kind !== 'arithmetic' && expression.kind !== 'conditional';
  return isSimple ? text : `(${text})`;
}
