import { contours } from 'd3-contour';

type Ring = readonly (readonly [x: number, y: number])[];

/** Closed rings around where the field is at least a level, holes among them; in parts of the box, y downwards. */
export interface Region {
  readonly rings: readonly Ring[];
}

/** A field on a grid that spans a box evenly, both ends included; y rises with the row. */
export interface Field {
  readonly values: readonly number[];
  readonly width: number;
  readonly height: number;
}

/** The regions where a field is at least each of the levels (marching squares, linear between grid values). */
export function regionsAbove({ values, width, height }: Field, levels: readonly number[]): Region[] {
  const found = contours()
    .size([width, height])
    .smooth(true)
    .thresholds([...levels])([...values]);
  return found.map(({ coordinates }) => ({
    rings: coordinates.flatMap((polygon) =>
      polygon.map((ring) => ring.map(([x = 0, y = 0]) => [part(x, width), 1 - part(y, height)] as const)),
    ),
  }));
}

/** Grid values stand at half-integers; what lies outside them is drawn in to the edge. */
function part(grid: number, count: number): number {
  return Math.min(1, Math.max(0, (grid - 0.5) / (count - 1)));
}

/** The rings as open lines without what runs along the edge of the box. */
export function innerLines({ rings }: Region): Ring[] {
  return rings.flatMap((ring) => {
    const lines: (readonly [number, number])[][] = [];
    let line: (readonly [number, number])[] = [];
    ring.forEach((point, index) => {
      const next = ring[index + 1];
      if (next === undefined) return;
      if (onOneEdge(point, next)) {
        if (line.length > 0) lines.push(line);
        line = [];
        return;
      }
      if (line.length === 0) line.push(point);
      line.push(next);
    });
    if (line.length > 0) lines.push(line);
    return lines;
  });
}

function onOneEdge([ax, ay]: readonly [number, number], [bx, by]: readonly [number, number]): boolean {
  return (ax === bx && (ax === 0 || ax === 1)) || (ay === by && (ay === 0 || ay === 1));
}
