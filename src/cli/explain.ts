import { explanationText } from '../report/explain.ts';
import { explanationOf, openCatalogue } from './engine.ts';
import { settle } from './problems.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

/** `rungcheck explain`: one condition, what it says and what a violation of it means. */
export function explainCommand(
  id: string,
  options: { readonly constraints?: readonly string[] },
  terminal: Terminal,
): number {
  const definition = settle(openCatalogue(options.constraints ?? []).constraint(id));
  terminal.writeOut(explanationText(explanationOf(definition), terminal));
  return exitStatus.fine;
}
