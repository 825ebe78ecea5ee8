import type { Problem } from '../errors/problem.ts';

type Point = Readonly<Record<string, string>>;

/** What a coordinate must be for a formula to mean anything there. */
const limits: Readonly<Record<string, { readonly words: string; readonly holds: (value: number) => boolean }>> = {
  rs: { words: 'above 0', holds: (value) => value > 0 },
  zeta: { words: 'from -1 to 1', holds: (value) => value >= -1 && value <= 1 },
  s: { words: '0 or more', holds: (value) => value >= 0 },
  alpha: { words: '0 or more', holds: (value) => value >= 0 },
  n_up: { words: '0 or more', holds: (value) => value >= 0 },
  n_dn: { words: '0 or more', holds: (value) => value >= 0 },
  sigma_uu: { words: '0 or more', holds: (value) => value >= 0 },
  sigma_dd: { words: '0 or more', holds: (value) => value >= 0 },
  tau_up: { words: '0 or more', holds: (value) => value >= 0 },
  tau_dn: { words: '0 or more', holds: (value) => value >= 0 },
};

/** Problems of a point outside the limits of its coordinates. `place` is where it was given. */
export function limitProblems(point: Point, place: Pick<Problem, 'file' | 'line'>): Problem[] {
  const problems = Object.entries(point).flatMap(([name, text]): Problem[] => {
    const limit = limits[name];
    if (limit === undefined || limit.holds(Number(text))) return [];
    return [
      { code: 'wrong-points', ...place, message: `${name} is ${text}`, remedy: `Give a value that is ${limit.words}.` },
    ];
  });
  const isEmpty = 'n_up' in point && Number(point.n_up) === 0 && Number(point.n_dn) === 0;
  if (!isEmpty) return problems;
  const remedy = 'Give a density in at least one spin channel.';
  return [...problems, { code: 'wrong-points', ...place, message: 'the density is zero', remedy }];
}

/** Relative allowance for the rounding of input at an exact limit. */
const rounding = 1e-9;

/** Whether no density can have the point: τ_σ below τ_Wσ = σ_σσ/(8n_σ), or |σ_ud| above √(σ_uu σ_dd). */
export function isInadmissible(point: Point): boolean {
  const value = (name: string) => Number(point[name] ?? Number.NaN);
  const below = (spin: 'up' | 'dn', gradient: string) => {
    const density = value(`n_${spin}`);
    const least = density === 0 ? 0 : value(gradient) / (8 * density);
    return value(`tau_${spin}`) < least * (1 - rounding);
  };
  const widest = Math.sqrt(value('sigma_uu') * value('sigma_dd')) * (1 + rounding);
  return below('up', 'sigma_uu') || below('dn', 'sigma_dd') || Math.abs(value('sigma_ud')) > widest;
}
