import { variable } from '../graph/build.ts';
import type { Graph } from '../graph/graph.ts';
import { type DensityInputs, densityPlace, type Place, slicePlace } from './place.ts';

/** Coordinates of the uniform-polarisation slice; q only for Laplacian functionals. */
export const sliceNames = ['rs', 'zeta', 's', 'alpha', 'q'] as const;
export type SliceName = (typeof sliceNames)[number];

/** The inputs of a spin-resolved density. */
export const densityNames = [
  'n_up',
  'n_dn',
  'sigma_uu',
  'sigma_ud',
  'sigma_dd',
  'tau_up',
  'tau_dn',
  'lapl_up',
  'lapl_dn',
] as const satisfies readonly (keyof DensityInputs)[];
export type DensityName = (typeof densityNames)[number];

/** The slice with a variable of the graph for each coordinate. */
export function variableSlice(graph: Graph): Place {
  const v = (name: SliceName) => variable(graph, name);
  return slicePlace(graph, { rs: v('rs'), zeta: v('zeta'), s: v('s'), alpha: v('alpha'), q: v('q') });
}

/** A density with a variable of the graph for each input. */
export function variableDensity(graph: Graph): Place {
  const inputs = Object.fromEntries(densityNames.map((name) => [name, variable(graph, name)]));
  return densityPlace(graph, inputs as unknown as Required<DensityInputs>);
}
