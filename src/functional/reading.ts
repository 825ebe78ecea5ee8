import type { PartName } from '../definition/functional.ts';
import type { Expression } from '../expression/expression.ts';
import type { PlacedText } from '../expression/parse.ts';

/** Where an expression stands in its sheet; this decides which names it may use. */
export type Site =
  | { readonly kind: 'parameter'; readonly name: string }
  | { readonly kind: 'import'; readonly alias: string; readonly parameter: string }
  | { readonly kind: 'exact-exchange' }
  | { readonly kind: 'function'; readonly name: string; readonly arguments: readonly string[] }
  | { readonly kind: 'step'; readonly part: PartName | undefined; readonly name: string }
  | { readonly kind: 'form'; readonly part: PartName; readonly insideChannel: boolean };

/** One expression of a sheet, parsed, with its source text and site. */
export interface Reading {
  readonly source: PlacedText;
  readonly expression: Expression;
  readonly site: Site;
}
