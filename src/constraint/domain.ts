import type { Space } from '../definition/constraint.ts';
import type { Axis } from '../search/axis.ts';

/** The region of density space that a condition is tried on. */
export interface Domain {
  readonly name: 'standard' | 'wide' | 'custom';
  readonly axes: Readonly<Record<DomainCoordinate, Axis>>;
}

export const domainCoordinates = ['rs', 'zeta', 's', 'alpha', 'q'] as const;
export type DomainCoordinate = (typeof domainCoordinates)[number];

const axes = (bounds: Record<DomainCoordinate, Omit<Axis, 'name'>>): Domain['axes'] => ({
  rs: { name: 'rs', ...bounds.rs },
  zeta: { name: 'zeta', ...bounds.zeta },
  s: { name: 's', ...bounds.s },
  alpha: { name: 'alpha', ...bounds.alpha },
  q: { name: 'q', ...bounds.q },
});

/** r_s 0.01…100 (log), ζ 0…1, s 0…5, α 0…5, q −5…5; ends included. */
export const standardDomain: Domain = {
  name: 'standard',
  axes: axes({
    rs: { lower: 0.01, upper: 100, scale: 'logarithmic' },
    // The worst points of some functionals lie at ζ 0.95–0.999: the grid closes up towards 1.
    zeta: { lower: 0, upper: 1, scale: 'toward-upper' },
    s: { lower: 0, upper: 5, scale: 'linear' },
    alpha: { lower: 0, upper: 5, scale: 'linear' },
    q: { lower: -5, upper: 5, scale: 'linear' },
  }),
};

/** r_s 10⁻³…10³ (log), ζ 0…1, s 0…100, α 0…10⁹ by the compact coordinate α/(1 + α), q −100…100. */
export const wideDomain: Domain = {
  name: 'wide',
  axes: axes({
    rs: { lower: 1e-3, upper: 1e3, scale: 'logarithmic' },
    zeta: { lower: 0, upper: 1, scale: 'toward-upper' },
    s: { lower: 0, upper: 100, scale: 'compact' },
    alpha: { lower: 0, upper: 1e9, scale: 'compact' },
    q: { lower: -100, upper: 100, scale: 'linear' },
  }),
};

/** The standard domain with other bounds for some coordinates. */
export function customDomain(bounds: ReadonlyMap<DomainCoordinate, readonly [number, number]>): Domain {
  const changed = domainCoordinates.map((name) => {
    const [lower, upper] = bounds.get(name) ?? [standardDomain.axes[name].lower, standardDomain.axes[name].upper];
    const { scale } = standardDomain.axes[name];
    // The grid closes up towards ζ = 1 only where the domain reaches it.
    const suited = name === 'zeta' && upper < 1 ? 'linear' : scale;
    return [name, { lower, upper, scale: suited }] as const;
  });
  return { name: 'custom', axes: axes(Object.fromEntries(changed) as Record<DomainCoordinate, Omit<Axis, 'name'>>) };
}

/** The axes of a space: those of the domain, or the general spin space within the same bounds. */
export function axesOf(domain: Domain, space: Space): readonly Axis[] {
  const { rs, zeta, s, alpha } = domain.axes;
  if (space === 'slice') return domainCoordinates.map((name) => domain.axes[name]);
  return [
    rs,
    { name: 'zeta', lower: -zeta.upper, upper: zeta.upper, scale: 'linear' },
    { ...s, name: 's_up' },
    { ...s, name: 's_dn' },
    { name: 'cosine', lower: -1, upper: 1, scale: 'linear' },
    { ...alpha, name: 'alpha_up' },
    { ...alpha, name: 'alpha_dn' },
  ];
}

/** How many grid values each axis gets when that many axes are swept together. */
export function gridCount(axis: string, sweptTogether: number): number {
  const counts = gridCounts[Math.min(sweptTogether, gridCounts.length) - 1] as Readonly<Record<string, number>>;
  return counts[axis] as number;
}

const gridCounts: readonly Readonly<Record<string, number>>[] = [
  { rs: 2001, zeta: 2001, s: 2001, alpha: 2001, q: 2001 },
  { rs: 401, zeta: 201, s: 401, alpha: 401, q: 401 },
  { rs: 101, zeta: 49, s: 121, alpha: 121, q: 61 },
  { rs: 49, zeta: 25, s: 51, alpha: 51, q: 31 },
  { rs: 33, zeta: 13, s: 33, alpha: 33, q: 21 },
];

/** Values that a grid always holds: joins of piecewise forms and the uniform gas. */
export const pinnedValues: Readonly<Record<string, readonly number[]>> = {
  rs: [1],
  zeta: [0, 1],
  s: [0],
  alpha: [0, 1],
  q: [0],
};

/** Points of the general spin space that are looked at. */
export const sampledPoints = 100_000;
