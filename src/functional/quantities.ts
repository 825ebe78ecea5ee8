import type { Rung } from '../definition/functional.ts';

/**
 * The names that a formula may use for the density at a point (Hartree atomic units), with the lowest
 * rung that may use each. Definitions: README, "Quantities".
 */
const rungs: readonly Rung[] = ['lda', 'gga', 'meta-gga'];

export const totalQuantities = {
  n: 'lda',
  rs: 'lda',
  zeta: 'lda',
  kF: 'lda',
  ks: 'lda',
  phi: 'lda',
  epsx_unif: 'lda',
  s: 'gga',
  p: 'gga',
  t: 'gga',
  sigma: 'gga',
  tauW: 'gga',
  tau: 'meta-gga',
  tauUnif: 'meta-gga',
  alpha: 'meta-gga',
  q: 'meta-gga',
} as const satisfies Record<string, Rung>;

export const channelQuantities = {
  n: 'lda',
  rs: 'lda',
  s: 'gga',
  p: 'gga',
  x: 'gga',
  x2: 'gga',
  sigma: 'gga',
  tauW: 'gga',
  tau: 'meta-gga',
  tauUnif: 'meta-gga',
  alpha: 'meta-gga',
  q: 'meta-gga',
} as const satisfies Record<string, Rung>;

export type TotalQuantity = keyof typeof totalQuantities;
export type ChannelQuantity = keyof typeof channelQuantities;
export type Channel = 'up' | 'dn';

export type QuantityName =
  | { readonly scope: 'total'; readonly quantity: TotalQuantity }
  | { readonly scope: 'channel'; readonly quantity: ChannelQuantity; readonly suffix: 'up' | 'dn' | 'sigma' | 'other' };

/** What a name means as a quantity, or undefined when it is none. */
export function quantityOf(name: string): QuantityName | undefined {
  if (Object.hasOwn(totalQuantities, name)) return { scope: 'total', quantity: name as TotalQuantity };
  const match = /^([a-zA-Z0-9]+)_(up|dn|sigma|other)$/.exec(name);
  if (match === null || !Object.hasOwn(channelQuantities, match[1] as string)) return undefined;
  return {
    scope: 'channel',
    quantity: match[1] as ChannelQuantity,
    suffix: match[2] as 'up' | 'dn' | 'sigma' | 'other',
  };
}

/** The lowest rung whose functionals may use a quantity. */
export function rungOf(name: QuantityName): Rung {
  return name.scope === 'total' ? totalQuantities[name.quantity] : channelQuantities[name.quantity];
}

export function isAbove(rung: Rung, limit: Rung): boolean {
  return rungs.indexOf(rung) > rungs.indexOf(limit);
}

/** Every name that stands for a quantity, for "did you mean". */
export function quantityNames(): string[] {
  const perChannel = Object.keys(channelQuantities).flatMap((name) =>
    ['up', 'dn', 'sigma', 'other'].map((suffix) => `${name}_${suffix}`),
  );
  return [...Object.keys(totalQuantities), ...perChannel];
}
