import { failure, type Outcome, success } from '../errors/problem.ts';
import { ProblemCollector, shown } from './collector.ts';
import type {
  Conflict,
  ConstrainedPart,
  ConstraintDefinition,
  Force,
  GateLevel,
  KnownCase,
  RuleName,
  Space,
  Status,
  Table,
} from './constraint-definition.ts';
import { constraintSheet } from './constraint-sheet.ts';
import { decimalNumber } from './field.ts';
import type { Rung } from './functional-definition.ts';
import { checkShape } from './shape.ts';
import type { SourceText } from './source-text.ts';
import { checkId, importsIn, type SheetOrigin, stepsIn } from './steps.ts';
import { entriesOf, entryOf, given, itemsOf, type SheetNode, scalarOf, sourceOf, textOf, textsOf } from './tree.ts';
import { parseYaml } from './yaml.ts';

export type {
  Conflict,
  ConstantChoice,
  ConstrainedPart,
  ConstraintDefinition,
  Force,
  GateLevel,
  KnownCase,
  RuleName,
  Space,
  Status,
  Table,
} from './constraint-definition.ts';

/**
 * The condition that a sheet defines, or every problem of the sheet's form, each at its line and column.
 * The requirement is kept as text and not looked into. Never throws for any text.
 */
export function parseConstraintSheet(text: string, origin: SheetOrigin): Outcome<ConstraintDefinition> {
  const problems = new ProblemCollector();
  checkId(origin, problems);
  const root = parseYaml(text, origin.file, problems);
  if (root === undefined) return failure(problems.sorted());
  checkShape(root, constraintSheet, problems);
  checkNames(root, problems);
  checkGate(root, problems);
  checkTable(root, problems);
  checkDecider(root, problems);
  const requirement = sourceOf(root, 'requirement') ?? sourceOf(root, 'rule');
  if (!problems.empty || requirement === undefined) return failure(problems.sorted());
  return success(read(root, text, origin, requirement));
}

/** Reads a sheet that the schema accepts. */
function read(root: SheetNode, text: string, origin: SheetOrigin, requirement: SourceText): ConstraintDefinition {
  const level = textOf(root, 'gate') as GateLevel | undefined;
  const gate = level === undefined ? undefined : { level, reason: textOf(root, 'gate-reason') ?? '' };
  return {
    id: origin.id,
    file: origin.file,
    text,
    title: textOf(root, 'title') ?? origin.id,
    statement: textOf(root, 'statement') ?? '',
    ...given('localForm', textOf(root, 'local-form')),
    ...given('derivation', textOf(root, 'derivation')),
    force: textOf(root, 'force') as Force,
    forceFor: Object.fromEntries(
      entriesOf(entryOf(root, 'force-for')?.node).map(({ key, node }) => [key, scalarOf(node)?.text as Force]),
    ),
    status: textOf(root, 'status') as Status,
    ...given('gate', gate),
    sources: textsOf(root, 'sources'),
    part: textOf(root, 'part') as ConstrainedPart,
    rungs: textsOf(root, 'rungs') as readonly Rung[],
    space: (textOf(root, 'space') ?? 'slice') as Space,
    at: stepsIn(entryOf(root, 'at')?.node),
    sweep: entriesOf(entryOf(root, 'sweep')?.node).map(({ key, keyPlace, node }) => {
      return { name: key, values: valuesIn(node), place: keyPlace };
    }),
    ...given('table', tableIn(root)),
    uses: importsIn(entryOf(root, 'uses')?.node),
    constants: entriesOf(entryOf(root, 'constants')?.node).flatMap(({ key, keyPlace, node }) => {
      const constant = scalarOf(node)?.text;
      return constant === undefined ? [] : [{ name: key, constant, place: keyPlace }];
    }),
    requirement,
    ...given('rule', textOf(root, 'rule') as RuleName | undefined),
    relative: textOf(root, 'relative') === 'true',
    tolerance: decimalNumber(textOf(root, 'tolerance') ?? '0') ?? 0,
    ...given('toleranceReason', textOf(root, 'tolerance-reason')),
    cannotMeet: itemsOf(root, 'cannot-meet').map(conflictOf),
    holds: itemsOf(root, 'holds').flatMap((item) =>
      item.kind === 'scalar' ? [{ id: item.value.text, place: item.place }] : [],
    ),
    breaks: itemsOf(root, 'breaks').map(counterexampleOf),
    traps: textsOf(root, 'traps'),
  };
}

