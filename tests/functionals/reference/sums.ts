import type { Sum } from './expected.ts';
import type { PartName } from './values.ts';

/**
 * Functionals without rows of their own whose parts are weighted sums of functionals with rows. Sheets that
 * take whole parts of other sheets unchanged need no entry.
 */
export const sums: Readonly<Record<string, Partial<Record<PartName, Sum>>>> = {
  // K. Hui and J.-D. Chai, J. Chem. Phys. 144, 044114 (2016)
  scan0: { exchange: [[0.75, 'scan', 'exchange']] },
};
