import { formatHex, interpolate, modeOklab, modeRgb, useMode } from 'culori/fn';
import type { Levels } from '../figure/levels.ts';
import { stepColour } from '../figure/map-panel.ts';

useMode(modeRgb);
useMode(modeOklab);

/** On a dark ground the scale runs from near black outwards, in the hues of the light one. */
const night = { mode: 'oklab', l: 0.24, a: 0, b: -0.005 } as const;
const keptByNight = interpolate([night, { mode: 'oklab', l: 0.66, a: -0.045, b: -0.115 }], 'oklab');
const brokenByNight = interpolate([night, { mode: 'oklab', l: 0.64, a: 0.11, b: 0.095 }], 'oklab');

/** The colour of one step of a margin scale. */
export function colourOfStep(levels: Levels, step: number, isDark: boolean): string {
  if (!isDark) return stepColour(levels, step);
  const zero = levels.levels.indexOf(0);
  const most = Math.max(zero + 1, levels.levels.length - zero);
  const size = (count: number) => 0.08 + 0.92 * (most === 1 ? 0.4 : (count - 0.5) / (most - 0.5));
  return formatHex(step <= zero ? brokenByNight(size(zero + 1 - step)) : keptByNight(size(step - zero)));
}

export const missingColour = (isDark: boolean): string => (isDark ? '#6d6d6d' : '#8a8a8a');
