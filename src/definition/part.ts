import type { ProblemCollector } from './collector.ts';
import type { Form, Part, PartName } from './functional-definition.ts';
import { checkAlias, stepsIn } from './steps.ts';
import { entryOf, type MappingEntry, type SheetNode, scalarOf } from './tree.ts';

const partNames = ['exchange', 'correlation', 'exchange-correlation'] as const;

/** The parts of a functional sheet; those of the wrong form are reported and left out. */
export function partsIn(root: SheetNode, problems: ProblemCollector): readonly Part[] {
  const entries = partNames.flatMap((name) => {
    const entry = entryOf(root, name);
    return entry === undefined ? [] : [{ name, entry }];
  });
  const combined = entryOf(root, 'exchange-correlation');
  if (entries.length === 0) {
    const remedy = 'Add exchange, correlation or exchange-correlation.';
    problems.add('missing-key', root.place, 'the sheet has no part', remedy);
  } else if (combined !== undefined && entries.length > 1) {
    problems.add(
      'wrong-value',
      combined.keyPlace,
      'exchange-correlation stands beside exchange or correlation',
      'Keep either the combined part or the separate ones.',
    );
  }
  const uses = entryOf(root, 'uses')?.node;
  return entries.flatMap(({ name, entry }) => {
    const form = formOf(name, entry, uses, problems);
    const where = stepsIn(entryOf(entry.node, 'where')?.node);
    return form === undefined ? [] : [{ name, where, form, place: entry.keyPlace }];
  });
}

const forms: Readonly<Record<PartName, readonly string[]>> = {
  exchange: ['enhancement', 'per-particle', 'per-volume', 'from'],
  correlation: ['per-particle', 'per-volume', 'from', 'partition'],
  'exchange-correlation': ['per-particle', 'per-volume', 'from'],
};
const pairKeys = ['partition', 'same-spin', 'opposite-spin'];

function formOf(
  name: PartName,
  { keyPlace: place, node }: MappingEntry,
  uses: SheetNode | undefined,
  problems: ProblemCollector,
): Form | undefined {
  const shorthand = scalarOf(node);
  if (shorthand !== undefined) {
    checkAlias(shorthand.text, uses, node.place, problems);
    return { kind: 'from', alias: shorthand.text, place: node.place };
  }
  if (node.kind !== 'mapping') return undefined;
  const keys = [...node.entries.keys()];
  const isPair = (key: string) => name === 'correlation' && pairKeys.includes(key);
  // The three keys of the pairs form count as one form.
  const present = keys.filter((key) => forms[name].includes(key) || isPair(key));
  const second = present.find((key) => key !== present[0] && !(isPair(key) && isPair(present[0] as string)));
  if (present[0] === undefined) {
    const remedy = `Add one of ${forms[name].join(', ')}.`;
    problems.add('missing-key', place, `${name} has no form`, remedy);
    return undefined;
  }
  if (second !== undefined) {
    const at = entryOf(node, second)?.keyPlace ?? place;
    problems.add('wrong-value', at, `${name} has both ${present[0]} and ${second}`, 'Keep one form in a part.');
    return undefined;
  }
  if (present[0] === 'from') return fromForm(name, node, uses, problems);
  if (isPair(present[0])) return pairsForm(place, node, uses, problems);
  const value = scalarOf(entryOf(node, present[0])?.node);
  return value === undefined ? undefined : { kind: present[0] as 'enhancement' | 'per-particle' | 'per-volume', value };
}

function fromForm(
  name: PartName,
  node: SheetNode,
  uses: SheetNode | undefined,
  problems: ProblemCollector,
): Form | undefined {
  const alias = entryOf(node, 'from')?.node;
  const where = entryOf(node, 'where');
  if (where !== undefined) {
    const message = `where has no use in ${name}, which is taken from another sheet`;
    problems.add('wrong-value', where.keyPlace, message, 'Remove where, or write the form out.');
  }
  if (alias?.kind !== 'scalar') return undefined;
  checkAlias(alias.value.text, uses, alias.place, problems);
  return { kind: 'from', alias: alias.value.text, place: alias.place };
}

function pairsForm(
  place: MappingEntry['keyPlace'],
  node: SheetNode,
  uses: SheetNode | undefined,
  problems: ProblemCollector,
): Form | undefined {
  for (const key of pairKeys) {
    if (entryOf(node, key) !== undefined) continue;
    problems.add('missing-key', place, `correlation has no ${key}`, `Give ${pairKeys.join(', ')}.`);
  }
  const partition = entryOf(node, 'partition')?.node;
  const sameSpin = scalarOf(entryOf(node, 'same-spin')?.node);
  const oppositeSpin = scalarOf(entryOf(node, 'opposite-spin')?.node);
  if (partition?.kind !== 'scalar') return undefined;
  checkAlias(partition.value.text, uses, partition.place, problems);
  if (sameSpin === undefined || oppositeSpin === undefined) return undefined;
  return { kind: 'pairs', partition: partition.value.text, sameSpin, oppositeSpin, place: partition.place };
}
