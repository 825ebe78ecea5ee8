import { energiesAt } from '../evaluate/energies.ts';
import type { Functional } from '../functional/functional.ts';
import { instantiate } from '../functional/instance.ts';
import type { Place } from '../functional/place.ts';
import {
  type DensityName,
  densityNames,
  type SliceName,
  sliceNames,
  variableDensity,
  variableSlice,
} from '../functional/variable-place.ts';
import { constant, mul } from '../graph/build.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { variablesOf } from '../graph/traverse.ts';
import type { Rational } from '../number/rational.ts';

/** One energy of a functional, under the symbol that a reader knows. */
export interface Energy {
  readonly symbol: string;
  readonly node: NodeId;
}

/** Energies of a functional in a graph of their own, and the variables that they depend on. */
export interface EnergyGraph<Name extends string> {
  readonly graph: Graph;
  readonly energies: readonly Energy[];
  readonly variables: readonly Name[];
}

type Parameters = ReadonlyMap<string, Rational>;

/** F_x and F_c on the slice, or F_xc where the sheet gives only their sum. */
export function sliceEnergies(functional: Functional, parameters: Parameters): EnergyGraph<SliceName> {
  const graph = new Graph();
  const energies = energiesOf(graph, functional, parameters, variableSlice(graph), 'enhancement');
  return { graph, energies, variables: namesIn(sliceNames, graph, energies) };
}

/** Energies per volume, n ε_x and n ε_c, of spin densities, their gradients and kinetic-energy densities. */
export function densityEnergies(functional: Functional, parameters: Parameters): EnergyGraph<DensityName> {
  const graph = new Graph();
  const place = variableDensity(graph);
  const energies = energiesOf(graph, functional, parameters, place, 'perParticle').map(({ symbol, node }) => ({
    symbol,
    node: mul(graph, place.total('n'), node),
  }));
  return { graph, energies, variables: namesIn(densityNames, graph, energies) };
}

/** The energies of a functional at a place of a graph. */
export function energiesOf(
  graph: Graph,
  functional: Functional,
  parameters: Parameters,
  place: Place,
  kind: 'enhancement' | 'perParticle',
): Energy[] {
  const changed = new Map([...parameters].map(([name, value]) => [name, constant(graph, value)]));
  const { x, c, xc } = energiesAt(instantiate(graph, functional, { parameters: changed }), place, kind);
  const letter = kind === 'enhancement' ? 'F' : 'nε';
  const named = (part: string, node: NodeId | undefined) =>
    node === undefined ? [] : [{ symbol: `${letter}_${part}`, node }];
  const separate = [...named('x', x), ...named('c', c)];
  return separate.length > 0 ? separate : named('xc', xc);
}

function namesIn<Name extends string>(names: readonly Name[], graph: Graph, energies: readonly Energy[]): Name[] {
  const used = variablesOf(
    graph,
    energies.map(({ node }) => node),
  );
  return names.filter((name) => used.has(name));
}
