import type { Problem } from '../errors/problem.ts';
import { variable } from '../graph/build.ts';
import { Graph } from '../graph/graph.ts';
import type { Functional } from './functional.ts';
import { exactExchangeShares, instantiate } from './instance.ts';
import { MissingCoordinate, slicePlace } from './place.ts';

/** A functional whose graph outgrows this is refused: it could not be differentiated in reasonable time. */
const largestGraph = 50_000;

/**
 * Builds every part once. What remains to go wrong after the names are right: an import evaluated with
 * too few coordinates, and a graph beyond any use.
 */
export function trialProblems(functional: Functional): Problem[] {
  const { definition } = functional;
  return definition.parts.flatMap((part): Problem[] => {
    const graph = new Graph();
    const coordinate = (name: string) => variable(graph, name);
    const place = slicePlace(graph, {
      rs: coordinate('rs'),
      zeta: coordinate('zeta'),
      s: coordinate('s'),
      alpha: coordinate('alpha'),
      q: coordinate('q'),
    });
    try {
      const instance = instantiate(graph, functional);
      instance.part(part.name, place);
      exactExchangeShares(instance);
    } catch (error) {
      if (!(error instanceof MissingCoordinate)) throw error;
      return [
        {
          code: 'wrong-arguments',
          message: `in ${part.name}, an imported energy needs ${error.coordinate}, which its call does not give`,
          remedy: `Give it ${error.coordinate}, or import a form that does not depend on it.`,
          ...part.place,
        },
      ];
    }
    if (graph.nodes.length <= largestGraph) return [];
    return [
      {
        code: 'expression-size',
        message: `${part.name} has more than ${largestGraph} operations`,
        remedy: 'A functional of this size cannot be vetted; simplify the form.',
        ...part.place,
      },
    ];
  });
}
