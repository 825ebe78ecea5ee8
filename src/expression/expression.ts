import type { Rational } from '../number/rational.ts';

export type ArithmeticOperator = '+' | '-' | '*' | '/' | '^';
export type Comparison = '<' | '<=' | '>' | '>=';

/** A parsed expression. `offset` is where its first name or number stands in the text. */
export type Expression =
  | { readonly kind: 'number'; readonly value: Rational; readonly offset: number }
  | { readonly kind: 'name'; readonly name: string; readonly offset: number }
  | { readonly kind: 'member'; readonly object: string; readonly name: string; readonly offset: number }
  | { readonly kind: 'call'; readonly name: string; readonly args: readonly Expression[]; readonly offset: number }
  | {
      readonly kind: 'member-call';
      readonly object: string;
      readonly name: string;
      readonly args: readonly Expression[];
      readonly offset: number;
    }
  | { readonly kind: 'negation'; readonly operand: Expression; readonly offset: number }
  | {
      readonly kind: 'arithmetic';
      readonly op: ArithmeticOperator;
      readonly left: Expression;
      readonly right: Expression;
      readonly offset: number;
    }
  | {
      readonly kind: 'conditional';
      readonly comparison: Comparison;
      readonly left: Expression;
      readonly right: Expression;
      readonly whenTrue: Expression;
      readonly whenFalse: Expression;
      readonly offset: number;
    };

export type Relation = '>=' | '<=' | '==';

/** A comparison of two expressions, as a condition requires it. */
export interface Requirement {
  readonly relation: Relation;
  readonly left: Expression;
  readonly right: Expression;
}

/** The direct subexpressions, in the order in which they stand in the text. */
export function childrenOf(expression: Expression): readonly Expression[] {
  switch (expression.kind) {
    case 'number':
    case 'name':
    case 'member':
      return [];
    case 'call':
    case 'member-call':
      return expression.args;
    case 'negation':
      return [expression.operand];
    case 'arithmetic':
      return [expression.left, expression.right];
    case 'conditional':
      return [expression.left, expression.right, expression.whenTrue, expression.whenFalse];
  }
}
