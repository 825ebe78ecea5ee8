import { type DensityInputs, densityPlace, slicePlace } from '../functional/place.ts';
import { densityNames, type SliceName } from '../functional/variable-place.ts';
import { add, constant, div, mul, pi, power, variable } from '../graph/build.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { variablesOf } from '../graph/traverse.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { compileKernel } from '../kernel/float64.ts';
import { decimalContext } from '../number/decimal.ts';
import { rational } from '../number/rational.ts';
import type { Axis } from '../search/axis.ts';
import { samplePoints } from '../search/sample.ts';
import { energiesOf } from './energies.ts';
import type { Rule, SlicePoint } from './rule.ts';
import { pointWords, shown } from './words.ts';

const axes: readonly (Axis & { readonly name: Exclude<SliceName, 'zeta'> })[] = [
  { name: 'rs', lower: 0.01, upper: 100, scale: 'logarithmic' },
  { name: 's', lower: 0.001, upper: 5, scale: 'linear' },
  { name: 'alpha', lower: 0.001, upper: 5, scale: 'linear' },
  { name: 'q', lower: -5, upper: 5, scale: 'linear' },
];
const names = axes.map(({ name }) => name);
const sampled = 500;
const digits = 40;
/** Differences count relative to F, or to this where F is smaller. */
const least = 1e-3;

/**
 * F of a density without spin, in which ζ = 0 is put into the formula, against F of the two equal spin densities,
 * through the formula for any spin. Violated where they differ by more than the threshold, relative, or have no value.
 */
export const spinPathsAgree: Rule = ({ functional, parameters, threshold }) => {
  const graph = new Graph();
  const at = Object.fromEntries(names.map((name) => [name, variable(graph, name)])) as Coordinates;
  const inputs = equalChannels(graph, at);
  // The spin densities are variables of their own: with one node for both, ζ would be 0 in the formula again.
  const free = Object.fromEntries(densityNames.map((name) => [name, variable(graph, name)])) as Required<DensityInputs>;
  const [folded, polarised] = [slicePlace(graph, { ...at, zeta: constant(graph, 0) }), densityPlace(graph, free)].map(
    (place) => energiesOf(graph, functional, parameters, place, 'enhancement'),
  ) as [Energies, Energies];
  const { coordinates: columns } = samplePoints(axes, { count: sampled, edgeShare: 0 }).next().value as {
    coordinates: Float64Array[];
  };
  const nodes = densityNames.map((name) => inputs[name]);
  const without = evaluate(graph, [...nodes, ...folded.map(({ node }) => node)], names, columns);
  const densities = without.slice(0, nodes.length);
  const spinless = without.slice(nodes.length);
  const spinful = evaluate(
    graph,
    polarised.map(({ node }) => node),
    densityNames,
    densities,
  );
  const places = folded.flatMap(({ symbol }, energy) =>
    Array.from({ length: sampled }, (_, index) => {
      const [a, b] = [spinless, spinful].map((values) => (values[energy] as Float64Array)[index] as number);
      return { symbol, energy, index, difference: distance(a as number, b as number) };
    }),
  );
  const worst = places.reduce((one, other) => (other.difference > one.difference ? other : one));
  const point = Object.fromEntries(names.map((name, axis) => [name, columns[axis]?.[worst.index]])) as SlicePoint;
  const used = variablesOf(
    graph,
    folded.map(({ node }) => node),
  );
  const slice = Object.fromEntries(Object.entries(point).filter(([name]) => used.has(name)));
  const asked = { witness: { ...slice, zeta: 0 }, points: sampled };
  const where = `${worst.symbol} at ${pointWords(slice)}`;
  if (worst.difference <= threshold) {
    const reason = `the two ways differ by at most ${shown(worst.difference, 2)}, in ${where}`;
    return { verdict: 'holds', reason, margin: -worst.difference, ...asked };
  }
  const context = decimalContext(digits);
  const bindings = new Map(names.map((name) => [name as string, context.from(point[name] as number)]));
  const exactInputs = evaluateDecimal(graph, nodes, bindings, digits);
  densityNames.forEach((name, index) => {
    bindings.set(name, context.from(exactInputs[index] ?? Number.NaN));
  });
  const pair = [folded, polarised].map((energies) => energies[worst.energy]?.node as NodeId);
  const [a, b] = evaluateDecimal(graph, pair, bindings, digits).map((value) => value.toNumber()) as [number, number];
  const exact = distance(a, b);
  if (!Number.isFinite(exact)) {
    const reason = `${where}: ${valueWords(a)} without spin, ${valueWords(b)} with it`;
    return { verdict: 'violated', reason, margin: null, ...asked };
  }
  const isRoundOff = exact <= threshold;
  const size = isRoundOff ? worst.difference : exact;
  const reason = `${where} differs by ${shown(size)}${isRoundOff ? ', by round-off and not in high precision' : ''}`;
  return { verdict: 'violated', reason, margin: -size, ...asked };
};

type Energies = ReturnType<typeof energiesOf>;
type Coordinates = Readonly<Record<(typeof names)[number], NodeId>>;

function evaluate(
  graph: Graph,
  outputs: readonly NodeId[],
  variables: readonly string[],
  columns: readonly Float64Array[],
): Float64Array[] {
  const results = outputs.map(() => new Float64Array(sampled));
  compileKernel(graph, outputs, [{ variables }]).evaluate([columns], results);
  return results;
}

function valueWords(value: number): string {
  return Number.isFinite(value) ? shown(value, 8) : 'no value';
}

/** Relative difference; infinite where a value is missing. */
function distance(a: number, b: number): number {
  const difference = Math.abs(a - b) / Math.max(Math.abs(a), least);
  return Number.isFinite(difference) ? difference : Number.POSITIVE_INFINITY;
}

/** The inputs of two equal spin channels at a point of the slice. */
function equalChannels(graph: Graph, at: Coordinates): Required<DensityInputs> {
  const number = (numerator: number, denominator = 1) => constant(graph, rational(numerator, denominator));
  const times = (first: NodeId, ...rest: readonly NodeId[]) => rest.reduce((a, b) => mul(graph, a, b), first);
  const raised = (base: NodeId, above: number, below = 1) => power(graph, base, rational(above, below));
  const n = div(graph, number(3), times(number(4), pi(graph), raised(at.rs, 3)));
  const kF = raised(times(number(3), raised(pi(graph), 2), n), 1, 3);
  const half = times(number(1, 2), n);
  // σ_σσ′ = σ/4 with |∇n| = 2 k_F n s
  const quarter = times(raised(kF, 2), raised(n, 2), raised(at.s, 2));
  // τ_σ = τ/2, τ = k_F² n (s²/2 + 3α/10)
  const weizsacker = times(number(1, 4), raised(kF, 2), n, raised(at.s, 2));
  const uniform = times(number(3, 20), raised(kF, 2), n, at.alpha);
  const tau = add(graph, weizsacker, uniform);
  const laplacian = times(number(2), raised(kF, 2), n, at.q);
  return {
    n_up: half,
    n_dn: half,
    sigma_uu: quarter,
    sigma_ud: quarter,
    sigma_dd: quarter,
    tau_up: tau,
    tau_dn: tau,
    lapl_up: laplacian,
    lapl_dn: laplacian,
  };
}
