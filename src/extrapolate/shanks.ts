import type { Decimal } from '../number/decimal.ts';

/** A value and a bound on its error that two neighbouring estimates suggest. */
export interface Estimate {
  readonly value: Decimal;
  readonly error: Decimal;
}

/**
 * The limit of a sequence by Wynn's epsilon algorithm. On S_k = L + Σ c_i ρ_i^k, also with factors k^m beside ρ_i^k,
 * column 2m removes m terms exactly; that is f at a geometric sequence of points whose expansion runs in any powers
 * and logarithms. Differences below `noise` count as none. Needs three terms.
 * Source: P. Wynn, Math. Tables Aids Comput. 10, 91 (1956).
 */
export function shanks(terms: readonly Decimal[], noise: Decimal): Estimate {
  let best = lastOf(terms);
  let before: readonly Decimal[] = terms.map((term) => term.times(0));
  let column = terms;
  for (let index = 1; column.length > 1; index++) {
    const next: Decimal[] = [];
    for (let k = 0; k + 1 < column.length; k++) {
      const difference = (column[k + 1] as Decimal).minus(column[k] as Decimal);
      // Neighbours that agree in an even column are the limit already; dividing by their difference would only show noise.
      if (difference.abs().lessThanOrEqualTo(noise)) return smaller(best, lastOf(index % 2 === 1 ? column : before));
      next.push((before[k + 1] as Decimal).plus(difference.pow(-1)));
    }
    before = column;
    column = next;
    if (index % 2 === 0)
      best = smaller(best, column.length > 1 ? lastOf(column) : alone(column[0] as Decimal, best.value));
  }
  return best;
}

function lastOf(column: readonly Decimal[]): Estimate {
  const value = column[column.length - 1] as Decimal;
  return { value, error: value.minus(column[column.length - 2] ?? 0).abs() };
}

/** The last column has one value; its neighbour is the best of the columns before. */
function alone(value: Decimal, before: Decimal): Estimate {
  return { value, error: value.minus(before).abs() };
}

function smaller(a: Estimate, b: Estimate): Estimate {
  return b.error.lessThan(a.error) ? b : a;
}
