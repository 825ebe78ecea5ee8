import { notApplicable } from '../constraint/applicable.ts';
import type { Condition } from '../constraint/condition.ts';
import { type Domain, type DomainCoordinate, domainCoordinates } from '../constraint/domain.ts';
import { limitInFloat64 } from '../constraint/limit.ts';
import { buildMargin } from '../constraint/margin.ts';
import { failure, type Outcome, success } from '../errors/problem.ts';
import { energiesAt } from '../evaluate/energies.ts';
import { evaluatePoints } from '../evaluate/points.ts';
import type { Expression } from '../expression/expression.ts';
import type { Bound, Curve, CurvePanel, CurveSet } from '../finding/curves.ts';
import type { PictureAxis } from '../finding/margin-map.ts';
import { instantiate } from '../functional/instance.ts';
import { variableSlice } from '../functional/variable-place.ts';
import { constant } from '../graph/build.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { variablesOf } from '../graph/traverse.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import type { Rational } from '../number/rational.ts';
import { drawnAxis, pictureAxis } from './axes.ts';
import { type MappedFunctional, parameterTexts } from './request.ts';

export const quantityNames = [
  'Fx',
  'Fc',
  'Fxc',
  'eps_x',
  'eps_c',
  'eps_xc',
  'dFx_drs',
  'dFc_drs',
  'd2Fc_drs2',
  'dFxc_drs',
] as const;
export type QuantityName = (typeof quantityNames)[number];

export interface CurvesRequest {
  readonly functionals: readonly MappedFunctional[];
  readonly quantities: readonly QuantityName[];
  readonly along: DomainCoordinate;
  readonly domain: Domain;
  /** One curve each; coordinates that are not named have the values of `usualSlice`. */
  readonly slices: readonly ReadonlyMap<DomainCoordinate, number>[];
  /** Of these, the ones that bound a quantity are drawn. */
  readonly conditions: readonly Condition[];
  readonly constants: ReadonlyMap<string, Rational>;
  readonly points: number;
}

/** Where the coordinates are that a request does not name. */
export const usualSlice: Readonly<Record<DomainCoordinate, number>> = { rs: 1, zeta: 0, s: 0, alpha: 1, q: 0 };

/** Curves of quantities along a coordinate: one panel for each quantity, the same curves in each. */
export function drawnCurves(request: CurvesRequest): Outcome<CurveSet> {
  const missing = request.functionals.flatMap(({ functional }) =>
    request.quantities
      .filter((quantity) => nodeFor(new Graph(), { functional, parameters: new Map() }, quantity) === undefined)
      .map((quantity) => ({
        code: 'wrong-option' as const,
        message: `${functional.definition.id} has no ${quantity}`,
        remedy: `It has ${functional.definition.parts.map(({ name }) => name).join(' and ')}.`,
      })),
  );
  if (missing.length > 0) return failure(missing);
  if (request.slices.some((slice) => slice.has(request.along))) {
    const message = `${request.along} is drawn along and is fixed by --at too`;
    return failure([{ code: 'wrong-option', message, remedy: 'Do one of the two.' }]);
  }
  const axis = drawnAxis(request.domain, request.along);
  if (!(axis.lower < axis.upper)) {
    const message = `the domain has one value of ${request.along}, which makes no axis`;
    return failure([{ code: 'wrong-option', message, remedy: 'Give it two bounds.' }]);
  }
  const along = pictureAxis(axis, request.points);
  return success({
    format: 'rungcheck plot',
    formatVersion: 1,
    along,
    panels: request.quantities.map((quantity) => panelOf(request, quantity, along)),
  });
}

