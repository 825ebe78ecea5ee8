import { coordinateSymbol } from '../finding/symbols.ts';
import { shortText } from '../report/number-text.ts';

/** `2.3 × 10^−7`, `−0.0123`: notation for `notationNodes`. */
export function numberNotation(value: number, digits = 4): string {
  const [mantissa = '', power] = shortText(value, digits).replace('-', '−').split('e');
  if (power === undefined) return mantissa;
  const raised = `10^${power.replace('+', '').replace('-', '−')}`;
  if (mantissa === '1' || mantissa === '−1') return mantissa.replace('1', raised);
  return `${mantissa} × ${raised}`;
}

const units: Readonly<Record<string, string>> = { rs: 'bohr' };
const meanings: Readonly<Record<string, string>> = {
  rs: 'Wigner–Seitz radius',
  zeta: 'spin polarisation',
  s: 'reduced gradient',
  alpha: 'iso-orbital indicator',
  q: 'reduced Laplacian',
  s_up: 'reduced gradient, up',
  s_dn: 'reduced gradient, down',
  cosine: 'angle between the gradients',
  alpha_up: 'iso-orbital indicator, up',
  alpha_dn: 'iso-orbital indicator, down',
};

export function coordinateTitle(name: string, withMeaning: boolean): string {
  const unit = units[name] === undefined ? '' : ` (${units[name]})`;
  const meaning = withMeaning && meanings[name] !== undefined ? `${meanings[name]} ` : '';
  return `${meaning}${coordinateSymbol(name)}${unit}`;
}

/** For lists of choice, which take no markup. */
export function coordinateWords(name: string): string {
  const symbol = coordinateSymbol(name).replace('r_s', 'rₛ');
  return meanings[name] === undefined ? symbol : `${symbol}, ${meanings[name]}`;
}
