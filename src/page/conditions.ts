import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import type { Explanation } from '../report/explain.ts';
import { percentText } from '../report/number-text.ts';
import { forceWords, statusWords } from '../report/words.ts';
import { findingDetail } from './detail.ts';
import { html, joined, type Markup } from './markup.ts';
import { notation } from './notation.ts';
import type { References } from './references.ts';
import type { ReportInput } from './report-input.ts';
import { marginShort, partWords, severity, verdictMark } from './words.ts';

/** Conditions that stand open at first; a page that is printed has those that stand open. */
const mostOpen = 4;

/** Each condition with its statement, what was found, and the place of its map; worst first, those not asked in a list. */
export function conditionsSection(input: ReportInput, references: References): Markup {
  const { functionals } = input.findings;
  const entries = input.conditions
    .map((explanation, index) => ({
      explanation,
      across: functionals.map(({ findings }) => findings[index] as Finding),
    }))
    .sort((a, b) => Math.min(...a.across.map(severity)) - Math.min(...b.across.map(severity)));
  const asked = entries.filter(({ across }) => across.some(({ verdict }) => verdict !== 'not-applicable'));
  const rest = entries.filter((entry) => !asked.includes(entry));
  const opened = asked.filter(({ across }) =>
    across.some(({ verdict }) => verdict === 'violated' || verdict === 'undecided'),
  );
  return html`<section id="conditions" aria-labelledby="conditions-title">
<h2 id="conditions-title">Conditions</h2>
<p class="note">Each margin is drawn over two coordinates; the others stand where their sliders do, or at their worst: then each point of the map shows the lowest margin over them. Maps are computed in this page, with the formulas that the verdicts came from. A condition opens by its title; those that are open are printed in full.</p>
<noscript><p class="note">The maps and curves need scripts; everything else is here without.</p></noscript>
${asked.map((entry) => condition(entry, opened.indexOf(entry) >= 0 && opened.indexOf(entry) < mostOpen, input, references))}
${rest.length === 0 ? '' : notAsked(rest)}
</section>`;
}

interface Entry {
  readonly explanation: Explanation;
  readonly across: readonly Finding[];
}

function condition(
  { explanation, across }: Entry,
  isOpen: boolean,
  input: ReportInput,
  references: References,
): Markup {
  const { functionals } = input.findings;
  const [worst] = [...across].sort((a, b) => severity(a) - severity(b)) as [Finding];
  const map = input.kernels.data.maps.findIndex(({ condition: id }) => id === explanation.id);
  const id = `c-${explanation.id}`;
  const heads =
    functionals.length === 1
      ? html`${verdictMark(worst)}<span class="number">${marginShort(worst)}</span>`
      : html`<span class="marks">${across.map((finding, index) => html`<span title="${functionals[index]?.name}">${verdictMark(finding, false)}</span>`)}</span>`;
  return html`<details class="condition ${worst.verdict}" id="${id}"${isOpen ? html` open` : ''}>
<summary><h3>${explanation.title}</h3><span class="found">${heads}</span></summary>
<div class="columns"><div class="text">
<p class="statement">${notation(explanation.statement)}</p>
<p class="form"><span class="label">local form</span> ${notation(explanation.localForm ?? explanation.requirement)}</p>
${functionals.length === 1 ? findingDetail(worst, functionals[0] as FunctionalFindings) : byFunctional(across, functionals)}
</div>
<div class="more">
<dl class="facts">
<dt>asked of</dt><dd>${partWords[explanation.part]} of ${explanation.rungs.join(', ')} forms</dd>
<dt>status</dt><dd>${notation(statusWords[explanation.status])}</dd>
<dt>force</dt><dd>the local form is ${notation(forceWords[worst.force])}</dd>
<dt>tolerance</dt><dd>${notation(explanation.tolerance)}${explanation.toleranceReason === null ? '' : html`: ${notation(explanation.toleranceReason)}`}</dd>
<dt>sources</dt><dd>${joined(
    explanation.sources.map((source) => references.mark(source)),
    ' ',
  )}</dd>
</dl>
${explanation.derivation === null ? '' : html`<details><summary>How the local form comes about</summary><p class="lines">${notation(explanation.derivation)}</p></details>`}
${explanation.traps.length === 0 ? '' : html`<details><summary>What to beware of</summary><ul>${explanation.traps.map((trap) => html`<li>${notation(trap)}</li>`)}</ul></details>`}
</div></div>
${map < 0 ? html`` : html`<div class="map" data-map="${map}"></div>`}
</details>`;
}

/** Of several functionals: those that break it in full, the others on a line each. */
function byFunctional(across: readonly Finding[], functionals: readonly FunctionalFindings[]): Markup {
  const entries = across.map((finding, index) => ({ finding, functional: functionals[index] as FunctionalFindings }));
  const told = entries.filter(({ finding }) => finding.verdict === 'violated' || finding.verdict === 'undecided');
  const proved = entries.filter(({ finding }) => finding.verdict === 'proved');
  const silent = entries.filter(({ finding }) => finding.verdict === 'holds');
  const idle = entries.filter(({ finding }) => finding.verdict === 'not-applicable');
  return html`${told.map(({ finding, functional }) => html`<section class="of"><h4>${functional.name} ${verdictMark(finding)}</h4>${findingDetail(finding, functional)}</section>`)}
${holding('proved on the whole domain', proved)}${holding('no violation found', silent)}
${idle.length === 0 ? '' : html`<p class="note">Does not apply to ${idle.map(({ functional }) => functional.name).join(', ')}.</p>`}`;
}

function holding(
  label: string,
  entries: readonly { readonly finding: Finding; readonly functional: FunctionalFindings }[],
): Markup {
  if (entries.length === 0) return html``;
  return html`<p class="holding"><span class="label">${label}</span> ${joined(
    entries.map(
      ({ finding, functional }) =>
        html`${functional.name} <span class="number">(${marginShort(finding)}${partlyProved(finding)})</span>`,
    ),
    ', ',
  )}</p>`;
}

/** Of what holds without being proved: how much of the domain is. */
function partlyProved({ verdict, proof }: Finding): string {
  if (verdict !== 'holds' || proof === undefined || proof.stop === 'not-provable') return '';
  return `; proved on ${percentText(proof.provedShare)}, undecided on ${percentText(proof.undecidedShare)}`;
}

function notAsked(entries: readonly Entry[]): Markup {
  return html`<details class="condition not-applicable"><summary><h3>Conditions that do not apply</h3><span class="number">${entries.length}</span></summary><ul class="idle">${entries.map(
    ({ explanation, across }) =>
      html`<li id="c-${explanation.id}"><b>${explanation.title}</b>: ${across[0]?.reason}</li>`,
  )}</ul></details>`;
}
