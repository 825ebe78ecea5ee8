import type { State } from '../finding/state.ts';

/** A state file: JSON with one line a finding, so that a difference of two reads as what has changed. */
export function stateText({ findings, ...circumstances }: State): string {
  const head = Object.entries(circumstances).map(
    ([key, value]) => `  ${JSON.stringify(key)}: ${JSON.stringify(value)},`,
  );
  const lines = findings.map((line) => `    ${JSON.stringify(line)}`);
  return `{\n${head.join('\n')}\n  "findings": [${lines.length === 0 ? '' : `\n${lines.join(',\n')}\n  `}]\n}\n`;
}
