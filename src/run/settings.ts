import { constantValues } from '../constraint/constants.ts';
import type { Settings } from '../constraint/decide.ts';
import type { Domain } from '../constraint/domain.ts';
import { parseDecimal, type Rational } from '../number/rational.ts';

/** The settings of a run as plain data, which goes to worker threads and into the keys of the cache. */
export interface RunSettings {
  readonly domain: Domain;
  /** Chosen values of constants: decimals or quotients of decimals. */
  readonly constants: Readonly<Record<string, string>>;
  /** Trial values of parameters, likewise. */
  readonly parameters: Readonly<Record<string, string>>;
  /** Other tolerances of conditions, by id. */
  readonly tolerances: Readonly<Record<string, number>>;
  /** Boxes to spend on the proof of each condition; without it nothing is proved. */
  readonly proofBoxes?: number;
}

export function settingsOf({ domain, constants, parameters }: RunSettings): Settings {
  return { domain, constants: constantValues(exactValues(constants)), parameters: exactValues(parameters) };
}

function exactValues(texts: Readonly<Record<string, string>>): Map<string, Rational> {
  return new Map(
    Object.entries(texts).map(([name, text]) => {
      const [top = '', bottom = '1'] = text.split('/');
      return [name, parseOrThrow(top).div(parseOrThrow(bottom))];
    }),
  );
}

function parseOrThrow(text: string): Rational {
  const value = parseDecimal(text);
  if (value === undefined) throw new RangeError(`not a decimal: ${text}`);
  return value;
}
