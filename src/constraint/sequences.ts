import { type GrowthResult, growthOf } from '../extrapolate/growth.ts';
import { closeSequences, type LimitResult, limitOf, ordinarySequences, outerSequences } from '../extrapolate/limit.ts';
import type { DecimalFunction, Target } from '../extrapolate/sequence.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { variablesOf } from '../graph/traverse.ts';
import { decimalLine } from '../kernel/decimal-line.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';
import { approach } from './expansion.ts';
import type { Leaf, Leaves } from './leaves.ts';

export type Bindings = ReadonlyMap<string, Decimal>;

/** What a sequence says of a limit or an order at one point. */
export interface LeafValue {
  readonly leaf: Leaf;
  readonly result: LimitResult | GrowthResult;
  /** NaN where it could not be told, infinite where the function has no finite limit. */
  readonly value: Decimal;
  readonly error: Decimal;
}

/** Evaluates nodes that contain limits, orders and coefficients. Equal questions are asked once. */
export class SequenceEvaluator {
  readonly #graph: Graph;
  readonly #leaves: Leaves;
  readonly #resolution: Decimal;
  readonly #known = new Map<string, LeafValue>();

  /** Limits are wanted to `resolution` only; a drift that stays below it over all of a sequence does not matter. */
  constructor(graph: Graph, leaves: Leaves, resolution: Decimal) {
    this.#graph = graph;
    this.#leaves = leaves;
    this.#resolution = resolution;
  }

  /** The limits and orders that a node contains itself, innermost left out. */
  leavesOf(node: NodeId): Leaf[] {
    const names = variablesOf(this.#graph, [node]);
    return this.#leaves.found.filter(({ symbol }) => names.has(symbol));
  }

  /** The coordinates and columns that a node depends on, also through its limits. */
  coordinatesOf(node: NodeId): Set<string> {
    const names = new Set([...variablesOf(this.#graph, [node])].filter((name) => !name.startsWith('#')));
    for (const leaf of this.leavesOf(node)) {
      for (const name of this.coordinatesOf(leaf.of)) if (name !== leaf.along) names.add(name);
    }
    return names;
  }

  /** A node at a point, with the values of the limits in it given. */
  value(node: NodeId, point: Bindings, digits: number): Decimal {
    return this.#line(node, point)(new Map(), digits);
  }

  /** A limit or an order at a point. */
  leaf(leaf: Leaf, point: Bindings): LeafValue {
    const needed = [...this.coordinatesOf(leaf.of)].filter((name) => name !== leaf.along).sort();
    const key = `${leaf.symbol} ${needed.map((name) => `${name}=${point.get(name)}`).join(' ')}`;
    const known = this.#known.get(key);
    if (known !== undefined) return known;
    const found = this.#resolve(leaf, point, undefined);
    this.#known.set(key, found);
    return found;
  }

  /** `within`: the distance from its target at which another limit stands that this one is inside of. */
  #resolve(leaf: Leaf, point: Bindings, within: Decimal | undefined): LeafValue {
    const line = this.#line(leaf.of, point, leaf);
    const f: DecimalFunction = (x, digits) => line(new Map([[leaf.along, x]]), digits);
    const target = targetFor(leaf);
    const { from } = decimalContext(50);
    const none = { value: from(Number.NaN), error: from(0) };
    if (leaf.kind === 'limit') {
      const isOuter = this.#movedLeaves(leaf.of, point, leaf.along).length > 0;
      const alone = isOuter ? outerSequences : ordinarySequences;
      const sequences = within === undefined ? alone : closeSequences(within.pow(4));
      const result = limitOf(f, target, { ...sequences, resolution: this.#resolution });
      if (result.kind === 'finite') return { leaf, result, value: result.value, error: result.error };
      if (result.kind === 'unknown') return { leaf, result, ...none };
      return { leaf, result, value: from(result.sign * Number.POSITIVE_INFINITY), error: from(0) };
    }
    const result = growthOf(f, target);
    if (result.kind === 'unknown') return { leaf, result, ...none };
    if (result.kind === 'vanishing') {
      const power = target.kind === 'infinity' ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
      return { leaf, result, value: from(leaf.kind === 'order' ? power : 0), error: from(0) };
    }
    return leaf.kind === 'order'
      ? { leaf, result, value: result.power, error: result.error }
      : { leaf, result, value: result.logPower, error: result.logError };
  }

  /** The limits in a node that change when a variable moves. */
  #movedLeaves(node: NodeId, point: Bindings, along: string): Leaf[] {
    return this.leavesOf(node).filter(
      ({ symbol, of, along: inner }) => !point.has(symbol) && inner !== along && this.coordinatesOf(of).has(along),
    );
  }

  /** A node at a point, or along the variable of a limit; limits in it are taken anew where they depend on that. */
  #line(node: NodeId, point: Bindings, outer?: Leaf) {
    const moved = outer === undefined ? [] : this.#movedLeaves(node, point, outer.along);
    const still = new Map(point);
    for (const leaf of this.leavesOf(node)) {
      if (!still.has(leaf.symbol) && !moved.includes(leaf)) still.set(leaf.symbol, this.leaf(leaf, point).value);
    }
    const expanded = [...this.#leaves.expanded].filter((name) => point.has(name) && name !== outer?.along);
    const moving = [...moved.map(({ symbol }) => symbol), ...expanded];
    const direct = decimalLine(
      this.#graph,
      node,
      still,
      new Set(outer === undefined ? moving : [outer.along, ...moving]),
    );
    const at = expanded.map((name) => [name, point.get(name) as Decimal] as const);
    return (values: Bindings, digits: number): Decimal => {
      const here = new Map(values);
      for (const leaf of moved) {
        const h = distance(outer as Leaf, values.get((outer as Leaf).along) as Decimal);
        here.set(leaf.symbol, this.#resolve(leaf, new Map([...point, ...values]), h).value);
      }
      if (at.length === 0) return direct(here, digits);
      return approach((place, precision) => direct(new Map([...here, ...place]), precision), at, digits);
    };
  }
}

function distance(leaf: Leaf, x: Decimal): Decimal {
  if (leaf.target === 'infinity') return x.pow(-1);
  return x.minus(decimalContext(50).fromRational(leaf.target)).abs();
}

/** A coordinate comes to its end from inside: ζ to 1 from below, everything else from above. */
function targetFor({ along, target }: Leaf): Target {
  if (target === 'infinity') return { kind: 'infinity' };
  const value = decimalContext(50).fromRational(target);
  const isUpperEnd = (along === 'zeta' || along === 'cosine') && target.equals(1);
  return { kind: 'value', value, side: isUpperEnd ? 'below' : 'above' };
}
