/** Colours a text; with colour off it returns the text as it is. */
export type Paint = (style: Style, text: string) => string;

export type Style = keyof typeof codes;

const codes = {
  strong: '1',
  faint: '2',
  red: '31',
  yellow: '33',
  green: '32',
  blue: '34',
  cyan: '36',
} as const;

export function makePaint(colour: boolean): Paint {
  if (!colour) return (_style, text) => text;
  return (style, text) => (text === '' ? '' : `\u001b[${codes[style]}m${text}\u001b[0m`);
}
