import type { ConstantName } from './published-constants.ts';

/** A point of the slice at which a black box is asked; a functional without a coordinate ignores it. */
export interface Place {
  readonly rs: number;
  readonly zeta: number;
  readonly s: number;
  readonly alpha: number;
  readonly q: number;
}

/** Energies per particle (hartree) at points: all that is known of a functional, be it a formula or a code. */
export interface BlackBox {
  /** Share of exchange that this is, 1 − a for a global hybrid; 1 if left out. */
  readonly exchangeShare?: number;
  readonly exchange?: (points: readonly Place[]) => ArrayLike<number>;
  readonly correlation?: (points: readonly Place[]) => ArrayLike<number>;
}

/** A constant read off: its values, and by how much they may be wrong. */
export interface Reading {
  readonly constant: ConstantName;
  readonly values: readonly number[];
  readonly error: number;
}

/** ε_x^unif r_s = −(3/4π)(9π/4)^(1/3) */
const gasExchange = (-3 / (4 * Math.PI)) * Math.cbrt((9 * Math.PI) / 4);
const gas: Place = { rs: 1, zeta: 0, s: 0, alpha: 1, q: 0 };
/** So dense that β(r_s) has its limit to 10⁻⁶, not so dense that the terms of H cancel to fewer digits. */
const denseRadius = 1e-5;
/** An error beyond this means that a limit was not reached. */
const largestError = 1e-4;

/** The constants that can be read off at a few points; one whose limit is not reached is left out. */
export function readConstants({ exchange, exchangeShare = 1, correlation }: BlackBox): Reading[] {
  const readings = [
    ...(exchange === undefined ? [] : exchangeReadings(exchange, exchangeShare)),
    ...(correlation === undefined ? [] : correlationReadings(correlation)),
  ];
  return readings.filter(({ values, error }) => values.every(Number.isFinite) && error <= largestError);
}

type Energy = (points: readonly Place[]) => ArrayLike<number>;

function at(energy: Energy, change: Partial<Place>): number {
  return energy([{ ...gas, ...change }])[0] as number;
}

function exchangeReadings(energy: Energy, share: number): Reading[] {
  const factor = (change: Partial<Place>) => at(energy, change) / share / (gasExchange / (change.rs ?? gas.rs));
  const uniform = factor({});
  const inS = limitAtZero((s) => (factor({ s }) - uniform) / s ** 2, [0.04, 0.02, 0.01, 0.005]);
  const inAlpha = limitAtZero(
    (h) => (factor({ alpha: 1 + h }) - factor({ alpha: 1 - h })) / (2 * h),
    [0.04, 0.02, 0.01, 0.005],
  );
  const inLaplacian = limitAtZero((h) => (factor({ q: h }) - factor({ q: -h })) / (2 * h), [0.04, 0.02, 0.01, 0.005]);
  // Integrated by parts, q → p/3 and α − 1 → −(20/27)p.
  const gradient = inS.value + inLaplacian.value / 3 - (20 / 27) * inAlpha.value;
  const [far, farther] = [factor({ s: 1e5 }), factor({ s: 1e7 })];
  return [
    { constant: 'gas-exchange', values: [uniform], error: 1e-15 },
    { constant: 'exchange-gradient', values: [gradient], error: inS.error + inAlpha.error + inLaplacian.error },
    { constant: 'exchange-large-s', values: [farther], error: 100 * Math.abs(far - farther) },
  ];
}

function correlationReadings(energy: Energy): Reading[] {
  const logarithmic = (rs: number) => (at(energy, { rs: rs * 100 }) - at(energy, { rs })) / Math.log(100);
  const [dense, denser] = [logarithmic(1e-18), logarithmic(1e-22)];
  const gasValues = [0, 0.5, 1].map((zeta) => at(energy, { rs: 2, zeta }));
  return [
    { constant: 'gas-correlation', values: gasValues, error: 1e-15 },
    { constant: 'gas-high-density', values: [denser], error: Math.abs(denser - dense) },
    ...gradientReadings(energy),
  ];
}

/** β and γ of (ε_c(t) − ε_c(0)) = β t² − β²/(2γ) t⁴ + …, which γ log(1 + (β/γ)t²(1 + At²)/(1 + At² + A²t⁴)) has. */
function gradientReadings(energy: Energy): Reading[] {
  const gain = (rs: number) => {
    const uniform = at(energy, { rs });
    // t² = (π k_F/4) s² at ζ = 0
    const slope = (Math.PI / 4) * (Math.cbrt((9 * Math.PI) / 4) / rs);
    return (t: number) => (at(energy, { rs, s: t / Math.sqrt(slope) }) - uniform) / t ** 2;
  };
  const beta = limitAtZero(gain(denseRadius), [0.16, 0.08, 0.04, 0.02]);
  const small = gain(gas.rs);
  const leading = limitAtZero(small, [0.1, 0.05, 0.025, 0.0125]);
  const next = limitAtZero((t) => (small(t) - leading.value) / t ** 2, [0.2, 0.1, 0.05, 0.025]);
  const gamma = -(leading.value ** 2) / (2 * next.value);
  const readings: Reading[] = [{ constant: 'correlation-gradient', values: [beta.value], error: beta.error }];
  const error = Math.abs((gamma * next.error) / next.value) + 2 * leading.error;
  return [...readings, { constant: 'pbe-gamma', values: [gamma], error }];
}

/** f(h → 0) of an f that is even in h. The error is what half the steps change: much, where f is not even after all. */
function limitAtZero(f: (step: number) => number, steps: readonly number[]): { value: number; error: number } {
  const value = extrapolated(steps.map(f));
  const closer = extrapolated(steps.map((step) => f(step / 2)));
  return { value, error: Math.abs(closer - value) };
}

/** Richardson extrapolation in h² of values at steps that halve. */
function extrapolated(values: readonly number[]): number {
  let column = values;
  for (let order = 1; column.length > 1; order += 1) {
    const weight = 4 ** order;
    column = column.slice(1).map((value, index) => (weight * value - (column[index] as number)) / (weight - 1));
  }
  return column[0] as number;
}
