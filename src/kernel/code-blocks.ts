/** Lines of JavaScript under conditions, in parts that are functions of their own. */
export interface CodeBlocks {
  push(...lines: string[]): void;
  /** Puts what follows under a condition, '' for none; lines under the same condition one after the other share a block. */
  open(condition: string): void;
  close(): void;
  /** Ends a part when it has become long. */
  rest(): void;
  /** The bodies of all parts. */
  parts(): string[];
}

/** V8 optimises many small functions sooner than one of thousands of lines. */
const linesPerPart = 80;

export function makeCodeBlocks(): CodeBlocks {
  const parts: string[] = [];
  let lines: string[] = [];
  let condition: string | undefined;
  const close = () => {
    if (condition !== undefined && condition !== '') lines.push('}');
    condition = undefined;
  };
  const end = () => {
    close();
    if (lines.length > 0) parts.push(`"use strict";\n${lines.join('\n')}`);
    lines = [];
  };
  return {
    push: (...more) => void lines.push(...more),
    open(wanted) {
      if (condition === wanted) return;
      close();
      condition = wanted;
      if (wanted !== '') lines.push(`if (${wanted}) {`);
    },
    close,
    rest() {
      if (lines.length >= linesPerPart) end();
    },
    parts() {
      end();
      return parts;
    },
  };
}
