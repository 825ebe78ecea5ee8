import type { Condition } from '../constraint/condition.ts';
import type { Domain, DomainCoordinate } from '../constraint/domain.ts';
import type { Functional } from '../functional/functional.ts';
import { parseDecimal, type Rational, rationalText, toNumber } from '../number/rational.ts';

export interface MappedFunctional {
  readonly functional: Functional;
  /** Trial values of parameters. */
  readonly parameters: ReadonlyMap<string, Rational>;
}

export interface MapRequest {
  readonly functionals: readonly MappedFunctional[];
  readonly condition: Condition;
  readonly domain: Domain;
  readonly constants: ReadonlyMap<string, Rational>;
  /** The coordinates of the picture; undefined for those that suit the condition best. */
  readonly x?: DomainCoordinate;
  readonly y?: DomainCoordinate;
  /** One panel each: coordinates held fixed. Coordinates that are not named are at their worst. */
  readonly slices: readonly ReadonlyMap<DomainCoordinate, number>[];
  /** Cells along each axis. */
  readonly cells: number;
}

/** Trial values as a reader would write them: decimal where that is exact, else a fraction. */
export function parameterTexts(parameters: ReadonlyMap<string, Rational>): Record<string, string> {
  return Object.fromEntries(
    [...parameters].map(([name, value]) => {
      const decimal = String(toNumber(value));
      return [name, parseDecimal(decimal)?.equals(value) === true ? decimal : rationalText(value)];
    }),
  );
}
