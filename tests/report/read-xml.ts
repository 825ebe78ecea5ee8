/** An element as a reader of XML sees it. */
export interface Read {
  readonly name: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: Read[];
  text: string;
}

/** Reads the XML that the reports write (elements, attributes, text, five entities and numbers); throws where it is not well formed. */
export function parseXml(document: string): Read {
  const root: Read = { name: '', attributes: {}, children: [], text: '' };
  const open = [root];
  const body = document.replace(/^<\?xml version="1\.0" encoding="UTF-8"\?>\n/, '');
  for (const [token, end, name, attributes = '', closed, text] of body.matchAll(
    /<(?:(\/)?([A-Za-z-]+)((?: [A-Za-z-]+="[^"<]*")*)(\/)?)>|([^<]+)|</g,
  )) {
    const here = open.at(-1) as Read;
    if (text !== undefined) here.text += decoded(text);
    else if (name === undefined) throw new Error(`not well formed at ${token}`);
    else if (end === '/') {
      if (open.pop()?.name !== name) throw new Error(`${name} is closed and not open`);
    } else {
      const listed = [...attributes.matchAll(/([A-Za-z-]+)="([^"]*)"/g)].map(([, key, value]) => [
        key,
        decoded(value ?? ''),
      ]);
      const child: Read = { name, attributes: Object.fromEntries(listed), children: [], text: '' };
      here.children.push(child);
      if (closed !== '/') open.push(child);
    }
  }
  const [only] = root.children;
  if (open.length !== 1 || root.children.length !== 1 || only === undefined) throw new Error('not one whole element');
  return only;
}

const entities: Readonly<Record<string, string>> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" };

function decoded(text: string): string {
  return text.replace(/&(?:#(\d+)|([a-z]+));|&/g, (whole, code?: string, name?: string) => {
    const value = code === undefined ? entities[name ?? ''] : String.fromCodePoint(Number(code));
    if (value === undefined) throw new Error(`not an entity: ${whole}`);
    return value;
  });
}
