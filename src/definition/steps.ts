import type { SourcePlace } from '../errors/problem.ts';
import { advice, type ProblemCollector, shown } from './collector.ts';
import type { Import, Step } from './functional-definition.ts';
import { idPattern } from './names.ts';
import { entriesOf, entryOf, type SheetNode, scalarOf, textOf } from './tree.ts';

/** The file and id of a sheet that is parsed. */
export interface SheetOrigin {
  readonly file: string;
  readonly id: string;
}

/** The steps of a mapping of names to expressions, in the order of the file. */
export function stepsIn(node: SheetNode | undefined): readonly Step[] {
  return entriesOf(node).flatMap(({ key, keyPlace, node: held }) => {
    const value = scalarOf(held);
    return value === undefined ? [] : [{ name: key, value, place: keyPlace }];
  });
}

/** The imports under `uses`; those of the wrong form are left out. */
export function importsIn(node: SheetNode | undefined): readonly Import[] {
  return entriesOf(node).flatMap(({ key, keyPlace, node: held }) => {
    const sheet = scalarOf(held)?.text ?? textOf(held, 'sheet');
    const parameters = stepsIn(entryOf(held, 'parameters')?.node);
    return sheet === undefined ? [] : [{ alias: key, sheet, parameters, place: keyPlace }];
  });
}

/** Reports an alias that `uses` (its node given, or undefined when the sheet has none) does not define. */
export function checkAlias(
  alias: string,
  uses: SheetNode | undefined,
  place: SourcePlace,
  problems: ProblemCollector,
): void {
  if (entryOf(uses, alias) !== undefined) return;
  const known = entriesOf(uses).map(({ key }) => key);
  const otherwise = `Add it: uses: { ${shown(alias)}: <sheet id> }.`;
  problems.add('missing-import', place, `uses has no ${shown(alias)}`, () => advice(alias, known, otherwise));
}

/** Reports an id (the file name without .yaml) that no other sheet could name. */
export function checkId({ file, id }: SheetOrigin, problems: ProblemCollector): void {
  if (idPattern.test(id)) return;
  const message = `"${shown(id)}" is not an id`;
  const remedy = 'Name the file with lower case letters, digits and hyphens: my-functional.yaml.';
  problems.add('wrong-value', { file, line: 1, column: 1 }, message, remedy);
}
