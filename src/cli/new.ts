import type { Rung } from '../definition/functional.ts';
import { idPattern } from '../definition/names.ts';
import { newSheet } from '../definition/template.ts';
import { ProblemError } from '../errors/problem.ts';
import { writeNewFile } from './output-file.ts';
import { wrongOption } from './problems.ts';
import { exitStatus } from './status.ts';
import type { Terminal } from './terminal.ts';

/** `rungcheck new`: a commented sheet in the current folder. */
export function newCommand(id: string, { rung }: { readonly rung: Rung }, terminal: Terminal): number {
  if (!idPattern.test(id) || id.length > 100) {
    const remedy = 'Use lower case letters and digits, with hyphens between: my-gga-2.';
    throw new ProblemError([wrongOption(`${id} cannot be the id of a sheet`, remedy)]);
  }
  const file = `${id}.yaml`;
  writeNewFile(file, newSheet(id, rung));
  terminal.writeOut(`wrote ${file}; vet it with: rungcheck vet ./${file}\n`);
  return exitStatus.fine;
}
