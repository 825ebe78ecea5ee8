const tokenPattern = /(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?|[A-Za-z_\u0080-\uffff][\w\u0080-\uffff]*/g;

/** The names and numbers of an expression with their offsets, in the order of the text. */
export function tokenOffsets(text: string): { text: string; offset: number }[] {
  return [...text.matchAll(tokenPattern)].map((match) => ({ text: match[0], offset: match.index }));
}

/** Names and numbers stand in the text in the order in which a walk of the tree meets them. */
export class TokenCursor {
  readonly #tokens: readonly { readonly text: string; readonly offset: number }[];
  #next = 0;

  constructor(text: string) {
    this.#tokens = tokenOffsets(text);
  }

  take(name?: string): number {
    while (this.#next < this.#tokens.length) {
      const token = this.#tokens[this.#next++] as { text: string; offset: number };
      if (name === undefined || token.text === name) return token.offset;
    }
    return 0;
  }

  get here(): number {
    return this.#tokens[this.#next]?.offset ?? this.#tokens.at(-1)?.offset ?? 0;
  }
}
