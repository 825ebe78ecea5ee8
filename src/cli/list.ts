import { jsonText } from '../report/json.ts';
import { constraintList, functionalList } from '../report/list.ts';
import { allOf, listedConstraint, listedFunctional, openCatalogue } from './engine.ts';
import { settle } from './problems.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

export interface ListOptions {
  readonly format: 'table' | 'json';
  readonly constraints?: readonly string[];
}

/** `rungcheck list`: what can be vetted, and against what. */
export function listCommand(what: string, options: ListOptions, terminal: Terminal): number {
  const shelf = openCatalogue(options.constraints ?? []);
  if (what === 'functionals') {
    const found = settle(allOf(shelf.functionalIds().map((id) => shelf.functional(id)))).map(listedFunctional);
    terminal.writeOut(options.format === 'json' ? jsonText(found) : functionalList(found, terminal));
  } else {
    const found = settle(allOf(shelf.constraintIds().map((id) => shelf.constraint(id)))).map(listedConstraint);
    terminal.writeOut(options.format === 'json' ? jsonText(found) : constraintList(found, terminal));
  }
  return exitStatus.fine;
}
