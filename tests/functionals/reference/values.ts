import { readFileSync } from 'node:fs';

export type PartName = 'exchange' | 'correlation' | 'exchange-correlation';

/** Energy per particle and the derivatives of the energy per volume at a general spin point; absent ones are zero. */
export interface GeneralValues {
  readonly eps: number;
  readonly d_n: readonly number[];
  readonly d_sigma?: readonly number[];
  readonly d_tau?: readonly number[];
}

/** Enhancement over uniform-gas exchange at a slice point, its derivatives in r_s, and their errors. */
export interface SliceValues {
  readonly F: number;
  readonly dF_drs: number;
  readonly dF_drs_error: number;
  readonly d2F_drs2: number;
  readonly d2F_drs2_error: number;
}

/** Values of one part of one functional, without its exact exchange. */
export interface ReferenceRow {
  readonly functional: string;
  readonly part: PartName;
  readonly general: readonly GeneralValues[];
  readonly slice: readonly SliceValues[];
}

export interface Points {
  readonly columns: readonly string[];
  readonly rows: readonly (readonly number[])[];
}

interface ReferenceFile {
  /** The library, its version and settings. */
  readonly source: string;
  readonly general_columns: readonly string[];
  readonly general_points: Points['rows'];
  readonly slice_columns: readonly string[];
  readonly slice_points: Points['rows'];
  readonly rows: readonly ReferenceRow[];
}

const file: ReferenceFile = JSON.parse(readFileSync(new URL('values.json', import.meta.url), 'utf8'));

export const source = file.source;
export const referenceRows = file.rows;
export const generalPoints: Points = { columns: file.general_columns, rows: file.general_points };
export const slicePoints: Points = { columns: file.slice_columns, rows: file.slice_points };

/** The row of one part, or undefined where the file has none. */
export function referenceRow(functional: string, part: PartName): ReferenceRow | undefined {
  return referenceRows.find((row) => row.functional === functional && row.part === part);
}
