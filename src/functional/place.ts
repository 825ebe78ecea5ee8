import { add, cbrt, constant, div, mul, neg, pi, power, sqrt, sub } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { type Rational, rational } from '../number/rational.ts';
import type { Channel, ChannelQuantity, TotalQuantity } from './quantities.ts';

/** A density at a point: the node of each quantity there. */
export interface Place {
  total(name: TotalQuantity): NodeId;
  channel(name: ChannelQuantity, channel: Channel): NodeId;
  /** A node that is positive exactly where the channel holds electrons. */
  occupied(channel: Channel): NodeId;
  /** −ε_x^unif = 3k_F/(4π), the positive unit of every enhancement factor. */
  readonly unit: NodeId;
}

/** The coordinates of the uniform-polarisation slice; those beyond the rung may be left out. */
export interface SliceCoordinates {
  readonly rs?: NodeId;
  readonly zeta: NodeId;
  readonly s?: NodeId;
  readonly alpha?: NodeId;
  readonly q?: NodeId;
}

/** The density, its gradients, kinetic-energy densities and Laplacians, per spin. */
export interface DensityInputs {
  readonly n_up: NodeId;
  readonly n_dn: NodeId;
  readonly sigma_uu?: NodeId;
  readonly sigma_ud?: NodeId;
  readonly sigma_dd?: NodeId;
  readonly tau_up?: NodeId;
  readonly tau_dn?: NodeId;
  readonly lapl_up?: NodeId;
  readonly lapl_dn?: NodeId;
}

/** Thrown when a formula asks a place for a coordinate it was not given; checks make it a problem beforehand. */
export class MissingCoordinate extends Error {
  readonly coordinate: string;
  constructor(coordinate: string) {
    super(`the coordinate ${coordinate} is not given`);
    this.coordinate = coordinate;
  }
}

/**
 * The uniform-polarisation slice: ∇n_σ = (n_σ/n)∇n and τ_σ = τ_Wσ + α τ_unif,σ, so that
 * s_σ = s(1 ± ζ)^(−1/3), α_σ = α and q_σ = q(1 ± ζ)^(−2/3).
 */
export function slicePlace(graph: Graph, coordinates: SliceCoordinates): Place {
  const g = shorthand(graph);
  const { zeta } = coordinates;
  const rs = () => given(coordinates.rs, 'rs');
  const s = () => given(coordinates.s, 's');
  const alpha = () => given(coordinates.alpha, 'alpha');
  const q = () => given(coordinates.q, 'q');
  const one = g.number(1);
  // (1 ± ζ) = 2n_σ/n
  const share: Record<Channel, NodeId> = { up: add(graph, one, zeta), dn: sub(graph, one, zeta) };

  const totals: Record<TotalQuantity, () => NodeId> = {
    n: () => g.divide(g.number(3), g.times(g.number(4), g.pi, g.power(rs(), 3))),
    rs,
    zeta: () => zeta,
    // k_F = (9π/4)^(1/3)/r_s
    kF: () => g.divide(cbrt(graph, g.times(g.number(9, 4), g.pi)), rs()),
    ks: () => sqrt(graph, g.divide(g.times(g.number(4), total('kF')), g.pi)),
    phi: () => g.half(add(graph, g.power(share.up, 2, 3), g.power(share.dn, 2, 3))),
    epsx_unif: () => neg(graph, unit()),
    s,
    p: () => g.power(s(), 2),
    // t = s·k_F/(φ k_s), k_s² = 4k_F/π
    t: () => g.divide(g.times(s(), sqrt(graph, g.times(g.number(1, 4), g.pi, total('kF')))), total('phi')),
    sigma: () => g.times(g.number(4), g.power(total('kF'), 2), g.power(total('n'), 2), total('p')),
    tauW: () => g.times(g.number(1, 2), g.kineticUnit(total('kF'), total('n')), total('p')),
    tau: () => add(graph, total('tauW'), mul(graph, alpha(), total('tauUnif'))),
    tauUnif: () =>
      g.times(
        g.number(3, 20),
        g.kineticUnit(total('kF'), total('n')),
        add(graph, g.power(share.up, 5, 3), g.power(share.dn, 5, 3)),
      ),
    alpha,
    q,
  };

  const channels: Record<ChannelQuantity, (channel: Channel) => NodeId> = {
    n: (channel) => g.times(g.number(1, 2), total('n'), share[channel]),
    rs: (channel) => g.times(rs(), cbrt(graph, g.number(2)), g.power(share[channel], -1, 3)),
    s: (channel) => mul(graph, s(), g.power(share[channel], -1, 3)),
    p: (channel) => mul(graph, total('p'), g.power(share[channel], -2, 3)),
    x: (channel) => g.times(g.number(2), g.reducedGradientUnit, at('s', channel)),
    x2: (channel) => g.times(g.number(4), g.power(g.reducedGradientUnit, 2), at('p', channel)),
    sigma: (channel) => g.times(g.number(1, 4), g.power(share[channel], 2), total('sigma')),
    tauW: (channel) => g.times(g.number(1, 2), share[channel], total('tauW')),
    tau: (channel) => add(graph, at('tauW', channel), mul(graph, alpha(), at('tauUnif', channel))),
    tauUnif: (channel) =>
      g.times(g.number(3, 20), g.kineticUnit(total('kF'), total('n')), g.power(share[channel], 5, 3)),
    alpha,
    q: (channel) => mul(graph, q(), g.power(share[channel], -2, 3)),
  };

  const total = remembered((name: TotalQuantity) => totals[name]());
  const at = rememberedPair((name: ChannelQuantity, channel: Channel) => channels[name](channel));
  const unit = () => g.exchangeUnit(total('kF'));
  return {
    total,
    channel: at,
    occupied: (channel) => share[channel],
    get unit() {
      return unit();
    },
  };
}

