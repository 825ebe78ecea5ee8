import type { Functional } from '../../src/functional/functional.ts';
import { instantiate } from '../../src/functional/instance.ts';
import { slicePlace } from '../../src/functional/place.ts';
import { variable } from '../../src/graph/build.ts';
import { Graph } from '../../src/graph/graph.ts';
import { evaluateDecimal } from '../../src/kernel/decimal.ts';
import { Decimal } from '../../src/number/decimal.ts';
import { openShelf } from '../../src/shelf/shelf.ts';

export const shelf = openShelf({ functionals: ['functionals'], constraints: [] });

/** A functional of the project's own shelf; throws its problems. */
export function onShelf(id: string): Functional {
  const outcome = shelf.functional(id);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problems, null, 1));
  return outcome.value;
}

interface Coordinates {
  readonly rs: Decimal.Value;
  readonly zeta?: Decimal.Value;
  readonly s?: Decimal.Value;
  readonly alpha?: Decimal.Value;
}

/** Energy per particle and enhancement of a part at (r_s, ζ, s, α), to 60 digits. */
export function atSlice(
  functional: Functional,
  part: 'exchange' | 'correlation',
  { rs, zeta = 0, s = 0, alpha = 1 }: Coordinates,
): { energy: Decimal; enhancement: Decimal } {
  const graph = new Graph();
  const coordinates = { rs, zeta, s, alpha };
  const [rsNode, zetaNode, sNode, alphaNode] = Object.keys(coordinates).map((name) => variable(graph, name));
  const place = slicePlace(graph, {
    rs: rsNode as number,
    zeta: zetaNode as number,
    s: sNode as number,
    alpha: alphaNode as number,
  });
  const energies = instantiate(graph, functional).part(part, place);
  if (energies === undefined) throw new RangeError(`${functional.definition.id} has no ${part}`);
  const bindings = new Map(Object.entries(coordinates).map(([name, value]) => [name, new Decimal(value)]));
  const [energy, enhancement] = evaluateDecimal(graph, [energies.perParticle, energies.enhancement], bindings, 60);
  return { energy: energy as Decimal, enhancement: enhancement as Decimal };
}
