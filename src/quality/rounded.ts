import { differentiate } from '../derivative/differentiate.ts';
import { energiesAt } from '../evaluate/energies.ts';
import { instantiate, type PrintedParameter } from '../functional/instance.ts';
import { type SliceName, sliceNames, variableSlice } from '../functional/variable-place.ts';
import { cbrt, constant, decimal, div, mul, pi, sub } from '../graph/build.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { variablesOf } from '../graph/traverse.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { compileKernel } from '../kernel/float64.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';
import { rational } from '../number/rational.ts';
import type { RuleQuestion, SlicePoint } from './rule.ts';

const digits = 40;

/** Points of the standard domain at which F and the verdicts are compared. */
const grid: Readonly<Record<SliceName, readonly number[]>> = {
  rs: [0.01, 0.05, 0.5, 2, 8, 30, 100],
  zeta: [0, 0.5, 0.9, 1],
  s: [0, 0.2, 0.5, 0.8, 1.2, 1.6, 2, 2.5, 3, 4, 5],
  alpha: [0, 0.2, 1, 2.2, 5],
  q: [0.3],
};

/** A margin below this breaks its condition. */
const tolerance = 1e-9;

/** What changes when parameters are rounded. */
export interface Change {
  /** The largest change of F. */
  readonly size: number;
  readonly at: SlicePoint;
  /** Ids of the conditions that held on the grid and do not any more, or the other way round. */
  readonly turned: readonly string[];
}

/** A functional whose printed parameters can be rounded. */
export interface Rounded {
  /** How many digits each printed parameter states. */
  readonly printedDigits: readonly number[];
  readonly points: number;
  /** Each printed parameter rounded to its digits, or to `count` where these are fewer. */
  roundedTo(count: number): Change;
}

export function roundedFunctional({ functional, parameters }: RuleQuestion): Rounded {
  const graph = new Graph();
  const noted = new Map<string, PrintedParameter>();
  const changed = new Map([...parameters].map(([name, value]) => [name, constant(graph, value)]));
  const instance = instantiate(graph, functional, { parameters: changed, printed: noted });
  const { xc, x, c } = energiesAt(instance, variableSlice(graph), 'enhancement');
  const whole = (xc ?? x ?? c) as NodeId;
  const margins = marginsOf(graph, { xc, x, c });
  const outputs = [whole, ...margins.map(({ node }) => node)];
  const used = variablesOf(graph, outputs);
  const names = sliceNames.filter((name) => used.has(name));
  const points = names.reduce<SlicePoint[]>(
    (all, name) => all.flatMap((point) => grid[name].map((value) => ({ ...point, [name]: value }))),
    [{}],
  );
  const printed = [...noted.values()];
  const settled = settle(graph, printed);
  // What depends on the parameters alone is evaluated once: they are an axis of one value.
  const kernel = compileKernel(graph, outputs, [
    { variables: ['unused', ...printed.map((parameter) => parameter.variable)] },
    { variables: ['none', ...names] },
  ]);
  const columns = [
    new Float64Array(points.length),
    ...names.map((name) => Float64Array.from(points, (point) => point[name] as number)),
  ];
  const evaluate = (values: readonly number[]) => {
    const results = outputs.map(() => new Float64Array(points.length));
    kernel.evaluate([[0, ...values].map((value) => Float64Array.of(value)), columns], results);
    return results as [Float64Array, ...Float64Array[]];
  };
  const context = decimalContext(digits);
  const before = evaluate(settled.map((value) => value.toNumber()));
  const heldBefore = before.slice(1).map(holds);
  return {
    printedDigits: printed.map((parameter) => parameter.digits),
    points: points.length,
    roundedTo(count) {
      const values = settled.map((value, index) => {
        const own = (printed[index] as PrintedParameter).digits;
        return context.from(value).toSignificantDigits(Math.min(own, count)).toNumber();
      });
      const after = evaluate(values);
      const moved = after[0].map((value, index) => Math.abs(value - (before[0][index] as number)) || 0);
      const worst = moved.reduce((best, size, index) => (size > (moved[best] as number) ? index : best), 0);
      const held = after.slice(1).map(holds);
      return {
        size: moved[worst] as number,
        at: points[worst] as SlicePoint,
        turned: margins.filter((_, index) => held[index] !== heldBefore[index]).map(({ id }) => id),
      };
    },
  };
}

/** The values of printed parameters; one may be computed from others, so they are settled in turn. */
function settle(graph: Graph, printed: readonly PrintedParameter[]): Decimal[] {
  const values = new Map<string, Decimal>();
  return printed.map((parameter) => {
    const value = evaluateDecimal(graph, [parameter.value], values, digits)[0] as Decimal;
    values.set(parameter.variable, value);
    return value;
  });
}

function holds(margins: Float64Array): boolean {
  return !margins.some((margin) => margin < -tolerance);
}

/** Four conditions that follow from F alone, by the ids of the catalogue. */
function marginsOf(
  graph: Graph,
  { x, c, xc }: { readonly [part in 'x' | 'c' | 'xc']: NodeId | undefined },
): { readonly id: string; readonly node: NodeId }[] {
  // C/A_x, A_x = (3/4)(3/π)^(1/3)
  const unit = mul(graph, constant(graph, rational(3, 4)), cbrt(graph, div(graph, constant(graph, 3), pi(graph))));
  const bound = div(graph, decimal(graph, '1.679'), unit);
  return [
    ...(x === undefined ? [] : [{ id: 'exchange-non-positive', node: x }]),
    ...(c === undefined ? [] : [{ id: 'correlation-non-positive', node: c }]),
    ...(c === undefined ? [] : [{ id: 'correlation-coordinate-scaling', node: differentiate(graph, c, 'rs') }]),
    ...(xc === undefined ? [] : [{ id: 'lieb-oxford', node: sub(graph, bound, xc) }]),
  ];
}