/** Any spin-resolved density, from its own inputs. */
export function densityPlace(graph: Graph, inputs: DensityInputs): Place {
  const g = shorthand(graph);
  const density: Record<Channel, NodeId> = { up: inputs.n_up, dn: inputs.n_dn };
  const gradient = (channel: Channel) =>
    channel === 'up' ? given(inputs.sigma_uu, 'sigma_uu') : given(inputs.sigma_dd, 'sigma_dd');
  const kinetic = (channel: Channel) =>
    channel === 'up' ? given(inputs.tau_up, 'tau_up') : given(inputs.tau_dn, 'tau_dn');
  const laplacian = (channel: Channel) =>
    channel === 'up' ? given(inputs.lapl_up, 'lapl_up') : given(inputs.lapl_dn, 'lapl_dn');
  const share = (channel: Channel) => g.divide(g.times(g.number(2), density[channel]), total('n'));

  const totals: Record<TotalQuantity, () => NodeId> = {
    n: () => add(graph, density.up, density.dn),
    rs: () => cbrt(graph, g.divide(g.number(3), g.times(g.number(4), g.pi, total('n')))),
    zeta: () => g.divide(sub(graph, density.up, density.dn), total('n')),
    kF: () => cbrt(graph, g.times(g.number(3), g.power(g.pi, 2), total('n'))),
    ks: () => sqrt(graph, g.divide(g.times(g.number(4), total('kF')), g.pi)),
    phi: () => g.half(add(graph, g.power(share('up'), 2, 3), g.power(share('dn'), 2, 3))),
    epsx_unif: () => neg(graph, g.exchangeUnit(total('kF'))),
    s: () => sqrt(graph, total('p')),
    p: () => g.divide(total('sigma'), g.times(g.number(4), g.power(total('kF'), 2), g.power(total('n'), 2))),
    // Under one root, so that t² is free of it and its derivative exists at t = 0.
    t: () => sqrt(graph, g.divide(g.times(g.number(1, 4), g.pi, total('kF'), total('p')), g.power(total('phi'), 2))),
    sigma: () =>
      add(
        graph,
        add(graph, gradient('up'), gradient('dn')),
        mul(graph, g.number(2), given(inputs.sigma_ud, 'sigma_ud')),
      ),
    tauW: () => g.divide(total('sigma'), mul(graph, g.number(8), total('n'))),
    tau: () => add(graph, kinetic('up'), kinetic('dn')),
    tauUnif: () =>
      g.times(
        g.number(3, 20),
        g.kineticUnit(total('kF'), total('n')),
        add(graph, g.power(share('up'), 5, 3), g.power(share('dn'), 5, 3)),
      ),
    alpha: () => g.divide(sub(graph, total('tau'), total('tauW')), total('tauUnif')),
    q: () =>
      g.divide(add(graph, laplacian('up'), laplacian('dn')), g.times(g.number(4), g.power(total('kF'), 2), total('n'))),
  };

  const channels: Record<ChannelQuantity, (channel: Channel) => NodeId> = {
    n: (channel) => density[channel],
    rs: (channel) => cbrt(graph, g.divide(g.number(3), g.times(g.number(4), g.pi, density[channel]))),
    s: (channel) => sqrt(graph, at('p', channel)),
    p: (channel) => g.divide(at('x2', channel), mul(graph, g.number(4), g.power(g.reducedGradientUnit, 2))),
    x: (channel) => sqrt(graph, at('x2', channel)),
    x2: (channel) => g.divide(gradient(channel), g.power(density[channel], 8, 3)),
    sigma: gradient,
    tauW: (channel) => g.divide(gradient(channel), mul(graph, g.number(8), density[channel])),
    tau: kinetic,
    tauUnif: (channel) => g.times(g.number(3, 10), g.power(g.reducedGradientUnit, 2), g.power(density[channel], 5, 3)),
    alpha: (channel) => g.divide(sub(graph, kinetic(channel), at('tauW', channel)), at('tauUnif', channel)),
    q: (channel) =>
      g.divide(
        laplacian(channel),
        g.times(g.number(4), g.power(g.reducedGradientUnit, 2), g.power(density[channel], 5, 3)),
      ),
  };

  const total = remembered((name: TotalQuantity) => totals[name]());
  const at = rememberedPair((name: ChannelQuantity, channel: Channel) => channels[name](channel));
  return {
    total,
    channel: at,
    occupied: (channel) => density[channel],
    get unit() {
      return g.exchangeUnit(total('kF'));
    },
  };
}

