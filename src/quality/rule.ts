import type { Functional } from '../functional/functional.ts';
import type { Rational } from '../number/rational.ts';

/** What a rule of numerical quality is asked about. */
export interface RuleQuestion {
  readonly functional: Functional;
  /** Trial values for parameters of the functional. */
  readonly parameters: ReadonlyMap<string, Rational>;
  /** The threshold of the rule, its sheet's tolerance; each rule says in which unit. */
  readonly threshold: number;
}

/** A point of the slice; coordinates that do not matter may be left out. */
export type SlicePoint = Readonly<Partial<Record<'rs' | 'zeta' | 's' | 'alpha' | 'q', number>>>;

/** What a rule found. */
export interface RuleAnswer {
  readonly verdict: 'holds' | 'violated' | 'undecided' | 'not-applicable';
  /** In one sentence what was found, with its numbers. */
  readonly reason: string;
  /** Negative where violated, in the unit of the threshold; null where a rule has no size. */
  readonly margin: number | null;
  /** The place of the worst value. */
  readonly witness: SlicePoint | null;
  /** Points looked at. */
  readonly points: number;
  /** Why a violation is to be weighed as a warning although its place is realistic. */
  readonly mildBecause?: string;
}

export type Rule = (question: RuleQuestion) => RuleAnswer;
