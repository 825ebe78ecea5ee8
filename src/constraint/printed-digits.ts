import { differentiateAll } from '../derivative/differentiate.ts';
import type { Functional } from '../functional/functional.ts';
import type { PrintedParameter } from '../functional/instance.ts';
import { Graph } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';
import type { Rational } from '../number/rational.ts';
import type { Condition } from './condition.ts';
import { limitInHighPrecision } from './limit.ts';
import { buildMargin } from './margin.ts';

/** Whether a violation lies within what the printed digits of the parameters leave open. */
export interface DigitsCause {
  readonly kind: 'formula' | 'printed-digits';
  readonly text: string;
  /** The parameter whose rounding matters most. */
  readonly parameter?: { readonly sheet: string; readonly name: string };
}

const digits = 40;

/**
 * Moves every parameter that states its printed digits by half a unit of its last digit, each in the direction that
 * the exact derivative of the margin gives, and looks whether the violation at the point is gone then.
 */
export function causeOfViolation(
  condition: Condition,
  functional: Functional,
  options: { readonly constants: ReadonlyMap<string, Rational>; readonly parameters: ReadonlyMap<string, Rational> },
  point: Readonly<Record<string, number>>,
): DigitsCause {
  const printed = new Map<string, PrintedParameter>();
  const graph = new Graph();
  const margin = buildMargin(graph, condition, functional, { ...options, limit: limitInHighPrecision[0], printed });
  if (printed.size === 0) {
    return {
      kind: 'formula',
      text: 'no parameter of the sheet states its printed digits; the formula as given is to blame',
    };
  }
  const context = decimalContext(digits);
  const parameters = [...printed.values()];
  const values = valuesOf(graph, parameters);
  const coordinates = margin.variables.map((name) => [name, context.from(point[name] as number)] as const);
  const slopes = evaluateDecimal(
    graph,
    parameters.map(({ variable }) => differentiateAll(graph, [margin.node], variable)[0] as number),
    new Map([...coordinates, ...values]),
    digits,
  );
  const shifts = parameters.map((parameter, index) => {
    const value = values.get(parameter.variable) as Decimal;
    const half = context
      .from(10)
      .pow(value.e - parameter.digits + 1)
      .div(2);
    const slope = slopes[index] as Decimal;
    const shift = slope.isNegative() ? half.neg() : half;
    return { parameter, value, half, shift, gain: slope.abs().times(half) };
  });
  const moved = shifts.map(({ parameter, value, shift }) => [parameter.variable, value.plus(shift)] as const);
  const [best] = evaluateDecimal(graph, [margin.node], new Map([...coordinates, ...moved]), digits);
  const cleared = best?.greaterThanOrEqualTo(-condition.definition.tolerance) === true;
  const [strongest] = [...shifts].sort((a, b) => b.gain.comparedTo(a.gain));
  if (!cleared || strongest === undefined) {
    return {
      kind: 'formula',
      text: `no values of the parameters within half a unit of their last printed digit remove it (best margin ${best?.toPrecision(3)})`,
    };
  }
  const { parameter, value, half } = strongest;
  return {
    kind: 'printed-digits',
    text: `it lies within the rounding of the printed parameters: ${parameter.sheet} prints ${parameter.name} = ${value.toString()} to ${parameter.digits} digits (± ${half.toPrecision(1)}), and values within that remove the violation at this point`,
    parameter: { sheet: parameter.sheet, name: parameter.name },
  };
}

/** Values of printed parameters; one may be computed from another, so they are settled in turn. */
function valuesOf(graph: Graph, parameters: readonly PrintedParameter[]): Map<string, Decimal> {
  const values = new Map<string, Decimal>();
  for (const { variable, value } of parameters) {
    values.set(variable, evaluateDecimal(graph, [value], values, digits)[0] as Decimal);
  }
  return values;
}
