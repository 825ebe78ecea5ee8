import { formatHex, interpolate, modeOklab, modeRgb, useMode } from 'culori/fn';

useMode(modeRgb);
useMode(modeOklab);

/** Neutral, and the two ends, of one lightness: straight lines between them in Oklab, so that even steps look even. */
const neutral = { mode: 'oklab', l: 0.975, a: 0, b: 0 } as const;
const kept = { mode: 'oklab', l: 0.42, a: -0.03, b: -0.115 } as const;
const broken = { mode: 'oklab', l: 0.42, a: 0.105, b: 0.085 } as const;

const keptColour = interpolate([neutral, kept], 'oklab');
const brokenColour = interpolate([neutral, broken], 'oklab');

/** The colour of a signed part, −1 … 1: white at zero, vermilion below, blue above; the same lightness on both sides. */
export function divergingColour(part: number): string {
  const size = Math.min(1, Math.abs(part));
  return formatHex(part < 0 ? brokenColour(size) : keptColour(size));
}

export const ink = {
  line: '#1a1a1a',
  text: '#1a1a1a',
  faint: '#6b6b6b',
  grid: '#dcdcdc',
  hatch: '#5a1606',
  missing: '#8a8a8a',
  /** Patterns of regions, behind contour lines. */
  regionHatch: '#b5532b',
  dot: '#8a7000',
} as const;

/** Told apart by hue and by lightness, and light enough for lines and patterns above them. */
export const regionColours = { proved: '#b4d0e7', violated: '#f0a987', undecided: '#f8f0c4' } as const;

/** Curves: told apart by hue and by lightness, and each has a dash pattern of its own. */
export const curveColours = ['#1f3b73', '#b8400e', '#2f7f6f', '#7a3e8f', '#8a6d00', '#3d8fc9', '#4a4a4a'] as const;
/** In parts of the line's unit, 1 mm at a width of 0.4 mm. */
export const dashPatterns: readonly (readonly number[])[] = [
  [],
  [2.2, 0.9],
  [0.5, 0.7],
  [3, 0.8, 0.6, 0.8],
  [4.4, 1],
  [1.2, 0.7],
  [3, 0.8, 0.6, 0.8, 0.6, 0.8],
];
