/*
 * Where the numbers of a second-order form lie in memory: see form-text.ts.
 */

/** `linear` is Σ|aᵢ|, `bent` Σ|qᵢⱼ|. */
export const part = { lower: 0, upper: 1, centre: 2, error: 3, linear: 4, bent: 5, coefficients: 6 } as const;

/** Doubles of a form in so many axes. */
export function formSize(axes: number): number {
  return part.coefficients + axes + (axes * (axes + 1)) / 2;
}

/** Where the coefficients of a form in the axes of a mask are, as offsets. */
export function places(mask: number) {
  const axes = axesIn(mask);
  const size = axes.length;
  return {
    axes,
    linear: (axis: number): number | undefined => {
      const index = axes.indexOf(axis);
      return index < 0 ? undefined : part.coefficients + index;
    },
    bent: (a: number, b: number): number | undefined => {
      const [i, j] = [axes.indexOf(Math.min(a, b)), axes.indexOf(Math.max(a, b))];
      if (i < 0 || j < 0) return undefined;
      return part.coefficients + size + i * size - (i * (i - 1)) / 2 + (j - i);
    },
  };
}

export function axesIn(mask: number): number[] {
  const axes: number[] = [];
  for (let axis = 0; mask >> axis !== 0; axis++) if (mask & (1 << axis)) axes.push(axis);
  return axes;
}

export const pairsOf = (axes: readonly number[]): (readonly [number, number])[] =>
  axes.flatMap((a, index) => axes.slice(index).map((b) => [a, b] as const));
