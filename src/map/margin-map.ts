import { notApplicable } from '../constraint/applicable.ts';
import { type DomainCoordinate, domainCoordinates, gridCount, pinnedValues } from '../constraint/domain.ts';
import { limitInFloat64 } from '../constraint/limit.ts';
import { tidied } from '../constraint/look.ts';
import { buildMargin, type Margin } from '../constraint/margin.ts';
import { failure, type Outcome, type Problem, success } from '../errors/problem.ts';
import { limitAtEdge } from '../evaluate/edge.ts';
import type { MapPanel, MarginMap } from '../finding/margin-map.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { compilePoint } from '../kernel/float64.ts';
import { type Rational, toNumber } from '../number/rational.ts';
import { descend } from '../search/descend.ts';
import { type AxisGrid, gridOf } from '../search/grid.ts';
import { chooseAxes, drawnAxis, pictureAxis } from './axes.ts';
import { ends, violatedRegion } from './boundary.ts';
import { projectWorst } from './project.ts';
import { type MappedFunctional, type MapRequest, parameterTexts } from './request.ts';
import { marginUnit } from './unit.ts';

/** Points that one panel may take; the coordinates at their worst are tried at fewer values beyond that. */
const mostPoints = 40_000_000;

/** The margin maps of functionals and slices on common axes. Problems when the request makes no map. */
export function mapMargins(request: MapRequest, onPoints: (points: number) => void = () => {}): Outcome<MarginMap> {
  const { condition, domain, cells } = request;
  const { definition } = condition;
  if (definition.space !== 'slice' || condition.kind === 'swept') {
    const why =
      condition.kind === 'swept' ? 'is asked at given points' : 'is not a condition on the slice in r_s, ζ, s, α';
    const remedy = 'Choose a condition that is tried over a region of the slice; rungcheck explain tells where one is.';
    return failure([wrong(`${definition.id} ${why}, and has no map`, remedy)]);
  }
  const margins = new Map<MappedFunctional, Margin>();
  const problems: Problem[] = [];
  for (const mapped of request.functionals) {
    const reason = notApplicable(condition, mapped.functional);
    if (reason !== undefined) {
      const message = `${definition.id} does not apply to ${mapped.functional.definition.id}: ${reason}`;
      problems.push(wrong(message, 'Leave the functional out, or choose another condition.'));
    } else {
      const options = { constants: request.constants, parameters: mapped.parameters, limit: limitInFloat64 };
      margins.set(mapped, buildMargin(new Graph(), condition, mapped.functional, options));
    }
  }
  if (problems.length > 0) return failure(problems);
  const axes = axesFor(request, [...margins.values()]);
  if (!axes.ok) return axes;
  const [x, y] = axes.value.map((name) => pictureAxis(drawnAxis(domain, name), cells)) as [Drawn, Drawn];
  const panels = [...margins].flatMap(([mapped, margin]) =>
    request.slices.map((slice) => panelOf(request, mapped, margin, slice, x, y, onPoints)),
  );
  return success({
    format: 'rungcheck map',
    formatVersion: 1,
    condition: {
      id: definition.id,
      title: definition.title,
      requirement: definition.localForm ?? definition.requirement.text,
      force: definition.force,
      status: definition.status,
      tolerance: definition.tolerance,
      relative: definition.relative,
      unit: marginUnit(condition) ?? null,
      constants: Object.fromEntries(
        definition.constants.map(({ constant }) => [constant, toNumber(request.constants.get(constant) as Rational)]),
      ),
    },
    domain: domain.name,
    x,
    y,
    panels,
  });
}

type Drawn = MarginMap['x'];

function axesFor(
  request: MapRequest,
  margins: readonly Margin[],
): Outcome<readonly [DomainCoordinate, DomainCoordinate]> {
  const { condition, slices } = request;
  const held = [...condition.at.keys()];
  const { axes } = request.domain;
  const pointlike = domainCoordinates.filter((name) => !(axes[name].lower < axes[name].upper));
  const problems = [request.x, request.y, ...slices.flatMap((slice) => [...slice.keys()])].flatMap((name) =>
    name !== undefined && held.includes(name)
      ? [wrong(`${condition.definition.id} holds ${name} fixed`, `Leave ${name} out, or choose another condition.`)]
      : [],
  );
  const fixed = slices.flatMap((slice) => [...slice.keys()]);
  const twice = [request.x, request.y].find((name) => name !== undefined && fixed.includes(name));
  if (twice !== undefined) problems.push(wrong(`${twice} is an axis and is fixed by --at too`, 'Do one of the two.'));
  const single = [request.x, request.y].find((name) => name !== undefined && pointlike.includes(name));
  if (single !== undefined) {
    problems.push(wrong(`the domain has one value of ${single}, which makes no axis`, 'Give it two bounds.'));
  }
  if (request.x !== undefined && request.x === request.y) {
    problems.push(wrong(`both axes are ${request.x}`, 'Choose two coordinates.'));
  }
  if (problems.length > 0) return failure(problems);
  const matters = (name: DomainCoordinate) => margins.some(({ variables }) => variables.includes(name));
  const free = domainCoordinates.filter((name) => ![...held, ...fixed, ...pointlike].includes(name));
  const chosen = chooseAxes(matters, free, request);
  if (chosen === undefined)
    return failure([wrong('fewer than two coordinates are left to draw', 'Fix fewer by --at.')]);
  return success(chosen);
}

