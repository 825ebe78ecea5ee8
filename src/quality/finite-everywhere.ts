import type { Graph } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { decimalContext } from '../number/decimal.ts';
import { type Path, pathDigits, type Tendency, tendencies } from './approach.ts';
import { atPoints } from './at-points.ts';
import { densityEdges } from './density-edges.ts';
import { type Edge, sliceEdges } from './edges.ts';
import { densityEnergies, type EnergyGraph, sliceEnergies } from './energies.ts';
import { type Derivative, derivativesToSecondOrder } from './partials.ts';
import type { Rule, SlicePoint } from './rule.ts';
import { derivativeWords, shown } from './words.ts';

/** Distances from an edge at which double precision looks for growth. */
const lookedAt = ['1e-3', '1e-6', '1e-9', '1e-12'];
/** Digits in which a point inside is tried that has no value in double precision. */
const pointDigits = 50;

/** A derivative that has no value at an edge, and why. */
interface Fault {
  readonly derivative: Derivative;
  readonly edge: Edge;
  readonly words: string;
}

interface Looked {
  readonly faults: readonly Fault[];
  /** Values that double precision cannot give though they exist: as a limit, or as a number. */
  readonly removable: number;
  readonly doubleOnly: number;
  readonly values: number;
}

/**
 * F_x and F_c, and the energies per volume by the densities, gradients and kinetic-energy densities, with all their
 * derivatives to second order on the edges of the domain. A value that double precision misses is not a fault when
 * high precision has it or a limit from inside exists.
 */
export const finiteEverywhere: Rule = ({ functional, parameters }) => {
  const slice = sliceEnergies(functional, parameters);
  const density = densityEnergies(functional, parameters);
  const looked = [look(slice, sliceEdges(slice.variables)), look(density, densityEdges(density.variables))];
  const faults = looked.flatMap((space) => space.faults).sort(byWeight);
  const sum = (count: (space: Looked) => number) => looked.reduce((total, space) => total + count(space), 0);
  const missed = missedWords(
    sum(({ removable }) => removable),
    sum(({ doubleOnly }) => doubleOnly),
  );
  const values = sum((space) => space.values);
  const [worst] = faults;
  if (worst === undefined) {
    return {
      verdict: 'holds',
      reason: `all ${values} values and derivatives to second order on the edges are finite${missed}`,
      margin: null,
      witness: null,
      points: values,
    };
  }
  const named = derivativeWords(worst.derivative);
  const others = [...new Set(faults.map(({ derivative }) => derivativeWords(derivative)))].filter(
    (one) => one !== named,
  );
  const also =
    others.length === 0 ? '' : `; also ${others.slice(0, 4).join(', ')}${others.length > 4 ? ' and more' : ''}`;
  return {
    verdict: 'violated',
    reason: `${worst.words} at ${worst.edge.words}${also}${missed}`,
    margin: null,
    witness: worst.edge.slice,
    points: values,
    ...(worst.edge.mildBecause !== undefined && { mildBecause: worst.edge.mildBecause }),
  };
};

function missedWords(removable: number, doubleOnly: number): string {
  const parts = [
    ...(removable > 0 ? [`${existWords(removable)} as limits only`] : []),
    ...(doubleOnly > 0 ? [`${existWords(doubleOnly)} in high precision but not in double precision`] : []),
  ];
  return parts.length === 0 ? '' : `; of the finite ones ${parts.join(' and ')}`;
}

function existWords(count: number): string {
  return count === 1 ? '1 exists' : `${count} exist`;
}

/** Faults where electrons are come first, then those of low order. */
function byWeight(a: Fault, b: Fault): number {
  const weight = ({ edge: { mildBecause, slice } }: Fault) => (mildBecause === undefined && !isFar(slice) ? 0 : 1);
  return weight(a) - weight(b) || a.derivative.by.length - b.derivative.by.length;
}

/** Beyond where the densities of atoms, molecules and solids mostly are. */
function isFar({ rs = 1, s = 0, alpha = 1 }: SlicePoint): boolean {
  return rs < 0.02 || rs > 10 || s > 3 || alpha > 4;
}

