import type { PictureAxis } from './margin-map.ts';

/** One curve: the value of a quantity of one functional along a coordinate. */
export interface Curve {
  readonly functional: { readonly id: string; readonly name: string; readonly rung: string };
  /** Trial values of parameters. */
  readonly parameters: Readonly<Record<string, string>>;
  /** The other coordinates. */
  readonly fixed: Readonly<Record<string, number>>;
  /** null where there is no finite value. */
  readonly values: readonly (number | null)[];
}

/** What a condition of the catalogue requires of the quantity: a level that it may not pass. */
export interface Bound {
  readonly condition: string;
  readonly title: string;
  readonly relation: '<=' | '>=';
  readonly value: number;
  readonly force: string;
  readonly status: string;
}

export interface CurvePanel {
  /** As in `rungcheck at`: Fx, Fc, Fxc, dFc_drs, eps_c …. */
  readonly quantity: string;
  readonly curves: readonly Curve[];
  readonly bounds: readonly Bound[];
}

export interface CurveSet {
  readonly format: 'rungcheck plot';
  readonly formatVersion: 1;
  readonly along: PictureAxis;
  readonly panels: readonly CurvePanel[];
}
