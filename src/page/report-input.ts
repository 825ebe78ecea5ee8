import type { Findings } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import type { Explanation } from '../report/explain.ts';
import type { PageKernels } from './page-kernels.ts';

/** All that a page is made of. */
export interface ReportInput {
  readonly findings: Findings;
  /** One for each functional of the findings, in their order. */
  readonly functionals: readonly Functional[];
  /** The conditions that were asked, in the order of the findings. */
  readonly conditions: readonly Explanation[];
  readonly kernels: PageKernels;
  /** The page's own script and style, as built. */
  readonly script: string;
  readonly style: string;
  /** The command line that makes this page. */
  readonly command: string;
}
