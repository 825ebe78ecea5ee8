import type { PartName } from '../definition/functional.ts';
import type { Expression } from '../expression/expression.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import type { Functional, Part } from './functional.ts';
import type { Place } from './place.ts';
import type { Channel } from './quantities.ts';

/** The energy of one part at a place: per particle of the whole density, and over ε_x^unif (F). */
export interface PartEnergy {
  readonly perParticle: NodeId;
  readonly enhancement: NodeId;
}

/** A functional in one graph with its parameters settled; asks a place for the quantities it needs. */
export interface Instance {
  readonly functional: Functional;
  readonly graph: Graph;
  parameter(name: string): NodeId;
  callFunction(name: string, args: readonly NodeId[]): NodeId;
  /** The energy of a part at a place; undefined where the functional has no such part. */
  part(name: PartName, place: Place): PartEnergy | undefined;
  imported(alias: string): Instance;
  interpretAt(expression: Expression, frame: Frame): NodeId;
}

/** Where an expression stands: the place, the part's own steps, and the spin channel inside a sum over spin. */
export interface Frame {
  readonly place: Place;
  readonly part?: Part;
  readonly channel?: Channel;
}
