import { millimetresPerPoint } from './frame.ts';

/** How large a figure is. */
export interface FigureOptions {
  /** Of the whole figure, mm. */
  readonly width: number;
  /** Height of the letters, points. */
  readonly points: number;
  readonly caption: boolean;
  /** Begins the ids within the drawing, so that several can stand on one page. */
  readonly name?: string;
}

/** Figures are laid out with letters of this size and then enlarged, lines and marks with them. */
const laidOutPoints = 7;

/** The size to lay a figure out in, mm, and how much it is enlarged afterwards. */
export function layoutSize({ width, points }: FigureOptions): { width: number; size: number; scale: number } {
  const scale = points / laidOutPoints;
  return { width: width / scale, size: laidOutPoints * millimetresPerPoint, scale };
}
