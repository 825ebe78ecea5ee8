import type { FunctionalDefinition, ParameterDefinition, PartName } from '../definition/functional.ts';
import type { Expression } from '../expression/expression.ts';

/** A checked functional: every expression parsed, every import joined to the functional it names. */
export interface Functional {
  readonly definition: FunctionalDefinition;
  readonly imports: ReadonlyMap<string, Import>;
  readonly parameters: ReadonlyMap<string, Parameter>;
  readonly functions: ReadonlyMap<string, NamedFunction>;
  /** Steps shared by the parts. */
  readonly steps: ReadonlyMap<string, Expression>;
  readonly parts: ReadonlyMap<PartName, Part>;
  readonly exactExchange: ExactExchange | undefined;
}

export interface Import {
  readonly functional: Functional;
  /** New values of the imported sheet's parameters, in the importer's scope. */
  readonly parameters: ReadonlyMap<string, Expression>;
}

export interface Parameter {
  readonly definition: ParameterDefinition;
  readonly value: Expression;
}

export interface NamedFunction {
  readonly arguments: readonly string[];
  readonly body: Expression;
}

export interface Part {
  readonly name: PartName;
  readonly steps: ReadonlyMap<string, Expression>;
  readonly form: Form;
}

export type Form =
  | { readonly kind: 'enhancement' | 'per-particle' | 'per-volume'; readonly value: Expression }
  | {
      readonly kind: 'pairs';
      readonly partition: string;
      readonly sameSpin: Expression;
      readonly oppositeSpin: Expression;
    }
  | { readonly kind: 'from'; readonly alias: string };

export type ExactExchange =
  | { readonly kind: 'global'; readonly fraction: Expression }
  | {
      readonly kind: 'range-separated';
      readonly shortRange: Expression;
      readonly longRange: Expression;
      readonly omega: Expression;
    };
