import type { Evaluated } from './evaluate.ts';
import { generalPoints, type ReferenceRow, slicePoints } from './values.ts';

/** Relative tolerances of energies and of first derivatives. */
const energyTolerance = 1e-10;
const derivativeTolerance = 1e-8;
/** Below this share of uniform-gas exchange an energy, below this share of its natural scale a derivative, counts as absolute. */
const energyFloor = 1e-5;
const derivativeFloor = 1e-3;
/** The stated errors of the r_s derivatives are estimates. */
const errorFactor = 3;
/** Differences of F in double precision leave this much, also where F is exactly zero and the estimate smaller. */
const differenceNoise = 2e-14;

interface Check {
  readonly what: string;
  readonly expected: number;
  readonly tolerance: number;
}

/** The values that differ from the row, each as a line of text; none when all agree. */
export function missesGeneral(row: ReferenceRow, evaluated: Evaluated): string[] {
  return missesOf(
    evaluated,
    row.general.map((values, point): Check[] => {
      const [up, dn, uu, , dd, tauUp, tauDn] = generalPoints.rows[point] as number[] as [
        number,
        number,
        number,
        number,
        number,
        number,
        number,
      ];
      const n = up + dn;
      const unit = 0.75 * Math.cbrt((3 * n) / Math.PI);
      const energy = Math.abs(values.eps) + energyFloor * unit;
      const expected = [...values.d_n, ...(values.d_sigma ?? [0, 0, 0]), ...(values.d_tau ?? [0, 0])];
      // The size of a derivative of an energy per volume n·ε that varies on the scale of its argument.
      const naturals = [1, 1, n / (uu + dd), n / (uu + dd), n / (uu + dd), n / (tauUp + tauDn), n / (tauUp + tauDn)];
      return [
        { what: 'eps', expected: values.eps, tolerance: energyTolerance * energy },
        ...expected.map((derivative, column) => ({
          what: `d_${generalPoints.columns[column]}`,
          expected: derivative,
          tolerance:
            derivativeTolerance *
            Math.max(Math.abs(derivative), derivativeFloor * energy * (naturals[column] as number)),
        })),
      ];
    }),
  );
}

/** `atAlphaZero` is an absolute tolerance of F at the points with α = 0. */
export function missesSlice(row: ReferenceRow, evaluated: Evaluated, atAlphaZero = 0): string[] {
  return missesOf(
    evaluated,
    row.slice.map((values, point): Check[] => {
      const [rs, , , alpha] = slicePoints.rows[point] as number[] as [number, number, number, number];
      const size = Math.abs(values.F) + energyFloor;
      return [
        {
          what: 'F',
          expected: values.F,
          tolerance: Math.max(energyTolerance * size, alpha === 0 ? atAlphaZero : 0),
        },
        {
          what: 'dF_drs',
          expected: values.dF_drs,
          tolerance: Math.max(
            errorFactor * values.dF_drs_error,
            derivativeTolerance * Math.max(Math.abs(values.dF_drs), size / rs),
          ),
        },
        {
          what: 'd2F_drs2',
          expected: values.d2F_drs2,
          tolerance: Math.max(
            errorFactor * values.d2F_drs2_error,
            differenceNoise,
            derivativeTolerance * Math.max(Math.abs(values.d2F_drs2), size / rs ** 2),
          ),
        },
      ];
    }),
  );
}

/** A value that misses in double precision is looked at again in high precision before it counts. */
function missesOf(evaluated: Evaluated, checks: readonly (readonly Check[])[]): string[] {
  return checks.flatMap((ofPoint, point) => {
    const missing = (values: (output: number) => number) =>
      ofPoint.flatMap(({ what, expected, tolerance }, output) => {
        const value = values(output);
        if (Math.abs(value - expected) <= tolerance) return [];
        return [`point ${point} ${what}: ${value}, reference ${expected}, tolerance ${tolerance.toExponential(1)}`];
      });
    if (missing((output) => evaluated.float64[output]?.[point] as number).length === 0) return [];
    const exact = evaluated.highPrecision(point);
    return missing((output) => exact[output] as number);
  });
}

/** The largest relative deviation of the energy per particle at the general points. */
export function largestEnergyDeviation(row: ReferenceRow, evaluated: Evaluated): number {
  const deviations = row.general.map(({ eps }, point) =>
    Math.abs(((evaluated.float64[0]?.[point] as number) - eps) / eps),
  );
  return Math.max(...deviations);
}
