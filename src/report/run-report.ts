import type { Comparison } from '../finding/compare.ts';
import type { Findings } from '../finding/finding.ts';
import type { Explanation } from './explain.ts';

/** All that the reports for machines are made from. */
export interface RunReport {
  readonly findings: Findings;
  /** Against a recorded state, when there is one: then only what is worse fails. */
  readonly comparison: Comparison | null;
  /** The conditions by id, for their help text. */
  readonly conditions: ReadonlyMap<string, Explanation>;
}
