/** A length or place in a drawing: at most three decimals, a thousandth of a millimetre. */
export function number(value: number): string {
  const rounded = Math.round(value * 1000) / 1000;
  return String(Object.is(rounded, -0) ? 0 : rounded);
}

/** Text for an element or a quoted attribute; characters that XML forbids are dropped. */
export function escapeXml(text: string): string {
  return text
    .replace(/[^\t\n\r\u0020-\uD7FF\uE000-\uFFFD\u{10000}-\u{10FFFF}]/gu, '')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

export type Attributes = Readonly<Record<string, string | number | undefined>>;

/** One element. Values are escaped; the content is not. */
export function element(name: string, attributes: Attributes, content = ''): string {
  const given = Object.entries(attributes).flatMap(([key, value]) =>
    value === undefined ? [] : [` ${key}="${typeof value === 'number' ? number(value) : escapeXml(value)}"`],
  );
  return content === '' ? `<${name}${given.join('')}/>` : `<${name}${given.join('')}>${content}</${name}>`;
}

export interface Drawing {
  /** In the units that it is drawn in. */
  readonly width: number;
  readonly height: number;
  /** Millimetres to the unit. */
  readonly scale: number;
  readonly title: string;
  /** What a reader who does not see it is told. */
  readonly description: string;
  readonly content: string;
}

/** A whole SVG file, on white. */
export function svgDocument({ width, height, scale, title, description, content }: Drawing): string {
  const named = `${element('title', {}, escapeXml(title))}${element('desc', {}, escapeXml(description))}`;
  const ground = element('rect', { width, height, fill: '#ffffff' });
  const svg = element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      width: `${number(width * scale)}mm`,
      height: `${number(height * scale)}mm`,
      viewBox: `0 0 ${number(width)} ${number(height)}`,
      role: 'img',
      'stroke-linejoin': 'round',
    },
    `${named}${ground}${content}`,
  );
  return `<?xml version="1.0" encoding="UTF-8"?>\n${svg}\n`;
}

/** A path through points; closed when asked for. */
export function pathData(points: readonly (readonly [x: number, y: number])[], closed = false): string {
  const steps = points.map(([x, y], index) => `${index === 0 ? 'M' : 'L'}${number(x)} ${number(y)}`);
  return steps.length === 0 ? '' : `${steps.join('')}${closed ? 'Z' : ''}`;
}
