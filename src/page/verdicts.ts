import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import { forceNames, knownCoordinates, placeWords, verdictMarks } from '../report/words.ts';
import { html, type Markup } from './markup.ts';
import { notation } from './notation.ts';
import type { ReportInput } from './report-input.ts';
import { differingConditions } from './summary.ts';
import {
  gateNames,
  gateOrder,
  marginShort,
  partWords,
  severity,
  shareShort,
  verdictMark,
  verdictOrder,
} from './words.ts';

/** The verdicts: one row for each condition; of several functionals a column for each. */
export function verdictsSection(input: ReportInput): Markup {
  const { functionals } = input.findings;
  const [only] = functionals;
  const isOne = functionals.length === 1 && only !== undefined;
  const differing = differingConditions(functionals);
  const all = functionals.flatMap(({ findings }) => findings);
  return html`<section id="verdicts" aria-labelledby="verdicts-title">
<h2 id="verdicts-title">Verdicts</h2>
${filters(all, differing.size > 0)}
<p class="count" role="status"></p>
<div class="scroller" tabindex="0" role="region" aria-labelledby="verdicts-title">${isOne ? oneTable(only) : matrix(functionals, differing)}</div>
<p class="note">The margin is signed: negative where the condition is violated, at the worst point found. ${isOne ? '' : '≠: the verdicts differ. –: the condition does not apply. '}The head of a column sorts by it.</p>
</section>`;
}

function filters(findings: readonly Finding[], withDiffering: boolean): Markup {
  const choice = (name: string, label: string, options: readonly (readonly [string, string])[]) =>
    html`<div class="control"><label for="filter-${name}">${label}</label><select id="filter-${name}" data-filter="${name}"><option value="">all</option>${options.map(([value, text]) => html`<option value="${value}">${text}</option>`)}</select></div>`;
  const present = <Value extends string>(order: readonly Value[], of: (finding: Finding) => Value) =>
    order.filter((value) => findings.some((finding) => of(finding) === value));
  const parts = present(Object.keys(partWords) as Finding['part'][], ({ part }) => part);
  const forces = present(Object.keys(forceNames) as Finding['force'][], ({ force }) => force);
  return html`<div class="filters" role="search" aria-label="Filter the conditions" hidden>
${choice(
  'part',
  'part',
  parts.map((part) => [part, partWords[part]]),
)}
${choice(
  'force',
  'local form is',
  forces.map((force) => [force, forceNames[force]]),
)}
${choice(
  'verdict',
  'verdict',
  present(verdictOrder, ({ verdict }) => verdict).map((verdict) => [verdict, verdictMarks[verdict].word]),
)}
${choice(
  'gate',
  'counts as',
  present(gateOrder, ({ gate }) => gate)
    .filter((gate) => gate !== 'pass')
    .map((gate) => [gate, gateNames[gate]]),
)}
<div class="control"><label for="filter-text">with the words</label><input id="filter-text" type="search" autocomplete="off"></div>
${withDiffering ? html`<div class="control tick"><input id="filter-differs" type="checkbox" data-filter="differs"><label for="filter-differs">only where they differ</label></div>` : ''}
</div>`;
}

const sortable = (text: string, kind = ''): Markup =>
  html`<th scope="col" data-sort class="${kind}"><button type="button">${text}</button></th>`;

function rowData(findings: readonly Finding[]): Markup {
  const [first] = findings as [Finding];
  const values = (of: (finding: Finding) => string) => [...new Set(findings.map(of))].join(' ');
  return html`data-part="${first.part}" data-force="${values(({ force }) => force)}" data-verdict="${values(({ verdict }) => verdict)}" data-gate="${values(({ gate }) => gate)}"`;
}

function oneTable(functional: FunctionalFindings): Markup {
  const known = knownCoordinates(functional);
  const rows = [...functional.findings].sort((a, b) => severity(a) - severity(b));
  const row = (finding: Finding) => {
    const applies = finding.verdict !== 'not-applicable';
    const key = (value: number | null) => (value === null || !applies ? '' : String(value));
    return html`<tr ${rowData([finding])}>
<td data-key="${severity(finding)}" data-label="verdict">${verdictMark(finding)}</td>
<th scope="row"><a href="#c-${finding.constraint}">${finding.title}</a></th>
<td data-label="part">${partWords[finding.part]}</td>
<td class="number" data-key="${key(finding.margin)}" data-label="margin">${marginShort(finding)}</td>
<td class="number" data-key="${key(finding.violatedShare)}" data-label="violated">${applies ? shareShort(finding) : ''}</td>
<td class="place" data-label="worst at">${applies ? notation(placeOf(finding, known)) : html`<span class="faint">${finding.reason}</span>`}</td>
<td data-label="local form is">${applies ? forceNames[finding.force] : ''}</td>
<td data-key="${gateOrder.indexOf(finding.gate)}" data-label="counts as">${finding.verdict === 'violated' ? html`<span class="gate gate-${finding.gate}">${gateNames[finding.gate]}</span>` : ''}</td>
</tr>`;
  };
  return html`<table class="verdicts"><caption class="unseen">Verdicts on ${functional.name}</caption><thead><tr>${sortable('verdict')}${sortable('condition')}${sortable('part')}${sortable('margin', 'number')}${sortable('violated', 'number')}<th scope="col">worst or closest at</th>${sortable('local form is')}${sortable('counts as')}</tr></thead><tbody>${rows.map(row)}</tbody></table>`;
}

/** An identity that holds exactly has no worst point. */
function placeOf(finding: Finding, known: readonly string[]): string {
  const isIdentity = finding.verdict === 'holds' && finding.margin === 0 && finding.domain.space === 'spin';
  return isIdentity ? '' : placeWords(finding, known);
}

function matrix(functionals: readonly FunctionalFindings[], differing: ReadonlySet<string>): Markup {
  const [first] = functionals as [FunctionalFindings];
  const rows = first.findings.map((finding, index) => ({
    finding,
    across: functionals.map(({ findings }) => findings[index] as Finding),
    differs: differing.has(finding.constraint),
  }));
  const worst = (findings: readonly Finding[]) => Math.min(...findings.map(severity));
  const ordered = [...rows].sort((a, b) => Number(b.differs) - Number(a.differs) || worst(a.across) - worst(b.across));
  const cell = (finding: Finding, name: string) =>
    html`<td class="cell ${finding.verdict}" data-key="${finding.verdict === 'not-applicable' ? '' : (finding.margin ?? '')}" data-label="${name}">${verdictMark(finding, false)} <span class="number">${marginShort(finding)}</span></td>`;
  return html`<table class="matrix"><caption class="unseen">Verdicts by condition and functional</caption><thead><tr>${sortable('condition')}${sortable('part')}${functionals.map(({ name }) => sortable(name, 'number'))}</tr></thead><tbody>${ordered.map(
    ({ finding, across, differs }) =>
      html`<tr ${rowData(across)} data-differs="${differs ? 'yes' : 'no'}"><th scope="row"><a href="#c-${finding.constraint}">${finding.title}</a>${differs ? html` <span class="differs" aria-hidden="true">≠</span><span class="unseen"> (verdicts differ)</span>` : ''}</th><td>${partWords[finding.part]}</td>${across.map((one, index) => cell(one, functionals[index]?.name ?? ''))}</tr>`,
  )}</tbody></table>`;
}
