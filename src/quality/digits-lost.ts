import { differentiate } from '../derivative/differentiate.ts';
import type { SliceName } from '../functional/variable-place.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { compileKernel } from '../kernel/float64.ts';
import { exactDecimal } from '../number/decimal.ts';
import type { Axis } from '../search/axis.ts';
import { samplePoints } from '../search/sample.ts';
import { sliceEnergies } from './energies.ts';
import type { Derivative } from './partials.ts';
import type { Rule, SlicePoint } from './rule.ts';
import { derivativeWords, pointWords, shown } from './words.ts';

/** Where round-off is looked for: the standard domain, with its ends left out by a little. */
const axes: Readonly<Record<SliceName, Axis>> = {
  rs: { name: 'rs', lower: 0.01, upper: 100, scale: 'logarithmic' },
  zeta: { name: 'zeta', lower: 0.001, upper: 0.9999, scale: 'toward-upper' },
  s: { name: 's', lower: 0.001, upper: 5, scale: 'linear' },
  alpha: { name: 'alpha', lower: 0.001, upper: 5, scale: 'linear' },
  q: { name: 'q', lower: -5, upper: 5, scale: 'linear' },
};
const sampled = 3000;
/** Rounds of the local search around the noisiest point, each with this many points, ten times closer. */
const rounds = 3;
const pointsInRound = 100;

const digits = 40;
/** Half a unit in the last place of 1, the error of one operation. */
const unitRoundOff = 2 ** -53;
/** Errors count relative to the value, or to this where the value is smaller: it adds to energies of size 1. */
const least = 1e-3;
/** Points in a row, this far apart relative to their coordinates: the third difference of a smooth f vanishes there. */
const spacing = 1e-8;

type Point = readonly number[];

/**
 * The decimal digits that double precision loses in F_x, F_c and their first derivatives: log₁₀ of the error in units
 * of 2⁻⁵³. The noisiest point of each, found by third differences over close points and a local search, is compared
 * with high precision. Violated where more digits are lost than the threshold.
 */
export const digitsLost: Rule = ({ functional, parameters, threshold }) => {
  const { graph, energies, variables } = sliceEnergies(functional, parameters);
  const quantities = energies.flatMap(({ symbol, node }): Derivative[] => [
    { symbol, node, by: [] },
    ...variables.map((name) => ({ symbol, node: differentiate(graph, node, name), by: [name] })),
  ]);
  const outputs = quantities.map(({ node }) => node);
  const own = variables.map((name) => axes[name]);
  if (own.length === 0) {
    const reason = 'the energy over that of the uniform gas is a constant';
    return { verdict: 'holds', reason, margin: null, witness: null, points: 0 };
  }
  const kernel = compileKernel(graph, outputs, [{ variables }]);
  const evaluate = (points: readonly Point[]) => {
    const columns = own.map((_, axis) => Float64Array.from(points, (point) => point[axis] as number));
    const results = outputs.map(() => new Float64Array(points.length));
    kernel.evaluate([columns], results);
    return results;
  };
  const start = samplePoints(own, { count: sampled, edgeShare: 0 }).next().value as {
    coordinates: readonly Float64Array[];
  };
  const sample = Array.from({ length: sampled }, (_, index) =>
    start.coordinates.map((values) => values[index] as number),
  );
  const noisiest = noisiestPoints(evaluate, sample, own);
  const worst = noisiest
    .map((point, index) => {
      // The binary values themselves, so that rounding of the input does not count.
      const bindings = new Map(variables.map((name, axis) => [name, exactDecimal(point[axis] as number)]));
      const [exact] = evaluateDecimal(graph, [outputs[index] as number], bindings, digits);
      const found = (evaluate([point])[index] as Float64Array)[0] as number;
      const value = exact?.toNumber() ?? Number.NaN;
      const error = exact?.minus(found).abs().toNumber() ?? Number.NaN;
      const relative = error / Math.max(Math.abs(value), least);
      return {
        quantity: quantities[index] as Derivative,
        point,
        lost: Math.max(0, Math.log10(relative / unitRoundOff)),
      };
    })
    .filter(({ lost }) => Number.isFinite(lost));
  const [first] = [...worst].sort((a, b) => b.lost - a.lost);
  if (first === undefined) {
    return { verdict: 'undecided', reason: 'no point has a value', margin: null, witness: null, points: sampled };
  }
  const witness = Object.fromEntries(variables.map((name, axis) => [name, first.point[axis]])) as SlicePoint;
  const values = worst.filter(({ quantity }) => quantity.by.length === 0);
  const ofValues = values.map(({ quantity, lost }) => `${shown(lost, 2)} in ${quantity.symbol}`).join(' and ');
  return {
    verdict: first.lost <= threshold ? 'holds' : 'violated',
    reason: `double precision loses at most ${ofValues} of its 16 digits; most of all ${shown(first.lost, 2)} in ${derivativeWords(first.quantity)}, at ${pointWords(witness)}`,
    margin: threshold - first.lost,
    witness,
    points: sampled + rounds * pointsInRound * outputs.length,
  };
};

