import type { SourcePlace } from '../errors/problem.ts';
import type { SourceText } from './source-text.ts';

export type Rung = 'lda' | 'gga' | 'meta-gga';
export type PartName = 'exchange' | 'correlation' | 'exchange-correlation';

/** A named expression. `place` is that of the name. */
export interface Step {
  readonly name: string;
  readonly value: SourceText;
  readonly place: SourcePlace;
}

/** Another sheet, under an alias, with changed parameters. */
export interface Import {
  readonly alias: string;
  readonly sheet: string;
  readonly parameters: readonly Step[];
  readonly place: SourcePlace;
}

export interface ParameterDefinition {
  readonly name: string;
  /** Exact decimal text or an expression of parameters. */
  readonly value: SourceText;
  /** Significant digits as printed. */
  readonly digits?: number;
  readonly source?: string;
  readonly meaning?: string;
  readonly place: SourcePlace;
}

export interface FunctionDefinition {
  readonly name: string;
  readonly arguments: readonly string[];
  readonly body: SourceText;
  readonly place: SourcePlace;
}

export type Form =
  | { readonly kind: 'enhancement' | 'per-particle' | 'per-volume'; readonly value: SourceText }
  | {
      readonly kind: 'pairs';
      /** Alias of the lda sheet whose correlation energy is partitioned. */
      readonly partition: string;
      readonly sameSpin: SourceText;
      readonly oppositeSpin: SourceText;
      readonly place: SourcePlace;
    }
  | { readonly kind: 'from'; readonly alias: string; readonly place: SourcePlace };

export interface Part {
  readonly name: PartName;
  readonly where: readonly Step[];
  readonly form: Form;
  readonly place: SourcePlace;
}

export type ExactExchange =
  | { readonly kind: 'global'; readonly fraction: SourceText }
  | {
      readonly kind: 'range-separated';
      readonly shortRange: SourceText;
      readonly longRange: SourceText;
      /** In 1/bohr. */
      readonly omega: SourceText;
    };

/** A functional as its sheet defines it; the expressions are still text. */
export interface FunctionalDefinition {
  readonly id: string;
  readonly file: string;
  /** The whole sheet. */
  readonly text: string;
  readonly name: string;
  readonly year?: number;
  readonly rung: Rung;
  readonly summary?: string;
  readonly notes?: string;
  readonly citations: readonly string[];
  readonly nonLocal?: string;
  readonly uses: readonly Import[];
  readonly parameters: readonly ParameterDefinition[];
  readonly functions: readonly FunctionDefinition[];
  readonly where: readonly Step[];
  readonly exactExchange?: ExactExchange;
  readonly parts: readonly Part[];
}
