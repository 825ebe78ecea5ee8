import type { DomainRecord, Finding } from './finding.ts';
import type { PlaneRegions } from './regions.ts';

/** A coordinate of a picture: its values rise, both ends included. */
export interface PictureAxis {
  readonly name: string;
  readonly scale: 'linear' | 'logarithmic' | 'toward-upper' | 'compact';
  readonly values: readonly number[];
}

/** A coordinate that a map does not show: every cell has the smallest margin over it. */
export interface WorstOver {
  readonly name: string;
  readonly lower: number;
  /** null for infinity. */
  readonly upper: number | null;
  /** Values that were tried. */
  readonly points: number;
}

/** The signed margin of one functional over two coordinates of one slice. Negative: violated. */
export interface MapPanel {
  readonly functional: { readonly id: string; readonly name: string; readonly rung: string };
  /** Trial values of parameters. */
  readonly parameters: Readonly<Record<string, string>>;
  /** Coordinates held fixed, by the condition or by the request, that the margin depends on. */
  readonly fixed: Readonly<Record<string, number>>;
  readonly worstOver: readonly WorstOver[];
  /** Row-major: x fastest, then y; null where the margin has no finite value. */
  readonly margins: readonly (number | null)[];
  /** Where each cell takes its smallest margin, for each coordinate of `worstOver`. */
  readonly worstAt: Readonly<Record<string, readonly number[]>>;
  /** The lowest margin, found on the grid and followed to the local minimum; null where nothing has a value. */
  readonly lowest: { readonly margin: number; readonly point: Readonly<Record<string, number>> } | null;
  /** The violated region as closed rings of places (x, y), holes among them. */
  readonly region: readonly (readonly (readonly [x: number, y: number])[])[];
  /** Cells below minus the tolerance. */
  readonly violatedCells: number;
  /** Points at which the margin was evaluated. */
  readonly points: number;
  /** What is proved on the plane, where a proof was asked for. */
  readonly regions?: PlaneRegions;
}

export interface MapCondition {
  readonly id: string;
  readonly title: string;
  readonly requirement: string;
  readonly force: Finding['force'];
  readonly status: Finding['status'];
  readonly tolerance: number;
  readonly relative: boolean;
  /** Unit of the margin, as `hartree/bohr`; empty where it has none, null where it is not known. */
  readonly unit: string | null;
  readonly constants: Readonly<Record<string, number>>;
}

export interface MarginMap {
  readonly format: 'rungcheck map';
  readonly formatVersion: 1;
  readonly condition: MapCondition;
  readonly domain: DomainRecord['name'];
  readonly x: PictureAxis;
  readonly y: PictureAxis;
  readonly panels: readonly MapPanel[];
}
