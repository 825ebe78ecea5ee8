import { coordinateSymbol } from '../finding/symbols.ts';

const raised = ['', '', '²', '³', '⁴'];

/** `F_c`, `∂F_c/∂ζ`, `∂²F_x/∂s∂α`, `∂²F_x/∂α²`. */
export function derivativeWords({ symbol, by }: { readonly symbol: string; readonly by: readonly string[] }): string {
  if (by.length === 0) return symbol;
  const power = raised[by.length] ?? `^${by.length}`;
  const names = by.map(coordinateSymbol);
  const below = new Set(names).size === 1 ? `∂${names[0]}${power}` : names.map((name) => `∂${name}`).join('');
  return `∂${power}${symbol}/${below}`;
}

/** `r_s = 1, ζ = 0.3`: the coordinates that are given. */
export function pointWords(point: Readonly<Record<string, number | undefined>>): string {
  return Object.entries(point)
    .filter((entry): entry is [string, number] => entry[1] !== undefined)
    .map(([name, value]) => `${coordinateSymbol(name)} = ${shown(value, 6)}`)
    .join(', ');
}

/** A value to so many significant digits; `7.1e-5` rather than `0.000071`. */
export function shown(value: number, digits = 3): string {
  const rounded = Number(value.toPrecision(digits));
  return Math.abs(rounded) < 1e-3 && rounded !== 0 ? rounded.toExponential() : String(rounded);
}
