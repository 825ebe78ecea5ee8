/** An XML element; a child is an element or a text. */
export interface XmlNode {
  readonly name: string;
  readonly attributes: Readonly<Record<string, string | number>>;
  readonly children: readonly (XmlNode | string)[];
}

export function element(name: string, attributes: XmlNode['attributes'], children: XmlNode['children'] = []): XmlNode {
  return { name, attributes, children };
}

/** A document in XML 1.0, one element a line. */
export function xmlText(root: XmlNode): string {
  return `<?xml version="1.0" encoding="UTF-8"?>\n${nodeText(root, '')}\n`;
}

function nodeText({ name, attributes, children }: XmlNode, indent: string): string {
  const listed = Object.entries(attributes).map(([key, value]) => ` ${key}="${escaped(String(value), true)}"`);
  const open = `${indent}<${name}${listed.join('')}`;
  if (children.length === 0) return `${open}/>`;
  if (children.every((child) => typeof child === 'string')) {
    return `${open}>${escaped(children.join(''), false)}</${name}>`;
  }
  const inner = children.map((child) =>
    typeof child === 'string' ? escaped(child, false) : nodeText(child, `${indent}  `),
  );
  return `${open}>\n${inner.join('\n')}\n${indent}</${name}>`;
}

function escaped(text: string, inAttribute: boolean): string {
  const plain = withoutForbidden(text).replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');
  return inAttribute
    ? plain.replaceAll('"', '&quot;').replaceAll('\n', '&#10;').replaceAll('\r', '&#13;').replaceAll('\t', '&#9;')
    : plain;
}

/** XML 1.0, section 2.2: most control characters and lone surrogates have no place in a document. */
function withoutForbidden(text: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is removed
  return text.replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]|\p{Surrogate}/gu, '\ufffd');
}
