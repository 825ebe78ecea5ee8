import type { Graph } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { compileKernel } from '../kernel/float64.ts';
import { decimalContext } from '../number/decimal.ts';
import { type Path, type Tendency, tendencies } from './approach.ts';
import { densityEdges } from './density-edges.ts';
import { type Edge, sliceEdges } from './edges.ts';
import { densityEnergies, type EnergyGraph, sliceEnergies } from './energies.ts';
import { type Derivative, derivativesToSecondOrder } from './partials.ts';
import type { Rule } from './rule.ts';
import { derivativeWords, pointWords, shown } from './words.ts';

/** Distances from an edge at which double precision looks for growth. */
const lookedAt = ['1e-3', '1e-6', '1e-9', '1e-12'];
/** Digits in which a point inside is tried that has no value in double precision. */
const pointDigits = 50;

/** A derivative that has no value at an edge, and why. */
interface Fault {
  readonly kind: 'diverges' | 'no-limit';
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
  const others = [...new Set(faults.slice(1).map(({ derivative }) => derivativeWords(derivative)))];
  const also =
    others.length === 0 ? '' : `; also ${others.slice(0, 4).join(', ')}${others.length > 4 ? ' and more' : ''}`;
  return {
    verdict: 'violated',
    reason: `${worst.words} at ${pointWords(worst.edge.point)}${also}${missed}`,
    margin: null,
    witness: worst.edge.slice,
    points: values,
    ...(worst.edge.mildBecause !== undefined && { mildBecause: worst.edge.mildBecause }),
  };
};

function missedWords(removable: number, doubleOnly: number): string {
  const parts = [
    ...(removable > 0 ? [`${removable} exist as limits only`] : []),
    ...(doubleOnly > 0 ? [`${doubleOnly} exist in high precision but not in double precision`] : []),
  ];
  return parts.length === 0 ? '' : `; of the finite ones ${parts.join(' and ')}`;
}

/** Faults where electrons are come first, then those of low order. */
function byWeight(a: Fault, b: Fault): number {
  const mild = (fault: Fault) => (fault.edge.mildBecause === undefined ? 0 : 1);
  return mild(a) - mild(b) || a.derivative.by.length - b.derivative.by.length;
}

function look<Name extends string>({ graph, energies, variables }: EnergyGraph<Name>, edges: readonly Edge[]): Looked {
  const derivatives = derivativesToSecondOrder(graph, energies, variables);
  const atPoints = evaluator(graph, derivatives, variables);
  const values = atPoints(edges.map(({ point }) => point));
  const growth = edges.map(({ paths }) => paths.map((path) => atPoints(lookedAt.map((step) => numbersOn(path, step)))));
  const faults: Fault[] = [];
  let removable = 0;
  let doubleOnly = 0;
  edges.forEach((edge, row) => {
    const asked = derivatives.map((derivative, index) => ({
      derivative,
      missing: !Number.isFinite(values[row]?.[index]),
      suspicious: (growth[row] ?? []).some((steps) => grows(steps.map((step) => step[index] as number))),
    }));
    const doubted = asked.filter((one) => (one.missing || one.suspicious) && !edge.isExempt(one.derivative.by));
    if (doubted.length === 0) return;
    const nodes = doubted.map(({ derivative }) => derivative.node);
    if (edge.paths.length === 0) {
      const exact = exactly(graph, nodes, edge.point);
      doubted.forEach(({ derivative }, index) => {
        if (exact[index]) doubleOnly += 1;
        else faults.push({ kind: 'no-limit', derivative, edge, words: `${derivativeWords(derivative)} has no value` });
      });
      return;
    }
    const ways = edge.paths.map((path) => tendencies(graph, nodes, path));
    doubted.forEach(({ derivative, missing }, index) => {
      const fault = faultOf(
        derivative,
        edge,
        ways.map((way) => way[index] as Tendency),
      );
      if (fault !== undefined) faults.push(fault);
      else if (missing) removable += 1;
    });
  });
  return { faults, removable, doubleOnly, values: edges.length * derivatives.length };
}

type PointEvaluator = (points: readonly Readonly<Record<string, number>>[]) => number[][];

/** The derivatives at points in double precision: one row a point. */
function evaluator(graph: Graph, derivatives: readonly Derivative[], variables: readonly string[]): PointEvaluator {
  const outputs = derivatives.map(({ node }) => node);
  const kernel = compileKernel(graph, outputs, [{ variables }]);
  return (points) => {
    const columns = variables.map((name) => Float64Array.from(points, (point) => point[name] ?? Number.NaN));
    const results = outputs.map(() => new Float64Array(points.length));
    kernel.evaluate([columns], results);
    return points.map((_, row) => results.map((result) => result[row] as number));
  };
}

function numbersOn(path: Path, distance: string): Record<string, number> {
  const place = path(decimalContext(80).from(distance));
  return Object.fromEntries([...place].map(([name, value]) => [name, value.toNumber()]));
}

/** Whether values on the way to an edge keep growing, or are lost. */
function grows(values: readonly number[]): boolean {
  const [, second, third, fourth] = values.map(Math.abs) as [number, number, number, number];
  if (!Number.isFinite(fourth)) return true;
  return third > 1.1 * second && fourth > 1.1 * third && fourth > 1e-3;
}

function exactly(graph: Graph, nodes: readonly number[], point: Readonly<Record<string, number>>): boolean[] {
  const context = decimalContext(pointDigits);
  const bindings = new Map(Object.entries(point).map(([name, value]) => [name, context.from(value)]));
  return evaluateDecimal(graph, nodes, bindings, pointDigits).map((value) => value.isFinite());
}

function faultOf(derivative: Derivative, edge: Edge, ways: readonly Tendency[]): Fault | undefined {
  const words = derivativeWords(derivative);
  const diverging = ways.find((way) => way.kind === 'diverges');
  if (diverging?.kind === 'diverges') {
    const how =
      diverging.power === 0 ? 'as a logarithm of' : `as the power ${shown(-diverging.power, 2)} of`;
    return { kind: 'diverges', derivative, edge, words: `${words} grows without bound, ${how} the distance,` };
  }
  const values = ways.flatMap((way) => (way.kind === 'no-value' ? [] : [way.value]));
  if (values.length < ways.length) return { kind: 'no-limit', derivative, edge, words: `${words} has no value near by and` };
  const [least, most] = [Math.min(...values), Math.max(...values)];
  if (most - least <= 1e-2 * Math.max(1, Math.abs(most))) return undefined;
  return {
    kind: 'no-limit',
    derivative,
    edge,
    words: `${words} has no limit (${shown(least)} to ${shown(most)}, by the way it is approached)`,
  };
}
