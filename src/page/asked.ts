import { createHash } from 'node:crypto';
import type { FunctionalFindings } from '../finding/finding.ts';
import { countText, shortText } from '../report/number-text.ts';
import { commonDomain, domainWords } from '../report/words.ts';
import { html, type Markup } from './markup.ts';
import { notation } from './notation.ts';
import type { ReportInput } from './report-input.ts';
import { sheetsOf } from './sheets.ts';

/** How the verdicts came about: command, versions, domain, tolerances, constants, and the sheets word for word. */
export function askedSection(input: ReportInput): Markup {
  const { findings, functionals, conditions, command } = input;
  const [first] = findings.functionals as [FunctionalFindings];
  const widest =
    [...findings.functionals].sort(
      (a, b) => commonDomain(b).coordinates.length - commonDomain(a).coordinates.length,
    )[0] ?? first;
  const points = findings.functionals.flatMap((one) => one.findings).reduce((sum, finding) => sum + finding.points, 0);
  const counts = new Map<string, number>();
  for (const { tolerance } of conditions) counts.set(tolerance, (counts.get(tolerance) ?? 0) + 1);
  const usual = [...counts].sort(([, a], [, b]) => b - a)[0]?.[0] ?? '';
  const constants = conditions.flatMap((explanation) => explanation.constants);
  const used = Object.assign(
    {},
    ...findings.functionals.flatMap((one) => one.findings.map((finding) => finding.constants)),
  ) as Record<string, number>;
  const constantRows = Object.entries(used).map(([name, value]) => {
    const known = constants.find((constant) => constant.name === name);
    const source = known?.published.find((choice) => Number(choice.value) === value)?.source;
    return html`<tr><th scope="row">${name}</th><td data-label="value">${notation(shortText(value, 10))}</td><td data-label="meaning">${known === undefined ? '' : notation(known.meaning)}</td><td data-label="source">${source ?? 'chosen for this run'}</td></tr>`;
  });
  return html`<section id="asked" aria-labelledby="asked-title"><h2 id="asked-title">How it was asked</h2>
<dl class="facts wide">
<dt>command</dt><dd><code>${command}</code></dd>
<dt>version</dt><dd>rungcheck ${findings.engineVersion}; conditions <code>${findings.catalogueVersion}</code></dd>
<dt>domain</dt><dd>${first.domain.name}: ${notation(domainWords(commonDomain(widest)).replaceAll('\u00a0', ' '))}; a condition may hold some of them fixed</dd>
<dt>points</dt><dd>${countText(points)} on grids and samples; then local search, and the worst point again in high precision</dd>
<dt>tolerance</dt><dd>a margin below minus the tolerance is a violation; it is ${notation(usual)} unless a condition states another</dd>
<dt>proofs</dt><dd>${proofWords(findings.functionals)}</dd>
</dl>
${constantRows.length === 0 ? '' : html`<h3>Constants</h3><div class="scroller" tabindex="0" role="region" aria-label="Constants"><table class="parameters"><thead><tr><th scope="col">constant</th><th scope="col">value</th><th scope="col">meaning</th><th scope="col">source</th></tr></thead><tbody>${constantRows}</tbody></table></div>`}
<h3>Sheets</h3>
${sheetsOf(functionals).map(
  ({ id, name, text }) =>
    html`<details class="source"><summary>${name} <code>${id}.yaml</code></summary><p class="hash">SHA-256 <code>${createHash('sha256').update(text).digest('hex')}</code></p><pre tabindex="0">${text}</pre></details>`,
)}
</section>`;
}

function proofWords(functionals: readonly FunctionalFindings[]): Markup {
  const proofs = functionals.flatMap(({ findings }) =>
    findings.flatMap(({ proof }) => (proof === undefined ? [] : [proof])),
  );
  if (proofs.length === 0) return html`not asked for: “holds” means that no violation was found`;
  const boxes = proofs.reduce((sum, proof) => sum + proof.boxes, 0);
  return html`branch and bound on ${countText(boxes)} boxes with interval arithmetic rounded outward; “proved” is said of the stated domain, to the tolerance, wherever the formula has a value. Conditions asked at points and those with a limit cannot be proved so`;
}