function given(node: NodeId | undefined, name: string): NodeId {
  if (node === undefined) throw new MissingCoordinate(name);
  return node;
}

function remembered<Key, Value>(make: (key: Key) => Value): (key: Key) => Value {
  const known = new Map<Key, Value>();
  return (key) => {
    const value = known.get(key) ?? make(key);
    known.set(key, value);
    return value;
  };
}

function rememberedPair<First, Second extends string, Value>(make: (first: First, second: Second) => Value) {
  const bySecond = remembered((second: Second) => remembered((first: First) => make(first, second)));
  return (first: First, second: Second): Value => bySecond(second)(first);
}

function shorthand(graph: Graph) {
  const times = (first: NodeId, ...rest: readonly NodeId[]) => rest.reduce((a, b) => mul(graph, a, b), first);
  const divide = (a: NodeId, b: NodeId) => div(graph, a, b);
  const number = (numerator: number, denominator = 1) => constant(graph, rational(numerator, denominator));
  const raise = (base: NodeId, exponent: Rational) => power(graph, base, exponent);
  return {
    pi: pi(graph),
    number,
    times,
    divide,
    half: (a: NodeId) => mul(graph, number(1, 2), a),
    power: (base: NodeId, numerator: number, denominator = 1) => raise(base, rational(numerator, denominator)),
    /** k_F² n = (3π²)^(2/3) n^(5/3) */
    kineticUnit: (kF: NodeId, n: NodeId) => times(power(graph, kF, rational(2)), n),
    /** (6π²)^(1/3): x_σ = 2(6π²)^(1/3) s_σ */
    reducedGradientUnit: cbrt(graph, times(number(6), power(graph, pi(graph), rational(2)))),
    /** 3k_F/(4π) */
    exchangeUnit: (kF: NodeId) => divide(times(number(3, 4), kF), pi(graph)),
  };
}
