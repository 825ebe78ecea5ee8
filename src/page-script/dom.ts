type Attributes = Readonly<Record<string, string | number | undefined>>;
type Child = Node | string;

/** An HTML element; texts become text nodes, never markup. */
export function make<Name extends keyof HTMLElementTagNameMap>(
  name: Name,
  attributes: Attributes = {},
  ...children: readonly Child[]
): HTMLElementTagNameMap[Name] {
  const element = document.createElement(name);
  assign(element, attributes);
  element.append(...children);
  return element;
}

const svgSpace = 'http://www.w3.org/2000/svg';

export function draw<Name extends keyof SVGElementTagNameMap>(
  name: Name,
  attributes: Attributes = {},
  ...children: readonly Child[]
): SVGElementTagNameMap[Name] {
  const element = document.createElementNS(svgSpace, name);
  assign(element, attributes);
  element.append(...children);
  return element;
}

function assign(element: Element, attributes: Attributes): void {
  for (const [name, value] of Object.entries(attributes)) {
    if (value !== undefined) element.setAttribute(name, String(value));
  }
}

export function find<Found extends Element>(root: ParentNode, selector: string): Found {
  const found = root.querySelector<Found>(selector);
  if (found === null) throw new Error(`the page lacks ${selector}`);
  return found;
}

/** `r_s`, `10^−3` as HTML nodes: italic letters, real indices and exponents. */
export function notationNodes(text: string): Child[] {
  return pieces(text).map(({ kind, text: part }) =>
    kind === 'plain' ? part : make(kind === 'symbol' ? 'i' : kind === 'index' ? 'sub' : 'sup', {}, part),
  );
}

/** The same inside an SVG text. */
export function notationSpans(text: string): SVGTSpanElement[] {
  let shift = 0;
  return pieces(text).map(({ kind, text: part }) => {
    const target = kind === 'index' ? 0.25 : kind === 'power' ? -0.4 : 0;
    const dy = target - shift;
    shift = target;
    const small = kind === 'index' || kind === 'power';
    return draw(
      'tspan',
      {
        // In the units of a text of 12 pixels, so that the next span comes back to the line.
        dy: dy === 0 ? undefined : dy * 12,
        'font-size': small ? '9' : undefined,
        'font-style': kind === 'symbol' ? 'italic' : undefined,
      },
      part,
    );
  });
}

interface Piece {
  readonly kind: 'plain' | 'symbol' | 'index' | 'power';
  readonly text: string;
}

function pieces(text: string): Piece[] {
  const found: Piece[] = [];
  let rest = 0;
  for (const match of text.matchAll(
    /([\p{L}ε∂]{1,2})_([\p{L}\d]+)|\^([−-]?\d+)|(?<![\p{L}\d])([\p{Script=Greek}qs])(?![\p{L}])/gu,
  )) {
    if (match.index > rest) found.push({ kind: 'plain', text: text.slice(rest, match.index) });
    const [whole, symbol, index, power, letter] = match;
    if (symbol !== undefined) found.push({ kind: 'symbol', text: symbol }, { kind: 'index', text: index as string });
    else if (power !== undefined) found.push({ kind: 'power', text: power.replace('-', '−') });
    else found.push({ kind: 'symbol', text: letter as string });
    rest = match.index + whole.length;
  }
  if (rest < text.length) found.push({ kind: 'plain', text: text.slice(rest) });
  return found;
}
