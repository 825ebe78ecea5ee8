import type { Condition } from '../constraint/condition.ts';
import { limitInFloat64 } from '../constraint/limit.ts';
import { buildMargin } from '../constraint/margin.ts';
import { regionWords } from '../constraint/words.ts';
import type { Finding, ProofRecord, Witness } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import { Graph } from '../graph/graph.ts';
import { evaluateIntervals } from '../kernel/interval-point.ts';
import type { BranchOptions } from '../search/box-search.ts';
import type { SharedResult } from '../search/share-blocks.ts';
import { type Claim, type ClaimSettings, claimOf } from './claim.ts';
import { decideClaim } from './decide-claim.ts';
import { polarisationRoot, rewriteNames } from './forms.ts';
import { sameMargin } from './same-margin.ts';

export interface Proof {
  readonly claim: Claim | undefined;
  readonly result: SharedResult | undefined;
  readonly record: ProofRecord;
}

/** What is claimed of a functional by a condition over the domain of the settings, or why boxes cannot prove it. */
export function provableClaim(condition: Condition, functional: Functional, settings: ClaimSettings): Claim | string {
  const claim = claimOf(condition, functional, settings, rewriteNames);
  if (typeof claim === 'string' || claim.rewrites.length === 0) return claim;
  const plain = claimOf(condition, functional, settings, []);
  if (typeof plain === 'string') return plain;
  if (sameMargin(plain, claim)) return claim;
  throw new Error(`the rewrites ${claim.rewrites.join(', ')} change the margin of ${condition.definition.id}`);
}

/** Tries to prove a condition for a functional over the domain of the settings, in this thread. */
export function proveCondition(
  condition: Condition,
  functional: Functional,
  settings: ClaimSettings,
  options: BranchOptions,
): Proof {
  const claim = provableClaim(condition, functional, settings);
  if (typeof claim === 'string') return { claim: undefined, result: undefined, record: recordOfNone(claim) };
  const result = decideClaim(claim, options);
  return { claim, result, record: recordOf(claim, result) };
}

/** The record of a condition that boxes cannot prove. */
export function recordOfNone(reason: string): ProofRecord {
  return {
    ...{ boxes: 0, deepest: 0, provedShare: 0, violatedShare: 0, undecidedShare: 1 },
    ...{ undecidedWords: '', violatedWords: '', certifiedAtWitness: false, rewrites: [] },
    stop: 'not-provable',
    reason: `not provable by boxes: ${reason}`,
  };
}

export function recordOf(claim: Claim, result: SharedResult): ProofRecord {
  const { boxes, deepest, stop, proved, violated, undecided } = result;
  const isProved = stop === 'decided' && violated === 0;
  const looked = `${boxes.toLocaleString('en')} ${boxes === 1 ? 'box' : 'boxes'}`;
  const ends = {
    budget: 'the budget of boxes ended',
    resolution: 'boxes became too small to divide',
    interrupted: 'the search was interrupted',
    decided: '',
  };
  const reason = isProved
    ? claim.axes.length === 0
      ? 'proved: exact rewrites bring the margin to one constant, wherever the formula has a value'
      : `proved by interval arithmetic on ${looked}, the smallest after ${deepest} halvings, wherever the formula has a value`
    : violated > 0
      ? `proved to be violated on ${percent(violated)} of the domain, to hold on ${percent(proved)}; ${looked}`
      : `${percent(undecided)} of the domain not decided after ${looked}: ${ends[stop]}`;
  return {
    boxes,
    deepest,
    stop,
    provedShare: proved,
    violatedShare: violated,
    undecidedShare: undecided,
    undecidedWords: undecided > 0 ? hullWords(claim, result.undecidedHull) : '',
    violatedWords: violated > 0 ? hullWords(claim, result.violatedHull) : '',
    certifiedAtWitness: false,
    rewrites: [...claim.rewrites],
    reason,
  };
}

function percent(share: number): string {
  return `${Number((100 * share).toPrecision(3))} %`;
}

/** The smallest box around some boxes, in coordinates that a reader knows. */
function hullWords({ variables, axes }: Claim, hull: SharedResult['undecidedHull']): string {
  return regionWords(
    variables.map((name, index) => {
      const axis = axes[index] as Claim['axes'][number];
      const [lower, upper] = hull[index] as readonly [number, number];
      const touches = { touchesLower: lower <= axis.lower, touchesUpper: upper >= axis.upper };
      const spans = touches.touchesLower && touches.touchesUpper;
      if (name !== polarisationRoot) return { axis: name, lower, upper, ...touches, spans };
      // ζ = 1 − w³ falls with w.
      const ends = { lower: 1 - upper ** 3, upper: 1 - lower ** 3 };
      return { axis: 'zeta', ...ends, touchesLower: touches.touchesUpper, touchesUpper: touches.touchesLower, spans };
    }),
  );
}

/**
 * A finding with what a proof adds: `holds` and `undecided` become `proved` where every box is; a violation is certified
 * where an interval evaluation at its witness lies wholly on the wrong side.
 */
export function withProof(
  finding: Finding,
  condition: Condition,
  functional: Functional,
  settings: ClaimSettings,
  options: BranchOptions,
): Finding {
  if (finding.verdict === 'not-applicable') return finding;
  const { record } = proveCondition(condition, functional, settings, options);
  if (finding.verdict === 'violated') {
    const certifiedAtWitness =
      record.stop !== 'not-provable' &&
      finding.witness !== null &&
      isCertified(condition, functional, settings, finding.witness);
    const words = certifiedAtWitness ? '; certified by an interval evaluation there' : '';
    return { ...finding, reason: `${finding.reason}${words}`, proof: { ...record, certifiedAtWitness } };
  }
  if (record.stop === 'decided' && record.violatedShare === 0) {
    return {
      ...finding,
      verdict: 'proved',
      gateReason: 'proved over the stated domain',
      reason: record.reason,
      proof: record,
    };
  }
  if (record.violatedShare > 0) {
    const reason = `${record.reason} (${record.violatedWords}), where the search found no point`;
    return { ...finding, verdict: 'undecided', gateReason: 'not decided; see the reason', reason, proof: record };
  }
  return { ...finding, proof: record };
}

/** Whether natural interval arithmetic at a point puts the margin wholly below minus the tolerance. */
function isCertified(condition: Condition, functional: Functional, settings: ClaimSettings, witness: Witness): boolean {
  const graph = new Graph();
  const { node, variables } = buildMargin(graph, condition, functional, { ...settings, limit: limitInFloat64 });
  const coordinates: Readonly<Record<string, number | undefined>> = witness;
  const box = new Map<string, readonly [number, number]>();
  for (const name of variables) {
    const value = coordinates[name];
    if (value === undefined) return false;
    box.set(name, [value, value]);
  }
  const [value] = evaluateIntervals(graph, [node], box);
  return value?.defined === true && value.upper < -condition.definition.tolerance;
}
