import { innerLines, type Region, regionsAbove } from '../figure/contour.ts';
import { compress, type Levels } from '../figure/levels.ts';
import { colourOfStep, missingColour } from './palette.ts';

/** A margin on the picture's grid, measured in steps of its scale. */
export interface MeasuredField {
  readonly measures: Float64Array;
  readonly width: number;
  readonly height: number;
  readonly levels: Levels;
}

/** Margins within the tolerance of zero count as zero, so that round-off makes no region. */
export function measure(
  margins: Float64Array,
  width: number,
  height: number,
  levels: Levels,
  tolerance: number,
): MeasuredField {
  const measures = margins.map((margin) => {
    if (!Number.isFinite(margin)) return Number.NaN;
    return compress(levels, margin < 0 && margin >= -tolerance ? 0 : margin);
  });
  return { measures, width, height, levels };
}

/** The field in colour steps, each pixel between the four grid values around it. */
export function paintField(
  { measures, width, height, levels }: MeasuredField,
  canvas: HTMLCanvasElement,
  isDark: boolean,
): void {
  const context = canvas.getContext('2d');
  if (context === null || canvas.width === 0 || canvas.height === 0) return;
  const image = context.createImageData(canvas.width, canvas.height);
  const pixels = new Uint32Array(image.data.buffer);
  const colours = Array.from({ length: levels.levels.length + 1 }, (_, step) =>
    pixelOf(colourOfStep(levels, step, isDark)),
  );
  const missing = pixelOf(missingColour(isDark));
  const at = (row: number, column: number) => measures[row * width + column] as number;
  for (let v = 0; v < canvas.height; v++) {
    const y = ((canvas.height - 1 - v) / Math.max(1, canvas.height - 1)) * (height - 1);
    const row = Math.min(height - 2, Math.floor(y));
    const up = y - row;
    for (let u = 0; u < canvas.width; u++) {
      const x = (u / Math.max(1, canvas.width - 1)) * (width - 1);
      const column = Math.min(width - 2, Math.floor(x));
      const right = x - column;
      const low = at(row, column) * (1 - right) + at(row, column + 1) * right;
      const high = at(row + 1, column) * (1 - right) + at(row + 1, column + 1) * right;
      const value = low * (1 - up) + high * up;
      pixels[v * canvas.width + u] = Number.isNaN(value)
        ? missing
        : (colours[Math.min(colours.length - 1, Math.max(0, Math.floor(value) + 1))] as number);
    }
  }
  context.putImageData(image, 0, 0);
}

/** `#rrggbb` as a pixel of the little-endian machines that browsers run on. */
function pixelOf(colour: string): number {
  const value = Number.parseInt(colour.slice(1), 16);
  return (0xff000000 | ((value & 0xff) << 16) | (value & 0xff00) | (value >> 16)) >>> 0;
}

export interface ViolatedOutline {
  /** Around what is kept, in parts of the box; what is left of the box is violated. */
  readonly kept: Region;
  readonly boundary: ReturnType<typeof innerLines>;
  readonly any: boolean;
}

/** Where the margin passes minus the tolerance, linear between the grid's values. */
export function violatedOutline(
  margins: Float64Array,
  width: number,
  height: number,
  tolerance: number,
): ViolatedOutline {
  const values = Array.from(margins, (margin) => (Number.isFinite(margin) ? margin + tolerance : tolerance));
  const [kept] = regionsAbove({ values, width, height }, [0]) as [Region];
  return { kept, boundary: innerLines(kept), any: values.some((value) => value < 0) };
}
