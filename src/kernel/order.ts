/** A set of axes, bit a for axis a. */
export type AxisMask = number;

/** An axis length to assume where none is given. */
const assumedLength = 32;

/** Beyond this many axes the orders are too many to try. */
const largestTried = 6;

/** The cost of a store to an output whose neighbour in memory is not the next point, in table reads. */
const stridedStoreCost = 2;

/**
 * The loop order, outermost axis first, with the least table traffic. Each node is computed once for
 * each point of the axes it depends on in any order; what the order decides is how much of that goes
 * through tables, and how often a table is read.
 */
export function chooseLoopOrder(
  axisCount: number,
  exported: ReadonlyMap<AxisMask, readonly unknown[]>,
  outputCount: number,
  lengths?: readonly number[],
): number[] {
  const lengthOf = (axis: number): number => lengths?.[axis] ?? assumedLength;
  const given = Array.from({ length: axisCount }, (_, axis) => axis);
  if (axisCount > largestTried) return given;
  let best = given;
  let least = Number.POSITIVE_INFINITY;
  for (const order of permutations(given)) {
    let cost = 0;
    for (const [mask, nodes] of exported) {
      if (prefixLength(mask, order) === bitCount(mask)) continue;
      const axes = given.filter((axis) => mask & (1 << axis));
      cost +=
        nodes.length * (product(axes.map(lengthOf)) + product(order.slice(0, depthOf(mask, order)).map(lengthOf)));
    }
    const innermost = order[axisCount - 1];
    if (innermost !== axisCount - 1) cost += stridedStoreCost * outputCount * product(given.map(lengthOf));
    if (cost < least) {
      least = cost;
      best = order;
    }
  }
  return best;
}

/** How many of the outermost loops run over axes of the mask, before the first that does not. */
export function prefixLength(mask: AxisMask, order: readonly number[]): number {
  let length = 0;
  while (length < order.length && mask & (1 << (order[length] as number))) length++;
  return length;
}

/** The number of loops that must be open before all axes of the mask are bound. */
export function depthOf(mask: AxisMask, order: readonly number[]): number {
  return 1 + order.findLastIndex((axis) => mask & (1 << axis));
}

export function bitCount(mask: AxisMask): number {
  let count = 0;
  for (let rest = mask; rest !== 0; rest &= rest - 1) count++;
  return count;
}

function product(factors: readonly number[]): number {
  return factors.reduce((total, factor) => total * factor, 1);
}

function permutations(items: readonly number[]): number[][] {
  if (items.length <= 1) return [[...items]];
  return items.flatMap((first, index) =>
    permutations([...items.slice(0, index), ...items.slice(index + 1)]).map((rest) => [first, ...rest]),
  );
}
