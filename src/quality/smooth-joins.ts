import { coordinateSymbol } from '../finding/symbols.ts';
import type { Graph, NodeId } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';
import { type Energy, sliceEnergies } from './energies.ts';
import { derivativesAlong } from './partials.ts';
import type { Rule, SlicePoint } from './rule.ts';
import { findJoins, type Join, switchesOf } from './switches.ts';
import { derivativeWords, pointWords, shown } from './words.ts';

const digits = 50;
/** Distance from the join of the two points that are compared. */
const distance = '1e-16';
const mostOrder = 4;
/** Energies enter a calculation with two derivatives: up to these a join must be continuous. */
const requiredOrder = 2;
/** Places that are named. */
const mostPlaces = 3;

/** The derivatives of one energy on the two sides of a join. */
interface Jumps {
  readonly join: Join;
  readonly energy: Energy;
  /** Difference of each order, relative to its size where that exceeds 1. */
  readonly sizes: readonly number[];
}

/**
 * At every switch of the formula that lines along the axes meet: the class of F there. Violated where the value or a
 * derivative of first or second order along the axis jumps by more than the threshold, relative where it exceeds 1.
 */
export const smoothJoins: Rule = ({ functional, parameters, threshold }) => {
  const { graph, energies, variables } = sliceEnergies(functional, parameters);
  const own = energies.map((energy) => ({ energy, switches: switchesOf(graph, [energy.node]) }));
  const joins = findJoins(graph, [...new Set(own.flatMap(({ switches }) => switches))], variables);
  if (joins.length === 0) {
    const reason = 'the formula has no join inside the domain: it is analytic there';
    return { verdict: 'holds', reason, margin: null, witness: null, points: 0 };
  }
  const all = joins
    .flatMap((join) => {
      const joined = own.filter(({ switches }) => switches.includes(join.difference));
      return jumpsAt(
        graph,
        joined.map(({ energy }) => energy),
        join,
      );
    })
    .sort(byRoughness(threshold));
  const [worst] = all as [Jumps, ...Jumps[]];
  const size = Math.max(...worst.sizes.slice(0, requiredOrder + 1));
  const places = placesOf(all, threshold);
  const further = places.length - mostPlaces;
  return {
    verdict: size <= threshold ? 'holds' : 'violated',
    reason: `${places.slice(0, mostPlaces).join('; ')}${further > 0 ? `; ${further} more, none rougher` : ''}`,
    margin: -size,
    witness: pointOf(worst.join),
    points: joins.length,
  };
};

function jumpsAt(graph: Graph, energies: readonly Energy[], join: Join): Jumps[] {
  const context = decimalContext(digits);
  const centre = join.isFixed ? context.from(join.at) : sharpened(graph, join);
  const orders = energies.map(({ node }) => derivativesAlong(graph, node, join.axis, mostOrder));
  const side = (sign: 1 | -1) =>
    evaluateDecimal(graph, orders.flat(), bindings(join, centre.plus(context.from(distance).times(sign))), digits);
  const [below, above] = [side(-1), side(1)];
  return energies.map((energy, index) => {
    const sizes = Array.from({ length: mostOrder + 1 }, (_, order) => {
      const at = index * (mostOrder + 1) + order;
      const [low, high] = [below[at] as Decimal, above[at] as Decimal];
      const scale = Math.max(1, low.abs().toNumber(), high.abs().toNumber());
      return high.minus(low).abs().toNumber() / scale;
    });
    return { join, energy, sizes };
  });
}

function bindings({ axis, base }: Join, at: Decimal): Map<string, Decimal> {
  const context = decimalContext(digits);
  const others = Object.entries(base).map(([name, value]) => [name, context.from(value)] as const);
  return new Map([...others, [axis, at]]);
}

/** The place of a join to working precision, by the secant method from its double-precision value. */
function sharpened(graph: Graph, join: Join): Decimal {
  const context = decimalContext(digits);
  const f = (at: Decimal) =>
    evaluateDecimal(graph, [join.difference as NodeId], bindings(join, at), digits)[0] as Decimal;
  let [before, at] = [context.from(join.at * (1 + 1e-9)), context.from(join.at)];
  let previous = f(before);
  for (let count = 0; count < 8; count += 1) {
    const value = f(at);
    const slope = value.minus(previous).div(at.minus(before));
    if (!slope.isFinite() || slope.isZero()) return at;
    const step = value.div(slope);
    [before, previous] = [at, value];
    at = at.minus(step);
    if (step.abs().lessThan('1e-30')) return at;
  }
  return at;
}

/** The highest order up to which all derivatives agree; −1 where the value itself jumps. */
function classOf(sizes: readonly number[], threshold: number): number {
  const first = sizes.findIndex((size) => !(size <= threshold));
  return first < 0 ? mostOrder : first - 1;
}

function byRoughness(threshold: number): (a: Jumps, b: Jumps) => number {
  const jump = ({ sizes }: Jumps) => sizes[classOf(sizes, threshold) + 1] ?? 0;
  return (a, b) => classOf(a.sizes, threshold) - classOf(b.sizes, threshold) || jump(b) - jump(a);
}

function pointOf({ axis, at, base }: Join): SlicePoint {
  return { ...base, [axis]: at };
}

/** Each place once, with the roughest class found there. */
function placesOf(sorted: readonly Jumps[], threshold: number): string[] {
  const seen = new Set<string>();
  return sorted.flatMap((jumps) => {
    const { join, energy, sizes } = jumps;
    const place = join.isFixed
      ? `${coordinateSymbol(join.axis)} = ${shown(join.at, 6)}`
      : `a surface through ${pointWords(pointOf(join))}`;
    const key = `${join.isFixed ? place : join.difference} ${energy.symbol}`;
    if (seen.has(key)) return [];
    seen.add(key);
    const smooth = classOf(sizes, threshold);
    if (smooth === mostOrder)
      return [`${energy.symbol} is continuous with derivatives to order ${mostOrder} at ${place}`];
    const by = Array.from({ length: smooth + 1 }, () => join.axis);
    const jump = `${derivativeWords({ symbol: energy.symbol, by })} jumps by ${shown(sizes[smooth + 1] as number)}`;
    return [`${jump}${smooth < 0 ? '' : `, class C${raised(smooth)},`} at ${place}`];
  });
}

function raised(order: number): string {
  return ['⁰', '¹', '²', '³', '⁴'][order] ?? `^${order}`;
}
