import type { Condition } from '../constraint/condition.ts';
import { axesOf, type Domain } from '../constraint/domain.ts';
import { limitInFloat64 } from '../constraint/limit.ts';
import { buildMargin } from '../constraint/margin.ts';
import type { Functional } from '../functional/functional.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { makeSigns, type Signs } from '../graph/sign.ts';
import { reachable, variablesOf } from '../graph/traverse.ts';
import { cbrtInterval } from '../interval/root.ts';
import { evaluateIntervals, intervalsOver } from '../kernel/interval-point.ts';
import type { Rational } from '../number/rational.ts';
import { toNumber } from '../number/rational.ts';
import type { BranchAxis } from '../search/branch.ts';
import {
  constantMargin,
  coordinatesNotNegative,
  decidableForm,
  polarisationRoot,
  type RewriteName,
  rewriteMargin,
} from './forms.ts';

/** What is to be proved: that a margin is at least −tolerance wherever in a box it has a value. */
export interface Claim {
  readonly graph: Graph;
  /** What is positive at every inner point of the domain: a point of its edge counts where the formula has a value. */
  readonly signs: Signs;
  /** Nodes that all are the margin, in different forms. */
  readonly forms: readonly NodeId[];
  readonly variables: readonly string[];
  readonly axes: readonly BranchAxis[];
  readonly tolerance: number;
  /** The rewrites that made the forms from the sheets. */
  readonly rewrites: readonly RewriteName[];
}

/** Coordinates that are positive inside every domain. */
const neverNegative = [...coordinatesNotNegative, 's_up', 's_dn', 'alpha_up', 'alpha_dn'];

export interface ClaimSettings {
  readonly domain: Domain;
  readonly constants: ReadonlyMap<string, Rational>;
  readonly parameters: ReadonlyMap<string, Rational>;
}

/** Why no boxes can prove a condition; undefined when they may. */
function whyNotProvable({ kind, definition }: Condition): string | undefined {
  if (kind !== 'pointwise') return 'it is asked at given points and not over a domain';
  if (!/\blimit\s*\(/.test(definition.requirement.text)) return undefined;
  return 'it contains a limit, which is extrapolated from values at finite r_s: intervals enclose the values, not the limit';
}

/** The claim of a condition for a functional, or why it is none that boxes can prove. */
export function claimOf(
  condition: Condition,
  functional: Functional,
  settings: ClaimSettings,
  allowed: readonly RewriteName[],
): Claim | string {
  const reason = whyNotProvable(condition);
  if (reason !== undefined) return reason;
  const graph = new Graph();
  const build = (rewrite?: (graph: Graph, energy: NodeId) => NodeId) =>
    buildMargin(graph, condition, functional, {
      ...settings,
      limit: limitInFloat64,
      ...(rewrite === undefined ? {} : { rewrite }),
    }).node;
  const plain = build();
  if (!haveValues(graph, plain)) return 'a constant in the formula has no value';
  const { space } = condition.definition;
  const signs = {
    inside: signsOver(graph, settings.domain, condition, neverNegative),
    closed: signsOver(graph, settings.domain, condition, ['rs']),
  };
  const ofEnergy = allowed.filter((name) => name === 'merge-logarithms' || name === 'separate-blends');
  // The sides of an identity are one expression as they stand, and may not be with only one of them rewritten.
  const constant = space === 'spin' ? constantMargin(graph, plain, allowed, signs) : undefined;
  const rewritten = constant !== undefined || ofEnergy.length === 0 ? plain : build(decidableForm);
  const ofMargin = space === 'slice' ? allowed : allowed.filter((name) => name !== 'polarisation-root');
  const made = constant ?? rewriteMargin(graph, rewritten, ofMargin, signs);
  const forms = [made.node];
  const hasZeta = made.rewrites.includes('polarisation-root');
  const rewrites = [...(rewritten === plain ? [] : ofEnergy), ...made.rewrites];
  const used = variablesOf(graph, forms);
  const axes = axesOf(settings.domain, condition.definition.space).flatMap((axis) => {
    const isRoot = axis.name === 'zeta' && hasZeta;
    const name = isRoot ? polarisationRoot : axis.name;
    if (!used.has(name)) return [];
    const [lower, upper] = isRoot ? rootBounds(axis.lower, axis.upper) : [axis.lower, axis.upper];
    const scale = axis.scale === 'logarithmic' || upper === Number.POSITIVE_INFINITY ? 'logarithmic' : 'linear';
    return [{ name, axis: { lower, upper, scale, divisions: switchesOf(graph, forms, name) } as BranchAxis }];
  });
  return {
    graph,
    signs: signs.inside,
    forms,
    variables: axes.map(({ name }) => name),
    axes: axes.map(({ axis }) => axis),
    tolerance: condition.definition.tolerance,
    rewrites,
  };
}

/** Whether every constant below a node has a value: a rewrite may lose one. */
function haveValues(graph: Graph, output: NodeId): boolean {
  const constants = reachable(graph, [output]).filter((id) => variablesOf(graph, [id]).size === 0);
  return evaluateIntervals(graph, constants, new Map()).every(({ defined }) => defined);
}

/** Signs on the domain, w = (1 − ζ)^(1/3) included, where the named coordinates are positive. */
function signsOver(graph: Graph, domain: Domain, condition: Condition, positive: readonly string[]): Signs {
  const box = new Map(
    axesOf(domain, condition.definition.space).map(({ name, lower, upper }) => [
      name as string,
      [lower, upper] as const,
    ]),
  );
  const [lower, upper] = box.get('zeta') ?? [0, 0];
  box.set(polarisationRoot, rootBounds(lower, upper));
  const bounds = intervalsOver(graph, box);
  // On a plane where a coordinate is 0 there is no inside.
  const moving = positive.filter((name) => (box.get(name)?.[1] ?? 1) > 0);
  return makeSigns(graph, new Set(moving), (id) => bounds(id).lower);
}

/** w = (1 − ζ)^(1/3), rounded outward. */
function rootBounds(lower: number, upper: number): [number, number] {
  return [cbrtInterval(1 - upper)[0], cbrtInterval(1 - lower)[1]];
}

/** Where a comparison with a constant switches a formula. */
function switchesOf(graph: Graph, outputs: readonly NodeId[], name: string): number[] {
  const found = new Set<number>();
  for (const id of reachable(graph, outputs)) {
    const node = graph.node(id);
    if (node.kind !== 'choice') continue;
    const [left, right] = [graph.node(node.args[0]), graph.node(node.args[1])];
    for (const [variable, value] of [
      [left, right],
      [right, left],
    ] as const) {
      if (variable.kind === 'variable' && variable.name === name && value.kind === 'rational')
        found.add(toNumber(value.value));
    }
  }
  return [...found];
}
