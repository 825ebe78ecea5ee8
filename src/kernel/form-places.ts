import type { Graph, NodeId } from '../graph/graph.ts';
import { axesIn, formSize } from './form-layout.ts';
import { evaluateIntervals } from './interval-point.ts';

/** Where a node keeps its form in V, and what is known of it before any box is. */
export interface Place {
  readonly offset: number;
  readonly mask: number;
  /** A value that is not 0 where the node may lack a value. */
  readonly outside: string | undefined;
}

export interface FormPlaces {
  /** Reserves some doubles; answers where. */
  reserve(numbers: number): number;
  /** The place of a node: as it was set, or that of a constant, enclosed from its exact rationals. */
  of(id: NodeId): Place;
  has(id: NodeId): boolean;
  set(id: NodeId, place: Place): void;
  /** A place for a constant that is no node of the outputs. */
  constant(id: NodeId): Place;
  /** A place for a form in the axes of a mask, with a flag when it, or what it is made of, may lack a value. */
  form(mask: number, args: readonly Place[], mayLack: boolean): Place;
  /** V as it begins: constants are in their places. */
  values(): Float64Array;
}

export function makeFormPlaces(graph: Graph): FormPlaces {
  const known = new Map<NodeId, Place>();
  const constants: (readonly [number, readonly number[]])[] = [];
  let size = 0;

  function reserve(numbers: number): number {
    size += numbers;
    return size - numbers;
  }

  function constant(id: NodeId): Place {
    const [value] = evaluateIntervals(graph, [id], new Map());
    const { lower, upper, defined } = value as NonNullable<typeof value>;
    const offset = reserve(formSize(0));
    const centre = lower + (upper - lower) / 2;
    const error = lower === upper ? 0 : Math.max(upper - centre, centre - lower) * (1 + 2 ** -50);
    const isBounded = Number.isFinite(centre) && Number.isFinite(error);
    const form = isBounded ? [centre, error] : [0, Number.POSITIVE_INFINITY];
    constants.push([offset, [lower, upper, ...form, 0, 0]]);
    return { offset, mask: 0, outside: defined ? undefined : '1' };
  }

  return {
    reserve,
    constant,
    of(id) {
      const place = known.get(id) ?? constant(id);
      known.set(id, place);
      return place;
    },
    has: (id) => known.has(id),
    set: (id, place) => void known.set(id, place),
    form(mask, args, mayLack) {
      const offset = reserve(formSize(axesIn(mask).length));
      const isFlagged = mayLack || args.some(({ outside }) => outside !== undefined);
      return { offset, mask, outside: isFlagged ? `V[${reserve(1)}]` : undefined };
    },
    values() {
      const values = new Float64Array(size);
      for (const [offset, numbers] of constants) values.set(numbers, offset);
      return values;
    },
  };
}
