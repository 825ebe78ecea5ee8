import type { Expression } from '../expression/expression.ts';
import type { Functional, Part } from '../functional/functional.ts';
import { html, type Markup } from './markup.ts';
import { expressionMathml, termsMathml } from './mathml.ts';
import { symbolMathml } from './mathml-symbol.ts';
import { notation } from './notation.ts';
import type { References } from './references.ts';
import type { ReportInput } from './report-input.ts';
import { linkedSheets } from './sheets.ts';

/** The formulas and parameters of each sheet, typeset from its expressions; then those of the sheets that it uses. */
export function formulasSection(input: ReportInput, references: References): Markup {
  const sheets = linkedSheets(input.functionals);
  return html`<section id="formulas" aria-labelledby="formulas-title"><h2 id="formulas-title">Formulas and parameters</h2>
<p class="note">Typeset from the expressions that were evaluated. A raised name is the sheet that a quantity is taken from; a name without an explanation is a parameter or a step of the same sheet. Hartree atomic units.</p>
${sheets.map((functional) => sheetFormulas(functional, input.functionals.includes(functional), references))}</section>`;
}

function sheetFormulas(functional: Functional, isOwn: boolean, references: References): Markup {
  const { definition, imports, parts, steps, functions } = functional;
  const uses = [...imports].map(([alias, used]) => {
    const changed = [...used.parameters].map(([name, value]) => equation(symbolMathml(name), value));
    return html`<li><b>${alias}</b> is <a href="#f-${used.functional.definition.id}">${used.functional.definition.name}</a>${changed.length === 0 ? '' : html` with ${changed}`}</li>`;
  });
  const inner = html`
<p class="cited">${definition.citations.map((citation) => html`${references.mark(citation)} `)}${definition.summary === undefined ? '' : notation(definition.summary)}</p>
${definition.notes === undefined ? '' : html`<p class="lines notes">${notation(definition.notes)}</p>`}
${uses.length === 0 ? '' : html`<ul class="uses">${uses}</ul>`}
${exactExchange(functional)}
${functions.size === 0 ? '' : html`<h4>Functions</h4>${[...functions].map(([name, { arguments: names, body }]) => equation(called(name, names), body))}`}
${steps.size === 0 ? '' : html`<h4>Steps shared by the parts</h4>${[...steps].map(([name, value]) => equation(symbolMathml(name), value))}`}
${[...parts.values()].map((part) => partFormulas(part))}
${parameterTable(functional)}`;
  const { id, name } = definition;
  return html`<details class="sheet" id="f-${id}"${isOwn ? html` open` : ''}><summary><h3>${name}</h3><span class="faint">${definition.rung}${definition.year === undefined ? '' : `, ${definition.year}`}${isOwn ? '' : ', used by the above'}</span></summary>${inner}</details>`;
}

const called = (name: string, names: readonly string[]): string =>
  `<mrow>${symbolMathml(name)}<mo stretchy="false" form="prefix">(</mo>${names.map(symbolMathml).join('<mo separator="true">,</mo>')}<mo stretchy="false" form="postfix">)</mo></mrow>`;

/** A line of formula that can be broken between the terms of its right-hand side. */
function equation(left: string, right: Expression): Markup {
  const [first = '', ...terms] = termsMathml(right);
  const rest = terms.map((term) => ` <math displaystyle="true">${term}</math>`).join('');
  return {
    html: `<div class="equation" tabindex="0"><math displaystyle="true"><mrow>${left}<mo>=</mo>${first}</mrow></math>${rest}</div>`,
  };
}

const partTitles: Record<Part['name'], string> = {
  exchange: 'Exchange',
  correlation: 'Correlation',
  'exchange-correlation': 'Exchange and correlation together',
};
const indices: Record<Part['name'], string> = { exchange: 'x', correlation: 'c', 'exchange-correlation': 'xc' };

function partFormulas({ name, steps, form }: Part): Markup {
  const index = `<mi mathvariant="normal">${indices[name]}</mi>`;
  const symbol = (letter: string) => `<msub><mi>${letter}</mi>${index}</msub>`;
  const local = [...steps].map(([step, value]) => equation(symbolMathml(step), value));
  const lead = (text: string) => html`<p class="lead">${text}</p>`;
  const inner = (() => {
    switch (form.kind) {
      case 'enhancement':
        return html`${equation(symbol('F'), form.value)}${lead('Enhancement factor of the unpolarised density; exact spin scaling gives that of any other.')}`;
      case 'per-particle':
        return html`${equation(symbol('ε'), form.value)}${lead('Energy per particle.')}`;
      case 'per-volume':
        return html`${equation(symbol('e'), form.value)}${lead('Energy per volume.')}`;
      case 'pairs':
        return html`${equation('<msub><mi>g</mi><mi>σσ</mi></msub>', form.sameSpin)}${equation('<msub><mi>g</mi><mi>↑↓</mi></msub>', form.oppositeSpin)}${lead(`Factors of the same-spin and the opposite-spin energy per volume of the uniform gas (${form.partition}): e(σσ) = n_σ ε_c(n_σ alone), the rest is of opposite spins.`)}`;
      case 'from':
        return lead(`As in ${form.alias}.`);
    }
  })();
  return html`<h4>${partTitles[name]}</h4>${local}${inner}`;
}

function exactExchange({ exactExchange: exact }: Functional): Markup {
  if (exact === undefined) return html``;
  if (exact.kind === 'global') return html`<h4>Exact exchange</h4>${equation('<mi>a</mi>', exact.fraction)}`;
  const share = (index: string) => `<msub><mi>a</mi><mtext>${index}</mtext></msub>`;
  return html`<h4>Exact exchange</h4>${equation(share('short range'), exact.shortRange)}${equation(share('long range'), exact.longRange)}${equation('<mi>ω</mi>', exact.omega)}`;
}

function parameterTable({ parameters, definition }: Functional): Markup {
  if (parameters.size === 0) return html``;
  const rows = [...parameters.values()].map(
    ({ definition: { name, value, digits, meaning, source }, value: expression }) => {
      const shown = /^[-\d.e+]+$/i.test(value.text.trim())
        ? notation(value.text.trim())
        : { html: `<math displaystyle="true">${expressionMathml(expression)}</math>` };
      return html`<tr><th scope="row"><span class="letter"><math>${{ html: symbolMathml(name) }}</math></span> <code>${name}</code></th><td data-label="value">${shown}</td><td class="number" data-label="digits as printed">${digits ?? ''}</td><td data-label="meaning">${meaning === undefined ? '' : notation(meaning)}</td><td data-label="source">${source === undefined ? '' : notation(source)}</td></tr>`;
    },
  );
  return html`<h4>Parameters</h4><div class="scroller" tabindex="0" role="region" aria-label="Parameters of ${definition.name}"><table class="parameters"><thead><tr><th scope="col">parameter</th><th scope="col">value</th><th scope="col">digits as printed</th><th scope="col">meaning</th><th scope="col">source</th></tr></thead><tbody>${rows}</tbody></table></div>`;
}
