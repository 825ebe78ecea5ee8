import { createHash } from 'node:crypto';
import { askedSection } from './asked.ts';
import { conditionsSection } from './conditions.ts';
import { formulasSection } from './formulas.ts';
import { escaped, html, type Markup, scriptJson } from './markup.ts';
import { kernelScript } from './page-kernels.ts';
import { collectReferences, referencesSection } from './references.ts';
import type { ReportInput } from './report-input.ts';
import { summarySection } from './summary.ts';
import { verdictsSection } from './verdicts.ts';
import { listed } from './words.ts';

/**
 * The whole page: one HTML file that asks nothing of the network. Its policy lets run only the two scripts and the
 * style whose hashes it states, and a worker made from these scripts.
 */
export function reportPage(input: ReportInput): string {
  const kernels = insideScript(kernelScript(input.kernels.bodies));
  const script = insideScript(input.script);
  const policy = [
    "default-src 'none'",
    `script-src ${hashOf(kernels)} ${hashOf(script)}`,
    `style-src ${hashOf(input.style)}`,
    'worker-src blob:',
    "base-uri 'none'",
    "form-action 'none'",
  ].join('; ');
  const names = input.findings.functionals.map(({ name }) => name);
  const title = `${listed(names)}: exact conditions`;
  const references = collectReferences(input);
  const body = html`<header>${heading(input)}<nav aria-label="Contents"><ul>${sections.map(([id, text]) => html`<li><a href="#${id}">${text}</a></li>`)}</ul></nav></header>
<main>
${summarySection(input)}
${verdictsSection(input)}
${conditionsSection(input, references)}
<section id="curves" aria-labelledby="curves-title"><h2 id="curves-title">Enhancement factors</h2><p class="note">Over the exchange energy per particle of the unpolarised uniform gas. Dashed levels: what conditions of the catalogue allow on the drawn slice.</p><div id="plots" class="plots"></div></section>
${formulasSection(input, references)}
${askedSection(input)}
${referencesSection(references)}
</main>
<p id="live" class="unseen" aria-live="polite"></p>`;
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${escaped(policy)}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<meta name="referrer" content="no-referrer">
<meta name="generator" content="rungcheck ${escaped(input.findings.engineVersion)}">
<title>${escaped(title)}</title>
<style>${input.style}</style>
</head>
<body>
<a class="skip" href="#summary">To the summary</a>
${body.html}
<script type="application/json" id="page-data">${scriptJson(input.kernels.data)}</script>
<script id="kernels">${kernels}</script>
<script id="script">${script}</script>
</body>
</html>
`;
}

const sections: readonly (readonly [id: string, text: string])[] = [
  ['summary', 'Summary'],
  ['verdicts', 'Verdicts'],
  ['conditions', 'Conditions'],
  ['curves', 'Curves'],
  ['formulas', 'Formulas'],
  ['asked', 'How it was asked'],
  ['references', 'References'],
];

function heading({ findings, functionals }: ReportInput): Markup {
  const [first] = findings.functionals;
  const [definition] = functionals.map((functional) => functional.definition);
  const trial = Object.entries(first?.parameters ?? {}).map(([name, value]) => `${name} = ${value}`);
  const marked =
    trial.length === 0 ? html`` : html`<p class="trial">Trial values for this run: ${trial.join(', ')}</p>`;
  if (findings.functionals.length === 1 && first !== undefined && definition !== undefined) {
    const facts = [
      definition.rung,
      ...(definition.year === undefined ? [] : [String(definition.year)]),
      ...(first.exactExchange === null ? [] : ['with exact exchange']),
      ...(first.nonLocal === null ? [] : [`with ${first.nonLocal}, not evaluated`]),
    ];
    return html`<p class="kicker">Exact conditions on a density functional</p><h1>${first.name}</h1><p class="under">${facts.join(' · ')}${definition.summary === undefined ? '' : html` · ${definition.summary}`}</p>${marked}`;
  }
  return html`<p class="kicker">Exact conditions on density functionals</p><h1 class="many">${listed(findings.functionals.map(({ name }) => name))}</h1>${marked}`;
}

/** Nothing in a script may look like its end; both scripts are our own, so this changes strings alone. */
function insideScript(text: string): string {
  return text.replaceAll('</script', '<\\/script').replaceAll('<!--', '<\\!--');
}

function hashOf(text: string): string {
  return `'sha256-${createHash('sha256').update(text, 'utf8').digest('base64')}'`;
}
