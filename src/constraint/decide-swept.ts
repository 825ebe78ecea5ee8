import type { Finding, SequenceRecord, Verdict } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import { exactExchangeShares, instantiate } from '../functional/instance.ts';
import { Graph, type NodeId } from '../graph/graph.ts';
import { reachable } from '../graph/traverse.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { type Decimal, decimalContext } from '../number/decimal.ts';
import { separationName } from './calls.ts';
import { withClosedForms } from './closed-forms.ts';
import type { Condition } from './condition.ts';
import { coordinatesOf } from './coordinates.ts';
import { heading, type Settings, witnessAt } from './decide.ts';
import { gateOf, isRealistic } from './gate.ts';
import type { Leaves } from './leaves.ts';
import { limitInFloat64 } from './limit.ts';
import { buildMargin, type Margin } from './margin.ts';
import { coefficientRecord, sequenceRecord } from './sequence-record.ts';
import { type Bindings, type LeafValue, SequenceEvaluator } from './sequences.ts';

/** Working digits, and those of a second evaluation that tells which digits are sure. */
const digits = 40;
const moreDigits = 60;
/** More digits than this are not claimed. */
const mostConfirmed = 35;

/** The margin at one point, with what its error comes to. */
interface PointMargin {
  /** Coordinates and columns that the margin depends on, and the fixed coordinates. */
  readonly point: Bindings;
  readonly margin: Decimal;
  readonly error: Decimal;
  readonly leaves: readonly LeafValue[];
}

/** Decides a condition that is asked at given points: limits, orders of growth, coefficients, tables. */
export function decideSwept(condition: Condition, functional: Functional, settings: Settings): Finding {
  const { definition } = condition;
  const graph = new Graph();
  const leaves: Leaves = { found: [], coefficients: [], expanded: new Set() };
  const margin = buildMargin(graph, condition, functional, { ...settings, limit: limitInFloat64, leaves });
  const evaluator = new SequenceEvaluator(graph, leaves, decimalContext(digits).from(definition.tolerance).div(10));
  const depends = evaluator.coordinatesOf(margin.node);
  const separation = exactExchangeShares(instantiate(graph, functional)).omega;
  const found = pointsOf(margin, depends, separation).map((point) => marginAt(evaluator, margin.node, point));
  const { verdict, chosen, reason } = judge(found, definition.tolerance);
  const violating = found.filter(({ margin: value, error }) => value.plus(error).lessThan(-definition.tolerance));
  const names = coordinatesOf(definition.space);
  const swept = names.filter((name) => depends.has(name) && isSwept(condition, name));
  const fixed = new Map(
    [...condition.at.keys()].flatMap((name) => {
      const value = chosen.point.get(name);
      return value === undefined ? [] : [[name, value.toNumber()] as const];
    }),
  );
  const witnessPoint = Object.fromEntries(
    names.flatMap((name) => (chosen.point.has(name) ? [[name, chosen.point.get(name)?.toNumber() as number]] : [])),
  );
  const witness = witnessAt(condition, witnessPoint, fixed);
  const { gate, reason: gateReason } = gateOf(definition, functional, verdict, isRealistic(witness));
  const value = chosen.margin.toNumber();
  const records = [
    ...chosen.leaves.map((leaf): SequenceRecord => sequenceRecord(leaf, chosen.point)),
    ...coefficientRecords(evaluator, leaves, margin, chosen.point),
  ];
  return {
    ...heading(condition, functional, settings),
    verdict,
    gate,
    gateReason,
    margin: Number.isFinite(value) ? value : null,
    ...confirmation(chosen),
    witness,
    irrelevant: ['rs', 'zeta', 's', 'alpha'].filter((name) => !depends.has(name) && !isAlong(leaves, name)),
    violatedShare: verdict === 'violated' ? violating.length / found.length : 0,
    regions: [],
    moreRegions: 0,
    through: [],
    cause: null,
    points: found.length,
    withoutValue: found.filter((one) => one.margin.isNaN()).length,
    domain: {
      name: settings.domain.name,
      space: definition.space,
      coordinates: swept.map((name) => {
        const values = [...new Set(found.map(({ point }) => point.get(name)?.toNumber() as number))];
        const [lower, upper] = [Math.min(...values), Math.max(...values)];
        return { name, lower, upper, points: values.length, scale: 'listed', values };
      }),
      fixed: Object.fromEntries([...fixed].filter(([name]) => depends.has(name))),
    },
    ...(settings.neighbourhood === true && { asked: found.map(askedRecord) }),
    sequences:
      settings.closedForms === undefined
        ? records
        : withClosedForms(records, condition, functional, settings, settings.closedForms),
    reason,
  };
}

/** The coefficients that the margin itself consists of; those inside a limit have no value of their own. */
function coefficientRecords(
  evaluator: SequenceEvaluator,
  leaves: Leaves,
  { graph, node }: Margin,
  point: Bindings,
): SequenceRecord[] {
  const parts = new Set(reachable(graph, [node]));
  const seen = new Set<string>();
  return leaves.coefficients.flatMap((coefficient) => {
    if (!parts.has(coefficient.node) || seen.has(coefficient.text)) return [];
    seen.add(coefficient.text);
    if (evaluator.coordinatesOf(coefficient.node).size === 0) return [];
    return [coefficientRecord(coefficient, evaluator.value(coefficient.node, point, digits), point)];
  });
}