function conflictOf(item: SheetNode): Conflict {
  return {
    rungs: textsOf(item, 'rungs') as readonly Rung[],
    ...given('with', textOf(item, 'with')),
    reason: textOf(item, 'reason') ?? '',
    place: item.place,
  };
}

function counterexampleOf(item: SheetNode): KnownCase {
  return {
    id: textOf(item, 'id') ?? '',
    ...given('where', textOf(item, 'where')),
    ...given('source', textOf(item, 'source')),
    place: item.place,
  };
}

function valuesIn(node: SheetNode): SourceText[] {
  return node.kind === 'list' ? node.items.flatMap((item) => scalarOf(item) ?? []) : [];
}

function tableIn(root: SheetNode): Table | undefined {
  const entry = entryOf(root, 'table');
  const columns = entryOf(entry?.node, 'columns')?.node;
  if (entry === undefined || columns === undefined) return undefined;
  return { columns: valuesIn(columns), rows: itemsOf(entry.node, 'rows').map(valuesIn), place: entry.keyPlace };
}

/** Every row of a table is as long as its columns. */
function checkTable(root: SheetNode, problems: ProblemCollector): void {
  const table = entryOf(root, 'table')?.node;
  const width = itemsOf(table, 'columns').length;
  for (const row of itemsOf(table, 'rows')) {
    if (row.kind !== 'list' || row.items.length === width) continue;
    const message = `this row has ${row.items.length} values for ${width} columns`;
    problems.add('wrong-value', row.place, message, 'Give each row one value for each column.');
  }
}

/** An alias and a constant must not share a name. */
function checkNames(root: SheetNode, problems: ProblemCollector): void {
  const uses = entryOf(root, 'uses')?.node;
  for (const { key, keyPlace } of entriesOf(entryOf(root, 'constants')?.node)) {
    const alias = entryOf(uses, key);
    if (alias === undefined) continue;
    const message = `${shown(key)} is a constant here and an alias in line ${alias.keyPlace.line}`;
    problems.add('duplicate-key', keyPlace, message, 'Give one of the two another name.');
  }
}

function checkGate(root: SheetNode, problems: ProblemCollector): void {
  const gate = entryOf(root, 'gate');
  const reason = entryOf(root, 'gate-reason');
  if (gate !== undefined && reason === undefined) {
    const remedy = 'Add gate-reason: say why it does not follow from force and status.';
    problems.add('missing-key', gate.keyPlace, 'the sheet has a gate and no gate-reason', remedy);
  }
  if (gate === undefined && reason !== undefined) {
    const remedy = 'Add gate, or remove gate-reason.';
    problems.add('missing-key', reason.keyPlace, 'the sheet has a gate-reason and no gate', remedy);
  }
}

/** A requirement or a rule decides, never both. */
function checkDecider(root: SheetNode, problems: ProblemCollector): void {
  const requirement = entryOf(root, 'requirement');
  const rule = entryOf(root, 'rule');
  if (requirement === undefined && rule === undefined && root.kind === 'mapping') {
    const remedy = 'Add requirement: it must be a comparison of two expressions.';
    problems.add('missing-key', root.place, 'the sheet has no requirement', remedy);
  }
  if (requirement !== undefined && rule !== undefined) {
    problems.add('duplicate-key', rule.keyPlace, 'the sheet has a requirement and a rule', 'Remove one of the two.');
  }
}
