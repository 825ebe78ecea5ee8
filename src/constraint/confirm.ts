import type { Functional } from '../functional/functional.ts';
import { Graph } from '../graph/graph.ts';
import { evaluateCertified } from '../kernel/certify.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';
import type { Rational } from '../number/rational.ts';
import type { Condition } from './condition.ts';
import { limitInHighPrecision } from './limit.ts';
import { buildMargin, type Margin } from './margin.ts';

/** Working digits of a confirmation. */
export const confirmationDigits = 40;
/** Where two evaluations disagree, up to so many working digits are tried. */
const mostDigits = 80;
const zeroBelow = '1e-30';

/** A margin in high precision: its value and how many of its digits are sure. */
export interface ConfirmedMargin {
  readonly value: Decimal;
  readonly digits: number;
}

/** Evaluates the margin of one condition at single points in high precision. */
export interface Confirmer {
  at(point: Readonly<Record<string, number>>): ConfirmedMargin;
}

/**
 * A confirmer for a functional and a condition. Coordinates are taken as their shortest decimal text, the one a report prints, so that a reader can repeat it. The digits that
 * two working precisions agree in are counted; where a limit is involved, those that two sequences agree in too.
 */
export function makeConfirmer(
  condition: Condition,
  functional: Functional,
  options: { readonly constants: ReadonlyMap<string, Rational>; readonly parameters: ReadonlyMap<string, Rational> },
): Confirmer {
  const withLimit = /\blimit\s*\(/.test(condition.definition.requirement.text);
  const margins = limitInHighPrecision
    .slice(0, withLimit ? 2 : 1)
    .map((limit) => buildMargin(new Graph(), condition, functional, { ...options, limit }));
  return {
    at(point) {
      const [first, second] = margins.map((margin) => certifyAt(margin, point)) as [ConfirmedMargin, ConfirmedMargin?];
      if (second === undefined) return first;
      return {
        value: first.value,
        digits: Math.min(first.digits, second.digits, commonDigits(first.value, second.value)),
      };
    },
  };
}

function certifyAt(margin: Margin, point: Readonly<Record<string, number>>): ConfirmedMargin {
  const context = decimalContext(confirmationDigits);
  const bindings = new Map(margin.variables.map((name) => [name, context.from(point[name] as number)]));
  const [result] = evaluateCertified(margin.graph, [margin.node], bindings, confirmationDigits, mostDigits);
  if (result === undefined) throw new RangeError('a margin has one value');
  const { value, agreedDigits } = result;
  // A value that only shrinks as digits are added is a true zero.
  if (agreedDigits === 0 && value.abs().lessThan(zeroBelow))
    return { value: context.from(0), digits: confirmationDigits };
  return { value, digits: agreedDigits };
}

/** How many leading digits two values share. */
function commonDigits(a: Decimal, b: Decimal): number {
  if (a.equals(b)) return confirmationDigits;
  if (!a.isFinite() || !b.isFinite() || a.isZero()) return 0;
  return Math.max(0, a.e - a.minus(b).e - 1);
}
