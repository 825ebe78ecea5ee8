import { quantityOf } from '../functional/quantities.ts';
import { greekLetters } from '../report/symbols.ts';
import { escaped } from './markup.ts';

const greek: Readonly<Record<string, string>> = {
  ...greekLetters,
  eps: 'ε',
  pi: 'π',
  Delta: 'Δ',
  Gamma: 'Γ',
  Lambda: 'Λ',
  Omega: 'Ω',
  Phi: 'Φ',
  Psi: 'Ψ',
};

const suffixes: Readonly<Record<string, string>> = { up: '↑', dn: '↓', sigma: 'σ', other: 'σ̄' };

/** The field's symbols of the quantities, as base, index and exponent; the others have their name's letter. */
const quantities: Readonly<Record<string, readonly [base: string, index: string, power?: string]>> = {
  rs: ['r', 's'],
  kF: ['k', 'F'],
  ks: ['k', 's'],
  epsx_unif: ['ε', 'x,unif'],
  tauW: ['τ', 'W'],
  tauUnif: ['τ', 'unif'],
  x2: ['x', '', '2'],
};

const identifier = (text: string): string =>
  [...text].length === 1 ? `<mi>${escaped(text)}</mi>` : `<mi mathvariant="normal">${escaped(text)}</mi>`;

/** A name of a sheet as a symbol: quantities as the field writes them, Greek by name, trailing digits as an index. */
export function symbolMathml(name: string): string {
  const quantity = quantityOf(name);
  if (quantity !== undefined) {
    const [base, index, power] = quantities[quantity.quantity] ?? [greek[quantity.quantity] ?? quantity.quantity, ''];
    const channel = quantity.scope === 'channel' ? (suffixes[quantity.suffix] as string) : '';
    if (quantity.quantity === 'sigma' && quantity.scope === 'total')
      return '<msup><mrow><mo>|</mo><mo>∇</mo><mi>n</mi><mo>|</mo></mrow><mn>2</mn></msup>';
    if (quantity.quantity === 'sigma')
      return `<msub><mi>σ</mi><mrow>${identifier(channel)}${identifier(channel)}</mrow></msub>`;
    return scripted(identifier(base), [index, channel].filter((part) => part !== '').join(','), power ?? '');
  }
  const [head = '', ...rest] = name.split('_').filter((part) => part !== '');
  const match = /^([A-Za-z]+?)(\d+[a-z]?)?$/.exec(head);
  const letters = match?.[1] ?? head;
  const indices = [
    ...(match?.[2] === undefined ? [] : [match[2]]),
    ...rest.map((part) => greek[part] ?? suffixes[part] ?? part),
  ];
  // A single letter before a word is its symbol: ec, epbe stay words, A1 and c_x0 do not.
  return scripted(identifier(greek[letters] ?? (letters === '' ? name : letters)), indices.join(','), '');
}

function scripted(base: string, index: string, power: string): string {
  const sub = index === '' ? '' : /^\d+$/.test(index) ? `<mn>${index}</mn>` : identifier(index);
  if (sub !== '' && power !== '') return `<msubsup>${base}${sub}<mn>${power}</mn></msubsup>`;
  if (sub !== '') return `<msub>${base}${sub}</msub>`;
  return power === '' ? base : `<msup>${base}<mn>${power}</mn></msup>`;
}
