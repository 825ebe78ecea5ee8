import type { NodeId } from '../graph/graph.ts';
import type { Signs } from '../graph/sign.ts';
import { type SmoothName, smoothFunctions } from '../interval/functions.ts';

/** A unary operator, or numerator and denominator of a power. */
export type FunctionName = SmoothName | readonly [bigint, bigint];

export const reciprocal: FunctionName = [-1n, 1n];

/** Whether a function may have no value for what its argument may be. */
export function mayLeave(name: FunctionName, argument: NodeId, signs: Signs | undefined): boolean {
  if (signs !== undefined && staysInside(name, argument, signs)) return false;
  if (typeof name !== 'string') return name[0] < 0n || name[1] % 2n === 0n;
  return smoothFunctions[name].least > Number.NEGATIVE_INFINITY;
}

/** Whether the sign of an argument says that the function has a value. */
function staysInside(name: FunctionName, argument: NodeId, signs: Signs): boolean {
  if (name === 'log1p') return signs.isAboveMinusOne(argument);
  if (name === 'lambertW') return signs.isNonNegative(argument);
  if (name === 'log') return signs.isPositive(argument);
  return typeof name !== 'string' && (name[0] < 0n ? signs.isPositive(argument) : signs.isNonNegative(argument));
}
