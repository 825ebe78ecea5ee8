import { jsonText } from '../report/json.ts';
import { constraintList, functionalList, type ListedFunctional } from '../report/list.ts';
import { allOf, listedConstraint, listedFunctional, openCatalogue } from './engine.ts';
import { settle } from './problems.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

export interface ListOptions {
  readonly format: 'table' | 'json';
  readonly constraints?: readonly string[];
  readonly rung?: string;
  readonly part?: string;
  readonly hybrid?: boolean;
  readonly match?: string;
}

/** `rungcheck list`: what can be vetted, and against what. */
export function listCommand(what: string, options: ListOptions, terminal: Terminal): number {
  const shelf = openCatalogue(options.constraints ?? []);
  if (what === 'functionals') {
    const all = settle(allOf(shelf.functionalIds().map((id) => shelf.functional(id)))).map(listedFunctional);
    const found = all.filter((functional) => isWanted(functional, options));
    terminal.writeOut(options.format === 'json' ? jsonText(found) : functionalList(found, terminal));
  } else {
    const all = settle(allOf(shelf.constraintIds().map((id) => shelf.constraint(id)))).map(listedConstraint);
    const found = all.filter(
      ({ id, title, part }) =>
        (options.part === undefined || part === options.part) && matches(options.match, id, title),
    );
    terminal.writeOut(options.format === 'json' ? jsonText(found) : constraintList(found, terminal));
  }
  return exitStatus.fine;
}

function isWanted({ id, name, rung, parts, exactExchange, summary }: ListedFunctional, options: ListOptions): boolean {
  return (
    (options.rung === undefined || rung === options.rung) &&
    (options.part === undefined || parts.includes(options.part)) &&
    (options.hybrid !== true || exactExchange !== null) &&
    matches(options.match, id, name, summary ?? '')
  );
}

function matches(wanted: string | undefined, ...texts: readonly string[]): boolean {
  return wanted === undefined || texts.some((text) => text.toLowerCase().includes(wanted.toLowerCase()));
}
