import type { SequenceRecord } from '../finding/finding.ts';
import type { Decimal } from '../number/decimal.ts';
import { rationalText } from '../number/rational.ts';
import { coordinatesOf } from './coordinates.ts';
import type { Coefficient } from './leaves.ts';
import type { Bindings, LeafValue } from './sequences.ts';

/** Digits of the terms, and at most so many of the value. */
const termDigits = 12;
const valueDigits = 20;

/** What was looked at for a limit or an order, as plain data. */
export function sequenceRecord({ leaf, result, value, error }: LeafValue, point: Bindings): SequenceRecord {
  const isKnown = result.kind === 'finite' || result.kind === 'power';
  return {
    quantity: leaf.text,
    kind: leaf.kind,
    along: leaf.along,
    toward: leaf.target === 'infinity' ? 'inf' : rationalText(leaf.target),
    at: coordinatesIn(point, leaf.along),
    terms: result.terms.map(({ x, value: term }) => ({ x: shown(x, 6), value: shown(term, termDigits) })),
    value: isKnown ? shown(value, sureDigits(value, error)) : null,
    error: isKnown ? shown(error, 2) : null,
    second: isKnown && leaf.kind !== 'logOrder' ? shown(result.second, sureDigits(value, error)) : null,
    closedForm: null,
    note: noteOf(result),
  };
}

/** A coefficient that the margin is made of, as plain data. */
export function coefficientRecord(
  { text, along, order }: Coefficient,
  value: Decimal,
  point: Bindings,
): SequenceRecord {
  return {
    quantity: text,
    kind: 'coefficient',
    along,
    toward: String(order),
    at: coordinatesIn(point, ''),
    terms: [],
    value: value.isFinite() ? shown(value, valueDigits) : null,
    error: null,
    second: null,
    closedForm: null,
    note: value.isFinite() ? '' : 'no value there, or different ones from two sides',
  };
}

function coordinatesIn(point: Bindings, along: string): Record<string, number> {
  const coordinates: readonly string[] = [...coordinatesOf('slice'), ...coordinatesOf('spin')];
  return Object.fromEntries(
    [...point]
      .filter(([name]) => name !== along && coordinates.includes(name))
      .map(([name, at]) => [name, at.toNumber()]),
  );
}

function noteOf(result: LeafValue['result']): string {
  switch (result.kind) {
    case 'infinite':
      return `no finite limit, it ${result.sign > 0 ? 'grows' : 'falls'} as a ${result.growth} does`;
    case 'vanishing':
      return 'it falls faster than any power';
    case 'unknown':
      return result.reason;
    default:
      return '';
  }
}

/** The digits that the error leaves sure, and two more. */
function sureDigits(value: Decimal, error: Decimal): number {
  if (value.isZero() || error.isZero()) return valueDigits;
  return Math.max(2, Math.min(valueDigits, value.e - error.e + 1));
}

function shown(value: Decimal, digits: number): string {
  return value.toSignificantDigits(digits).toString();
}
