import { decimalContext } from '../number/decimal.ts';
import { type Path, pathDigits } from './approach.ts';
import type { SlicePoint } from './rule.ts';
import { pointWords } from './words.ts';

/** A point of the closed domain at which derivatives are asked for. */
export interface Edge {
  readonly words: string;
  readonly point: Readonly<Record<string, number>>;
  /** The same place on the slice. */
  readonly slice: SlicePoint;
  /** Ways to it from inside; a point that lies inside has none. */
  readonly paths: readonly Path[];
  /** Derivatives that do not exist here for any functional built on the uniform gas. */
  readonly isExempt: (by: readonly string[]) => boolean;
  /** Why a divergence here weighs less than its place suggests. */
  readonly mildBecause?: string;
}

/** A place inside the domain, in no way special. */
export const insidePlace = { rs: 1, zeta: 0.3, s: 0.7, alpha: 0.6, q: 0.3 } as const;
type Coordinate = keyof typeof insidePlace;
type Changes = Partial<Record<Coordinate, number>>;

/** n = 10⁻³⁰ bohr⁻³ */
const lowDensityRadius = 6.2e9;

/** Coordinates at an end of the domain, and the direction that leads inside. */
const ends: readonly { readonly at: Changes; readonly inside: Changes }[] = [
  { at: { s: 0 }, inside: { s: 1 } },
  { at: { alpha: 0 }, inside: { alpha: 1 } },
  { at: { s: 0, alpha: 0 }, inside: { s: 1, alpha: 1 } },
  { at: { s: 0, alpha: 1 }, inside: { s: 1 } },
  { at: { zeta: 1 }, inside: { zeta: -1 } },
  { at: { zeta: -1 }, inside: { zeta: 1 } },
  { at: { zeta: 1, s: 0 }, inside: { zeta: -1, s: 1 } },
  { at: { zeta: 1, alpha: 0 }, inside: { zeta: -1, alpha: 1 } },
];

const interior: readonly Changes[] = [
  { alpha: 1 },
  { alpha: 1 + 1e-9 },
  { alpha: 1 - 1e-9 },
  { alpha: 1e6 },
  { zeta: 0 },
  ...[3, 6, 9, 12, 15].map((k) => ({ zeta: 1 - 10 ** -k })),
  { s: 1e3 },
  { s: 1e6 },
  { rs: 1e-4 },
  { rs: lowDensityRadius },
  { rs: lowDensityRadius, s: 1e3 },
];

/**
 * Edges of the slice in the coordinates that a functional has: no gradient, one spin channel, α = 0, around α = 1,
 * low density and rapid variation. At ζ = ±1 derivatives of second order that involve ζ are not asked for: the
 * (1 − ζ)^(4/3) of the uniform gas has none.
 */
export function sliceEdges(variables: readonly string[]): Edge[] {
  const base = Object.fromEntries(variables.map((name) => [name, insidePlace[name as Coordinate]]));
  const has = (changes: Changes) => Object.keys(changes).every((name) => variables.includes(name));
  const atEnds = ends
    .filter(({ at }) => has(at))
    .map(({ at, inside }): Edge => {
      const point = { ...base, ...at };
      const oneChannel = at.zeta !== undefined;
      return {
        words: pointWords(at),
        point,
        slice: point,
        paths: pathsFrom(point, inside),
        isExempt: (by) => oneChannel && by.length === 2 && by.includes('zeta'),
        ...(oneChannel && {
          mildBecause: 'only where a spin channel is empty: the potential that diverges is that of no electron',
        }),
      };
    });
  const within = interior.filter(has).map((at): Edge => {
    const point = { ...base, ...at };
    return { words: pointWords(at), point, slice: point, paths: [], isExempt: () => false };
  });
  const isMild = ({ mildBecause }: Edge) => mildBecause !== undefined;
  return [...atEnds.filter((edge) => !isMild(edge)), ...within, ...atEnds.filter(isMild)];
}

/** Powers of the distance by which two coordinates leave their ends. */
const pacings = [
  [1, 1],
  [1, 2],
  [2, 1],
];

/** Where several coordinates end at once, they are left at the same pace and each one faster than the others. */
function pathsFrom(point: Readonly<Record<string, number>>, inside: Changes): Path[] {
  const context = decimalContext(pathDigits);
  const moved = Object.entries(inside);
  return (moved.length === 1 ? [[1]] : pacings).map(
    (powers): Path =>
      (distance) => {
        const place = new Map(Object.entries(point).map(([name, value]) => [name, context.from(value)]));
        moved.forEach(([name, direction], index) => {
          const step = distance.pow(powers[index] as number).times(direction);
          place.set(name, context.from(point[name] as number).plus(step));
        });
        return place;
      },
  );
}
