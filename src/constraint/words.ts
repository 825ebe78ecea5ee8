import { coordinateSymbol } from '../finding/symbols.ts';
import type { Extent } from '../search/region.ts';

/** A region as a person would say it: `1.96 ≤ s ≤ 2.28, r_s ≤ 1.2, every ζ`; ends to three digits. */
export function regionWords(hull: readonly Extent[]): string {
  const limited: string[] = [];
  const whole: string[] = [];
  for (const { axis, lower, upper, touchesLower, touchesUpper, spans } of hull) {
    const symbol = coordinateSymbol(axis);
    if (lower === upper) limited.push(`${symbol} = ${short(lower)}`);
    else if (spans) whole.push(symbol);
    else if (touchesUpper)
      limited.push(lower > 0 && lower < nearZero ? `${symbol} > 0` : `${symbol} ≥ ${short(lower)}`);
    else if (touchesLower) limited.push(`${symbol} ${upperRelation(upper)} ${short(upper)}`);
    else limited.push(`${lowerBound(lower)} ${symbol} ${upperRelation(upper)} ${short(upper)}`);
  }
  const every = whole.length === 0 ? [] : [`every ${whole.join(', ')}`];
  return [...limited, ...every].join(', ');
}

/** A region up to a point without a value, such as α = 0 where s = 0, ends as close to it as numbers go. */
const nearZero = 1e-12;

function lowerBound(lower: number): string {
  return lower > 0 && lower < nearZero ? '0 <' : `${short(lower)} ≤`;
}

/** A region that ends just short of a round value ends before it: `ζ < 1`, not `ζ ≤ 1`. */
function upperRelation(upper: number): '<' | '≤' {
  return Number(short(upper)) > upper ? '<' : '≤';
}

function short(value: number): string {
  return String(Number(value.toPrecision(3)));
}
