import type { DomainRecord, Findings, FunctionalFindings } from '../finding/finding.ts';
import { shortText } from './number-text.ts';
import { type SupplementTable, supplementTable } from './supplement.ts';
import { titleOf } from './vet-markdown.ts';
import { marginText, toleranceWords } from './vet-overview.ts';

/** The findings as LaTeX tables, one for each functional. Needs the packages booktabs, longtable and array. */
export function vetLatex(findings: Findings): string {
  const head = '% Needs \\usepackage{booktabs,longtable,array}.\n';
  return `${head}\n${findings.functionals.map((functional) => tableOf(functional)).join('\n\n')}\n`;
}

function tableOf(functional: FunctionalFindings): string {
  const table = supplementTable(functional);
  const rows = table.rows.map(({ finding, verdict, place, every, notes }) =>
    [
      `${escapeLatex(finding.title)}\\textsuperscript{${notes.join(',')}}`,
      escapeLatex(verdict),
      marginLatex(marginText(finding)),
      placeLatex(place, every),
    ].join(' & '),
  );
  const notes = table.notes.map(({ letter, note }) => {
    const text = note.kind === 'words' ? escapeLatex(note.text) : `Tried at ${domainLatex(note.domain)}.`;
    return `\\textsuperscript{${letter}}\\,${text}`;
  });
  const head = 'Condition & Verdict & Lowest margin & at \\\\';
  return [
    '\\begingroup\\small',
    '\\begin{longtable}{@{}>{\\raggedright\\arraybackslash}p{0.42\\linewidth}ll>{\\raggedright\\arraybackslash}p{0.22\\linewidth}@{}}',
    `\\caption{Exact conditions tried for ${escapeLatex(titleOf(functional))}, worst first.}`,
    `\\label{tab:conditions-${functional.id.replace(/[^a-z0-9-]/gi, '-')}} \\\\`,
    '\\toprule',
    head,
    '\\midrule',
    '\\endfirsthead',
    '\\toprule',
    head,
    '\\midrule',
    '\\endhead',
    '\\bottomrule',
    '\\endfoot',
    ...rows.map((row) => `${row} \\\\`),
    '\\end{longtable}',
    '\\noindent\\footnotesize',
    [...notes, ...closing(table)].join('\\\\\n'),
    '\\par\\endgroup',
  ].join('\n');
}

function closing({ functional, domain, notApplicable }: SupplementTable): string[] {
  const skipped = notApplicable.map(({ title }) => escapeLatex(title)).join('; ');
  const tolerance = escapeLatex(toleranceWords(functional.findings));
  return [
    `Domain: ${domainLatex(domain)}.`,
    ...(tolerance === ''
      ? []
      : [`A condition is violated where its margin is below minus the tolerance, ${tolerance}.`]),
    "``Holds'' means that no violation was found; it is no proof.",
    ...(skipped === '' ? [] : [`Does not apply: ${skipped}.`]),
  ];
}

function domainLatex({ coordinates, fixed, space }: DomainRecord): string {
  const held = Object.entries(fixed).map(([name, value]) => `$${symbol(name)} = ${plainNumber(value)}$`);
  const axes = coordinates
    .filter(({ name }) => !(name in fixed))
    .map(
      ({ name, lower, upper }) =>
        `$${plainNumber(lower)} \\le ${symbol(name)} ${upper === null ? '< \\infty' : `\\le ${plainNumber(upper)}`}$`,
    );
  return `${space === 'spin' ? 'the general spin space: ' : ''}${[...held, ...axes].join(', ')}`;
}

function placeLatex(place: readonly (readonly [string, number])[], every: readonly string[]): string {
  const given = place.map(([name, value]) => `$${symbol(name)} = ${plainNumber(value, 4)}$`);
  const rest = every.length === 0 ? [] : [`every~$${every.map(symbol).join(', ')}$`];
  return [...given, ...rest].join(', ');
}

function marginLatex(text: string): string {
  if (text === '') return '';
  return `$${text.startsWith('≈') ? '\\approx 0' : poweredLatex(text)}$`;
}

/** `2.5\times 10^{-7}`, for math. */
function plainNumber(value: number, digits = 6): string {
  return poweredLatex(shortText(value, digits));
}

function poweredLatex(text: string): string {
  const [mantissa = '', exponent] = text.split('e');
  const shown = mantissa === '∞' ? '\\infty' : mantissa === '-∞' ? '-\\infty' : mantissa;
  return exponent === undefined ? shown : `${shown}\\times 10^{${Number(exponent)}}`;
}

const symbols: Readonly<Record<string, string>> = {
  rs: 'r_s',
  zeta: '\\zeta',
  s: 's',
  alpha: '\\alpha',
  q: 'q',
  s_up: 's_\\uparrow',
  s_dn: 's_\\downarrow',
  cosine: '\\cos\\theta',
  alpha_up: '\\alpha_\\uparrow',
  alpha_dn: '\\alpha_\\downarrow',
};

function symbol(name: string): string {
  return symbols[name] ?? `\\mathrm{${escapeLatex(name)}}`;
}

const special: Readonly<Record<string, string>> = {
  '\\': '\\textbackslash{}',
  '{': '\\{',
  '}': '\\}',
  $: '\\$',
  '&': '\\&',
  '#': '\\#',
  '%': '\\%',
  _: '\\_',
  '^': '\\textasciicircum{}',
  '~': '\\textasciitilde{}',
  '<': '$<$',
  '>': '$>$',
  '|': '$|$',
  '"': "''",
  '–': '--',
  '—': '---',
  '…': '\\ldots{}',
  '\u00a0': '~',
  '−': '$-$',
  '·': '$\\cdot$',
  '×': '$\\times$',
  '≤': '$\\le$',
  '≥': '$\\ge$',
  '≠': '$\\neq$',
  '≈': '$\\approx$',
  '→': '$\\to$',
  '↑': '$\\uparrow$',
  '↓': '$\\downarrow$',
  '∞': '$\\infty$',
  '∂': '$\\partial$',
  '∇': '$\\nabla$',
  '∫': '$\\int$',
  '√': '$\\surd$',
  '²': '\\textsuperscript{2}',
  '³': '\\textsuperscript{3}',
  α: '$\\alpha$',
  β: '$\\beta$',
  γ: '$\\gamma$',
  δ: '$\\delta$',
  ε: '$\\varepsilon$',
  ζ: '$\\zeta$',
  η: '$\\eta$',
  θ: '$\\theta$',
  κ: '$\\kappa$',
  λ: '$\\lambda$',
  μ: '$\\mu$',
  ν: '$\\nu$',
  ξ: '$\\xi$',
  π: '$\\pi$',
  ρ: '$\\rho$',
  σ: '$\\sigma$',
  τ: '$\\tau$',
  φ: '$\\phi$',
  χ: '$\\chi$',
  ψ: '$\\psi$',
  ω: '$\\omega$',
  Γ: '$\\Gamma$',
  Δ: '$\\Delta$',
  Σ: '$\\Sigma$',
  Ω: '$\\Omega$',
};

/** Text that LaTeX sets as it reads: what it reserves is escaped, symbols of the field become math. */
export function escapeLatex(text: string): string {
  return [...text.replace(/\p{Cc}+/gu, ' ')].map((letter) => special[letter] ?? letter).join('');
}
