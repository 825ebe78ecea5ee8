const tokenPattern = /(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?|[A-Za-z_\u0080-\uffff][\w\u0080-\uffff]*/g;

/** The names and numbers of an expression with their offsets, in the order of the text. */
export function tokenOffsets(text: string): { text: string; offset: number }[] {
  return [...text.matchAll(tokenPattern)].map((match) => ({ text: match[0], offset: match.index }));
}
