import type { DomainRecord, Finding } from '../finding/finding.ts';
import type { RegionTree } from '../finding/regions.ts';

/*
 * What the page's script is given: plain data, written into the page as JSON, beside the generated functions that the
 * indices of kernels refer to.
 */

export type AxisRecord = Pick<DomainRecord['coordinates'][number], 'name' | 'lower' | 'upper'> & {
  readonly scale: 'linear' | 'logarithmic' | 'toward-upper' | 'compact';
};

/** A generated function of grids: one loop for each variable; tables as the generator asks for them. */
export interface KernelRecord {
  readonly variables: readonly string[];
  /** One loop over a list of points instead of one for each variable. */
  readonly together: boolean;
  readonly outputs: readonly string[];
  readonly tables: readonly { readonly axes: readonly number[]; readonly width: number }[];
}

/** A functional of the page: what its readouts name, and the kernel of its energies. */
export interface PageFunctional {
  readonly id: string;
  readonly name: string;
  /** How `rungcheck at` is told of it: the id, or the file. */
  readonly argument: string;
  readonly coordinates: readonly string[];
  readonly energies: number;
}

/** The margin of one functional. */
export interface MapPanelRecord {
  /** Index of the functional. */
  readonly functional: number;
  readonly kernel: number;
  readonly variables: readonly string[];
  readonly fixed: Readonly<Record<string, number>>;
  readonly witness: Readonly<Record<string, number>> | null;
  readonly margin: number | null;
  /** What is proved, where that was asked and boxes can tell. */
  readonly regions?: RegionTree;
}

export interface MapRecord {
  readonly condition: string;
  readonly title: string;
  readonly space: 'slice' | 'spin';
  readonly tolerance: number;
  readonly unit: string;
  readonly axes: readonly AxisRecord[];
  readonly panels: readonly MapPanelRecord[];
}

/** A level that a condition sets to a quantity where the fixed coordinates have their values. */
export interface BoundRecord {
  readonly quantity: string;
  readonly condition: string;
  readonly title: string;
  readonly relation: '<=' | '>=';
  readonly value: number;
  readonly fixed: Readonly<Record<string, number>>;
  readonly force: Finding['force'];
}

export interface PageData {
  readonly kernels: readonly KernelRecord[];
  readonly functionals: readonly PageFunctional[];
  readonly axes: readonly AxisRecord[];
  readonly maps: readonly MapRecord[];
  readonly bounds: readonly BoundRecord[];
}
