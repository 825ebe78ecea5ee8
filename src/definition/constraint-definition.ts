import type { SourcePlace } from '../errors/problem.ts';
import type { constrainedParts, forces, gateLevels, ruleNames, spaces, statuses } from './constraint-sheet.ts';
import type { Import, Rung, Step } from './functional-definition.ts';
import type { SourceText } from './source-text.ts';

export type Force = (typeof forces)[number];
export type Status = (typeof statuses)[number];
export type GateLevel = (typeof gateLevels)[number];
export type ConstrainedPart = (typeof constrainedParts)[number];
export type Space = (typeof spaces)[number];
export type RuleName = (typeof ruleNames)[number];

/** A name of the requirement that stands for a constant with several published values. */
export interface ConstantChoice {
  readonly name: string;
  /** Which selectable constant: `lieb-oxford`. */
  readonly constant: string;
  readonly place: SourcePlace;
}

/** A coordinate with a list of values. */
export interface Sweep {
  readonly name: string;
  readonly values: readonly SourceText[];
  readonly place: SourcePlace;
}

/** Points with data of their own; every row has a value for each column. */
export interface Table {
  readonly columns: readonly SourceText[];
  readonly rows: readonly (readonly SourceText[])[];
  readonly place: SourcePlace;
}

/** Rungs that cannot meet this condition (together with another one, when it is named). */
export interface Conflict {
  readonly rungs: readonly Rung[];
  readonly with?: string;
  readonly reason: string;
  readonly place: SourcePlace;
}

/** A functional that is known to hold or to break the condition. */
export interface KnownCase {
  readonly id: string;
  readonly where?: string;
  readonly source?: string;
  readonly place: SourcePlace;
}

/** A condition as its sheet defines it; requirement and coordinates are still text. */
export interface ConstraintDefinition {
  readonly id: string;
  readonly file: string;
  /** The whole sheet. */
  readonly text: string;
  readonly title: string;
  readonly statement: string;
  readonly localForm?: string;
  readonly derivation?: string;
  readonly force: Force;
  /** Force for one rung, or for functionals with exact exchange, where it differs. */
  readonly forceFor: Readonly<Partial<Record<Rung | 'hybrid', Force>>>;
  readonly status: Status;
  readonly gate?: { readonly level: GateLevel; readonly reason: string };
  readonly sources: readonly string[];
  readonly part: ConstrainedPart;
  readonly rungs: readonly Rung[];
  readonly space: Space;
  /** Fixed coordinates: rs, zeta, s, alpha or q, each with a decimal or an expression. */
  readonly at: readonly Step[];
  /** Coordinates with a list of values; every combination is asked. */
  readonly sweep: readonly Sweep[];
  readonly table?: Table;
  readonly uses: readonly Import[];
  readonly constants: readonly ConstantChoice[];
  /** The comparison as written; of a rule its name. */
  readonly requirement: SourceText;
  /** The rule of numerical quality that decides in the place of a requirement. */
  readonly rule?: RuleName;
  readonly relative: boolean;
  readonly tolerance: number;
  readonly toleranceReason?: string;
  readonly cannotMeet: readonly Conflict[];
  readonly holds: readonly KnownCase[];
  readonly breaks: readonly KnownCase[];
  readonly traps: readonly string[];
}