type Evaluate = (points: readonly Point[]) => Float64Array[];

/** For each output the point of the sample with most noise, refined by a search around it. */
function noisiestPoints(evaluate: Evaluate, sample: readonly Point[], own: readonly Axis[]): Point[] {
  const noises = noiseOf(evaluate, sample);
  return noises.map((noise, output) => {
    let best = largest(noise);
    let at = sample[best] as Point;
    let size = noise[best] as number;
    for (let round = 1; round <= rounds; round += 1) {
      const near = pointsAround(at, own, 10 ** -round);
      const found = noiseOf(evaluate, near)[output] as Float64Array;
      best = largest(found);
      if ((found[best] as number) > size) [at, size] = [near[best] as Point, found[best] as number];
    }
    return at;
  });
}

/** |f₀ − 3f₁ + 3f₂ − f₃|/√20 of points in a row, relative: the error of one value when the errors are independent. */
function noiseOf(evaluate: Evaluate, points: readonly Point[]): Float64Array[] {
  // Steps go down, so that ζ stays below its end.
  const shifted = [0, 1, 2, 3].map((step) =>
    evaluate(points.map((point) => point.map((value) => value * (1 - step * spacing)))),
  );
  return (shifted[0] as Float64Array[]).map((values, output) => {
    const [, second, third, fourth] = shifted.map((results) => results[output] as Float64Array) as [
      Float64Array,
      Float64Array,
      Float64Array,
      Float64Array,
    ];
    return values.map((value, index) => {
      const middle = 3 * ((third[index] as number) - (second[index] as number));
      const difference = value + middle - (fourth[index] as number);
      const noise = Math.abs(difference) / Math.sqrt(20) / Math.max(Math.abs(value), least);
      return Number.isFinite(noise) ? noise : 0;
    });
  });
}

/** Points around one, spread by a share of each axis, the same on every run. */
function pointsAround(centre: Point, own: readonly Axis[], share: number): Point[] {
  const spread = samplePoints(
    own.map(({ name }) => ({ name, lower: -1, upper: 1, scale: 'linear' })),
    { count: pointsInRound, edgeShare: 0 },
  ).next().value as { coordinates: readonly Float64Array[] };
  return Array.from({ length: pointsInRound }, (_, index) =>
    centre.map((value, axis) => {
      const { lower, upper, scale } = own[axis] as Axis;
      const shift = share * ((spread.coordinates[axis] as Float64Array)[index] as number);
      const moved =
        scale === 'logarithmic' ? value * Math.exp(shift * Math.log(upper / lower)) : value + shift * (upper - lower);
      return Math.min(upper, Math.max(lower, moved));
    }),
  );
}

function largest(values: Float64Array): number {
  return values.reduce((best, value, index) => (value > (values[best] as number) ? index : best), 0);
}
