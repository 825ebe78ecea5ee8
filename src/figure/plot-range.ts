import type { Bound, CurvePanel } from '../finding/curves.ts';

/** The range of the values, and of the bounds that lie near them. */
export function valueRange({ curves, bounds }: CurvePanel): [lower: number, upper: number] {
  const values = curves.flatMap((curve) => curve.values.filter((value) => value !== null));
  if (values.length === 0) return [0, 1];
  let lower = values.reduce((a, b) => Math.min(a, b));
  let upper = values.reduce((a, b) => Math.max(a, b));
  const span = Math.max(upper - lower, 1e-3 * Math.max(Math.abs(lower), Math.abs(upper)), 1e-12);
  const near = bounds
    .map(({ value }) => value)
    .filter((value) => value > lower - 0.6 * span && value < upper + 0.6 * span);
  lower = Math.min(lower, ...near);
  upper = Math.max(upper, ...near);
  const margin = 0.05 * Math.max(upper - lower, span);
  // A quantity that ends at zero is drawn from zero, unless a bound is there that has to be seen.
  const ends = (end: number) => Math.abs(end) < margin && !near.some((value) => Math.abs(value) < margin);
  return [lower >= 0 && ends(lower) ? 0 : lower - margin, upper <= 0 && ends(upper) ? 0 : upper + margin];
}

/** The bounds that lie in the picture. */
export function drawnBounds(panel: CurvePanel): Bound[] {
  const [lower, upper] = valueRange(panel);
  return panel.bounds.filter(({ value }) => value >= lower && value <= upper);
}
