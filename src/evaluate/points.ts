import { differentiate } from '../derivative/differentiate.ts';
import type { Functional } from '../functional/functional.ts';
import { instantiate } from '../functional/instance.ts';
import type { Place } from '../functional/place.ts';
import { densityNames, sliceNames, variableDensity, variableSlice } from '../functional/variable-place.ts';
import { constant, mul } from '../graph/build.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { evaluateCertified } from '../kernel/certify.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { compileKernel } from '../kernel/float64.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';
import type { Rational } from '../number/rational.ts';
import { limitAtEdge } from './edge.ts';
import { type Energies, energiesAt } from './energies.ts';

export { densityNames as densityColumns, sliceNames as sliceColumns };

export type PointSpace = 'slice' | 'density';

export interface PointsRequest {
  readonly space: PointSpace;
  /** One point a row: the exact decimal text of each coordinate (Hartree atomic units). */
  readonly points: readonly Readonly<Record<string, string>>[];
  readonly derivatives: boolean;
  /** Decimal digits of the answer; undefined for double precision. */
  readonly digits?: number;
  /** New values for parameters of the functional. */
  readonly parameters?: ReadonlyMap<string, Rational>;
}

/** Answers by column: a number, decimal text when digits were asked for, or null where there is no value. */
export interface PointsAnswer {
  readonly columns: readonly string[];
  readonly rows: readonly (readonly (number | string | null)[])[];
}

/** Digits in which a point is tried that has no value in double precision. */
const edgeDigits = 50;

/**
 * The energies per particle (hartree), enhancement factors and derivatives of a functional at points.
 * Slice points: eps_*, F*, and with derivatives dFx_drs, dFc_drs, d2Fc_drs2, dFxc_drs at fixed ζ, s, α.
 * Density points: with derivatives those of the energy per volume by each input, `d_<input>_x`, `_c`, and total.
 * A coordinate that the functional does not depend on may be left out of every point.
 */
export function evaluatePoints(functional: Functional, request: PointsRequest): PointsAnswer {
  const graph = new Graph();
  const instance = instantiate(graph, functional, {
    parameters: new Map([...(request.parameters ?? [])].map(([name, value]) => [name, constant(graph, value)])),
  });
  const inputs: readonly string[] = request.space === 'slice' ? sliceNames : densityNames;
  const place = request.space === 'slice' ? variableSlice(graph) : variableDensity(graph);
  const perParticle = energiesAt(instance, place, 'perParticle');
  const enhancement = energiesAt(instance, place, 'enhancement');
  const columns = new Map<string, NodeId | undefined>([
    ['eps_x', perParticle.x],
    ['eps_c', perParticle.c],
    ['eps_xc', perParticle.xc],
    ['Fx', enhancement.x],
    ['Fc', enhancement.c],
    ['Fxc', enhancement.xc],
  ]);
  if (request.derivatives) {
    const derivatives =
      request.space === 'slice'
        ? sliceDerivatives(graph, enhancement)
        : densityDerivatives(
            graph,
            perParticle,
            place,
            inputs.filter((name) => isGiven(request, name)),
          );
    for (const [name, node] of derivatives) columns.set(name, node);
  }
  const outputs = [...columns.values()].filter((node) => node !== undefined);
  const values =
    request.digits === undefined
      ? evaluateDoubles(graph, outputs, inputs, request)
      : evaluateDigits(graph, outputs, inputs, request, request.digits);
  return {
    columns: [...columns.keys()],
    rows: request.points.map((_, row) => {
      let next = 0;
      return [...columns.values()].map((node) => (node === undefined ? null : (values[next++]?.[row] ?? null)));
    }),
  };
}

function sliceDerivatives(graph: Graph, enhancement: Energies): [string, NodeId | undefined][] {
  const byRadius = (node: NodeId | undefined) => (node === undefined ? undefined : differentiate(graph, node, 'rs'));
  const firstOfCorrelation = byRadius(enhancement.c);
  return [
    ['dFx_drs', byRadius(enhancement.x)],
    ['dFc_drs', firstOfCorrelation],
    ['d2Fc_drs2', byRadius(firstOfCorrelation)],
    ['dFxc_drs', byRadius(enhancement.xc)],
  ];
}

function densityDerivatives(
  graph: Graph,
  perParticle: Energies,
  place: Place,
  inputs: readonly string[],
): [string, NodeId | undefined][] {
  const suffixes = { x: '_x', c: '_c', xc: '' } as const;
  return (['x', 'c', 'xc'] as const).flatMap((part) => {
    const energy = perParticle[part];
    const perVolume = energy === undefined ? undefined : mul(graph, place.total('n'), energy);
    return inputs.map((name): [string, NodeId | undefined] => [
      `d_${name}${suffixes[part]}`,
      perVolume === undefined ? undefined : differentiate(graph, perVolume, name),
    ]);
  });
}

function isGiven(request: PointsRequest, name: string): boolean {
  return request.points.every((point) => point[name] !== undefined);
}

/** Values by output, then by point. Where double precision gives no value, high precision is asked. */
function evaluateDoubles(
  graph: Graph,
  outputs: readonly NodeId[],
  inputs: readonly string[],
  request: PointsRequest,
): (number | null)[][] {
  const { points } = request;
  const kernel = compileKernel(graph, outputs, [{ variables: inputs }]);
  const columns = inputs.map((name) => Float64Array.from(points, (point) => Number(point[name] ?? Number.NaN)));
  const results = outputs.map(() => new Float64Array(points.length));
  kernel.evaluate([columns], results);
  return results.map((result, index) =>
    [...result].map((value, row) => {
      if (Number.isFinite(value)) return value;
      const point = points[row] as Readonly<Record<string, string>>;
      const node = outputs[index] as NodeId;
      const [exact] = evaluateDecimal(graph, [node], bindingsOf(inputs, point, edgeDigits), edgeDigits);
      const retried = exact?.toNumber() ?? Number.NaN;
      return Number.isFinite(retried) ? retried : (limitAtEdge(graph, node, point) ?? null);
    }),
  );
}

function evaluateDigits(
  graph: Graph,
  outputs: readonly NodeId[],
  inputs: readonly string[],
  request: PointsRequest,
  digits: number,
): (string | null)[][] {
  const rows = request.points.map((point) =>
    evaluateCertified(graph, outputs, bindingsOf(inputs, point, digits), digits).map(({ value }) =>
      value.isFinite() ? value.toSignificantDigits(digits).toString() : null,
    ),
  );
  return outputs.map((_, index) => rows.map((row) => row[index] ?? null));
}

function bindingsOf(
  inputs: readonly string[],
  point: Readonly<Record<string, string>>,
  digits: number,
): Map<string, Decimal> {
  const context = decimalContext(digits);
  return new Map(inputs.map((name) => [name, context.from(point[name] ?? Number.NaN)]));
}