function askedRecord({ point, margin }: PointMargin): NonNullable<Finding['asked']>[number] {
  const value = margin.toNumber();
  return {
    at: Object.fromEntries([...point].map(([name, at]) => [name, at.toNumber()])),
    margin: Number.isFinite(value) ? value : null,
  };
}

function isSwept({ definition }: Condition, name: string): boolean {
  return definition.sweep.some((sweep) => sweep.name === name) || isColumn(definition, name);
}

function isColumn({ table }: Condition['definition'], name: string): boolean {
  return table?.columns.some(({ text }) => text === name) ?? false;
}

function isAlong(leaves: Leaves, name: string): boolean {
  return leaves.found.some(({ along }) => along === name);
}

/** The values of everything that the margin depends on, point by point; points alike in all of that count once. */
function pointsOf(margin: Margin, depends: ReadonlySet<string>, separation: NodeId | undefined): Bindings[] {
  const { from } = decimalContext(digits);
  const evaluated = (node: NodeId) => evaluateDecimal(margin.graph, [node], new Map(), digits)[0] as Decimal;
  const valuesOf = (nodes: ReadonlyMap<string, NodeId>) =>
    [...nodes].map(([name, node]) => [name, evaluated(node)] as const);
  const fixed = [
    ...valuesOf(margin.fixed),
    ...(separation === undefined ? [] : [[separationName, evaluated(separation)] as const]),
  ];
  const known = new Map<string, Bindings>();
  for (const point of margin.points) {
    const all = new Map([['q', from(0)] as const, ...fixed, ...valuesOf(point)]);
    const here = new Map([...all].filter(([name]) => depends.has(name)));
    const key = [...here].map(([name, value]) => `${name}=${value}`).join(' ');
    if (!known.has(key)) known.set(key, here);
  }
  return [...known.values()];
}

/** The margin with the limits in it resolved; its error is what theirs move it by, or what more digits do. */
function marginAt(evaluator: SequenceEvaluator, node: NodeId, point: Bindings): PointMargin {
  const leaves = evaluator.leavesOf(node).map((leaf) => evaluator.leaf(leaf, point));
  const values = new Map([...point, ...leaves.map(({ leaf, value }) => [leaf.symbol, value] as const)]);
  const margin = evaluator.value(node, values, digits);
  let error = margin.minus(evaluator.value(node, values, moreDigits)).abs();
  for (const { leaf, value, error: width } of leaves) {
    if (width.isZero()) continue;
    const moved = evaluator.value(node, new Map([...values, [leaf.symbol, value.plus(width)]]), digits);
    error = error.plus(moved.minus(margin).abs());
  }
  return { point, margin, error: error.isNaN() ? decimalContext(digits).from(0) : error, leaves };
}

function judge(
  found: readonly PointMargin[],
  tolerance: number,
): { verdict: Verdict; chosen: PointMargin; reason: string } {
  const counted = `${found.length} ${found.length === 1 ? 'point' : 'points'}`;
  const lowest = (these: readonly PointMargin[]) => these.reduce((a, b) => (b.margin.lessThan(a.margin) ? b : a));
  const violating = found.filter((one) => one.margin.plus(one.error).lessThan(-tolerance));
  if (violating.length > 0) {
    const chosen = lowest(violating);
    const where = found.length === 1 ? '' : ` at ${violating.length} of ${counted}`;
    return { verdict: 'violated', chosen, reason: `violated${where}, in high precision${checked(chosen)}` };
  }
  const open = found.filter((one) => !one.margin.minus(one.error).greaterThanOrEqualTo(-tolerance));
  const [first] = open;
  if (first !== undefined) {
    return { verdict: 'undecided', chosen: first, reason: `${undecidedReason(first)} (${open.length} of ${counted})` };
  }
  const chosen = lowest(found);
  return {
    verdict: 'holds',
    chosen,
    reason: `no violation at ${counted}, in high precision${checked(chosen)}; not a proof`,
  };
}

function checked({ leaves }: PointMargin): string {
  return leaves.length === 0 ? '' : ', each value by two sequences';
}

function undecidedReason({ leaves, margin, error }: PointMargin): string {
  for (const { leaf, result } of leaves) {
    if (result.kind === 'unknown') return `${leaf.text} could not be told: ${result.reason}`;
  }
  if (margin.isNaN()) return 'the requirement has no value there, or different ones from two sides';
  return `the margin ${short(margin)} is known to ± ${short(error)} only`;
}

function short(value: Decimal): string {
  return value.toSignificantDigits(3).toString();
}

function confirmation({ margin, error }: PointMargin): Pick<Finding, 'confirmed' | 'confirmedDigits'> {
  if (!margin.isFinite()) return { confirmed: null, confirmedDigits: 0 };
  const sure = error.isZero() ? mostConfirmed : Math.max(0, Math.min(mostConfirmed, margin.e - error.e - 1));
  return { confirmed: margin.toSignificantDigits(Math.max(1, Math.min(30, sure))).toString(), confirmedDigits: sure };
}
