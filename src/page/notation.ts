import { escaped, type Markup } from './markup.ts';

/**
 * Plain notation as a page shows it: `F_xc`, `r_s`, `E_c[n_γ]`, `2^(1/3)`, `10^-9` and `3.2e-7` with real indices and
 * exponents. Words around them stay as they are.
 */
export function notation(text: string): Markup {
  const typeset = escaped(text)
    .replace(/\b(\d+(?:\.\d+)?)e([+-]?)0*(\d+)\b/g, (_, mantissa: string, sign: string, power: string) => {
      const raised = `10<sup>${sign === '-' ? '−' : ''}${power}</sup>`;
      return mantissa === '1' ? raised : `${mantissa}\u202f×\u202f${raised}`;
    })
    .replace(/(?<![\p{L}\d])([\p{L}ε∂∇]{1,2}[²³]?)_([\p{L}\d]+|\{[^}]*\})/gu, (_, symbol: string, index: string) => {
      return `<i>${symbol}</i><sub>${index.replace(/[{}]/g, '')}</sub>`;
    })
    .replace(/(?<![\p{L}\d_;])([sqζα])(?=[\s\u00a0]?(?:[=≤≥→\d−]|&lt;|&gt;))/gu, '<i>$1</i>')
    .replace(/<\/sub>\^(\p{L}+)/gu, '</sub><sup>$1</sup>')
    .replace(/\^\(([^()]*)\)/g, (_, power: string) => `<sup>${power.replaceAll('-', '−')}</sup>`)
    .replace(/\^([−-]?\d+)/g, (_, power: string) => `<sup>${power.replaceAll('-', '−')}</sup>`)
    .replace(/(?<=^|[\s(=≤<,|])-(?=\d|10<)/g, '−');
  return { html: typeset };
}
