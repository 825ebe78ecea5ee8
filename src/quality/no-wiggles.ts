import { coordinateSymbol } from '../finding/symbols.ts';
import type { SliceName } from '../functional/variable-place.ts';
import { atPoints } from './at-points.ts';
import { type EnergyGraph, sliceEnergies } from './energies.ts';
import { derivativesAlong } from './partials.ts';
import type { Rule, SlicePoint } from './rule.ts';
import { derivativeWords, shown } from './words.ts';

/** Lines within the realistic box along which the shape of F is read. */
const lines = {
  s: { upper: 3, fixed: { rs: [0.1, 1, 5], zeta: [0, 0.7], alpha: [0, 0.5, 1, 2], q: [0] } },
  alpha: { upper: 4, fixed: { rs: [0.1, 1, 5], zeta: [0, 0.7], s: [0.2, 0.5, 1, 2], q: [0] } },
} as const;
type Along = keyof typeof lines;

const steps = 400;
/** Values below this share of the largest on their line have no sign. */
const deadBand = 1e-5;
/** More turns than these along one line are wiggles: F_x that rises and falls again, once through a plateau, has fewer. */
const mostExtrema = 1;
const mostInflections = 3;

/** The shape of one energy along one axis: the worst line for each measure. */
interface Shape {
  readonly symbol: string;
  readonly along: Along;
  readonly extrema: Counted;
  readonly inflections: Counted;
  readonly curvature: { readonly size: number; readonly point: SlicePoint };
  readonly points: number;
}

interface Counted {
  readonly count: number;
  readonly point: SlicePoint;
}

/**
 * Extrema, inflections and the largest second derivative of F_x and F_c along s and α in the realistic box. Violated
 * where a line has more than one extremum or three inflections, or |∂²F/∂s²| or |∂²F/∂α²| exceeds the threshold.
 */
export const noWiggles: Rule = ({ functional, parameters, threshold }) => {
  const energies = sliceEnergies(functional, parameters);
  const along = (['s', 'alpha'] as const).filter((axis) => energies.variables.includes(axis));
  const shapes = along.flatMap((axis) => shapesAlong(energies, axis));
  if (shapes.length === 0) {
    const reason = 'the form depends on neither s nor α';
    return { verdict: 'not-applicable', reason, margin: null, witness: null, points: 0 };
  }
  const steepest = shapes.reduce((a, b) => (b.curvature.size > a.curvature.size ? b : a));
  const turning = shapes.filter(
    ({ extrema, inflections }) => extrema.count > mostExtrema || inflections.count > mostInflections,
  );
  const [wiggle] = turning;
  const isSteep = !(steepest.curvature.size <= threshold);
  const witness = isSteep || wiggle === undefined ? steepest.curvature.point : turnOf(wiggle).point;
  return {
    verdict: isSteep || wiggle !== undefined ? 'violated' : 'holds',
    reason: shapes.map(shapeWords).join('; '),
    margin: threshold - steepest.curvature.size,
    witness,
    points: shapes.reduce((sum, { points }) => sum + points, 0),
  };
};

function turnOf({ extrema, inflections }: Shape): Counted {
  return extrema.count > mostExtrema ? extrema : inflections;
}

/** `F_x along α: 2 extrema, 5 inflections, |∂²F_x/∂α²| ≤ 2.13`, each the most of any line. */
function shapeWords({ symbol, along, extrema, inflections, curvature }: Shape): string {
  const counted = (count: number, one: string, many: string) => `${count} ${count === 1 ? one : many}`;
  const turns = `${counted(extrema.count, 'extremum', 'extrema')}, ${counted(inflections.count, 'inflection', 'inflections')}`;
  const second = derivativeWords({ symbol, by: [along, along] });
  return `${symbol} along ${coordinateSymbol(along)}: ${turns}, |${second}| ≤ ${shown(curvature.size)}`;
}

function shapesAlong({ graph, energies, variables }: EnergyGraph<SliceName>, along: Along): Shape[] {
  const { upper, fixed } = lines[along];
  const bases = combinations(variables.filter((name) => name !== along).map((name) => [name, valuesOf(fixed, name)]));
  // The first step is left out: every even F has an extremum at s = 0.
  const grid = Array.from({ length: steps }, (_, index) => (upper * (index + 1)) / steps);
  const points = bases.flatMap((base) => grid.map((value): SlicePoint => ({ ...base, [along]: value })));
  return energies.map(({ symbol, node }): Shape => {
    const [, first, second] = derivativesAlong(graph, node, along, 2) as [number, number, number];
    const [slopes, curvatures] = atPoints(graph, [first, second], variables)(points) as [Float64Array, Float64Array];
    const worst = (values: Float64Array) =>
      bases
        .map((_, line): Counted => {
          const turns = signChanges(values.subarray(line * steps, (line + 1) * steps));
          return { count: turns.length, point: points[line * steps + (turns.at(-1) ?? 0)] as SlicePoint };
        })
        .reduce((a, b) => (b.count > a.count ? b : a));
    const largest = curvatures.reduce(
      (best, value, index) => (Math.abs(value) > Math.abs(curvatures[best] as number) ? index : best),
      0,
    );
    return {
      symbol,
      along,
      extrema: worst(slopes),
      inflections: worst(curvatures),
      curvature: { size: Math.abs(curvatures[largest] as number), point: points[largest] as SlicePoint },
      points: points.length,
    };
  });
}

function valuesOf(fixed: Readonly<Partial<Record<SliceName, readonly number[]>>>, name: SliceName): readonly number[] {
  return fixed[name] as readonly number[];
}

function combinations(axes: readonly (readonly [SliceName, readonly number[]])[]): SlicePoint[] {
  return axes.reduce<SlicePoint[]>(
    (points, [name, values]) => points.flatMap((point) => values.map((value) => ({ ...point, [name]: value }))),
    [{}],
  );
}

/** The indices at which the sign differs from the last sign before. */
function signChanges(values: Float64Array): number[] {
  const least = deadBand * values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const turns: number[] = [];
  let last = 0;
  values.forEach((value, index) => {
    if (!(Math.abs(value) > least)) return;
    if (last !== 0 && Math.sign(value) !== last) turns.push(index);
    last = Math.sign(value);
  });
  return turns;
}
