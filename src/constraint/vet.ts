import { createHash } from 'node:crypto';
import type { DomainRecord, Finding, FunctionalFindings } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import { exactExchangeShares, instantiate } from '../functional/instance.ts';
import { constant } from '../graph/build.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { type Rational, rationalText } from '../number/rational.ts';
import { notApplicable, rungReason } from './applicable.ts';
import type { Condition } from './condition.ts';
import type { Constraint, RuleCondition } from './constraint.ts';
import { decide, notApplicableFinding, type Settings } from './decide.ts';
import { decideRule } from './decide-rule.ts';
import { decideSwept } from './decide-swept.ts';
import { axesOf, type Domain } from './domain.ts';
import { limitInFloat64 } from './limit.ts';
import { type Evidence, lookAtSamples, lookOnce, lookOnGrid } from './look.ts';
import { buildMargin, type Margin } from './margin.ts';

/** Tells how far a run is: what is being looked at, and the points looked at since the last call. */
export type Progress = (subject: string, points: number) => void;

/**
 * Vets one functional against conditions and rules: one finding for each, in their order. Margins over the same coordinates are
 * looked at together, in one pass over their grid.
 */
export function vetFunctional(
  functional: Functional,
  constraints: readonly Constraint[],
  settings: Settings,
  onProgress: Progress = () => {},
): FunctionalFindings {
  const conditions = constraints.filter((one): one is Condition => one.kind !== 'rule');
  const graph = new Graph();
  const findings = new Map<Condition, Finding>();
  const margins = new Map<Condition, Margin>();
  for (const condition of conditions) {
    const reason = notApplicable(condition, functional);
    if (reason !== undefined) findings.set(condition, notApplicableFinding(condition, functional, settings, reason));
    else if (condition.kind === 'swept') {
      const finding = decideSwept(condition, functional, settings);
      findings.set(condition, finding);
      onProgress(functional.definition.id, finding.points);
    } else margins.set(condition, buildMargin(graph, condition, functional, { ...settings, limit: limitInFloat64 }));
  }
  for (const group of groupBySpace(margins)) {
    const evidences = look(graph, group, margins, settings.domain, (points) =>
      onProgress(functional.definition.id, points),
    );
    group.forEach((condition, index) => {
      const { fixed } = margins.get(condition) as Margin;
      const finding = decide(condition, functional, settings, evidences[index] as Evidence, numbersOf(graph, fixed));
      findings.set(condition, finding);
      onProgress(functional.definition.id, 0);
    });
  }
  const ofRules = rulesAsked(constraints, functional, settings, onProgress);
  return {
    id: functional.definition.id,
    name: functional.definition.name,
    rung: functional.definition.rung,
    exactExchange: exactExchangeOf(functional, settings.parameters),
    nonLocal: functional.definition.nonLocal ?? null,
    parameters: Object.fromEntries([...settings.parameters].map(([name, value]) => [name, rationalText(value)])),
    sheetHash: createHash('sha256').update(functional.definition.text).digest('hex'),
    domain: domainSummary(settings.domain),
    findings: constraints.map((one) => (one.kind === 'rule' ? ofRules.get(one) : findings.get(one)) as Finding),
  };
}

function rulesAsked(
  constraints: readonly Constraint[],
  functional: Functional,
  settings: Settings,
  onProgress: Progress,
): Map<RuleCondition, Finding> {
  const asked = constraints.filter((one): one is RuleCondition => one.kind === 'rule');
  return new Map(
    asked.map((rule) => {
      const reason = rungReason(rule.definition, functional);
      const finding =
        reason === undefined
          ? decideRule(rule, functional, settings)
          : notApplicableFinding(rule, functional, settings, reason);
      onProgress(functional.definition.id, finding.points);
      return [rule, finding];
    }),
  );
}

/** Conditions whose margins depend on the same coordinates of the same space. */
function groupBySpace(margins: ReadonlyMap<Condition, Margin>): Condition[][] {
  const groups = new Map<string, Condition[]>();
  for (const [condition, { variables }] of margins) {
    const key = [condition.definition.space, ...[...variables].sort()].join(' ');
    const group = groups.get(key) ?? [];
    groups.set(key, group);
    group.push(condition);
  }
  return [...groups.values()];
}

function look(
  graph: Graph,
  group: readonly Condition[],
  margins: ReadonlyMap<Condition, Margin>,
  domain: Domain,
  onPoints: (points: number) => void,
): Evidence[] {
  const [first] = group as [Condition];
  const { variables } = margins.get(first) as Margin;
  const axes = axesOf(domain, first.definition.space).filter(({ name }) => variables.includes(name));
  const nodes = group.map((condition) => (margins.get(condition) as Margin).node);
  const tolerances = group.map(({ definition }) => definition.tolerance);
  if (axes.length === 0) return nodes.map((node) => lookOnce(graph, node));
  return first.definition.space === 'slice'
    ? lookOnGrid(graph, nodes, axes, tolerances, onPoints)
    : lookAtSamples(graph, nodes, axes, tolerances, onPoints);
}

function numbersOf(graph: Graph, nodes: ReadonlyMap<string, NodeId>): Map<string, number> {
  const values = evaluateDecimal(graph, [...nodes.values()], new Map(), 30);
  return new Map([...nodes.keys()].map((name, index) => [name, values[index]?.toNumber() as number]));
}

function exactExchangeOf(
  functional: Functional,
  parameters: ReadonlyMap<string, Rational>,
): FunctionalFindings['exactExchange'] {
  if (functional.exactExchange === undefined) return null;
  const graph = new Graph();
  const changed = new Map([...parameters].map(([name, value]) => [name, constant(graph, value)]));
  const shares = exactExchangeShares(instantiate(graph, functional, { parameters: changed }));
  const nodes = [shares.shortRange, shares.longRange, ...(shares.omega === undefined ? [] : [shares.omega])];
  const [shortRange, longRange, omega] = evaluateDecimal(graph, nodes, new Map(), 30).map((value) => value.toNumber());
  return { shortRange: shortRange as number, longRange: longRange as number, omega: omega ?? null };
}

function domainSummary(domain: Domain): DomainRecord {
  return {
    name: domain.name,
    space: 'slice',
    coordinates: Object.values(domain.axes).map(({ name, lower, upper, scale }) => ({
      name,
      lower,
      upper: Number.isFinite(upper) ? upper : null,
      points: 0,
      scale,
    })),
    fixed: {},
  };
}