function look<Name extends string>({ graph, energies, variables }: EnergyGraph<Name>, edges: readonly Edge[]): Looked {
  const derivatives = derivativesToSecondOrder(graph, energies, variables);
  const evaluate = atPoints(
    graph,
    derivatives.map(({ node }) => node),
    variables,
  );
  const values = evaluate(edges.map(({ point }) => point));
  const growth = edges.map(({ paths }) => paths.map((path) => evaluate(lookedAt.map((step) => numbersOn(path, step)))));
  const faults: Fault[] = [];
  let removable = 0;
  let doubleOnly = 0;
  edges.forEach((edge, row) => {
    const asked = derivatives.flatMap((derivative, index) => {
      const missing = !Number.isFinite(values[index]?.[row]);
      const rising = (growth[row] ?? []).some((steps) => grows(steps[index] as Float64Array));
      return (missing || rising) && !edge.isExempt(derivative.by) ? [{ derivative, missing }] : [];
    });
    // Where an energy has no value its derivatives have none either; and one place of a fault is enough, the mild last.
    for (const order of [0, 1, 2]) {
      const faulty = new Set(faults.filter((fault) => fault.edge === edge).map(({ derivative }) => derivative.symbol));
      const doubted = asked.filter(
        ({ derivative }) =>
          derivative.by.length === order &&
          !faulty.has(derivative.symbol) &&
          !faults.some((one) => one.derivative === derivative),
      );
      const found = examine(
        graph,
        doubted.map(({ derivative }) => derivative),
        edge,
      );
      doubted.forEach(({ missing }, index) => {
        const fault = found[index];
        if (fault !== undefined) faults.push(fault);
        else if (missing && edge.paths.length === 0) doubleOnly += 1;
        else if (missing) removable += 1;
      });
    }
  });
  return { faults, removable, doubleOnly, values: edges.length * derivatives.length };
}

/** What high precision says of derivatives at an edge: the fault of each, or undefined where there is none. */
function examine(graph: Graph, derivatives: readonly Derivative[], edge: Edge): (Fault | undefined)[] {
  if (derivatives.length === 0) return [];
  const nodes = derivatives.map(({ node }) => node);
  if (edge.paths.length > 0) {
    const ways = edge.paths.map((path) => tendencies(graph, nodes, path));
    return derivatives.map((derivative, index) =>
      faultOf(
        derivative,
        edge,
        ways.map((way) => way[index] as Tendency),
      ),
    );
  }
  const exists = existsAt(graph, nodes, edge.point);
  return derivatives.map((derivative, index) =>
    exists[index] ? undefined : { derivative, edge, words: `${derivativeWords(derivative)} has no value` },
  );
}

function numbersOn(path: Path, distance: string): Record<string, number> {
  const place = path(decimalContext(pathDigits).from(distance));
  return Object.fromEntries([...place].map(([name, value]) => [name, value.toNumber()]));
}

/** Whether values on the way to an edge keep growing, or are lost. */
function grows(values: Float64Array): boolean {
  const [, second, third, fourth] = [...values].map(Math.abs) as [number, number, number, number];
  if (!Number.isFinite(fourth)) return true;
  return third > 1.1 * second && fourth > 1.1 * third && fourth > 1e-3;
}

function existsAt(graph: Graph, nodes: readonly number[], point: Readonly<Record<string, number>>): boolean[] {
  const context = decimalContext(pointDigits);
  const bindings = new Map(Object.entries(point).map(([name, value]) => [name, context.from(value)]));
  return evaluateDecimal(graph, nodes, bindings, pointDigits).map((value) => value.isFinite());
}

function faultOf(derivative: Derivative, edge: Edge, ways: readonly Tendency[]): Fault | undefined {
  const words = derivativeWords(derivative);
  const diverging = ways.find((way) => way.kind === 'diverges');
  if (diverging?.kind === 'diverges') {
    const how = diverging.power === 0 ? 'a logarithm' : `the power −${powerWords(diverging.power)}`;
    return { derivative, edge, words: `${words} grows without bound, as ${how} of the distance,` };
  }
  const values = ways.flatMap((way) => ('value' in way ? [way.value] : []));
  if (values.length < ways.length) return { derivative, edge, words: `${words} has no value, nor any close by,` };
  const [least, most] = [Math.min(...values), Math.max(...values)];
  if (most - least <= 1e-2 * Math.max(1, Math.abs(most))) return undefined;
  return {
    derivative,
    edge,
    words: `${words} has no limit (${shown(least)} to ${shown(most)}, by the way it is approached)`,
  };
}

/** A power as the small fraction that it is close to. */
function powerWords(power: number): string {
  for (const below of [1, 2, 3, 4, 6]) {
    const above = Math.round(power * below);
    if (Math.abs(power - above / below) < 0.02) return below === 1 ? String(above) : `${above}/${below}`;
  }
  return shown(power, 2);
}
