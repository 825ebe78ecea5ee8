/** The steps of a margin scale: rising, zero among them; a colour between each two and beyond the ends. */
export interface Levels {
  readonly levels: readonly number[];
  /** Steps beyond the last level on either side that the values reach. */
  readonly below: boolean;
  readonly above: boolean;
  /** `linear`: even steps. `compressed`: 1, 2, 5, 10 … times a power of ten on either side of zero. */
  readonly kind: 'linear' | 'compressed';
  readonly ticks: readonly number[];
}

/** Colour steps on one side at most. */
const mostSteps = 10;
const mostLinearSteps = 24;

/**
 * Steps that show the values of all panels of a figure: even where the values are of one size, compressed where most
 * are small against the largest, or the violations are.
 */
export function chooseLevels(values: readonly number[], tolerance: number): Levels {
  const finite = values.filter((value) => Number.isFinite(value));
  const [least, most] = extent(finite.length === 0 ? [0] : finite);
  const [lowest, highest] = [Math.min(0, least), Math.max(0, most)];
  const largest = Math.max(-lowest, highest, tolerance);
  const small = smallSize(finite, tolerance, largest);
  const levels =
    largest / small > 12 ? compressed(lowest, highest, largest, small) : linear([least, most], [lowest, highest]);
  return {
    ...levels,
    below: (levels.levels[0] as number) < 0 || lowest < -tolerance,
    above: finite.some((value) => value >= -tolerance),
  };
}

function extent(values: readonly number[]): [number, number] {
  return [values.reduce((a, b) => Math.min(a, b)), values.reduce((a, b) => Math.max(a, b))];
}

/** A size that the scale must still resolve: that of the lower quarter of the margins, violated or held. */
function smallSize(values: readonly number[], tolerance: number, largest: number): number {
  const violated = values.filter((value) => value < -tolerance).map((value) => -value);
  const kept = values.filter((value) => value > tolerance);
  const quantile = (list: readonly number[], part: number) =>
    [...list].sort((a, b) => a - b)[Math.floor((list.length - 1) * part)] ?? largest;
  return Math.max(Math.min(quantile(violated, 0.25), quantile(kept, 0.25)), tolerance, largest * 1e-12);
}

const mantissas = [1, 2, 5] as const;

function compressed(lowest: number, highest: number, largest: number, small: number): Omit<Levels, 'below' | 'above'> {
  const top = Math.ceil(Math.log10(largest) - 1e-9);
  const bottom = Math.max(Math.floor(Math.log10(small)), top - Math.ceil(mostSteps / 1) + 1);
  const decades = top - bottom;
  const chosen = decades <= 3 ? mantissas : decades <= 5 ? ([1, 3] as const) : ([1] as const);
  const sizes: number[] = [];
  for (let exponent = bottom; exponent < top; exponent++) {
    for (const mantissa of chosen) {
      const size = Number(`${mantissa}e${exponent}`);
      if (size < largest) sizes.push(size);
    }
  }
  const levels = [
    ...sizes
      .filter((size) => size < -lowest)
      .map((size) => -size)
      .reverse(),
    0,
    ...sizes.filter((size) => size < highest),
  ];
  const ticks = levels.filter(
    (level) => level === 0 || chosen.length === 1 || /^1(e|$)/.test(Math.abs(level).toExponential()),
  );
  return { levels, kind: 'compressed', ticks };
}

function linear(
  [least, most]: readonly [number, number],
  [lowest, highest]: readonly [number, number],
): Omit<Levels, 'below' | 'above'> {
  if (lowest === highest) return { levels: [0], kind: 'linear', ticks: [0] };
  const step = niceStep(Math.max((most - least) / 10, (highest - lowest) / mostLinearSteps));
  const count = (end: number) => Math.max(0, Math.ceil(end / step - 1e-9) - 1);
  const numbers: number[] = [];
  for (let k = -count(-lowest); k <= count(highest); k++) numbers.push(k);
  const every = [1, 2, 5, 10].find((candidate) => numbers.length / candidate <= 9) ?? 10;
  const level = (k: number) => Number((k * step).toPrecision(12)) + 0;
  return { levels: numbers.map(level), kind: 'linear', ticks: numbers.filter((k) => k % every === 0).map(level) };
}

function niceStep(size: number): number {
  const power = 10 ** Math.floor(Math.log10(size));
  const mantissa = [1, 2, 5, 10].find((candidate) => candidate * power >= size * (1 - 1e-9)) ?? 10;
  return Number((mantissa * power).toPrecision(12));
}

/**
 * A margin as the picture measures it: level k at k, so that even steps of the result are even steps of colour. It runs
 * without sharp bends (in the logarithm on compressed steps), for contours fall where they belong only then.
 */
export function compress({ levels, kind }: Pick<Levels, 'levels' | 'kind'>, value: number): number {
  const last = levels.length - 1;
  if (last === 0) return value;
  let index = 0;
  while (index < last - 1 && (levels[index + 1] as number) < value) index++;
  // Beyond the ends the first and the last step go on.
  const [a, b] = [levels[index] as number, levels[index + 1] as number];
  const inLogarithm = kind === 'compressed' && a * b > 0 && a * value > 0;
  return index + (inLogarithm ? Math.log(value / a) / Math.log(b / a) : (value - a) / (b - a));
}
