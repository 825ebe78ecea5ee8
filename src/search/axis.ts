/**
 * How the unit coordinate t in 0…1 runs along an axis: `linear`; `logarithmic` (lower > 0);
 * `toward-upper`, x = upper − (upper − lower)(1 − t)³, close steps near the upper end; `compact`,
 * uniform in x/(1 + x), where upper may be Infinity and lower must be above −1.
 */
export type Scale = 'linear' | 'logarithmic' | 'toward-upper' | 'compact';

/** One coordinate of a box, ends included; lower = upper is a fixed coordinate. */
export interface Axis {
  readonly name: string;
  readonly lower: number;
  readonly upper: number;
  readonly scale: Scale;
}

/** Throws a RangeError for bounds that the scale cannot run along. */
export function checkAxis({ name, lower, upper, scale }: Axis): void {
  const finite = Number.isFinite(lower) && (Number.isFinite(upper) || (scale === 'compact' && upper === Infinity));
  const lowest = scale === 'logarithmic' ? 0 : scale === 'compact' ? -1 : -Infinity;
  if (!(finite && lower <= upper && lower > lowest)) {
    throw new RangeError(`axis ${name}: no ${scale} scale from ${lower} to ${upper}`);
  }
}

/** The value at the unit coordinate t in 0…1: exactly `lower` at 0, exactly `upper` at 1. */
export function axisValue({ lower, upper, scale }: Axis, unit: number): number {
  if (unit <= 0 || lower === upper) return lower;
  if (unit >= 1) return upper;
  return Math.min(upper, Math.max(lower, innerValue(lower, upper, scale, unit)));
}

function innerValue(lower: number, upper: number, scale: Scale, unit: number): number {
  switch (scale) {
    case 'linear':
      return lower + unit * (upper - lower);
    case 'logarithmic':
      return lower * Math.exp(unit * Math.log(upper / lower));
    case 'toward-upper':
      return upper - (upper - lower) * (1 - unit) ** 3;
    case 'compact': {
      // v = 1/(1 + x) runs linearly; x − lower = 1/v − 1/v_lower without cancellation at either end.
      const atLower = 1 / (1 + lower);
      const atUpper = 1 / (1 + upper);
      return lower + (unit * (atLower - atUpper)) / (((1 - unit) * atLower + unit * atUpper) * atLower);
    }
  }
}

/**
 * The unit coordinate of a value, clamped to 0…1; exactly 0 and 1 at the ends. Inverts `axisValue` to
 * rounding, except that `toward-upper` and `compact` cannot tell places apart that round to one value:
 * within 1e-5 of t = 1 on the former.
 */
export function axisUnit({ lower, upper, scale }: Axis, value: number): number {
  if (value <= lower) return 0;
  if (value >= upper) return 1;
  return Math.min(1, Math.max(0, innerUnit(lower, upper, scale, value)));
}

function innerUnit(lower: number, upper: number, scale: Scale, value: number): number {
  switch (scale) {
    case 'linear':
      return (value - lower) / (upper - lower);
    case 'logarithmic':
      return Math.log(value / lower) / Math.log(upper / lower);
    case 'toward-upper':
      return 1 - Math.cbrt((upper - value) / (upper - lower));
    case 'compact':
      // (v_lower − v)/(v_lower − v_upper) with v = 1/(1 + x); the last factor is 1 at upper = Infinity.
      return ((value - lower) / (1 + value)) * (upper === Infinity ? 1 : (1 + upper) / (upper - lower));
  }
}

/**
 * The coordinate, 0…1, in which shares of a domain are uniform: the plain coordinate for `linear` and
 * `toward-upper`, the logarithm for `logarithmic`, x/(1 + x) for `compact`.
 */
export function axisMeasure(axis: Axis, value: number): number {
  return axisUnit(axis.scale === 'toward-upper' ? { ...axis, scale: 'linear' } : axis, value);
}

/** A part of an axis; its measure is that of the axis. Values outside are drawn in to the ends. */
export function partOfAxis(axis: Axis, lower: number, upper: number): Axis {
  const part = { ...axis, lower: Math.max(lower, axis.lower), upper: Math.min(upper, axis.upper) };
  // Steps that close up towards an inner end would serve nothing.
  return axis.scale === 'toward-upper' && part.upper < axis.upper ? { ...part, scale: 'linear' } : part;
}
