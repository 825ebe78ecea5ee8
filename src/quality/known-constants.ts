import { energiesAt } from '../evaluate/energies.ts';
import type { Functional } from '../functional/functional.ts';
import { exactExchangeShares, instantiate } from '../functional/instance.ts';
import { sliceNames, variableSlice } from '../functional/variable-place.ts';
import { constant } from '../graph/build.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import type { Rational } from '../number/rational.ts';
import { atPoints } from './at-points.ts';
import { type ConstantName, type PublishedConstant, publishedConstants } from './published-constants.ts';
import { type BlackBox, type Reading, readConstants } from './read-constants.ts';
import type { Rule } from './rule.ts';
import { shown } from './words.ts';

/** Published variants differ by more than this, relative; what is read off a formula has smaller errors. */
const sameWithin = 1e-7;
/** Beyond this relative distance a published value is not worth naming. */
const stillNear = 0.01;
/** Gradient and logarithmic coefficients below this are none. */
const negligible = 5e-5;
/** What γ must be near to in order to be one. */
const gammaNear = 1e-4;

const symbols: Readonly<Record<ConstantName, string>> = {
  'gas-exchange': 'F_x of the gas',
  'exchange-gradient': 'μ',
  'exchange-large-s': 'F_x(s → ∞)',
  'correlation-gradient': 'β(r_s → 0)',
  'pbe-gamma': 'γ',
  'gas-high-density': 'c₀',
  'gas-correlation': 'ε_c of the gas',
};

/** A constant that was read, and the published variant nearest to it. */
export interface NamedReading extends Reading {
  readonly nearest: PublishedConstant;
  /** The largest relative difference of a value. */
  readonly distance: number;
  readonly isIt: boolean;
}

/** Which published constants a functional carries, read off at a few points; it reports and does not judge. */
export const knownConstants: Rule = ({ functional, parameters }) => {
  const readings = nameConstants(blackBoxOf(functional, parameters));
  return {
    verdict: 'holds',
    reason: readings.map(readingWords).join('; '),
    margin: null,
    witness: null,
    points: readings.length,
  };
};

/** The constants of a black box with the nearest published variant of each. */
export function nameConstants(box: BlackBox): NamedReading[] {
  return readConstants(box).flatMap((reading): NamedReading[] => {
    const ranked = publishedConstants[reading.constant]
      .map((nearest) => ({ nearest, distance: distanceTo(reading.values, nearest.values) }))
      .sort((a, b) => a.distance - b.distance);
    const [best] = ranked as [(typeof ranked)[0]];
    const isIt = best.distance <= Math.max(sameWithin, 10 * reading.error);
    // γ has a meaning in forms like that of PBE alone.
    if (reading.constant === 'pbe-gamma' && !(best.distance <= gammaNear)) return [];
    return [{ ...reading, ...best, isIt }];
  });
}

/** The largest relative difference; a published zero is met by what is zero but for errors, or not at all. */
function distanceTo(values: readonly number[], published: readonly number[]): number {
  const differences = values.map((value, index) => {
    const expected = published[index] as number;
    if (expected === 0) return Math.abs(value) <= negligible ? 0 : Number.POSITIVE_INFINITY;
    return Math.abs(value / expected - 1);
  });
  return Math.max(...differences);
}

function readingWords({ constant: name, values, nearest, distance, isIt }: NamedReading): string {
  const isNone = isIt && nearest.values.every((expected) => expected === 0);
  const value = values.length === 1 && !isNone ? ` = ${shown(values[0] as number, 8)}` : '';
  const symbol = `${symbols[name]}${value}`;
  if (isIt) return `${symbol}: ${nearest.name}`;
  if (!(distance <= stillNear)) return `${symbol}: no published value near`;
  return `${symbol}: nearest is ${nearest.name}, ${shown(distance, 2)} away`;
}

function blackBoxOf(functional: Functional, parameters: ReadonlyMap<string, Rational>): BlackBox {
  const graph = new Graph();
  const changed = new Map([...parameters].map(([name, value]) => [name, constant(graph, value)]));
  const instance = instantiate(graph, functional, { parameters: changed });
  const { x, c } = energiesAt(instance, variableSlice(graph), 'perParticle');
  const { exactExchange } = functional;
  const exact = exactExchange?.kind === 'global' ? exactExchangeShares(instance).longRange : undefined;
  const share = exact === undefined ? 1 : 1 - (evaluateDecimal(graph, [exact], new Map(), 30)[0]?.toNumber() ?? 0);
  return {
    ...(share > 0 && { exchangeShare: share }),
    ...(x !== undefined && { exchange: energyFunction(graph, x) }),
    ...(c !== undefined && { correlation: energyFunction(graph, c) }),
  };
}

function energyFunction(graph: Graph, node: NodeId): NonNullable<BlackBox['exchange']> {
  const evaluate = atPoints(graph, [node], sliceNames);
  return (points) => evaluate(points.map((point) => ({ ...point })))[0] as Float64Array;
}
