/** The steps of a margin scale: rising, zero among them; a colour between each two and beyond the ends. */
export interface Levels {
  readonly levels: readonly number[];
  /** `linear`: even steps. `compressed`: 1, 2, 5, 10 … times a power of ten on either side of zero. */
  readonly kind: 'linear' | 'compressed';
  readonly ticks: readonly number[];
}

/** Colour steps on one side at most. */
const mostSteps = 10;

/**
 * Steps that show the values of all panels of a figure: even where the values are of one size, compressed where most
 * are small against the largest, or the violations are.
 */
export function chooseLevels(values: readonly number[], tolerance: number): Levels {
  const finite = values.filter((value) => Number.isFinite(value));
  const lowest = Math.min(0, ...extent(finite));
  const highest = Math.max(0, ...extent(finite));
  const largest = Math.max(-lowest, highest, tolerance);
  const small = smallSize(finite, tolerance, largest);
  return largest / small > 12 ? compressed(lowest, highest, largest, small) : linear(lowest, highest, largest);
}

function extent(values: readonly number[]): [number, number] | [] {
  if (values.length === 0) return [];
  return [values.reduce((a, b) => Math.min(a, b)), values.reduce((a, b) => Math.max(a, b))];
}

/** A size that the scale must still resolve: the lower tenth of the violated margins, or of all. */
function smallSize(values: readonly number[], tolerance: number, largest: number): number {
  const violated = values.filter((value) => value < -tolerance).map((value) => -value);
  const kept = values.filter((value) => value > tolerance);
  const quantile = (list: readonly number[], part: number) =>
    [...list].sort((a, b) => a - b)[Math.floor((list.length - 1) * part)] ?? largest;
  return Math.max(Math.min(quantile(violated, 0.25), quantile(kept, 0.25)), tolerance, largest * 1e-12);
}

const mantissas = [1, 2, 5] as const;

function compressed(lowest: number, highest: number, largest: number, small: number): Levels {
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
    ...sizes.filter((size) => size < -lowest).map((size) => -size).reverse(),
    0,
    ...sizes.filter((size) => size < highest),
  ];
  const ticks = levels.filter((level) => level === 0 || chosen.length === 1 || /^1(e|$)/.test(Math.abs(level).toExponential()));
  return { levels, kind: 'compressed', ticks };
}

function linear(lowest: number, highest: number, largest: number): Levels {
  const step = niceStep(largest / mostSteps);
  const count = (end: number) => Math.max(0, Math.ceil(end / step - 1e-9) - 1);
  const levels: number[] = [];
  for (let k = -count(-lowest); k <= count(highest); k++) levels.push(Number((k * step).toPrecision(12)) + 0);
  const every = levels.length > 8 ? 2 : 1;
  return { levels, kind: 'linear', ticks: levels.filter((level) => Math.round(level / step) % every === 0) };
}

function niceStep(size: number): number {
  const power = 10 ** Math.floor(Math.log10(size));
  const mantissa = [1, 2, 5, 10].find((candidate) => candidate * power >= size * (1 - 1e-9)) ?? 10;
  return Number((mantissa * power).toPrecision(12));
}

/**
 * A margin as the picture measures it: even steps of the result are even steps of colour. Between levels it runs
 * linearly, so that contours fall where they belong.
 */
export function compress(levels: readonly number[], value: number): number {
  const last = levels.length - 1;
  if (last === 0) return value;
  const [first, end] = [levels[0] as number, levels[last] as number];
  if (value <= first) return (value - first) / Math.max(Math.abs(first), (levels[1] as number) - first);
  if (value >= end) return last + (value - end) / Math.max(Math.abs(end), end - (levels[last - 1] as number));
  let index = 0;
  while ((levels[index + 1] as number) < value) index++;
  const [a, b] = [levels[index] as number, levels[index + 1] as number];
  return index + (value - a) / (b - a);
}
