import { differentiate } from '../../../src/derivative/differentiate.ts';
import type { Instance, PartEnergy } from '../../../src/functional/frame.ts';
import type { Functional } from '../../../src/functional/functional.ts';
import { instantiate } from '../../../src/functional/instance.ts';
import {
  type DensityInputs,
  densityPlace,
  type Place,
  type SliceCoordinates,
  slicePlace,
} from '../../../src/functional/place.ts';
import { add, decimal, mul, variable } from '../../../src/graph/build.ts';
import { Graph, type NodeId } from '../../../src/graph/graph.ts';
import { evaluateDecimal } from '../../../src/kernel/decimal.ts';
import { compileKernel } from '../../../src/kernel/float64.ts';
import { Decimal } from '../../../src/number/decimal.ts';
import type { PartName, Points } from './values.ts';

/** Values of one part at points: in double precision at all of them, in high precision at one. */
export interface Evaluated {
  /** float64[k][i] is output k at point i. */
  readonly float64: readonly Float64Array[];
  highPrecision(point: number): number[];
}

/** New values of parameters of the sheet, as decimal text. */
export type Parameters = Readonly<Record<string, string>>;

/** Energy per particle, then the derivative of the energy per volume with respect to each column. */
export function evaluateGeneral(
  functional: Functional,
  part: PartName,
  points: Points,
  changed: Parameters,
): Evaluated {
  const graph = new Graph();
  const place = densityPlace(graph, inputs<DensityInputs>(graph, points.columns));
  const { perParticle } = energyOf(instanceOf(graph, functional, changed), part, place);
  const perVolume = mul(graph, place.total('n'), perParticle);
  const derivatives = points.columns.map((name) => differentiate(graph, perVolume, name));
  return evaluate(graph, [perParticle, ...derivatives], points);
}

/** F, ∂F/∂r_s and ∂²F/∂r_s² at fixed ζ, s, α. */
export function evaluateSlice(functional: Functional, part: PartName, points: Points, changed: Parameters): Evaluated {
  const graph = new Graph();
  const place = slicePlace(graph, inputs<SliceCoordinates>(graph, points.columns));
  const { enhancement } = energyOf(instanceOf(graph, functional, changed), part, place);
  const first = differentiate(graph, enhancement, 'rs');
  return evaluate(graph, [enhancement, first, differentiate(graph, first, 'rs')], points);
}

/** The part itself; for a combined part that the sheet gives in two, their sum. */
function energyOf(instance: Instance, name: PartName, place: Place): PartEnergy {
  const own = instance.part(name, place);
  if (own !== undefined) return own;
  const exchange = instance.part('exchange', place);
  const correlation = instance.part('correlation', place);
  if (name !== 'exchange-correlation' || exchange === undefined || correlation === undefined) {
    throw new RangeError(`${instance.functional.definition.id} has no ${name}`);
  }
  const { graph } = instance;
  return {
    perParticle: add(graph, exchange.perParticle, correlation.perParticle),
    enhancement: add(graph, exchange.enhancement, correlation.enhancement),
  };
}

function instanceOf(graph: Graph, functional: Functional, changed: Parameters): Instance {
  const unknown = Object.keys(changed).find((name) => !functional.parameters.has(name));
  if (unknown !== undefined) throw new RangeError(`${functional.definition.id} has no parameter ${unknown}`);
  const parameters = Object.entries(changed).map(([name, text]): [string, NodeId] => [name, decimal(graph, text)]);
  return instantiate(graph, functional, { parameters: new Map(parameters) });
}

function inputs<Inputs>(graph: Graph, columns: readonly string[]): Inputs {
  // The columns of the reference file are named as the inputs are.
  return Object.fromEntries(columns.map((name) => [name, variable(graph, name)])) as Inputs;
}

function evaluate(graph: Graph, outputs: readonly NodeId[], { columns, rows }: Points): Evaluated {
  const float64 = outputs.map(() => new Float64Array(rows.length));
  const values = columns.map((_, column) => Float64Array.from(rows, (row) => row[column] as number));
  compileKernel(graph, outputs, [{ variables: columns }]).evaluate([values], float64);
  return {
    float64,
    highPrecision(point) {
      const row = rows[point] as readonly number[];
      const bindings = new Map(columns.map((name, column) => [name, new Decimal(row[column] as number)]));
      return evaluateDecimal(graph, outputs, bindings, 40).map((value) => value.toNumber());
    },
  };
}
