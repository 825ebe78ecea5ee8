/**
 * The closed list of operators. Every layer (derivative, float64, high precision, printing) owns one
 * complete table over it, so a new operator does not compile until every layer answers.
 */
export const unaryOperators = [
  'neg',
  'abs',
  'exp',
  'expm1',
  'log',
  'log1p',
  'sin',
  'cos',
  'sinh',
  'cosh',
  'tanh',
  'asinh',
  'atan',
  'erf',
  'lambertW',
] as const;

export const binaryOperators = ['add', 'sub', 'mul', 'div', 'min', 'max'] as const;

/** `ifLess(a, b, c, d)` is c where a < b and d elsewhere; only the branch taken is evaluated to a value. */
export const choiceOperators = ['ifLess', 'ifLessEqual'] as const;

export type UnaryOperator = (typeof unaryOperators)[number];
export type BinaryOperator = (typeof binaryOperators)[number];
export type ChoiceOperator = (typeof choiceOperators)[number];
