import { html, type Markup } from './markup.ts';
import type { ReportInput } from './report-input.ts';
import { sheetsOf } from './sheets.ts';

/** The literature of a page, numbered in the order in which it is first met. */
export interface References {
  /** The number of a source, as a link to the list. */
  mark(source: string): Markup;
  readonly list: readonly string[];
}

export function collectReferences({ functionals, conditions }: ReportInput): References {
  const sheets = sheetsOf(functionals);
  const list = [
    ...new Set([...sheets.flatMap(({ citations }) => citations), ...conditions.flatMap(({ sources }) => sources)]),
  ];
  return {
    list,
    mark(source) {
      const number = list.indexOf(source) + 1;
      return html`<a class="cite" href="#r-${number}">[${number}]</a>`;
    },
  };
}

export function referencesSection({ list }: References): Markup {
  return html`<section id="references" aria-labelledby="references-title"><h2 id="references-title">References</h2><ol class="references">${list.map((text, index) => html`<li id="r-${index + 1}">${text}</li>`)}</ol></section>`;
}
