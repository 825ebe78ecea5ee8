import type { DomainRecord, Findings, FunctionalFindings } from '../finding/finding.ts';
import { coordinateSymbol } from '../finding/symbols.ts';
import { shortText, signedText } from './number-text.ts';
import { type SupplementTable, supplementTable } from './supplement.ts';
import { marginText, toleranceWords } from './vet-overview.ts';
import { domainWords, verdictMarks } from './words.ts';

/** The findings as Markdown tables (GitHub's dialect): a matrix when there are several functionals, then one table each. */
export function vetMarkdown(findings: Findings): string {
  const { functionals } = findings;
  const matrix = functionals.length > 1 ? [matrixOf(functionals)] : [];
  return `${[...matrix, ...functionals.map(tableOf)].join('\n\n')}\n`;
}

function matrixOf(functionals: readonly FunctionalFindings[]): string {
  const ids = [...new Set(functionals.flatMap(({ findings }) => findings.map(({ constraint }) => constraint)))];
  const rows = ids.map((id) => {
    const cells = functionals.map(({ findings }) => {
      const finding = findings.find(({ constraint }) => constraint === id);
      if (finding === undefined || finding.verdict === 'not-applicable') return verdictMarks['not-applicable'].symbol;
      const { symbol, word } = verdictMarks[finding.verdict];
      return finding.verdict === 'violated' && finding.margin !== null
        ? `${symbol} ${numberText(signedText(finding.margin))}`
        : `${symbol} ${word}`;
    });
    return [id, ...cells];
  });
  const titles = functionals.map((functional) => escapeMarkdown(titleOf(functional)));
  return `${lines(
    ['Condition', ...titles],
    rows.map(([id = '', ...cells]) => [escapeMarkdown(id), ...cells]),
  )}\n\nFor violated conditions the cell is the lowest margin. ${verdictMarks['not-applicable'].symbol}: does not apply.`;
}

function tableOf(functional: FunctionalFindings): string {
  const table = supplementTable(functional);
  const rows = table.rows.map(({ finding, verdict, place, every, notes }) => [
    `${escapeMarkdown(finding.title)}<sup>${notes.join(', ')}</sup>`,
    `${verdictMarks[finding.verdict].symbol} ${verdict}`,
    numberText(marginText(finding)),
    placeText(place, every),
  ]);
  const body = lines(['Condition', 'Verdict', 'Lowest margin', 'at'], rows, ['left', 'left', 'right', 'left']);
  const notes = table.notes.map(({ letter, note }) => {
    const text = note.kind === 'words' ? note.text : `Tried at ${domainWords(note.domain).replaceAll('\u00a0', ' ')}.`;
    return `<sup>${letter}</sup> ${escapeMarkdown(text)}  `;
  });
  return [`### ${escapeMarkdown(titleOf(functional))}`, '', body, '', ...notes, ...closing(table).map(escapeMarkdown)]
    .join('\n')
    .trimEnd();
}

function closing({ functional, domain, notApplicable }: SupplementTable): string[] {
  const skipped = notApplicable.map(({ title }) => title).join('; ');
  const tolerance = toleranceWords(functional.findings);
  const violated = tolerance === '' ? '' : ` Violated below minus the tolerance, ${tolerance}.`;
  return [
    `Domain: ${domainOf(domain)}.${violated} "Holds" means that no violation was found; it is no proof.`,
    ...(skipped === '' ? [] : [`Does not apply: ${skipped}.`]),
  ];
}

function domainOf(domain: DomainRecord): string {
  return domainWords(domain).replaceAll('\u00a0', ' ');
}

export function titleOf({ name, parameters }: FunctionalFindings): string {
  const trial = Object.entries(parameters).map(([key, value]) => `${key} = ${value}`);
  return trial.length === 0 ? name : `${name} (trial: ${trial.join(', ')})`;
}

function placeText(place: readonly (readonly [string, number])[], every: readonly string[]): string {
  const given = place.map(([name, value]) => `${symbol(name)} = ${numberText(shortText(value, 4))}`);
  const rest = every.length === 0 ? [] : [`every ${every.map(symbol).join(', ')}`];
  return [...given, ...rest].join(', ');
}

/** `r_s` as r<sub>s</sub>. */
function symbol(name: string): string {
  return coordinateSymbol(name).replace(/_(\w+)/, '<sub>$1</sub>');
}

/** `-2.5e-7` as −2.5 × 10<sup>−7</sup>. */
function numberText(text: string): string {
  const [mantissa = '', exponent] = text.split('e');
  const minus = (part: string) => part.replace('-', '−');
  return exponent === undefined ? minus(text) : `${minus(mantissa)} × 10<sup>${minus(String(Number(exponent)))}</sup>`;
}

type Align = 'left' | 'right';

function lines(header: readonly string[], rows: readonly (readonly string[])[], align: readonly Align[] = []): string {
  const rule = header.map((_, index) => (align[index] === 'right' ? '---:' : '---'));
  return [header, rule, ...rows].map((cells) => `| ${cells.join(' | ')} |`).join('\n');
}

/** Text that Markdown and HTML leave as it is. */
export function escapeMarkdown(text: string): string {
  return text
    .replace(/\s+/g, ' ')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replace(/[\\`*_{}[\]#|~$]/g, '\\$&');
}
