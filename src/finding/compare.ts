import type { Gate, Verdict } from './finding.ts';
import type { State, StateLine } from './state.ts';

/** How much may differ before it is told. */
export interface CompareTolerances {
  /** Of a margin, relative to the recorded one; never less than the tolerance of the condition. */
  readonly margin: number;
  /** Of a violated share, in shares of the domain. */
  readonly share: number;
}

export const usualTolerances: CompareTolerances = { margin: 1e-3, share: 1e-3 };

export type ChangeKind =
  | 'new-violation'
  | 'violation-gone'
  | 'verdict'
  | 'gate'
  | 'margin'
  | 'share'
  | 'functional-gone'
  | 'condition-gone'
  | 'functional-new'
  | 'condition-new';

/** One difference between two states; `condition` is null where it is about a whole functional. */
export interface Change {
  readonly kind: ChangeKind;
  readonly direction: 'worse' | 'better' | 'other';
  readonly functional: string;
  readonly constraint: string | null;
  readonly before: StateLine | null;
  readonly after: StateLine | null;
}

export interface Comparison {
  /** Circumstances in which the two differ: a reason why findings may. */
  readonly circumstances: readonly { readonly what: string; readonly before: string; readonly after: string }[];
  readonly changes: readonly Change[];
  /** Findings that are the same within the tolerances. */
  readonly same: number;
  readonly tolerances: CompareTolerances;
}

/** What differs between a recorded and the present state: worse first, each by functional and condition. */
export function compareStates(before: State, after: State, tolerances: CompareTolerances): Comparison {
  const recorded = groupLines(before.findings);
  const present = groupLines(after.findings);
  const changes: Change[] = [];
  let same = 0;
  for (const [functional, lines] of recorded) {
    const now = present.get(functional);
    if (now === undefined) {
      changes.push(wholeFunctional('functional-gone', 'worse', functional));
      continue;
    }
    for (const [constraint, line] of lines) {
      const found = compareLines(line, now.get(constraint) ?? null, tolerances);
      if (found.length === 0) same++;
      changes.push(...found.map((change) => ({ ...change, functional, constraint, before: line })));
    }
  }
  for (const [functional, lines] of present) {
    const known = recorded.get(functional);
    if (known === undefined) changes.push(wholeFunctional('functional-new', 'other', functional));
    for (const [constraint, line] of lines) {
      if (known?.has(constraint)) continue;
      // What was never recorded is worse only where it fails.
      const fails = line.gate === 'fail';
      if (!fails && known === undefined) continue;
      const kind = fails ? 'new-violation' : 'condition-new';
      changes.push({
        kind,
        direction: fails ? 'worse' : 'other',
        functional,
        constraint,
        before: null,
        after: line,
      });
    }
  }
  return { circumstances: circumstancesOf(before, after), changes: sorted(changes), same, tolerances };
}

export function isWorse({ changes }: Comparison): boolean {
  return changes.some(({ direction }) => direction === 'worse');
}

type Difference = Pick<Change, 'kind' | 'direction' | 'after'>;

function compareLines(before: StateLine, after: StateLine | null, tolerances: CompareTolerances): Difference[] {
  const difference = (kind: ChangeKind, worse: boolean): Difference => {
    // What the project accepts is bounded by the acceptance, and not by the record.
    const direction = worse ? (after?.gate === 'accepted' ? 'other' : 'worse') : 'better';
    return { kind, direction, after };
  };
  if (after === null) return [difference('condition-gone', true)];
  if (before.verdict !== after.verdict) {
    if (after.verdict === 'not-applicable') return [difference('condition-gone', true)];
    if (before.verdict === 'not-applicable') {
      return after.verdict === 'violated'
        ? [difference('new-violation', true)]
        : [{ kind: 'condition-new', direction: 'other', after }];
    }
    if (after.verdict === 'violated') return [difference('new-violation', true)];
    if (before.verdict === 'violated' && after.verdict !== 'undecided') return [difference('violation-gone', false)];
    return [difference('verdict', strength[after.verdict] < strength[before.verdict])];
  }
  const differences: Difference[] = [];
  if (before.gate !== after.gate) differences.push(difference('gate', weight[after.gate] > weight[before.gate]));
  const margin = (after.margin ?? Number.NaN) - (before.margin ?? Number.NaN);
  const allowed = Math.max(before.tolerance, after.tolerance, tolerances.margin * Math.abs(before.margin ?? 0));
  if (Math.abs(margin) > allowed) differences.push(difference('margin', margin < 0));
  else if ((before.margin === null) !== (after.margin === null)) {
    differences.push(difference('margin', after.margin === null));
  }
  const share = (after.share ?? 0) - (before.share ?? 0);
  if (Math.abs(share) > tolerances.share) differences.push(difference('share', share > 0));
  return differences;
}

const strength: Record<Verdict, number> = { proved: 3, holds: 2, undecided: 1, violated: 0, 'not-applicable': 2 };
const weight: Record<Gate, number> = { pass: 0, accepted: 1, score: 2, note: 2, warn: 3, fail: 4 };

function wholeFunctional(kind: ChangeKind, direction: Change['direction'], functional: string): Change {
  return { kind, direction, functional, constraint: null, before: null, after: null };
}

function groupLines(lines: readonly StateLine[]): Map<string, Map<string, StateLine>> {
  const groups = new Map<string, Map<string, StateLine>>();
  for (const line of lines) {
    const group = groups.get(line.functional) ?? new Map<string, StateLine>();
    groups.set(line.functional, group.set(line.constraint, line));
  }
  return groups;
}

const directions: readonly Change['direction'][] = ['worse', 'better', 'other'];

function sorted(changes: readonly Change[]): Change[] {
  const rank = ({ direction }: Change) => directions.indexOf(direction);
  const key = ({ functional, constraint }: Change) => `${functional} ${constraint ?? ''}`;
  return [...changes].sort((a, b) => rank(a) - rank(b) || (key(a) < key(b) ? -1 : key(a) > key(b) ? 1 : 0));
}

function circumstancesOf(before: State, after: State): Comparison['circumstances'] {
  const listed = (values: Readonly<Record<string, number | string>>) =>
    Object.entries(values)
      .map(([name, value]) => `${name}=${value}`)
      .join(',') || 'none';
  const rows = [
    ['engine version', before.engineVersion, after.engineVersion],
    ['catalogue version', before.catalogueVersion, after.catalogueVersion],
    ['domain', before.domain, after.domain],
    ['constants', listed(before.constants), listed(after.constants)],
    ['trial values', listed(before.parameters), listed(after.parameters)],
  ] as const;
  return rows.flatMap(([what, old, now]) => (old === now ? [] : [{ what, before: old, after: now }]));
}
