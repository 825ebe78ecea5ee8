import type { Space } from '../definition/constraint.ts';
import { type DensityInputs, densityPlace, type Place } from '../functional/place.ts';
import { sliceNames } from '../functional/variable-place.ts';
import { add, cbrt, constant, div, mul, pi, power, sub, variable } from '../graph/build.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { rational } from '../number/rational.ts';

/** Coordinates of the general spin space; `cosine` is that of the angle between ∇n↑ and ∇n↓. */
export const spinCoordinates = ['rs', 'zeta', 's_up', 's_dn', 'cosine', 'alpha_up', 'alpha_dn'] as const;

export function coordinatesOf(space: Space): readonly string[] {
  return space === 'slice' ? sliceNames : spinCoordinates;
}

/** The coordinate that takes a coordinate's value when the spin labels are swapped, with its sign. */
export const swappedCoordinates: Readonly<Record<string, { readonly from: string; readonly sign: 1 | -1 }>> = {
  zeta: { from: 'zeta', sign: -1 },
  s_up: { from: 's_dn', sign: 1 },
  s_dn: { from: 's_up', sign: 1 },
  alpha_up: { from: 'alpha_dn', sign: 1 },
  alpha_dn: { from: 'alpha_up', sign: 1 },
};

/**
 * The densities of the general spin space, from its coordinates: n_σ = n(1 ± ζ)/2,
 * |∇n_σ| = 2(6π²)^(1/3) n_σ^(4/3) s_σ and τ_σ = τ_Wσ + α_σ τ_unif,σ. Every such point is admissible.
 */
export function spinInputs(graph: Graph): Required<Omit<DensityInputs, 'lapl_up' | 'lapl_dn'>> {
  const coordinate = (name: (typeof spinCoordinates)[number]) => variable(graph, name);
  const times = (first: NodeId, ...rest: readonly NodeId[]) => rest.reduce((a, b) => mul(graph, a, b), first);
  const number = (numerator: number, denominator = 1) => constant(graph, rational(numerator, denominator));
  const raised = (base: NodeId, numerator: number, denominator: number) =>
    power(graph, base, rational(numerator, denominator));
  const one = number(1);
  const zeta = coordinate('zeta');
  const n = div(graph, number(3), times(number(4), pi(graph), raised(coordinate('rs'), 3, 1)));
  const n_up = times(number(1, 2), n, add(graph, one, zeta));
  const n_dn = times(number(1, 2), n, sub(graph, one, zeta));
  // (6π²)^(1/3)
  const unit = cbrt(graph, times(number(6), raised(pi(graph), 2, 1)));
  const gradient = (density: NodeId, s: NodeId) => times(number(2), unit, raised(density, 4, 3), s);
  const grad_up = gradient(n_up, coordinate('s_up'));
  const grad_dn = gradient(n_dn, coordinate('s_dn'));
  // τ_Wσ = |∇n_σ|²/(8n_σ) = (6π²)^(2/3) n_σ^(5/3) s_σ²/2 and τ_unif,σ = (3/10)(6π²)^(2/3) n_σ^(5/3)
  const kinetic = (density: NodeId, s: NodeId, alpha: NodeId) =>
    times(
      raised(unit, 2, 1),
      raised(density, 5, 3),
      add(graph, times(number(1, 2), raised(s, 2, 1)), times(number(3, 10), alpha)),
    );
  return {
    n_up,
    n_dn,
    sigma_uu: raised(grad_up, 2, 1),
    sigma_ud: times(coordinate('cosine'), grad_up, grad_dn),
    sigma_dd: raised(grad_dn, 2, 1),
    tau_up: kinetic(n_up, coordinate('s_up'), coordinate('alpha_up')),
    tau_dn: kinetic(n_dn, coordinate('s_dn'), coordinate('alpha_dn')),
  };
}

export function spinPlaceOf(graph: Graph): Place {
  return densityPlace(graph, spinInputs(graph));
}
