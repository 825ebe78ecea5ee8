import type { Graph, NodeId } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';

/*
 * A derivative can be 0/0 or 0·∞ exactly at an edge (no gradient, an empty channel, ζ = ±1) and yet have a limit
 * there. The limit is approached from within the domain along two sequences; where they agree it is the value.
 */
const digits = 100;
/**
 * How far inside the domain the edge is approached: s and α at quite different rates, so that a corner in which the
 * value depends on the direction (τ_W/τ at s = α = 0) is seen to have no limit.
 */
const approachSteps = [
  { s: '1e-12', alpha: '1e-36', other: '1e-24' },
  { s: '1e-34', alpha: '1e-14', other: '1e-30' },
] as const;
/** The two sequences must agree to this much, relative. */
const agreement = '1e-7';

/**
 * The limit of a node at an edge of its domain, or undefined where there is none that two sequences agree on.
 * `point` has the exact decimal text of each coordinate that matters.
 */
export function limitAtEdge(graph: Graph, node: NodeId, point: Readonly<Record<string, string>>): number | undefined {
  const approaches = approachSteps.map(
    (step) => evaluateDecimal(graph, [node], moveInside(point, step), digits)[0] as Decimal,
  );
  const [far, near] = approaches as [Decimal, Decimal];
  if (!far.isFinite() || !near.isFinite()) return undefined;
  const difference = near.minus(far).abs();
  if (!difference.lessThanOrEqualTo(near.abs().times(agreement).plus('1e-20'))) return undefined;
  return near.toNumber();
}

/** The point moved a little inside wherever a coordinate lies at an edge. */
function moveInside(
  point: Readonly<Record<string, string>>,
  steps: (typeof approachSteps)[number],
): Map<string, Decimal> {
  const context = decimalContext(digits);
  const step = context.from(steps.other);
  const value = (name: string) => context.from(point[name] ?? Number.NaN);
  const inside = new Map(Object.keys(point).map((name) => [name, value(name)]));
  if (point.zeta !== undefined && value('zeta').abs().equals(1)) {
    inside.set('zeta', value('zeta').times(context.from(1).minus(step)));
  }
  for (const name of ['s', 'alpha'] as const) {
    if (point[name] !== undefined && value(name).isZero()) inside.set(name, context.from(steps[name]));
  }
  for (const channel of ['up', 'dn'] as const) moveChannelInside(inside, channel, step);
  return inside;
}

/** A channel without electrons gets a few, spread as in the uniform gas; one without a gradient a small gradient. */
function moveChannelInside(inside: Map<string, Decimal>, channel: 'up' | 'dn', step: Decimal): void {
  const context = decimalContext(digits);
  const other = inside.get(channel === 'up' ? 'n_dn' : 'n_up');
  const density = inside.get(`n_${channel}`);
  if (density === undefined || other === undefined) return;
  const moved = density.isZero() ? other.times(step) : density;
  inside.set(`n_${channel}`, moved);
  const gradient = channel === 'up' ? 'sigma_uu' : 'sigma_dd';
  const present = inside.get(gradient);
  const empty = density.isZero();
  const scale = moved.pow(context.from(8).div(3));
  if (present?.isZero()) inside.set(gradient, scale.times(step));
  const kinetic = inside.get(`tau_${channel}`);
  // τ_unif,σ = (3/10)(6π²)^(2/3) n_σ^(5/3), about 4.557 n_σ^(5/3)
  if (empty && kinetic?.isZero()) inside.set(`tau_${channel}`, moved.pow(context.from(5).div(3)).times('4.557'));
}
