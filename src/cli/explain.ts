import { closedFormsByAlgebra } from '../closed-form/algebra.ts';
import { constantValues } from '../constraint/constants.ts';
import { type Constraint, readConstraint } from '../constraint/constraint.ts';
import { standardDomain } from '../constraint/domain.ts';
import { vetFunctional } from '../constraint/vet.ts';
import type { Finding, FunctionalFindings } from '../finding/finding.ts';
import type { Functional } from '../functional/functional.ts';
import { explanationText } from '../report/explain.ts';
import { foundText } from '../report/found.ts';
import { signedText } from '../report/number-text.ts';
import type { Shelf } from '../shelf/shelf.ts';
import { explanationOf, findFunctional, openCatalogue } from './engine.ts';
import { settle } from './problems.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

export interface ExplainOptions {
  readonly constraints?: readonly string[];
  /** A functional that the condition is asked of. */
  readonly for?: string;
  /** Asks it of the functionals known to hold or to break it, and shows their margins. */
  readonly margins?: boolean;
}

/** `rungcheck explain`: one condition, what it says and what a violation of it means; with `--for` what was found there. */
export function explainCommand(id: string, options: ExplainOptions, terminal: Terminal): number {
  const shelf = openCatalogue(options.constraints ?? []);
  const definition = settle(shelf.constraint(id));
  const functional = options.for === undefined ? undefined : settle(findFunctional(shelf, options.for));
  const margins = options.margins === true ? knownMargins(shelf, id) : undefined;
  terminal.writeOut(explanationText(explanationOf(definition, margins), terminal));
  if (functional !== undefined) {
    const found = findingsFor(shelf, id, functional);
    terminal.writeOut(`\n${foundText(found.findings[0] as Finding, found, terminal)}`);
  }
  return exitStatus.fine;
}

const standardSettings = { domain: standardDomain, constants: constantValues(new Map()), parameters: new Map() };

/** On the standard domain, with what lies around the witness. */
function findingsFor(shelf: Shelf, id: string, functional: Functional): FunctionalFindings {
  return vetFunctional(functional, [constraintOf(shelf, id)], {
    ...standardSettings,
    neighbourhood: true,
    closedForms: closedFormsByAlgebra,
  });
}

/** The margins of the functionals known to hold or to break a condition, on the standard domain. */
function knownMargins(shelf: Shelf, id: string): Map<string, string> {
  const constraint = constraintOf(shelf, id);
  const { holds, breaks } = constraint.definition;
  return new Map(
    [...holds, ...breaks].map((known) => {
      const functional = settle(shelf.functional(known.id));
      const [finding] = vetFunctional(functional, [constraint], standardSettings).findings;
      const margin = finding?.margin;
      return [known.id, margin === null || margin === undefined ? `${finding?.verdict}` : signedText(margin)];
    }),
  );
}

function constraintOf(shelf: Shelf, id: string): Constraint {
  return settle(readConstraint(settle(shelf.constraint(id)), (sheet) => shelf.functional(sheet)));
}
