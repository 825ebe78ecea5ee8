import type { ClosedFormFinder } from '../closed-form/algebra.ts';
import type { ConstraintDefinition } from '../definition/constraint.ts';
import type { DomainRecord, Finding, RegionRecord, Witness } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import { Graph } from '../graph/graph.ts';
import { evaluateDecimal } from '../kernel/decimal.ts';
import { decimalContext } from '../number/decimal.ts';
import { type Rational, toNumber } from '../number/rational.ts';
import type { Interval } from '../search/cross.ts';
import { gridOf } from '../search/grid.ts';
import type { Condition } from './condition.ts';
import { makeConfirmer } from './confirm.ts';
import { spinPlaceOf } from './coordinates.ts';
import type { Domain } from './domain.ts';
import { forceOf, gateOf, isRealistic } from './gate.ts';
import { judge } from './judge.ts';
import type { Evidence, ViolatedRegion } from './look.ts';
import { causeOfViolation } from './printed-digits.ts';
import { regionWords } from './words.ts';

export interface Settings {
  readonly domain: Domain;
  /** Values of the selectable constants. */
  readonly constants: ReadonlyMap<string, Rational>;
  /** Trial values for parameters of the functional. */
  readonly parameters: ReadonlyMap<string, Rational>;
  /** Finds closed forms of limits and coefficients; without it findings have numbers alone. */
  readonly closedForms?: ClosedFormFinder;
  /** Whether findings show the margin around their witness. */
  readonly neighbourhood?: boolean;
}

/** Minima that are tried in high precision before double-precision noise is blamed. */
const minimaTried = 6;

/** Evidence in double precision and confirmation in high precision make a finding. */
export function decide(
  condition: Condition,
  functional: Functional,
  settings: Settings,
  evidence: Evidence,
  fixed: ReadonlyMap<string, number>,
): Finding {
  const { definition } = condition;
  const confirmer = makeConfirmer(condition, functional, settings);
  const pointOf = (place: Float64Array) =>
    Object.fromEntries(evidence.axes.map(({ name }, index) => [name, place[index] as number]));
  const candidates = [...evidence.minima.slice(0, minimaTried)];
  if (evidence.firstWithoutValue !== undefined)
    candidates.push({ place: evidence.firstWithoutValue, value: Number.NaN });
  const { verdict, place, confirmed, reason } = judge(candidates, evidence, definition.tolerance, (at) =>
    confirmer.at(pointOf(at)),
  );
  const violated = verdict === 'violated';
  const witness = place === undefined ? null : witnessAt(condition, pointOf(place), fixed);
  const realistic = witness !== null && isRealistic(witness);
  const { gate, reason: gateReason } = gateOf(definition, functional, verdict, realistic);
  const margin = confirmed?.value.toNumber() ?? evidence.minima[0]?.value;
  return {
    ...heading(condition, functional, settings),
    verdict,
    gate,
    gateReason,
    margin: margin === undefined || !Number.isFinite(margin) ? null : margin,
    confirmed: confirmed?.value.isFinite()
      ? confirmed.value.toSignificantDigits(Math.max(1, Math.min(30, confirmed.digits))).toString()
      : null,
    confirmedDigits: confirmed?.value.isFinite() ? confirmed.digits : 0,
    witness,
    irrelevant: irrelevantCoordinates(condition, evidence, fixed),
    violatedShare: violated ? evidence.violatedShare : 0,
    regions: violated ? evidence.regions.map(regionRecord) : [],
    moreRegions: violated ? evidence.moreRegions : 0,
    through: violated && place !== undefined ? throughRecord(evidence, place) : [],
    cause: violated && place !== undefined ? causeOfViolation(condition, functional, settings, pointOf(place)) : null,
    points: evidence.points,
    withoutValue: evidence.withoutValue,
    domain: domainRecord(condition, settings.domain, evidence, fixed),
    ...(settings.neighbourhood === true && place !== undefined && { neighbourhood: neighbourhoodOf(evidence, place) }),
    reason,
  };
}

const neighbours = 9;

/** The margin along each axis through a place, at values spread over the axis and at the place itself. */
function neighbourhoodOf({ axes, at }: Evidence, place: Float64Array): NonNullable<Finding['neighbourhood']> {
  return axes.map((axis, index) => {
    const own = place[index] as number;
    const values = [...new Set([...gridOf(axis, neighbours).values, own])].sort((a, b) => a - b);
    return {
      coordinate: axis.name,
      values: values.map((value) => {
        const margin = at(place.with(index, value));
        return { at: value, margin: Number.isFinite(margin) ? margin : null };
      }),
    };
  });
}

