import fc from 'fast-check';
import type { Graph, NodeId } from '../../src/graph/graph.ts';
import type { Signs } from '../../src/graph/sign.ts';
import { Decimal, exactDecimal } from '../../src/number/decimal.ts';
import { makeEvaluator } from '../../src/recheck/evaluate.ts';
import { arrange } from '../../src/recheck/program.ts';
import { variableNames } from '../graph/arbitrary.ts';

/** Ends of each variable in turn. */
export type Box = readonly (readonly [number, number])[];

/** Boxes around points with coordinates between two numbers. */
export const arbitraryBox = (min: number, max: number): fc.Arbitrary<Box> =>
  fc
    .tuple(
      fc.constantFrom(0, 1e-9, 1e-3, 0.03, 0.1, 0.3, 1),
      fc.array(fc.double({ min, max, noNaN: true }), { minLength: 3, maxLength: 3 }),
    )
    .map(([half, middles]) => middles.map((middle) => [middle - half, middle + half] as const));

/** Places in a box: shares of the way from end to end along each axis. */
export const arbitraryPlaces = fc.array(
  fc.array(fc.constantFrom(0, 0.5, 1, 0.25, 0.9), { minLength: 3, maxLength: 3 }),
  { minLength: 1, maxLength: 5 },
);

export function pointAt(box: Box, place: readonly number[]): Map<string, Decimal> {
  return new Map(
    variableNames.map((name, axis) => {
      const [from, to] = box[axis] as readonly [number, number];
      const inside = Math.min(to, Math.max(from, from + (place[axis] as number) * (to - from)));
      return [name, exactDecimal(inside)] as const;
    }),
  );
}

const toDecimal = (mantissa: number, exponent: number): Decimal =>
  Number.isFinite(mantissa) ? new Decimal(`${mantissa}e${exponent}`) : new Decimal(mantissa);

export function boundsOf(graph: Graph, node: NodeId, box: Box, signs?: Signs) {
  const evaluate = makeEvaluator(arrange(graph, node, variableNames, signs));
  const { lower, lowerPower, upper, upperPower, defined } = evaluate(Float64Array.from(box.flat()), 0);
  return { lower: toDecimal(lower, lowerPower), upper: toDecimal(upper, upperPower), defined };
}

/** Throws where a value, off by 10⁻³⁰ of itself, is not between the bounds. */
export function expectInside(value: Decimal, { lower, upper }: { lower: Decimal; upper: Decimal }): void {
  const slack = value.abs().times('1e-30');
  if (!value.plus(slack).gte(lower) || !value.minus(slack).lte(upper))
    throw new Error(`${value} is outside ${lower} … ${upper}`);
}
