import type { Verdict } from '../finding/finding.ts';
import type { ConfirmedMargin } from './confirm.ts';
import type { Evidence } from './look.ts';

/** A margin must be known to so many digits before its sign is believed. */
const sureDigits = 3;
/** Where more than this share of the domain has no value, nothing is said. */
const mostWithoutValue = 0.05;

export interface Judgement {
  readonly verdict: Verdict;
  readonly place: Float64Array | undefined;
  readonly confirmed: ConfirmedMargin | undefined;
  readonly reason: string;
}

/**
 * The verdict on a margin: double precision proposes the places, lowest first, high precision disposes. A point without
 * a value in double precision is tried too.
 */
export function judge(
  candidates: readonly { readonly place: Float64Array; readonly value: number }[],
  evidence: Evidence,
  tolerance: number,
  confirm: (place: Float64Array) => ConfirmedMargin,
): Judgement {
  const { points, withoutValue } = evidence;
  const looked =
    evidence.axes.length === 0
      ? 'it depends on no coordinate of the domain: one value decides it'
      : `no violation at ${points.toLocaleString('en')} points and the local minima among them; not a proof`;
  let roundOff: { value: number; exact: ConfirmedMargin } | undefined;
  let first: { place: Float64Array; confirmed: ConfirmedMargin } | undefined;
  let unresolved: typeof first;
  for (const { place, value } of candidates) {
    // Once a point without suspicion is reached, the rest are higher still.
    if (first !== undefined && value >= -tolerance) continue;
    const confirmed = confirm(place);
    if (!confirmed.value.isFinite()) continue;
    first ??= { place, confirmed };
    const isBelow = confirmed.value.lessThan(-tolerance);
    const isResolved = confirmed.digits >= sureDigits || confirmed.value.abs().lessThanOrEqualTo(tolerance);
    if (isBelow && isResolved) {
      return {
        verdict: 'violated',
        place,
        confirmed,
        reason: `confirmed to ${confirmed.digits} digits at the witness`,
      };
    }
    if (!isResolved) {
      unresolved ??= { place, confirmed };
      continue;
    }
    if (value < -tolerance) roundOff ??= { value, exact: confirmed };
  }
  if (unresolved !== undefined) {
    const { place, confirmed } = unresolved;
    return {
      verdict: 'undecided',
      place,
      confirmed,
      reason: `the margin at a low point could not be resolved: only ${confirmed.digits} digits of it are sure`,
    };
  }
  if (first === undefined) {
    return {
      verdict: 'undecided',
      place: undefined,
      confirmed: undefined,
      reason: 'no point of the domain has a value',
    };
  }
  if (evidence.withoutValueShare > mostWithoutValue) {
    return {
      verdict: 'undecided',
      place: first.place,
      confirmed: first.confirmed,
      reason: `${withoutValue.toLocaleString('en')} of ${points.toLocaleString('en')} points have no value`,
    };
  }
  const cleared =
    roundOff === undefined
      ? ''
      : `; double precision shows ${roundOff.value.toPrecision(2)}, which high precision clears as round-off`;
  const excluded =
    withoutValue === 0
      ? ''
      : `; ${withoutValue.toLocaleString('en')} points without a value are left out${placeText(evidence)}`;
  return {
    verdict: 'holds',
    place: first.place,
    confirmed: first.confirmed,
    reason: `${looked}${cleared}${excluded}`,
  };
}

function placeText({ firstWithoutValue, axes }: Evidence): string {
  if (firstWithoutValue === undefined) return '';
  const place = axes.map(({ name }, index) => `${name} ${Number((firstWithoutValue[index] as number).toPrecision(4))}`);
  return ` (the first at ${place.join(', ')})`;
}
