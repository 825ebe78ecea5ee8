import { closedFormsByAlgebra } from '../closed-form/algebra.ts';
import { constantValues } from '../constraint/constants.ts';
import { readConstraint } from '../constraint/constraint.ts';
import { standardDomain } from '../constraint/domain.ts';
import { vetFunctional } from '../constraint/vet.ts';
import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import { explanationText } from '../report/explain.ts';
import { foundText } from '../report/found.ts';
import type { Shelf } from '../shelf/shelf.ts';
import { explanationOf, findFunctional, openCatalogue } from './engine.ts';
import { settle } from './problems.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

export interface ExplainOptions {
  readonly constraints?: readonly string[];
  /** A functional that the condition is asked of. */
  readonly for?: string;
}

/** `rungcheck explain`: one condition, what it says and what a violation of it means; with `--for` what was found there. */
export function explainCommand(id: string, options: ExplainOptions, terminal: Terminal): number {
  const shelf = openCatalogue(options.constraints ?? []);
  const definition = settle(shelf.constraint(id));
  const functional = options.for === undefined ? undefined : settle(findFunctional(shelf, options.for));
  terminal.writeOut(explanationText(explanationOf(definition), terminal));
  if (functional !== undefined) {
    const found = findingsFor(shelf, id, functional);
    terminal.writeOut(`\n${foundText(found.findings[0] as Finding, found, terminal)}`);
  }
  return exitStatus.fine;
}

/** On the standard domain, with what lies around the witness. */
function findingsFor(shelf: Shelf, id: string, functional: Functional): FunctionalFindings {
  const constraint = settle(readConstraint(settle(shelf.constraint(id)), (sheet) => shelf.functional(sheet)));
  return vetFunctional(functional, [constraint], {
    domain: standardDomain,
    constants: constantValues(new Map()),
    parameters: new Map(),
    neighbourhood: true,
    closedForms: closedFormsByAlgebra,
  });
}
