import { coordinateSymbol } from '../finding/symbols.ts';
import { greekLetters } from '../report/symbols.ts';
import { numberRuns } from './scale.ts';
import { lineWidth, type Run } from './typeface.ts';
import { formula, words } from './typeset.ts';

const units: Readonly<Record<string, string>> = { rs: 'bohr' };
const meanings: Readonly<Record<string, string>> = {
  rs: 'Wigner–Seitz radius',
  zeta: 'spin polarisation',
  s: 'reduced gradient',
  alpha: 'iso-orbital indicator',
  q: 'reduced Laplacian',
};

/** `Wigner–Seitz radius r_s (bohr)`, or without the words where they do not fit. */
export function axisTitle(name: string, room: number, size: number): Run[] {
  const unit = units[name];
  const short = [...formula(coordinateSymbol(name)), ...(unit === undefined ? [] : words(` (${unit})`))];
  const long = [...words(`${meanings[name] ?? ''} `), ...short];
  return lineWidth(long, size) < room ? long : short;
}

/** `ζ = 0.5`, kept on one line. */
export function setTo(name: string, value: number, digits = 6): Run[] {
  return [...formula(coordinateSymbol(name)), ...words('\u00a0=\u00a0'), ...noBreak(numberRuns(value, digits))];
}

/** A parameter's name as a symbol: mu → μ, b1 → b_1; longer names stay words. */
export function parameterSymbol(name: string): Run[] {
  const match = /^([A-Za-z]+?)_?(\d*)$/.exec(name);
  const [, letters = name, index = ''] = match ?? [];
  const symbol = greekLetters[letters] ?? letters;
  return [...formula(symbol), ...(index === '' ? [] : formula(`_${index}`))];
}

export function noBreak(runs: readonly Run[]): Run[] {
  return runs.map((run) => ({ ...run, text: run.text.replaceAll(' ', '\u00a0') }));
}

/** Items with commas between them. */
export function listed(items: readonly (readonly Run[])[], separator = ', '): Run[] {
  return items.flatMap((item, index) => (index === 0 ? [...item] : [...words(separator), ...item]));
}
