import type { Domain, DomainCoordinate } from '../constraint/domain.ts';
import type { PictureAxis } from '../finding/margin-map.ts';
import { type Axis, axisValue } from '../search/axis.ts';

/** Which coordinates a picture shows when none are asked for: the first two of these that matter. */
const preference: readonly DomainCoordinate[] = ['s', 'rs', 'alpha', 'zeta', 'q'];

/**
 * The axes of a picture: those asked for, the others chosen from the coordinates that matter. A margin of one
 * coordinate is drawn over another one all the same, which it does not change along.
 */
export function chooseAxes(
  matters: (name: DomainCoordinate) => boolean,
  free: readonly DomainCoordinate[],
  asked: { readonly x?: DomainCoordinate; readonly y?: DomainCoordinate },
): readonly [x: DomainCoordinate, y: DomainCoordinate] | undefined {
  const wanted = preference.filter((name) => name !== asked.x && name !== asked.y && free.includes(name));
  const order = [...wanted.filter(matters), ...wanted.filter((name) => !matters(name))];
  const x = asked.x ?? order.shift();
  const y = asked.y ?? order.shift();
  return x === undefined || y === undefined ? undefined : [x, y];
}

/** The axis as it is drawn: ζ evenly, not closing up towards 1. */
export function drawnAxis(domain: Domain, name: DomainCoordinate): Axis {
  const axis = domain.axes[name];
  return axis.scale === 'toward-upper' ? { ...axis, scale: 'linear' } : axis;
}

/** Evenly spaced on the drawn axis, both ends included. */
export function pictureAxis(axis: Axis, count: number): PictureAxis {
  const values = Array.from({ length: count }, (_, index) => axisValue(axis, index / (count - 1)));
  return { name: axis.name, scale: axis.scale, values };
}
