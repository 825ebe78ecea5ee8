import { differentiate } from '../../../src/derivative/differentiate.ts';
import type { Expression } from '../../../src/expression/expression.ts';
import type { Instance, PartEnergy } from '../../../src/functional/frame.ts';
import type { Functional, Parameter } from '../../../src/functional/functional.ts';
import { instantiate } from '../../../src/functional/instance.ts';
import {
  type DensityInputs,
  densityPlace,
  type Place,
  type SliceCoordinates,
  slicePlace,
} from '../../../src/functional/place.ts';
import { add, mul, variable } from '../../../src/graph/build.ts';
import { Graph, type NodeId } from '../../../src/graph/graph.ts';
import { evaluateDecimal } from '../../../src/kernel/decimal.ts';
import { compileKernel } from '../../../src/kernel/float64.ts';
import { Decimal } from '../../../src/number/decimal.ts';
import { parseDecimal } from '../../../src/number/rational.ts';
import type { PartName, Points } from './values.ts';

/** Values of one part at points: in double precision at all of them, in high precision at one. */
export interface Evaluated {
  /** float64[k][i] is output k at point i. */
  readonly float64: readonly Float64Array[];
  highPrecision(point: number): number[];
}

/** New values of parameters as decimal text, by name; `pbe.kappa` is kappa of pbe where the sheet uses it. */
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
  const unused = new Set(Object.keys(changed));
  const altered = withParameters(functional, changed, unused);
  if (unused.size > 0) throw new RangeError(`${functional.definition.id} has no parameter ${[...unused].join(', ')}`);
  return instantiate(graph, altered);
}

/** The functional with new values, of its own parameters (`kappa`) and of those of the sheets it uses (`pbe.kappa`). */
function withParameters(functional: Functional, changed: Parameters, unused: Set<string>): Functional {
  const own = Object.entries(changed).filter(([key]) => functional.parameters.has(key));
  const imports = [...functional.imports].map(([alias, { functional: imported, parameters }]) => {
    const prefix = `${imported.definition.id}.`;
    const direct = Object.entries(changed).filter(
      ([key]) => key.startsWith(prefix) && imported.parameters.has(key.slice(prefix.length)),
    );
    for (const [key] of direct) unused.delete(key);
    const replaced = direct.map(([key, text]) => [key.slice(prefix.length), numberOf(text)] as const);
    const deeper = Object.fromEntries(Object.entries(changed).filter(([key]) => key.includes('.')));
    return [
      alias,
      {
        functional: withParameters(imported, deeper, unused),
        parameters: new Map([...parameters, ...replaced]),
      },
    ] as const;
  });
  for (const [key] of own) unused.delete(key);
  const parameters = new Map(functional.parameters);
  for (const [name, text] of own) {
    const { definition } = functional.parameters.get(name) as Parameter;
    parameters.set(name, { definition, value: numberOf(text) });
  }
  return { ...functional, imports: new Map(imports), parameters };
}

function numberOf(text: string): Expression {
  const value = parseDecimal(text);
  if (value === undefined) throw new RangeError(`not a decimal: ${text}`);
  return { kind: 'number', value, offset: 0 };
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
