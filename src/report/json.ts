import type { Findings } from '../finding/finding.ts';

/** The findings file: JSON, two spaces, ends with a line break. A number that is not finite becomes null. */
export function findingsJson(findings: Findings): string {
  return jsonText(findings);
}

/** Any plain data as the program writes JSON. */
export function jsonText(data: unknown): string {
  return `${JSON.stringify(data, null, 2)}\n`;
}