function panelOf(
  request: MapRequest,
  { functional, parameters }: MappedFunctional,
  margin: Margin,
  slice: ReadonlyMap<DomainCoordinate, number>,
  x: Drawn,
  y: Drawn,
  onPoints: (points: number) => void,
): MapPanel {
  const { domain, condition } = request;
  const { variables, graph, node } = margin;
  const rest = domainCoordinates.filter((name) => variables.includes(name) && name !== x.name && name !== y.name);
  const swept = rest.filter((name) => !slice.has(name));
  const grids = rest.map((name) => {
    const value = slice.get(name);
    return value === undefined
      ? gridOf(domain.axes[name], restCount(name, swept.length, x.values.length * y.values.length), pinnedValues[name])
      : gridOf({ name, lower: value, upper: value, scale: 'linear' }, 1);
  });
  const found = projectWorst(graph, node, variables, { x, y, rest: grids }, onPoints);
  if (grids.length === 0) fillEdges(margin, found.margins, x, y);
  const { tolerance } = condition.definition;
  const region = violatedRegion(graph, node, found.margins, { x, y, rest: grids }, tolerance, onPoints);
  return {
    functional: pick(functional),
    parameters: parameterTexts(parameters),
    fixed: {
      ...conditionFixed(margin),
      ...Object.fromEntries([...slice].filter(([name]) => variables.includes(name))),
    },
    worstOver: grids.filter(({ axis }) => !slice.has(axis.name as DomainCoordinate)).map(worstOver),
    // Zero without a sign, which JSON does not keep.
    margins: Array.from(found.margins, (value) => (Number.isFinite(value) ? value + 0 : null)),
    worstAt: Object.fromEntries(
      grids.flatMap(({ axis }, index) =>
        slice.has(axis.name as DomainCoordinate) ? [] : [[axis.name, Array.from(found.worstAt[index] as Float64Array)]],
      ),
    ),
    lowest: lowestOf(margin, found, { x, y, rest: grids }),
    violatedCells: found.margins.reduce((count, value) => (value < -tolerance ? count + 1 : count), 0),
    region: region.rings,
    points: found.points + region.points,
  };
}

/** Cells that are tried again where double precision gives no value. */
const mostRetried = 500;

/** At an edge (no gradient, ζ = ±1) a derivative can be 0/0 and yet have a limit: that is the margin there. */
function fillEdges({ graph, node, variables }: Margin, margins: Float64Array, x: Drawn, y: Drawn): void {
  const empty = [...margins.keys()].filter((cell) => !Number.isFinite(margins[cell]));
  for (const cell of empty.slice(0, mostRetried)) {
    const place = [
      [x.name, x.values[cell % x.values.length]],
      [y.name, y.values[Math.floor(cell / x.values.length)]],
    ] as const;
    const point = Object.fromEntries(
      place.filter(([name]) => variables.includes(name)).map(([name, value]) => [name, String(value)]),
    );
    margins[cell] = limitAtEdge(graph, node, point) ?? Number.NaN;
  }
}

/** As fine as the scan of a vet with that many coordinates, less where that would be too much. */
function restCount(name: DomainCoordinate, swept: number, cells: number): number {
  const wanted = gridCount(name, swept + 2);
  const most = Math.floor((mostPoints / cells) ** (1 / Math.max(1, swept)));
  return Math.max(5, Math.min(wanted, most));
}

function worstOver({ axis, values }: AxisGrid): MapPanel['worstOver'][number] {
  const upper = Number.isFinite(axis.upper) ? axis.upper : null;
  return { name: axis.name, lower: axis.lower, upper, points: values.length };
}

/** The lowest cell, followed downhill to the local minimum within the coordinates that are free. */
function lowestOf(
  { graph, node, variables }: Margin,
  found: ReturnType<typeof projectWorst>,
  { x, y, rest }: { readonly x: Drawn; readonly y: Drawn; readonly rest: readonly AxisGrid[] },
): MapPanel['lowest'] {
  let cell = -1;
  found.margins.forEach((value, index) => {
    if (Number.isFinite(value) && !(cell >= 0 && value >= (found.margins[cell] as number))) cell = index;
  });
  if (cell < 0) return null;
  const start = [
    { axis: ends(x), value: x.values[cell % x.values.length] as number },
    { axis: ends(y), value: y.values[Math.floor(cell / x.values.length)] as number },
    ...rest.map(({ axis }, index) => ({ axis, value: found.worstAt[index]?.[cell] as number })),
  ].filter(({ axis }) => variables.includes(axis.name));
  const at = compilePoint(
    graph,
    node,
    start.map(({ axis }) => axis.name),
  );
  const spot = descend(
    at,
    Float64Array.from(start, (entry) => entry.value),
    start.map(({ axis }) => axis),
  );
  const { place, value } = tidied(
    at,
    spot,
    start.map(({ axis }) => axis),
  );
  return {
    margin: value + 0,
    point: Object.fromEntries(start.map(({ axis }, index) => [axis.name, place[index] as number])),
  };
}

function conditionFixed({ graph, fixed }: Margin): Record<string, number> {
  const values = evaluateDecimal(graph, [...fixed.values()] as NodeId[], new Map(), 30);
  return Object.fromEntries([...fixed.keys()].map((name, index) => [name, values[index]?.toNumber() as number]));
}

function pick({ definition }: MappedFunctional['functional']): MapPanel['functional'] {
  return { id: definition.id, name: definition.name, rung: definition.rung };
}

function wrong(message: string, remedy: string): Problem {
  return { code: 'wrong-option', message, remedy };
}
