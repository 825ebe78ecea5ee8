/** Text that is HTML already; anything else is escaped where it is put in. */
export interface Markup {
  readonly html: string;
}

export type Content = Markup | string | number | null | undefined | readonly Content[];

/** A template whose values are escaped unless they are markup. Attribute values are to be written in quotes. */
export function html(parts: TemplateStringsArray, ...values: readonly Content[]): Markup {
  return { html: parts.reduce((text, part, index) => text + markupText(values[index - 1]) + part) };
}

export function joined(items: readonly Content[], separator: Content = ''): Markup {
  return { html: items.map(markupText).join(markupText(separator)) };
}

function markupText(content: Content): string {
  if (content === null || content === undefined) return '';
  if (typeof content === 'string' || typeof content === 'number') return escaped(String(content));
  if ('html' in content) return content.html;
  return content.map(markupText).join('');
}

/** Text as it stands in HTML, in an element or in a quoted attribute; control characters have no place in either. */
export function escaped(text: string): string {
  return text
    .replace(/[^\P{Cc}\n\r\t]|\p{Surrogate}/gu, '\ufffd')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

/** JSON that stays inside its script element. */
export function scriptJson(data: unknown): string {
  return JSON.stringify(data)
    .replaceAll('<', '\\u003c')
    .replaceAll('\u2028', '\\u2028')
    .replaceAll('\u2029', '\\u2029');
}