function panelOf(request: CurvesRequest, quantity: QuantityName, along: PictureAxis): CurvePanel {
  const curves = request.functionals.flatMap((drawn) => {
    const graph = new Graph();
    const variables = variablesOf(graph, [nodeFor(graph, drawn, quantity) as NodeId]);
    return request.slices.map((slice): Curve => {
      const place = { ...usualSlice, ...Object.fromEntries(slice) };
      const matters = domainCoordinates.filter(
        (name) => name !== along.name && (variables.has(name) || slice.has(name)),
      );
      return {
        functional: identity(drawn),
        parameters: parameterTexts(drawn.parameters),
        fixed: Object.fromEntries(matters.map((name) => [name, place[name]])),
        values: valuesOf(drawn, quantity, along, place),
      };
    });
  });
  return { quantity, curves, bounds: boundsOf(request, quantity, along.name, curves) };
}

function valuesOf(
  { functional, parameters }: MappedFunctional,
  quantity: QuantityName,
  along: PictureAxis,
  place: Readonly<Record<DomainCoordinate, number>>,
): (number | null)[] {
  const fixed = Object.fromEntries(Object.entries(place).map(([name, value]) => [name, String(value)]));
  const { columns, rows } = evaluatePoints(functional, {
    space: 'slice',
    points: along.values.map((value) => ({ ...fixed, [along.name]: String(value) })),
    derivatives: quantity.startsWith('d'),
    parameters,
  });
  const column = columns.indexOf(quantity);
  return rows.map((row) => row[column] as number | null);
}

/** The quantity as a node; undefined where the functional lacks the part. */
function nodeFor(
  graph: Graph,
  { functional, parameters }: MappedFunctional,
  quantity: QuantityName,
): NodeId | undefined {
  const changed = new Map([...parameters].map(([name, value]) => [name, constant(graph, value)]));
  const instance = instantiate(graph, functional, { parameters: changed });
  const part = /(?:F|eps_)(xc|x|c)/.exec(quantity)?.[1] as 'x' | 'c' | 'xc';
  // A derivative depends on what the factor depends on.
  return energiesAt(instance, variableSlice(graph), quantity.startsWith('eps') ? 'perParticle' : 'enhancement')[part];
}

/** Levels that conditions set to the quantity alone, where the slice is one that the condition speaks of. */
function boundsOf(request: CurvesRequest, quantity: QuantityName, along: string, curves: readonly Curve[]): Bound[] {
  const bounds = request.conditions.flatMap((condition): Bound[] => {
    const { relation, left } = condition.requirement;
    if (condition.kind === 'swept' || relation === '==' || quantityOf(left) !== quantity) return [];
    return request.functionals.flatMap((drawn): Bound[] => {
      if (notApplicable(condition, drawn.functional) !== undefined) return [];
      const margin = buildMargin(new Graph(), condition, drawn.functional, {
        constants: request.constants,
        parameters: drawn.parameters,
        limit: limitInFloat64,
      });
      if (variablesOf(margin.graph, [margin.right]).size > 0) return [];
      const numbers = evaluateDecimal(margin.graph, [margin.right, ...margin.fixed.values()], new Map(), 30);
      const [value, ...held] = numbers.map((decimal) => decimal.toNumber());
      const names = [...margin.fixed.keys()];
      const speaksOf = curves.some(
        ({ functional, fixed }) =>
          functional.id === drawn.functional.definition.id &&
          names.every((name, index) => name !== along && (fixed[name] === undefined || fixed[name] === held[index])),
      );
      if (!speaksOf || value === undefined) return [];
      const { id, title, force, status } = condition.definition;
      return [{ condition: id, title, relation, value, force, status }];
    });
  });
  return bounds.filter(
    (bound, index) =>
      bounds.findIndex(({ condition, value }) => condition === bound.condition && value === bound.value) === index,
  );
}

/** `Fx`, `d(Fc, rs)` … as the name of a quantity. */
function quantityOf(expression: Expression): string | undefined {
  if (expression.kind === 'name') return expression.name;
  if (expression.kind !== 'call' || expression.name !== 'd') return undefined;
  const [inner, by] = expression.args;
  return inner?.kind === 'name' && by?.kind === 'name' ? `d${inner.name}_d${by.name}` : undefined;
}

function identity({ functional: { definition } }: MappedFunctional): Curve['functional'] {
  return { id: definition.id, name: definition.name, rung: definition.rung };
}