function regionRecord({ share, hull }: ViolatedRegion): RegionRecord {
  const bounds = hull.map(({ axis, lower, upper, spans }) => ({ coordinate: axis, lower, upper, whole: spans }));
  return { share, bounds, words: regionWords(hull) };
}

function throughRecord(evidence: Evidence, place: Float64Array): Finding['through'] {
  // A point that only high precision gives a value to has no line of double-precision values through it.
  if (!(evidence.at(place) < 0)) return [];
  return evidence.through(place).map(({ lower, upper }: Interval, index) => ({
    coordinate: evidence.axes[index]?.name as string,
    lower: lower.value,
    upper: upper.value,
    lowerIsEdge: lower.kind === 'end',
    upperIsEdge: upper.kind === 'end',
  }));
}

/** A finding for a condition that does not apply. */
export function notApplicableFinding(
  condition: { readonly definition: ConstraintDefinition },
  functional: Functional,
  settings: Settings,
  reason: string,
): Finding {
  const { gate, reason: gateReason } = gateOf(condition.definition, functional, 'not-applicable', false);
  return {
    ...heading(condition, functional, settings),
    verdict: 'not-applicable',
    gate,
    gateReason,
    margin: null,
    confirmed: null,
    confirmedDigits: 0,
    witness: null,
    irrelevant: [],
    violatedShare: null,
    regions: [],
    moreRegions: 0,
    through: [],
    cause: null,
    points: 0,
    withoutValue: 0,
    domain: { name: settings.domain.name, space: condition.definition.space, coordinates: [], fixed: {} },
    reason,
  };
}

/** What every finding says of its condition. */
export function heading(
  { definition }: { readonly definition: ConstraintDefinition },
  functional: Functional,
  settings: Settings,
) {
  return {
    constraint: definition.id,
    title: definition.title,
    part: definition.part,
    force: forceOf(definition, functional),
    status: definition.status,
    requirement: definition.localForm ?? definition.requirement.text,
    tolerance: definition.tolerance,
    relative: definition.relative,
    constants: Object.fromEntries(
      definition.constants.map(({ constant }) => [constant, toNumber(settings.constants.get(constant) as Rational)]),
    ),
  };
}

/** Values of the coordinates that a condition does not depend on, for a witness that can be evaluated. */
const neutral = { rs: 1, zeta: 0, s: 0, alpha: 1 };

/** A point with a value for every coordinate, those without a say at neutral ones. */
export function witnessAt(
  condition: Condition,
  point: Readonly<Record<string, number>>,
  fixed: ReadonlyMap<string, number>,
): Witness {
  if (condition.definition.space === 'slice') return { ...neutral, ...Object.fromEntries(fixed), ...point };
  const graph = new Graph();
  const place = spinPlaceOf(graph);
  const context = decimalContext(30);
  const all = { ...neutral, s_up: 0, s_dn: 0, cosine: 1, alpha_up: 1, alpha_dn: 1, ...point };
  const bindings = new Map(Object.entries(all).map(([name, value]) => [name, context.from(value)]));
  const [s, alpha] = evaluateDecimal(graph, [place.total('s'), place.total('alpha')], bindings, 30).map((value) =>
    value.toNumber(),
  ) as [number, number];
  return { ...all, s, alpha };
}

function irrelevantCoordinates(condition: Condition, evidence: Evidence, fixed: ReadonlyMap<string, number>): string[] {
  if (condition.definition.space === 'spin') return [];
  const named = new Set([...evidence.axes.map(({ name }) => name), ...fixed.keys()]);
  return Object.keys(neutral).filter((name) => !named.has(name));
}

function domainRecord(
  condition: Condition,
  domain: Domain,
  evidence: Evidence,
  fixed: ReadonlyMap<string, number>,
): DomainRecord {
  return {
    name: domain.name,
    space: condition.definition.space,
    coordinates: evidence.axes.map(({ name, lower, upper, scale }, index) => ({
      name,
      lower,
      upper: Number.isFinite(upper) ? upper : null,
      points: evidence.counts[index] ?? 0,
      scale,
    })),
    fixed: Object.fromEntries(fixed),
  };
}
