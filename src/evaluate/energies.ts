import type { PartName } from '../definition/functional.ts';
import type { Instance } from '../functional/frame.ts';
import type { Place } from '../functional/place.ts';
import { add } from '../graph/build.ts';
import type { NodeId } from '../graph/graph.ts';

/** Exchange, correlation and their sum at a place; undefined where the functional does not give them. */
export interface Energies {
  readonly x: NodeId | undefined;
  readonly c: NodeId | undefined;
  readonly xc: NodeId | undefined;
}

/** Energies per particle, or over ε_x^unif, of the semilocal parts. */
export function energiesAt(instance: Instance, place: Place, kind: 'perParticle' | 'enhancement'): Energies {
  const part = (name: PartName) => instance.part(name, place)?.[kind];
  const x = part('exchange');
  const c = part('correlation');
  const both = x === undefined || c === undefined ? undefined : add(instance.graph, x, c);
  return { x, c, xc: part('exchange-correlation') ?? both };
}
