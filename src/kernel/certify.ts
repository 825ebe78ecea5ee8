import type { Graph, NodeId } from '../graph/graph.ts';
import type { Decimal } from '../number/decimal.ts';
import { maximumDigits } from '../number/decimal.ts';
import { evaluateDecimal } from './decimal.ts';

export interface CertifiedValue {
  /** From the evaluation with the most digits. */
  readonly value: Decimal;
  /**
   * Leading significant digits in which two evaluations at different precision agree, at most those
   * asked for; 0 for NaN and for a value that only shrinks as digits are added, as a true zero does.
   */
  readonly agreedDigits: number;
}

const stepDigits = 20;

/**
 * The outputs at one point, evaluated at `digits` and at 20 digits more, and again with more digits, at
 * most `ceiling`, while an output agrees in fewer than `digits − 5`. An output that is truly zero always
 * goes to the ceiling, by default four times the digits.
 */
export function evaluateCertified(
  graph: Graph,
  outputs: readonly NodeId[],
  bindings: ReadonlyMap<string, Decimal>,
  digits: number,
  ceiling: number = 4 * digits,
): CertifiedValue[] {
  const most = Math.min(maximumDigits, Math.max(ceiling, digits + stepDigits));
  let working = Math.min(digits + stepDigits, most);
  let coarse = evaluateDecimal(graph, outputs, bindings, digits);
  for (;;) {
    const fine = evaluateDecimal(graph, outputs, bindings, working);
    const certified = fine.map((value, index) => ({
      value,
      agreedDigits: Math.min(digits, agreement(coarse[index] as Decimal, value)),
    }));
    const enough = certified.every(({ agreedDigits, value }) => agreedDigits >= digits - 5 || value.isNaN());
    if (enough || working >= most) return certified;
    coarse = fine;
    working = Math.min(2 * working, most);
  }
}

function agreement(coarse: Decimal, fine: Decimal): number {
  if (fine.isNaN() || coarse.isNaN()) return 0;
  if (fine.equals(coarse)) return Number.POSITIVE_INFINITY;
  if (!fine.isFinite() || !coarse.isFinite() || fine.isZero()) return 0;
  const difference = fine.minus(coarse);
  // |difference| < 10^(e + 1) and |fine| ≥ 10^e′ give at least e′ − e − 1 common digits.
  return Math.max(0, fine.e - difference.e - 1);
}
